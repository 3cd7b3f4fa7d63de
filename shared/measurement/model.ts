/** What readings of a test row are measured in. `1` is a ratio; lengths are kept in millimetres. */
export type MeasuredUnit = 'H' | 'Ω' | 'V' | 'A' | 'Hz' | 'F' | 'mm' | '1'

export type MeasuredCharacteristic =
  | 'inductance'
  | 'inductance-at-bias'
  | 'leakage'
  | 'dc-resistance'
  | 'turns-ratio'
  | 'polarity'
  | 'self-resonance'
  | 'interwinding-capacitance'
  | 'hipot'
  | 'insulation-resistance'
  | 'surge'
  | 'impulse'
  | 'partial-discharge'
  | 'dimension'
  | 'visual'

/** One row of the drawing's test table, as far as readings are mapped and judged by it. Limits in `unit`. */
export interface ExpectedRow {
  id: string
  symbol: string
  characteristic: MeasuredCharacteristic
  unit: MeasuredUnit
  minimum: number | null
  nominal: number | null
  maximum: number | null
  /** Test voltage, V; a withstand test at less is no evidence. */
  levelV: number | null
  /** Temperature that the limits are stated at, °C. */
  temperatureC: number | null
  extent: 'every-part' | 'sample' | 'type-test' | 'reference'
  record: 'reading' | 'pass-fail'
}

/** Values are in the unit of the test row. */
export type Reading =
  | { kind: 'value'; value: number }
  /** Beyond the instrument's range or a stated threshold; `bound` is null when the range's end is unknown. */
  | { kind: 'censored'; side: 'above' | 'below'; bound: number | null }
  | { kind: 'attribute'; passed: boolean }
  | { kind: 'withstand'; voltageV: number | null; timeS: number | null; currentA: number | null; passed: boolean }
  /** The instrument itself reported that it has no number (9.91E37 of IEEE 488.2 instruments). */
  | { kind: 'no-number' }

export interface AcceptedReading {
  serial: string
  /** 1 for the first test of a part, 2 for its re-test. */
  run: number
  rowId: string
  /** Cell in the file, e.g. `D14`. */
  address: string
  /** The cell as it stands in the file. */
  text: string
  reading: Reading
  /** Set where a person's answer or a unit in the cell changed the power of ten. */
  scaledBy: number | null
}

export type QuestionCode =
  | 'column-target'
  | 'unit-missing'
  | 'unit-ambiguous'
  | 'unit-unlike'
  | 'column-factor'
  | 'inverted-ratio'
  | 'ambiguous-number'
  | 'cell-factor'
  | 'zero-or-negative'
  | 'unsure-verdict'
  | 'date-for-number'
  | 'formula-error'
  | 'unreadable-cell'
  | 'unit-unknown'
  | 'serial-missing'
  | 'serial-duplicate'
  | 'serial-range'

export interface QuestionOption {
  id: string
  /** Figures, symbols or units for the option's words. */
  values: Readonly<Record<string, string | number>>
}

/** Something that only a person can decide. Questions with one `code` can be answered alike. */
export interface Question {
  /** `code:address`, stable for one file. */
  id: string
  code: QuestionCode
  address: string
  /** The cell or heading as it stands in the file. */
  text: string
  values: Readonly<Record<string, string | number>>
  options: QuestionOption[]
  /** Whether the answer may be typed instead of chosen. */
  typed: boolean
}

/** `option` is one of the question's, or `typed` with the text. */
export interface Answer {
  questionId: string
  option: string
  text?: string
}

export interface RejectedCell {
  address: string
  text: string
  serial: string | null
  rowId: string | null
  reason: 'left-out' | 'part-left-out'
}

export type ColumnTarget = { kind: 'serial' } | { kind: 'row'; rowId: string } | { kind: 'ignored' } | { kind: 'open' }

export interface ColumnMapping {
  address: string
  heading: string
  target: ColumnTarget
  how: 'symbol' | 'synonym' | 'position' | 'answer' | 'known-word' | 'open'
  /** Unit of bare numbers, as text; null while unknown or when cells carry their own. */
  unit: string | null
}

export type NoteCode =
  | 'mixed-units'
  | 'mixed-decimal-signs'
  | 'repaired-characters'
  | 'limit-differs'
  | 'summary-disagrees'
  | 'identical-readings'
  | 'line-ignored'
  | 'cells-outside-table'
  | 'row-without-readings'
  | 'other-revision'
  | 'other-drawing'

/** Worth reading, but nobody has to answer. */
export interface Note {
  code: NoteCode
  address: string
  values: Readonly<Record<string, string | number>>
}

export type DecimalSign = 'comma' | 'point' | 'undecided' | 'mixed'

export interface FileFacts {
  encoding: string
  separator: string
  decimalSign: DecimalSign
  /** Cells that speak for each sign, and one of them. */
  evidence: { comma: number; point: number; commaAt: string | null; pointAt: string | null }
  orientation: 'parts-in-rows' | 'parts-in-columns'
  headingAddress: string
}

export interface MeasurementReading {
  kind: 'read'
  facts: FileFacts
  columns: ColumnMapping[]
  /** What stands above the table, pairwise. */
  titleBlock: { address: string; label: string; value: string }[]
  serials: { serial: string; address: string; provisional: boolean; run: number }[]
  accepted: AcceptedReading[]
  questions: Question[]
  rejected: RejectedCell[]
  notes: Note[]
}

export type RefusalCode = 'empty-file' | 'not-a-text-table' | 'broken-quotes' | 'no-table' | 'no-parts' | 'too-many-cells'

/** The file cannot be read at all; nothing of it is kept as readings. */
export interface RefusedFile {
  kind: 'refused'
  code: RefusalCode
  values: Readonly<Record<string, string | number>>
}
