import type { CheckState } from '../../engine/evaluation'
import type { SheetStatus } from './input'
import type {
  BoundaryEnd,
  Characteristic,
  Contract,
  DocumentStatus,
  InsulationType,
  SequenceStep,
  Side,
  TestRow,
  Topology,
  WindingSpecification,
  WindingStep,
  WireInsulation,
} from '../../engine/specification'
import { windingName } from './input'

export const STATUS_WORDS: Record<SheetStatus | DocumentStatus, string> = {
  draft: 'Draft – not released',
  'in-check': 'In check – not released',
  'for-quotation-only': 'For quotation only',
  'for-samples-only': 'For samples only',
  released: 'Released',
  obsolete: 'Obsolete',
}

export const CONTRACT_WORDS: Record<Contract, string> = {
  'build-to-print': 'Build to print: the construction is fixed by this drawing.',
  'build-to-performance': 'Build to performance: the limits are fixed by this drawing, the vendor fixes the construction, which is frozen at approval.',
}

export const TOPOLOGY_WORDS: Record<Topology, string> = {
  flyback: 'flyback',
  forward: 'forward',
  'half-bridge': 'half bridge',
  'full-bridge': 'full bridge',
  'push-pull': 'push-pull',
  llc: 'LLC resonant',
  'coupled-inductor': 'coupled inductor',
  inductor: 'inductor',
  'common-mode-choke': 'common-mode choke',
  'gate-drive': 'gate drive',
  'current-sense': 'current sense',
}

export const SIDE_WORDS: Record<Side, string> = {
  primary: 'primary',
  secondary: 'secondary',
  'secondary-2': 'secondary 2',
  'secondary-3': 'secondary 3',
  floating: 'floating',
}

export const INSULATION_WORDS: Record<InsulationType, string> = {
  functional: 'functional',
  basic: 'basic',
  supplementary: 'supplementary',
  double: 'double',
  reinforced: 'reinforced',
}

export const WIRE_INSULATION_WORDS: Record<WireInsulation, string> = {
  'enamel-grade-1': 'enamelled, grade 1',
  'enamel-grade-2': 'enamelled, grade 2',
  'enamel-grade-3': 'enamelled, grade 3',
  'triple-insulated': 'triple insulated',
  'fully-insulated': 'fully insulated',
  bare: 'bare',
}

export const CHARACTERISTIC_WORDS: Record<Characteristic, string> = {
  inductance: 'Inductance',
  'inductance-at-bias': 'Inductance at d.c. bias',
  leakage: 'Leakage inductance',
  'dc-resistance': 'DC resistance',
  'turns-ratio': 'Turns ratio',
  polarity: 'Polarity',
  'self-resonance': 'Self-resonant frequency',
  'interwinding-capacitance': 'Interwinding capacitance',
  hipot: 'Withstand voltage (hipot)',
  'insulation-resistance': 'Insulation resistance',
  surge: 'Surge, winding',
  impulse: 'Impulse 1.2/50 µs',
  'partial-discharge': 'Partial discharge',
  dimension: 'Dimension',
  visual: 'Visual',
}

export const EXTENT_WORDS: Record<TestRow['extent'], string> = {
  'every-part': '100 %',
  sample: 'sample',
  'type-test': 'type test',
  reference: 'reference',
}

export const LAY_WORDS: Record<WindingStep['lay'], string> = {
  'close-wound': 'close-wound',
  spread: 'spread evenly',
  centred: 'centred',
  'close-wound-left': 'close-wound from left',
  'close-wound-right': 'close-wound from right',
}

export const DIRECTION_WORDS: Record<WindingStep['direction'], string> = { clockwise: 'CW', 'counter-clockwise': 'CCW' }

const TAPE_PURPOSE = { interlayer: 'Interlayer tape', interwinding: 'Interwinding tape', outer: 'Outer tape', base: 'Base tape' } as const
const CORE_TAPE_PURPOSE = { insulation: 'Core tape, insulation', banding: 'Core tape, banding', 'flux-band': 'Flux band' } as const

/** What a step of the winding sequence does, in the words of the shop floor. */
export function stepWords(specification: WindingSpecification, step: SequenceStep): string {
  switch (step.kind) {
    case 'winding':
      return `Winding ${windingName(specification, step.windingId)}`
    case 'tape':
      return TAPE_PURPOSE[step.purpose]
    case 'margin':
      return 'Margin tape'
    case 'shield':
      return `Shield ${windingName(specification, step.windingId)}, ${step.form}`
    case 'sleeve':
      return `Sleeve on lead ${step.lead}`
    case 'core-tape':
      return CORE_TAPE_PURPOSE[step.purpose]
    case 'varnish':
      return step.extent === 'coil-only' ? 'Varnish, coil only' : 'Varnish, coil and core'
  }
}

/** One end of an insulation boundary. */
export function boundaryEndWords(specification: WindingSpecification, end: BoundaryEnd): string {
  switch (end.kind) {
    case 'side':
      return SIDE_WORDS[end.side]
    case 'winding':
      return windingName(specification, end.windingId)
    case 'core':
      return 'core'
  }
}

export const STATE_WORDS: Record<CheckState, string> = { met: 'met', 'not-met': 'NOT MET', 'not-checkable': 'not checkable' }
