import type { Quote } from '#shared/contracts/quotes'
import { DELIVERY_RULES } from '#shared/contracts/rfqs'
import { isCurrency } from '#shared/money'
import { formatMoney } from '#shared/number-format'
import { CURRENCIES } from '@/components/base/currencies'
import { PRICE_UNITS } from './quote-entry'

/** What a price is for, as it is said after the amount. */
export const perText = (priceUnit: number): string => (priceUnit === 1 ? 'each' : `per ${priceUnit}`)

export const PRICE_UNIT_CHOICES = PRICE_UNITS.map((value) => ({ value, label: value === 1 ? 'each' : `per ${value} pieces` }))

export const CURRENCY_CHOICES = CURRENCIES.filter(({ code }) => isCurrency(code))

const RULE_WORDS: Record<(typeof DELIVERY_RULES)[number], string> = {
  EXW: 'Ex works',
  FCA: 'Free carrier',
  FAS: 'Free alongside ship',
  FOB: 'Free on board',
  CFR: 'Cost and freight',
  CIF: 'Cost, insurance and freight',
  CPT: 'Carriage paid to',
  CIP: 'Carriage and insurance paid to',
  DAP: 'Delivered at place',
  DPU: 'Delivered at place unloaded',
  DDP: 'Delivered duty paid',
}

export const DELIVERY_CHOICES = DELIVERY_RULES.map((value) => ({ value, label: `${value} ${RULE_WORDS[value]}` }))

export const QUOTE_STATE_WORDS: Record<Quote['state'], string> = {
  submitted: 'Submitted, valid',
  superseded: 'Replaced by a later revision',
  withdrawn: 'Withdrawn',
}

export const ONE_TIME_WORDS = { amount: 'Amount', included: 'Included in the price', 'not-quoted': 'Not quoted' } as const
export const SAMPLES_WORDS = { amount: 'Price for all samples', included: 'Free of charge', 'not-quoted': 'Not quoted' } as const

/** An amount where null says nothing and zero says included. */
export function costText(amount: string | null, currency: string, included: string): string {
  if (amount === null) return 'not quoted'
  return Number(amount) === 0 ? included : formatMoney(amount, currency)
}

export const daysText = (days: number | null): string => (days === null ? '–' : `${days} d`)
