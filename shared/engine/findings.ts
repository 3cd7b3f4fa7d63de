/** Codes are permanent: they are stored with revisions and translated by the client. */
export type FindingCode =
  | 'bulk-capacitor-too-small'
  | 'commutation-time-assumed'
  | 'core-loss-flux-out-of-range'
  | 'core-loss-frequency-out-of-range'
  | 'core-loss-temperature-out-of-range'
  | 'core-loss-under-bias'
  | 'harmonic-sum-capped'
  | 'no-core-loss-data'
  | 'temperature-out-of-range'
  | 'thermal-runaway'
  | 'thermal-model-out-of-range'
  | 'window-overfilled'
  | 'wire-not-in-library'
  | CompositionFindingCode

/** What the composition of the stages finds: the sequence, the document against itself and against the library. */
export type CompositionFindingCode =
  // the coil
  | 'margin-lower-than-winding'
  | 'tape-not-in-library'
  | 'tape-wider-than-former'
  | 'foil-wider-than-former'
  | 'sequence-names-unknown-winding'
  | 'section-not-on-former'
  | 'turn-wider-than-layer'
  | 'layers-too-few'
  | 'cannot-be-wound-together'
  | 'lead-crossing-too-high'
  | 'ring-hole-full'
  | 'step-not-for-a-ring'
  | 'too-many-turns-to-draw'
  | 'leakage-wound-together'
  | 'field-not-calculable'
  // the library
  | 'core-not-in-library'
  | 'former-not-in-library'
  | 'material-not-in-library'
  | 'former-belongs-to-another-core'
  | 'wire-overall-diameter-unknown'
  | 'generic-row-used'
  | 'capacitance-not-calculable'
  | 'no-saturation-data'
  | 'no-bias-data'
  // the duty
  | 'no-primary-winding'
  | 'several-primary-windings'
  | 'output-without-winding'
  | 'output-has-several-windings'
  | 'output-lacks-half-winding'
  | 'primary-lacks-half-winding'
  | 'half-windings-differ'
  | 'reset-winding-missing'
  | 'duty-ratio-not-reachable'
  | 'reset-not-complete'
  | 'slope-compensation-needed'
  | 'gain-not-reachable'
  | 'frequency-out-of-range'
  | 'current-limit-not-reached'
  | 'coupling-capacitor-missing'
  | 'coupling-capacitor-small'
  | 'sense-ratio-differs'
  | 'sense-reset-too-slow'
  | 'choke-turns-differ'
  | 'differential-leakage-not-known'
  | 'light-load-changes-mode'
  | 'sharing-not-known'
  | 'leakage-state-not-found'
  | 'stacked-output-not-found'
  | 'ratio-steers-ripple'
  | 'no-output-takes-current'
  | 'duty-not-solvable'
  | 'value-out-of-range'
  | 'inductance-not-stated'
  | 'current-limit-not-stated'
  | 'coupling-not-known'
  | 'currents-from-stated-values'
  | 'output-voltage-off'
  // the document against itself
  | 'winding-not-in-sequence'
  | 'sequence-turns-differ'
  | 'terminal-does-not-exist'
  | 'gap-and-al-both-control'
  // insulation
  | 'working-voltage-not-known'
  | 'insulation-value-from-memory'
  | 'boundary-missing'
  // the proposal
  | 'no-core-fits'
  | 'duty-without-proposal'
  | 'duty-ratio-high'
  | 'mains-without-protection'
  | 'ratio-compromise'
  | 'too-few-pins'
  | 'current-limit-assumed'
  | 'no-suitable-wire'
  | 'material-fit-out-of-range'

export type Severity = 'note' | 'warning' | 'error'

export interface Finding {
  code: FindingCode
  severity: Severity
  /** Dotted path of the input that caused it, e.g. `windings.2.turnsCount`. */
  path: string
  /** Numbers and names for the message, unit in the key: `{ fillRatio: 1.08 }`. */
  values: Readonly<Record<string, number | string>>
}
