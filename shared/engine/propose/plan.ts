import type { Duty, DutyOf, RequirementSheet, Side } from '../specification'
import { planCommonMode } from './plan-common-mode'
import { planCoupled } from './plan-coupled'
import { planFlyback } from './plan-flyback'
import { planForced } from './plan-forced'
import { planLlc } from './plan-llc'
import { planGateDrive } from './plan-gate-drive'
import { planInductor } from './plan-inductor'
import type { Finding } from '../findings'
import type { ProposalReason } from './reasons'

/** What a winding needs before its wire is chosen. */
export interface WindingNeed {
  id: string
  name: string
  role: 'primary' | 'secondary' | 'auxiliary' | 'reset'
  side: Side
  outputId: string | null
  /** The winding of the equal and opposite output, e.g. of −15 V for +15 V. */
  partnerId: string | null
  turns: number
  rmsA: number
  /** Alternating over total rms current: where it is small, skin depth limits the wire little. */
  acShare: number
  powerW: number
}

/** The duty solved so far that every core can be tried against it. */
export interface Plan {
  frequencyHz: number
  inductanceH: number
  /** What the material is for; a power material where left out. */
  materialUse?: 'common-mode'
  powerW: number
  onMains: boolean
  /** Worst current that the flux is checked at, in terms of the primary. */
  worstCurrentA: (inductanceH: number) => number
  /** Windings for at least so many primary turns. */
  windings: (leastPrimaryTurns: number) => WindingNeed[]
  /** Set where the flux follows the volt-seconds and not the current of the switch. */
  transformer?: TransformerNeed
  findings: Finding[]
  reasons: ProposalReason[]
}

export interface TransformerNeed {
  /** Of the worst pulse from zero flux, at the primary. */
  worstVs: number
  /** Of the steady swing, and the swing that it begins with, peak to peak. */
  steadyVs: number
  steadySwingT: number
  /** Without a gap the inductance follows from core and turns. */
  gapped: boolean
  /** The inductance of the plan is the least that turns and permeability must give. */
  leastInductance?: boolean
  waveform: 'unipolar-pulse' | 'bipolar-pulse' | 'sine'
}

/** How the part of each topology is planned; one that is not here is entered by a person. */
const PLANS: { readonly [T in Duty['topology']]?: (duty: DutyOf<T>) => Plan } = {
  'flyback': planFlyback,
  'coupled-inductor': planCoupled,
  'forward': planForced,
  'half-bridge': planForced,
  'full-bridge': planForced,
  'push-pull': planForced,
  'llc': planLlc,
  'inductor': planInductor,
  'common-mode-choke': planCommonMode,
  'gate-drive': planGateDrive,
}

/** Null where no plan is made for the topology. @throws RangeError when the duty cannot be solved */
export const planOf = ({ duty }: RequirementSheet): Plan | null => (PLANS[duty.topology] as ((duty: Duty) => Plan) | undefined)?.(duty) ?? null
