import { CHANGE_CLASSES, classesOf, type ChangeClass } from './change-classes'
import type { DocumentChange } from './compare-documents'

/** What a change asks of one column; each list rises from nothing to most. */
export const REQUOTE = ['no', 'maybe', 'ask-reduction', 'yes', 'with-tooling'] as const
export const SAMPLES = ['no', 'first-box', 'declaration', 'correlation', 'judge-old-data', 'new', 'new-with-dimensions', 'new-with-section'] as const
export const CERTIFICATION = ['no', 'routine-tests', 'if-insulation', 'wire-certificate', 'insulation-system', 'yes'] as const
export const RETEST = ['no', 'saturation-loss', 'thermal', 'interference-thermal', 'yes'] as const
export const STOCK = ['use', 'decide', 'sort', 'use-up', 'scrap-rework'] as const

export interface ChangeEffect {
  requote: (typeof REQUOTE)[number]
  samples: (typeof SAMPLES)[number]
  certification: (typeof CERTIFICATION)[number]
  retest: (typeof RETEST)[number]
  stock: (typeof STOCK)[number]
}

/** Common practice of the trade; vendors of the part are told of every change and acknowledge it. */
export const CHANGE_EFFECTS: Readonly<Record<ChangeClass, ChangeEffect>> = {
  clarification: { requote: 'no', samples: 'no', certification: 'no', retest: 'no', stock: 'use' },
  'limit-widened': { requote: 'ask-reduction', samples: 'no', certification: 'no', retest: 'no', stock: 'use' },
  'limit-tightened': { requote: 'yes', samples: 'judge-old-data', certification: 'no', retest: 'no', stock: 'sort' },
  'turns-gap': { requote: 'yes', samples: 'new', certification: 'if-insulation', retest: 'yes', stock: 'scrap-rework' },
  wire: { requote: 'yes', samples: 'new', certification: 'wire-certificate', retest: 'thermal', stock: 'use-up' },
  construction: { requote: 'yes', samples: 'new-with-section', certification: 'yes', retest: 'interference-thermal', stock: 'decide' },
  core: { requote: 'yes', samples: 'new', certification: 'insulation-system', retest: 'saturation-loss', stock: 'decide' },
  'former-pins': { requote: 'with-tooling', samples: 'new-with-dimensions', certification: 'yes', retest: 'no', stock: 'decide' },
  'process-material': { requote: 'maybe', samples: 'new', certification: 'insulation-system', retest: 'thermal', stock: 'decide' },
  'insulation-demand': { requote: 'yes', samples: 'new-with-section', certification: 'yes', retest: 'no', stock: 'decide' },
  'test-method': { requote: 'maybe', samples: 'correlation', certification: 'routine-tests', retest: 'no', stock: 'decide' },
  'marking-packing': { requote: 'maybe', samples: 'first-box', certification: 'no', retest: 'no', stock: 'use' },
  declaration: { requote: 'maybe', samples: 'declaration', certification: 'no', retest: 'no', stock: 'decide' },
}

const ORDERS = { requote: REQUOTE, samples: SAMPLES, certification: CERTIFICATION, retest: RETEST, stock: STOCK } as const

export interface ClassifiedChange {
  class: ChangeClass
  /** Keys of the differences of this kind. */
  keys: string[]
  effect: ChangeEffect
}

export interface ChangeVerdict {
  classes: ClassifiedChange[]
  /** The most that any of them asks, column by column. */
  total: ChangeEffect
}

/** What the differences between two specifications ask: who quotes, samples and certifies again. */
export function judgeChanges(changes: readonly DocumentChange[]): ChangeVerdict {
  const found = changes.map((change) => ({ key: change.key, classes: classesOf(change) }))
  const classes = CHANGE_CLASSES.flatMap((kind) => {
    const keys = found.filter((one) => one.classes.includes(kind)).map(({ key }) => key)
    return keys.length === 0 ? [] : [{ class: kind, keys, effect: CHANGE_EFFECTS[kind] }]
  })
  return { classes, total: mostOf(classes.map(({ effect }) => effect)) }
}

function mostOf(effects: readonly ChangeEffect[]): ChangeEffect {
  const most = <K extends keyof ChangeEffect>(column: K): ChangeEffect[K] => {
    const order: readonly string[] = ORDERS[column]
    return order[Math.max(0, ...effects.map((effect) => order.indexOf(effect[column])))] as ChangeEffect[K]
  }
  return { requote: most('requote'), samples: most('samples'), certification: most('certification'), retest: most('retest'), stock: most('stock') }
}
