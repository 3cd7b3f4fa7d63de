import type { Rfq, RfqInput } from '#shared/contracts/rfqs'
import type { ZonedMoment } from '@/components/base/DateTimeZoneInput.vue'

export interface LineEntry {
  /** Tells entries of the form apart while others are removed. */
  key: number
  releaseId: string
  quantities: (number | null)[]
  orderQuantity: number | null
  annualQuantity: number | null
  sampleQuantity: number | null
}

/** What the form holds while it is typed; plain data, so that it survives a reload. */
export interface RfqEntry {
  /** Version of the stored enquiry that the typing began from; 0 for a new one. */
  version: number
  title: string
  due: ZonedMoment | null
  currency: string
  deliveryRule: RfqInput['deliveryRule']
  deliveryPlace: string
  paymentTerms: string
  packing: string
  quality: string
  compliance: string
  awardBasis: string
  general: string
  validityDays: number | null
  samplesNeededOn: string | null
  questionsUntil: ZonedMoment | null
  lines: LineEntry[]
  vendorCompanyIds: string[]
}

export const emptyLine = (key = 0): LineEntry => ({ key, releaseId: '', quantities: [1000, 5000], orderQuantity: 1000, annualQuantity: null, sampleQuantity: 5 })

export function entryOf(rfq: Rfq | null, home: { currency: string }): RfqEntry {
  if (!rfq) {
    return {
      version: 0,
      title: '',
      due: null,
      currency: home.currency,
      deliveryRule: 'DAP',
      deliveryPlace: '',
      paymentTerms: '30 days net',
      packing: '',
      quality: '',
      compliance: '',
      awardBasis: 'Lowest landed cost among technically compliant offers',
      general: '',
      validityDays: 60,
      samplesNeededOn: null,
      questionsUntil: null,
      lines: [emptyLine()],
      vendorCompanyIds: [],
    }
  }
  const { terms } = rfq
  return {
    version: rfq.version,
    title: rfq.title,
    due: { at: rfq.dueAt, zone: rfq.dueZone },
    currency: rfq.currency,
    deliveryRule: rfq.deliveryRule,
    deliveryPlace: rfq.deliveryPlace,
    ...terms,
    questionsUntil: terms.questionsUntil === null ? null : { at: terms.questionsUntil, zone: rfq.dueZone },
    lines: rfq.lines.map(({ release, quantities, orderQuantity, annualQuantity, sampleQuantity }, key) => ({ key, releaseId: release.id, quantities: [...quantities], orderQuantity, annualQuantity, sampleQuantity })),
    vendorCompanyIds: rfq.invitations.map(({ vendorCompanyId }) => vendorCompanyId),
  }
}

/** What is sent. Entries left empty go as zero or empty text, which the server refuses at their place. */
export function inputOf(entry: RfqEntry): RfqInput {
  const { title, due, currency, deliveryRule, deliveryPlace, lines, vendorCompanyIds, questionsUntil, validityDays, samplesNeededOn } = entry
  const { paymentTerms, packing, quality, compliance, awardBasis, general } = entry
  return {
    title,
    dueAt: due?.at ?? '',
    dueZone: due?.zone ?? '',
    currency,
    deliveryRule,
    deliveryPlace,
    terms: { paymentTerms, packing, quality, compliance, awardBasis, general, validityDays: validityDays ?? 0, samplesNeededOn, questionsUntil: questionsUntil?.at ?? null },
    lines: lines.map(({ releaseId, quantities, orderQuantity, annualQuantity, sampleQuantity }) => ({
      releaseId,
      quantities: quantities.map((quantity) => quantity ?? 0),
      orderQuantity: orderQuantity ?? 0,
      annualQuantity,
      sampleQuantity: sampleQuantity ?? 0,
    })),
    vendorCompanyIds,
  }
}

/** Input paths whose sentence stands at its entry in the form. */
export const isShownPath = (path: string): boolean =>
  /^(title|dueAt|dueZone|currency|deliveryRule|deliveryPlace|terms\.\w+|lines\.\d+\.\w+(\.\d+)?|lines|vendorCompanyIds(\.\d+)?)$/.test(path)

const LABELS: readonly [keyof RfqEntry, string][] = [
  ['title', 'title'],
  ['due', 'due time'],
  ['currency', 'currency'],
  ['deliveryRule', 'delivery rule'],
  ['deliveryPlace', 'named place'],
  ['paymentTerms', 'payment terms'],
  ['packing', 'packing'],
  ['quality', 'quality requirements'],
  ['compliance', 'compliance'],
  ['awardBasis', 'award basis'],
  ['general', 'other terms'],
  ['validityDays', 'validity'],
  ['samplesNeededOn', 'date of the samples'],
  ['questionsUntil', 'end of questions'],
  ['lines', 'parts and quantities'],
  ['vendorCompanyIds', 'vendors'],
]

/** What differs between what is typed and what a colleague stored meanwhile, in the words of the form. */
export function differences(typed: RfqEntry, stored: RfqEntry): string[] {
  const comparable = (entry: RfqEntry, key: keyof RfqEntry): string => {
    if (key === 'vendorCompanyIds') return [...entry.vendorCompanyIds].sort().join()
    if (key === 'lines') return JSON.stringify(entry.lines.map((line) => ({ ...line, key: 0 })))
    return JSON.stringify(entry[key])
  }
  return LABELS.filter(([key]) => comparable(typed, key) !== comparable(stored, key)).map(([, label]) => label)
}
