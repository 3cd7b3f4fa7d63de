/** Codes are permanent: they are stored with revisions and translated by the client. */
export type FindingCode =
  | 'bulk-capacitor-too-small'
  | 'core-loss-flux-out-of-range'
  | 'core-loss-frequency-out-of-range'
  | 'core-loss-temperature-out-of-range'
  | 'no-core-loss-data'
  | 'temperature-out-of-range'
  | 'thermal-runaway'
  | 'thermal-model-out-of-range'
  | 'window-overfilled'
  | 'wire-not-in-library'

export type Severity = 'note' | 'warning' | 'error'

export interface Finding {
  code: FindingCode
  severity: Severity
  /** Dotted path of the input that caused it, e.g. `windings.2.turnsCount`. */
  path: string
  /** Numbers for the message, unit in the key: `{ fillRatio: 1.08 }`. */
  values: Readonly<Record<string, number>>
}
