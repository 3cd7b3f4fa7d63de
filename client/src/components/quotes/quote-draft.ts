import type { QuoteDraft } from '#shared/contracts/quotes'
import { COST_CHOICES, PRICE_UNITS, type BreakEntry, type CostChoice, type LineEntry, type PriceUnit, type QuoteEntry } from './quote-entry'

type Form = QuoteDraft['form']

/** The typed quotation as the flat record that the server keeps: dotted path → value. */
export function toDraftForm({ lines, ...terms }: QuoteEntry): Form {
  const form: Form = { ...terms }
  for (const [id, { breaks, ...line }] of Object.entries(lines)) {
    for (const [field, value] of Object.entries(line)) form[`lines.${id}.${field}`] = value
    breaks.forEach(({ fromQuantity, price }, index) => {
      form[`lines.${id}.breaks.${index}.fromQuantity`] = fromQuantity
      form[`lines.${id}.breaks.${index}.price`] = price
    })
  }
  return form
}

/** Reads one value of the kept record; what is absent or of another kind leaves the value of the start. */
class Kept {
  constructor(
    private readonly form: Form,
    private readonly prefix: string,
  ) {}

  private read<T>(field: string, fits: (value: unknown) => value is T, start: T): T {
    const value = this.form[`${this.prefix}${field}`]
    return fits(value) ? value : start
  }

  text = (field: string, start: string) => this.read(field, (value): value is string => typeof value === 'string', start)
  flag = (field: string, start: boolean) => this.read(field, (value): value is boolean => typeof value === 'boolean', start)
  count = (field: string, start: number | null) => this.read<number | null>(field, (value): value is number | null => value === null || typeof value === 'number', start)
  textOrNull = (field: string, start: string | null) => this.read<string | null>(field, (value): value is string | null => value === null || typeof value === 'string', start)
  choice = <T>(field: string, choices: readonly T[], start: T) => this.read(field, (value): value is T => choices.includes(value as T), start)

  breaks(start: BreakEntry[]): BreakEntry[] {
    const places = Object.keys(this.form).flatMap((path) => {
      const place = path.startsWith(`${this.prefix}breaks.`) ? Number(path.slice(this.prefix.length).split('.')[1]) : NaN
      return Number.isInteger(place) ? [place] : []
    })
    if (places.length === 0) return start.map((row) => ({ ...row }))
    const rows = [...new Set(places)].sort((a, b) => a - b)
    return rows.map((place) => ({ fromQuantity: this.count(`breaks.${place}.fromQuantity`, null), price: this.textOrNull(`breaks.${place}.price`, null) }))
  }
}

function lineFromForm(form: Form, id: string, start: LineEntry): LineEntry {
  const kept = new Kept(form, `lines.${id}.`)
  return {
    quoted: kept.flag('quoted', start.quoted),
    priceUnit: kept.choice<PriceUnit>('priceUnit', PRICE_UNITS, start.priceUnit),
    breaks: kept.breaks(start.breaks),
    oneTime: kept.choice<CostChoice>('oneTime', [...COST_CHOICES, ''], start.oneTime),
    oneTimeCost: kept.textOrNull('oneTimeCost', start.oneTimeCost),
    oneTimeCostText: kept.text('oneTimeCostText', start.oneTimeCostText),
    samples: kept.choice<CostChoice>('samples', [...COST_CHOICES, ''], start.samples),
    samplesPrice: kept.textOrNull('samplesPrice', start.samplesPrice),
    sampleLeadTimeDays: kept.count('sampleLeadTimeDays', start.sampleLeadTimeDays),
    firstOrderLeadTimeDays: kept.count('firstOrderLeadTimeDays', start.firstOrderLeadTimeDays),
    repeatLeadTimeDays: kept.count('repeatLeadTimeDays', start.repeatLeadTimeDays),
    minimumOrderQuantity: kept.count('minimumOrderQuantity', start.minimumOrderQuantity),
    packQuantity: kept.count('packQuantity', start.packQuantity),
    countryOfOrigin: kept.textOrNull('countryOfOrigin', start.countryOfOrigin),
  }
}

/** The kept record over a start: it may be older than the program and hold only some of the fields. */
export function fromDraftForm(form: Form, start: QuoteEntry): QuoteEntry {
  const kept = new Kept(form, '')
  return {
    vendorReference: kept.text('vendorReference', start.vendorReference),
    reason: kept.text('reason', start.reason),
    currency: kept.text('currency', start.currency),
    deliveryRule: kept.text('deliveryRule', start.deliveryRule),
    deliveryPlace: kept.text('deliveryPlace', start.deliveryPlace),
    paymentTerms: kept.text('paymentTerms', start.paymentTerms),
    paymentDays: kept.count('paymentDays', start.paymentDays),
    validUntil: kept.textOrNull('validUntil', start.validUntil),
    remarks: kept.text('remarks', start.remarks),
    lines: Object.fromEntries(Object.entries(start.lines).map(([id, line]) => [id, lineFromForm(form, id, line)])),
  }
}
