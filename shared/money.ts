import { Decimal as BaseDecimal } from 'decimal.js'

/** Exact decimals of this program: 40 significant digits, halves away from zero. */
export const Decimal = BaseDecimal.clone({ precision: 40, rounding: BaseDecimal.ROUND_HALF_UP })
export type Decimal = BaseDecimal

/** Decimal text with six places, as a `numeric(18,6)` column holds it. Never a float. */
export const AMOUNT_PATTERN = /^-?\d{1,12}\.\d{6}$/

/** Places after the point that amounts are kept with. */
export const AMOUNT_PLACES = 6

const LARGEST_AMOUNT = new Decimal('999999999999.999999')

/**
 * Decimals of the currencies' minor units. Source: ISO 4217:2015, list one (active national currencies;
 * funds, metals and test codes left out).
 */
export const CURRENCY_MINOR_UNITS: Readonly<Record<string, number>> = {
  AED: 2, ARS: 2, AUD: 2, BDT: 2, BGN: 2, BHD: 3, BRL: 2, CAD: 2, CHF: 2, CLP: 0, CNY: 2, COP: 2, CRC: 2, CZK: 2,
  DKK: 2, DZD: 2, EGP: 2, EUR: 2, GBP: 2, GEL: 2, HKD: 2, HUF: 2, IDR: 2, ILS: 2, INR: 2, ISK: 0, JOD: 3, JPY: 0,
  KES: 2, KRW: 0, KWD: 3, KZT: 2, LKR: 2, MAD: 2, MDL: 2, MKD: 2, MXN: 2, MYR: 2, NGN: 2, NOK: 2, NZD: 2, OMR: 3,
  PEN: 2, PHP: 2, PKR: 2, PLN: 2, QAR: 2, RON: 2, RSD: 2, SAR: 2, SEK: 2, SGD: 2, THB: 2, TND: 3, TRY: 2, TWD: 2,
  TZS: 2, UAH: 2, USD: 2, UYU: 2, VND: 0, ZAR: 2,
}

/** The currencies that can be chosen, in alphabetical order of their ISO 4217 code. */
export const CURRENCIES: readonly string[] = Object.keys(CURRENCY_MINOR_UNITS)

/** Whether a text is an ISO 4217 code that this program knows. */
export const isCurrency = (code: string): boolean => Object.hasOwn(CURRENCY_MINOR_UNITS, code)

/** An exact amount with its currency; `amount` is decimal text. */
export interface Money {
  amount: string
  currency: string
}

/**
 * Writes a decimal as amount text with exactly six places.
 *
 * @throws RangeError when it has more than six places or does not fit `numeric(18,6)`
 */
export function amountText(value: Decimal | string | number): string {
  const amount = new Decimal(value)
  if (amount.decimalPlaces() > AMOUNT_PLACES) throw new RangeError(`more than six places: ${amount}`)
  if (!amount.isFinite() || amount.abs().gt(LARGEST_AMOUNT)) throw new RangeError(`amount out of range: ${amount}`)
  return amount.toFixed(AMOUNT_PLACES)
}

/** Rounds to six places, halves away from zero: for a computed figure that has to be stored. */
export const roundedAmountText = (value: Decimal): string => amountText(value.toDecimalPlaces(AMOUNT_PLACES))

/**
 * Sum of amounts in one currency, exact.
 *
 * @throws RangeError when the currencies differ
 */
export function addMoney(first: Money, ...others: Money[]): Money {
  const stranger = others.find(({ currency }) => currency !== first.currency)
  if (stranger) throw new RangeError(`cannot add ${stranger.currency} to ${first.currency}`)
  const sum = others.reduce((total, { amount }) => total.plus(amount), new Decimal(first.amount))
  return { amount: amountText(sum), currency: first.currency }
}

/** An amount for a number of pieces, rounded to six places. */
export const multiplyMoney = ({ amount, currency }: Money, factor: Decimal | string | number): Money => ({
  amount: roundedAmountText(new Decimal(amount).times(factor)),
  currency,
})
