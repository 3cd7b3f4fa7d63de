import type { Duty, DutyOf } from '../specification'
import { FULL_BRIDGE, HALF_BRIDGE, PUSH_PULL } from './bridge-circuits'
import { COMMON_MODE_CHOKE } from './common-mode-circuit'
import { COUPLED_INDUCTOR } from './coupled-circuit'
import { CURRENT_SENSE } from './current-sense-circuit'
import { FLYBACK } from './flyback-circuit'
import { FORWARD } from './forward-circuit'
import { LLC } from './llc-circuit'
import { GATE_DRIVE } from './gate-drive-circuit'
import { INDUCTOR } from './inductor-circuit'
import type { DutyTraits, Topology } from './topology'

/** Every topology that the engine turns into waveforms: a new one is one file and one line. */
const TOPOLOGIES: { readonly [T in Duty['topology']]: Topology<DutyOf<T>> } = {
  'flyback': FLYBACK,
  'coupled-inductor': COUPLED_INDUCTOR,
  'forward': FORWARD,
  'half-bridge': HALF_BRIDGE,
  'full-bridge': FULL_BRIDGE,
  'push-pull': PUSH_PULL,
  'llc': LLC,
  'inductor': INDUCTOR,
  'common-mode-choke': COMMON_MODE_CHOKE,
  'gate-drive': GATE_DRIVE,
  'current-sense': CURRENT_SENSE,
}

/** The topology of a duty. The table's key and the duty's own agree, which the type of an index cannot say. */
export const topologyOf = <D extends Duty>(duty: D): Topology<D> => TOPOLOGIES[duty.topology] as unknown as Topology<D>

export const dutyTraits = (duty: Duty): DutyTraits => topologyOf(duty).traits(duty)
