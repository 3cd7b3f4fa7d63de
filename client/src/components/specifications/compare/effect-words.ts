import type { ChangeClass } from '#shared/workflow/change-classes'
import type { ChangeEffect } from '#shared/workflow/change-effects'

export const CLASS_WORDS: Readonly<Record<ChangeClass, string>> = {
  clarification: 'Clarification without effect on the part',
  'limit-widened': 'Limit widened',
  'limit-tightened': 'Limit tightened',
  'turns-gap': 'Turns, gap or AL',
  wire: 'Wire',
  construction: 'Sequence, shield, margin or tape',
  core: 'Core, material or maker',
  'former-pins': 'Former, pin-out or footprint',
  'process-material': 'Varnish, adhesive or polymer',
  'insulation-demand': 'Insulation demanded',
  'test-method': 'Test condition or method',
  'marking-packing': 'Marking or packing',
  declaration: 'Compliance declarations',
}

type Words = { [C in keyof ChangeEffect]: Readonly<Record<ChangeEffect[C], string>> }

export const EFFECT_WORDS: Words = {
  requote: { no: 'no', maybe: 'maybe', 'ask-reduction': 'ask for a price reduction', yes: 'yes', 'with-tooling': 'yes, with tooling' },
  samples: {
    no: 'no',
    'first-box': 'photo of the first box',
    declaration: 'new declaration',
    correlation: 'correlation of the measurement',
    'judge-old-data': 'judge the data that is there first; then at least 30 parts against the new limit',
    new: 'new samples, first-article report',
    'new-with-dimensions': 'new samples, first-article report with dimensions',
    'new-with-section': 'new samples, first-article report with a cross-section',
  },
  certification: {
    no: 'no',
    'routine-tests': 'look at the routine test duties',
    'if-insulation': 'if volt-seconds or insulation are concerned',
    'wire-certificate': 'class and certificate of the wire',
    'insulation-system': 'insulation system',
    yes: 'yes',
  },
  retest: { no: 'no', 'saturation-loss': 'saturation and loss', thermal: 'temperature rise', 'interference-thermal': 'interference and temperature rise', yes: 'yes' },
  stock: { use: 'use', decide: 'decide', sort: 'sort', 'use-up': 'use up?', 'scrap-rework': 'scrap or rework' },
}

export const COLUMN_WORDS: Readonly<Record<keyof ChangeEffect, string>> = {
  requote: 'Re-quote',
  samples: 'Samples',
  certification: 'Safety certification',
  retest: 'Power-supply re-test',
  stock: 'Stock',
}

export const COLUMNS = Object.keys(COLUMN_WORDS) as (keyof ChangeEffect)[]

export const effectWord = (effect: ChangeEffect, column: keyof ChangeEffect): string => (EFFECT_WORDS[column] as Readonly<Record<string, string>>)[effect[column]]!

/** One line for the revision block: what the change does to samples and stock. */
export const effectLine = (effect: ChangeEffect): string =>
  COLUMNS.filter((column) => effect[column] !== 'no' && effect[column] !== 'use').map((column) => `${COLUMN_WORDS[column]}: ${effectWord(effect, column)}`).join('; ') || 'No effect on samples or stock'
