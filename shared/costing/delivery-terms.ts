/** The rules of Incoterms® 2020 by their three letters. */
export const DELIVERY_TERMS = ['EXW', 'FCA', 'FAS', 'FOB', 'CFR', 'CIF', 'CPT', 'CIP', 'DAP', 'DPU', 'DDP'] as const
export type DeliveryTerm = (typeof DELIVERY_TERMS)[number]

/** What the seller's price already covers under a rule. */
export interface Covered {
  /** Carriage to the named place. */
  carriage: boolean
  /** Insurance during carriage: bought by the seller, or the goods travel at the seller's risk. */
  insurance: boolean
  importDuty: boolean
}

/** Source: Incoterms® 2020, articles A2, A4 to A6 and A9 of each rule. */
export function coveredBy(term: DeliveryTerm): Covered {
  switch (term) {
    case 'EXW':
    case 'FCA':
    case 'FAS':
    case 'FOB':
      return { carriage: false, insurance: false, importDuty: false }
    case 'CFR':
    case 'CPT':
      return { carriage: true, insurance: false, importDuty: false }
    case 'CIF':
    case 'CIP':
    case 'DAP':
    case 'DPU':
      return { carriage: true, insurance: true, importDuty: false }
    case 'DDP':
      return { carriage: true, insurance: true, importDuty: true }
  }
}
