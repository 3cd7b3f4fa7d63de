import type { MainsSupply, SpecificationDocument } from '../specification'
import { dutyTraits } from '../topologies'

type Parts = Pick<SpecificationDocument, 'specification' | 'requirement'>

/** The mains that the duty hangs on; null for a direct voltage or without a duty. */
export function mainsSupply({ requirement }: Pick<Parts, 'requirement'>): MainsSupply | null {
  const supply = requirement && dutyTraits(requirement.duty).supply
  return supply?.kind === 'mains' ? supply : null
}

/** Whether a part hangs on the mains: by its duty, or because a document without one states a mains voltage. */
export const isOnMains = (parts: Parts): boolean => mainsSupply(parts) !== null || parts.specification.insulation.mainsVoltageV.value !== null

/** The greatest mains voltage is given with its tolerance, commonly 10 %. */
const USUAL_TOLERANCE = 1.1

/** The least rated voltage that a duty's mains can have, V rms: its nominal, and its greatest without tolerance, to 10 V. */
export const leastRatedMainsV = ({ nominalV, maximumV }: MainsSupply): number => Math.max(nominalV, Math.round(maximumV / USUAL_TOLERANCE / 10) * 10)

/**
 * Rated mains voltage that the insulation is dimensioned for, V rms; null without a mains side. A voltage stated below
 * the duty's nominal one lowers nothing, and a missing one is replaced by the duty's.
 */
export function ratedMainsV(parts: Parts): number | null {
  const stated = parts.specification.insulation.mainsVoltageV.value
  const supply = mainsSupply(parts)
  if (!supply) return stated
  return Math.max(stated ?? leastRatedMainsV(supply), supply.nominalV)
}
