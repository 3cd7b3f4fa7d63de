import { Decimal } from '#shared/money'

/** One fixed table for a whole comparison: what one unit of each currency is worth in the base currency. */
export interface ExchangeRates {
  base: string
  /** Calendar date that the rates are of, ISO 8601. */
  date: string
  /** Who published them, in words a reader can look up years later. */
  source: string
  /** Decimal text by ISO 4217 code: base units for one unit of the currency. */
  rates: Readonly<Record<string, string>>
}

/** The rate of a currency, `1` for the base itself, or null when the table has none. */
export function rateOf(table: ExchangeRates, currency: string): Decimal | null {
  if (currency === table.base) return new Decimal(1)
  const rate = Object.hasOwn(table.rates, currency) ? table.rates[currency] : undefined
  return rate === undefined ? null : new Decimal(rate)
}
