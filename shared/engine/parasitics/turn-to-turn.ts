import { requireNotNegative, requirePositive } from '../require'
import { EPSILON_0_F_PER_M } from './wire-cell'

export interface TurnToTurnInput {
  conductorMm: number
  overallMm: number
  /** Clear distance of the two insulated surfaces; 0 when they touch. */
  airMm?: number
  insulationPermittivity: number
  fillPermittivity?: number
  /** Half the angle of each wire that faces the other: π/6 with layers above and below, π/2 for a single layer in air. */
  halfAngleRad?: number
}

/**
 * Capacitance of two neighbouring turns of one layer, per length of wire, in F/m. Flow lines leave the conductor
 * radially through the insulation and cross the air in parallel:
 *
 *     C = ε0·∫ dθ / (2·(β − cos θ)),  β = 1 + s/D + ln(D/d)/ε
 *
 * Source: A. Massarini and M. Kazimierczuk, IEEE Trans. Power Electron. 12 (1997) 671; closed integral as in G. Grandi et
 * al., IEEE Trans. Ind. Appl. 35 (1999) 1162; with a distance s between the surfaces added to the path in air.
 *
 * @throws RangeError unless conductor and overall diameter are positive, overall ≥ conductor, and the permittivity 1 or more
 */
export function turnToTurnFPerM(input: TurnToTurnInput): number {
  const { conductorMm, overallMm, airMm = 0, insulationPermittivity, fillPermittivity = 1, halfAngleRad = Math.PI / 6 } = input
  requirePositive('conductorMm', conductorMm)
  requireNotNegative('airMm', airMm)
  if (!(overallMm >= conductorMm && Number.isFinite(overallMm))) throw new RangeError(`overallMm must be at least conductorMm ${conductorMm}: ${overallMm}`)
  if (!(insulationPermittivity >= 1 && fillPermittivity >= 1)) throw new RangeError(`insulationPermittivity and fillPermittivity must be 1 or more: ${insulationPermittivity}, ${fillPermittivity}`)
  if (!(halfAngleRad > 0 && halfAngleRad <= Math.PI / 2)) throw new RangeError(`halfAngleRad must lie between 0 and π/2: ${halfAngleRad}`)
  const beta = 1 + airMm / overallMm + (Math.log(overallMm / conductorMm) * fillPermittivity) / insulationPermittivity
  if (!(beta > 1)) throw new RangeError('overallMm and airMm leave no insulation between the turns')
  const arc = Math.atan(Math.sqrt((beta + 1) / (beta - 1)) * Math.tan(halfAngleRad / 2))
  return (EPSILON_0_F_PER_M * fillPermittivity * 2 * arc) / Math.sqrt(beta ** 2 - 1)
}
