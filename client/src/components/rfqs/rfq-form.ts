import type { Rfq, RfqInput } from '#shared/contracts/rfqs'
import type { ZonedMoment } from '@/components/base/DateTimeZoneInput.vue'

export interface LineEntry {
  releaseId: string
  quantities: (number | null)[]
  orderQuantity: number | null
  annualQuantity: number | null
  sampleQuantity: number | null
}

/** What the form holds while it is typed; plain data, so that it survives a reload. */
export interface RfqEntry {
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

export const emptyLine = (releaseId = ''): LineEntry => ({ releaseId, quantities: [1000, 5000], orderQuantity: 1000, annualQuantity: null, sampleQuantity: 5 })

export function entryOf(rfq: Rfq | null, home: { currency: string }): RfqEntry {
  if (!rfq) {
    return {
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
    title: rfq.title,
    due: { at: rfq.dueAt, zone: rfq.dueZone },
    currency: rfq.currency,
    deliveryRule: rfq.deliveryRule,
    deliveryPlace: rfq.deliveryPlace,
    ...terms,
    questionsUntil: terms.questionsUntil === null ? null : { at: terms.questionsUntil, zone: rfq.dueZone },
    lines: rfq.lines.map(({ release, quantities, orderQuantity, annualQuantity, sampleQuantity }) => ({ releaseId: release.id, quantities: [...quantities], orderQuantity, annualQuantity, sampleQuantity })),
    vendorCompanyIds: rfq.invitations.map(({ vendorCompanyId }) => vendorCompanyId),
  }
}

/** What is sent. Entries left empty go as zero or empty text, which the server refuses at their place. */
export function inputOf(entry: RfqEntry): RfqInput {
  const { title, due, currency, deliveryRule, deliveryPlace, lines, vendorCompanyIds, questionsUntil, validityDays, samplesNeededOn, ...words } = entry
  const { paymentTerms, packing, quality, compliance, awardBasis, general } = words
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
