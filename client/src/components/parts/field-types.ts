export interface Choice {
  value: string
  label: string
}

interface FieldBase {
  /** Dotted path in the row; within a list or a variant, from there. */
  path: string
  label: string
  help?: string
}

export interface FigureField extends FieldBase {
  type: 'figure'
  /** Symbol of `#shared/shown-units`; empty for plain numbers. */
  unit: string
  optional?: boolean
  whole?: boolean
}

export interface TextField extends FieldBase {
  type: 'text'
  optional?: boolean
  /** Takes two columns among the entries of a line. */
  wide?: boolean
}

export interface ChoiceField extends FieldBase {
  type: 'choice'
  choices: readonly Choice[]
}

export type PlainField = FigureField | TextField | ChoiceField

/** A part of the row that takes one of several forms, or none. */
export interface VariantField extends FieldBase {
  type: 'variant'
  forms: readonly { value: string; label: string; make: () => Record<string, unknown> | null; fields: readonly PlainField[] }[]
  /** Which form a stored value has. */
  formOf: (value: Record<string, unknown> | null) => string
}

export interface ListField extends FieldBase {
  type: 'list'
  /** What one line is called, for the button that adds one. */
  line: string
  columns: readonly PlainField[]
}

/** Plain figures, without names: the widths that a tape is sold in. */
export interface FiguresField extends FieldBase {
  type: 'figures'
  unit: string
}

export type PartField = PlainField | VariantField | ListField | FiguresField

export interface PartSection {
  title: string
  fields: readonly PartField[]
}
