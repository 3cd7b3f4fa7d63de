import { coreLossFit } from '../evaluate/core-loss'
import type { CoreRow, FormerRow, MaterialRow } from '../library'
import { coreLossTemperatureFactor, steinmetzLossWPerM3 } from '../losses/core-loss'
import type { WindingNeed } from '../propose/plan'
import type { Rejection } from '../propose/reasons'
import type { InsulationMethod } from '../specification'
import { resistivityOhmMm2PerM } from '../wires/resistance'
import { boxSurfaceMm2, temperatureRiseK } from '../thermal/temperature-rise'

/** One way to make the part, before any wire is chosen. */
export interface Variant {
  core: CoreRow
  former: FormerRow
  material: MaterialRow
  method: InsulationMethod
  /** Turns above the least that flux asks for. */
  turnShare: number
  /** Share of the current density aimed at. */
  densityShare: number
}

/** Rough figures of a variant, by closed forms: to order candidates, never to show. */
export interface Estimate {
  lossW: number
  volumeMm3: number
  heightMm: number
  copperMm3: number
}

export interface ScreenInput {
  variant: Variant
  needs: readonly WindingNeed[]
  currentDensityAPerMm2: number
  frequencyHz: number
  /** At the primary, over one period. */
  voltSecondsVs: number
  mostRiseK: number
}

export type Screened = { state: 'kept'; estimate: Estimate } | { state: 'rejected'; rejection: Rejection }

/** More bare copper than this share of the window is never wound. Source: common practice, 0.2 to 0.4. */
const MOST_COPPER_FILL = 0.4
/** What alternating current adds to the copper loss before wires are chosen. */
const AC_ALLOWANCE = 1.3
const TEMPERATURE_C = 100
/** A rough figure rejects only what is rejected by far. */
const ROUGHNESS = 1.5
const MARGIN_MM = 3

/** Mean length of turn of the full window, mm. Source: geometry. */
export function meanTurnMm({ meanTurnLengthMm, tube, windingHeightMm }: FormerRow): number {
  if (meanTurnLengthMm !== null) return meanTurnLengthMm
  return tube.shape === 'round' ? Math.PI * (tube.diameterMm + windingHeightMm) : 2 * (tube.widthMm + tube.depthMm) + Math.PI * windingHeightMm
}

/**
 * A cheap look at a variant: does the copper go into the window, and is it cool? Core loss by Steinmetz at half the swing, copper
 * loss at the chosen density, rise by the surface.
 *
 * Source: Faraday's law; C. Steinmetz; C. McLyman, Handbook, 3rd ed. 2004, ch. 6.
 *
 * @throws RangeError as the functions of loss and rise
 */
export function screen({ variant, needs, currentDensityAPerMm2, frequencyHz, voltSecondsVs, mostRiseK }: ScreenInput): Screened {
  const { core, former, material, method, densityShare } = variant
  const densityAPerMm2 = currentDensityAPerMm2 * densityShare
  const widthMm = former.windingWidthMm - (method === 'margin-tape' ? 2 * MARGIN_MM : 0)
  const copperMm2 = needs.reduce((sum, { turns, rmsA }) => sum + (turns * rmsA) / densityAPerMm2, 0)
  if (!(widthMm > 0) || copperMm2 > MOST_COPPER_FILL * widthMm * former.windingHeightMm) return { state: 'rejected', rejection: 'window' }
  const turnMm = meanTurnMm(former)
  const ampereTurns = needs.reduce((sum, { turns, rmsA }) => sum + turns * rmsA, 0)
  // ρ·l/A·I² with A = I/J is ρ·l·I·J.
  const copperW = AC_ALLOWANCE * resistivityOhmMm2PerM(TEMPERATURE_C) * turnMm * 1e-3 * densityAPerMm2 * ampereTurns
  const lossW = copperW + coreLossW({ core, material, frequencyHz, voltSecondsVs, turns: needs[0]!.turns })
  const { length, width, height } = former.envelopeMm
  const riseK = temperatureRiseK({ kind: 'mclyman-surface', surfaceMm2: boxSurfaceMm2({ lengthMm: length, widthMm: width, heightMm: height, withoutBase: true }) }, lossW)
  if (riseK > ROUGHNESS * mostRiseK) return { state: 'rejected', rejection: 'temperature' }
  return { state: 'kept', estimate: { lossW, volumeMm3: length * width * height, heightMm: height, copperMm3: copperMm2 * turnMm } }
}

/** Loss of the swing as if it were sinusoidal. Without a fit nothing is known, and the full evaluation says so. */
function coreLossW({ core, material, frequencyHz, voltSecondsVs, turns }: { core: CoreRow; material: MaterialRow; frequencyHz: number; voltSecondsVs: number; turns: number }): number {
  const row = material.lossFits.find(({ minimumHz, maximumHz }) => frequencyHz >= minimumHz && frequencyHz <= maximumHz) ?? material.lossFits[0]
  if (!row || !(voltSecondsVs > 0)) return 0
  const fit = coreLossFit(row)
  const peakFluxDensityT = voltSecondsVs / (2 * turns * core.effectiveAreaMm2 * 1e-6)
  return steinmetzLossWPerM3(fit, { frequencyHz, peakFluxDensityT }) * coreLossTemperatureFactor(fit, TEMPERATURE_C) * core.effectiveVolumeMm3 * 1e-9
}
