/** Why the proposal is as it is. Codes are permanent: the client says them in words. */
export type ReasonCode =
  | 'ratio-from-duty'
  | 'ratio-from-reflected-voltage'
  | 'ratio-from-gain'
  | 'inductance-from-gain'
  | 'inductance-from-ripple'
  | 'inductance-for-boundary'
  | 'inductance-for-idle-share'
  | 'inductance-for-magnetising-current'
  | 'inductance-for-impedance'
  | 'material-least-loss'
  | 'material-preferred'
  | 'smallest-core-that-fits'
  | 'core-rejected'
  | 'turns-from-flux'
  | 'wire-from-density-and-skin-depth'
  | 'primary-in-two-halves'
  | 'margins-from-creepage'
  | 'insulated-wire'

export interface ProposalReason {
  code: ReasonCode
  /** Dotted path of the field that it explains. */
  path: string
  values: Readonly<Record<string, number | string>>
}

/** Why a core fell out. */
export type Rejection = 'window' | 'build' | 'pins' | 'flux' | 'temperature' | 'resistance' | 'wire' | 'height' | 'insulation' | 'layer-width'
