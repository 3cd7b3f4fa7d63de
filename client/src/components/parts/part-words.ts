import type { Confidence, LibraryKind } from '#shared/engine/library'
import type { PartFlags, PartOrigin } from '#shared/contracts/parts'

export const KIND_WORDS: Record<LibraryKind, { one: string; many: string }> = {
  core: { one: 'Core', many: 'Cores' },
  former: { one: 'Coil former', many: 'Coil formers' },
  material: { one: 'Core material', many: 'Core materials' },
  wire: { one: 'Wire', many: 'Wires' },
  tape: { one: 'Tape', many: 'Tapes' },
  sleeve: { one: 'Sleeve', many: 'Sleeves' },
}

export const CONFIDENCE_WORDS: Record<Confidence, string> = {
  high: 'high',
  medium: 'medium',
  low: 'low',
  generic: 'generic',
}

export const ORIGIN_WORDS: Record<PartOrigin, string> = { shared: 'shipped', company: 'own' }

const FAMILY_WORDS: Readonly<Record<string, string>> = {
  toroid: 'Ring',
  'E-planar': 'E, planar',
  EQ: 'ER, low profile',
  other: 'Other',
  round: 'Round',
  litz: 'Litz',
  foil: 'Foil',
  power: 'Power',
  wideband: 'Wideband',
  'common-mode': 'Common mode',
  powder: 'Powder',
  insulation: 'Insulation',
  margin: 'Margin',
}

export const familyWord = (family: string) => FAMILY_WORDS[family] ?? family

export const flagWords = ({ preferred, stocked }: PartFlags) => [preferred && 'preferred', stocked && 'in store'].filter(Boolean).join(', ')
