import type { FilteredOutput, ForcedDuty, RectifierForm } from './converter'

export interface BridgeOutput extends FilteredOutput {
  /** Centre-tapped outputs have two windings in the document, full-wave ones have one. */
  rectifier: RectifierForm
}

/** Two switches and two capacitors that halve the input voltage. */
export interface HalfBridgeDuty extends ForcedDuty {
  topology: 'half-bridge'
  outputs: BridgeOutput[]
}

/**
 * Four switches. With pulse width control all of them are open between the pulses; with phase shift the primary is
 * shorted there and carries the reflected load current on.
 */
export interface FullBridgeDuty extends ForcedDuty {
  topology: 'full-bridge'
  control: 'pulse-width' | 'phase-shift'
  outputs: BridgeOutput[]
}

/** Two switches at the ends of a tapped primary: two windings of the role `primary`. */
export interface PushPullDuty extends ForcedDuty {
  topology: 'push-pull'
  outputs: BridgeOutput[]
}
