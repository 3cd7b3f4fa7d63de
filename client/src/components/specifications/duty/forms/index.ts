import type { Duty, DutyOf } from '#shared/engine/specification'
import { COMMON_MODE_FORM } from './common-mode-choke'
import { COUPLED_INDUCTOR_FORM } from './coupled-inductor'
import { CURRENT_SENSE_FORM } from './current-sense'
import type { DutyForm } from './fields'
import { FLYBACK_FORM } from './flyback'
import { FORWARD_FORM, FULL_BRIDGE_FORM, HALF_BRIDGE_FORM, PUSH_PULL_FORM } from './forced'
import { LLC_FORM } from './llc'
import { GATE_DRIVE_FORM } from './gate-drive'
import { INDUCTOR_FORM } from './inductor'

/** How each duty is entered: a new topology is one file and one line. Their order is that of the ways in. */
export const DUTY_FORMS: { readonly [T in Duty['topology']]: DutyForm<DutyOf<T>> } = {
  'flyback': FLYBACK_FORM,
  'forward': FORWARD_FORM,
  'half-bridge': HALF_BRIDGE_FORM,
  'full-bridge': FULL_BRIDGE_FORM,
  'push-pull': PUSH_PULL_FORM,
  'llc': LLC_FORM,
  'coupled-inductor': COUPLED_INDUCTOR_FORM,
  'inductor': INDUCTOR_FORM,
  'common-mode-choke': COMMON_MODE_FORM,
  'gate-drive': GATE_DRIVE_FORM,
  'current-sense': CURRENT_SENSE_FORM,
}

/** The form of a duty. The table's key and the duty's own agree, which the type of an index cannot say. */
export const formOf = <D extends Duty>(duty: D): DutyForm<D> => DUTY_FORMS[duty.topology] as unknown as DutyForm<D>

export const DUTY_TOPOLOGIES = Object.keys(DUTY_FORMS) as Duty['topology'][]
