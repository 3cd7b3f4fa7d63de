import type { FieldStatus, Origin } from '#shared/engine/specification'

export const STATUS_ORDER: readonly FieldStatus[] = ['mandatory', 'reference', 'vendor-choice']

export const STATUS_MARKS: Readonly<Record<FieldStatus, { letter: string; word: string; meaning: string }>> = {
  mandatory: { letter: 'M', word: 'mandatory', meaning: 'the vendor answers for it' },
  reference: { letter: 'R', word: 'reference', meaning: 'for information, not inspected' },
  'vendor-choice': { letter: 'V', word: 'vendor’s choice', meaning: 'declared by the vendor, frozen at approval' },
}

export const ORIGIN_LETTERS: Readonly<Record<Origin['kind'], string>> = { entered: '', proposed: 'P', library: 'L', default: 'D' }

export function originWords(origin: Origin): string {
  switch (origin.kind) {
    case 'entered':
      return origin.reason ? `Entered: ${origin.reason}` : 'Entered by a person'
    case 'proposed':
      return `Proposed by the engine, version ${origin.engine}`
    case 'library':
      return `From the parts library: ${origin.row.id}, version ${origin.row.version}`
    case 'default':
      return `Default: ${origin.source}`
  }
}
