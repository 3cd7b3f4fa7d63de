import type { Duty, DutyOf, RequirementSheet, Side } from '../specification'
import { planCoupled } from './plan-coupled'
import { planFlyback } from './plan-flyback'
import type { Finding } from '../findings'
import type { ProposalReason } from './reasons'

/** What a winding needs before its wire is chosen. */
export interface WindingNeed {
  id: string
  name: string
  role: 'primary' | 'secondary' | 'auxiliary'
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
  powerW: number
  onMains: boolean
  /** Worst current that the flux is checked at, in terms of the primary. */
  worstCurrentA: (inductanceH: number) => number
  /** Windings for at least so many primary turns. */
  windings: (leastPrimaryTurns: number) => WindingNeed[]
  findings: Finding[]
  reasons: ProposalReason[]
}

/** How the part of each topology is planned; one that is not here is entered by a person. */
const PLANS: { readonly [T in Duty['topology']]?: (duty: DutyOf<T>) => Plan } = {
  'flyback': planFlyback,
  'coupled-inductor': planCoupled,
}

/** Null where no plan is made for the topology. @throws RangeError when the duty cannot be solved */
export const planOf = ({ duty }: RequirementSheet): Plan | null => (PLANS[duty.topology] as ((duty: Duty) => Plan) | undefined)?.(duty) ?? null
