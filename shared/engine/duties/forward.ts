import type { FilteredOutput, ForcedDuty } from './converter'

/**
 * How the core is demagnetised: a reset winding back into the supply (a winding of the role `reset`), two switches with
 * two diodes back into the supply, or a clamp capacitor with a switch of its own.
 */
export type ForwardReset = 'reset-winding' | 'two-switch' | 'active-clamp'

export interface ForwardDuty extends ForcedDuty {
  topology: 'forward'
  reset: ForwardReset
  outputs: FilteredOutput[]
}
