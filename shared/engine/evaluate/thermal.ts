import type { LossResult, ThermalResult } from '../evaluation'
import { THERMAL_CLASSES, THERMOCOUPLE_DEDUCTION_K, windingLimitC } from '../thermal/classes'
import type { ThermalClassC } from '../thermal/classes'
import { settleTemperature } from '../thermal/fixed-point'
import type { FixedPoint } from '../thermal/fixed-point'
import { boxSurfaceMm2, HOT_SPOT_ALLOWANCE_K, temperatureRiseK } from '../thermal/temperature-rise'
import { sampled } from '../thermal/smooth'
import { TAIL_SHARE } from '../losses/copper-loss'
import type { CopperLoss } from '../losses/copper-loss'
import { coreHeat } from './core-loss'
import type { CopperStage } from './copper-loss'
import { attempt, explain, report } from './context'
import type { Context } from './context'
import { atFullLoad } from './corner-result'
import type { CornerState } from './corner-result'
import { originOf } from './inductance'

/** No hotter than this is searched: beyond it the laws of copper and ferrite loss do not hold. */
const CEILING_C = 250

/** Temperature at which the corners are compared, °C. */
const COMPARISON_C = 100

export const THERMAL_MODEL = 'ΔT = 450·ψ^0.826, mean of the part, natural convection, box without its base (McLyman); ±25 %'
export const LOSS_MODEL = 'copper: skin and proximity of each layer, each harmonic; core: improved generalised Steinmetz'

/** Temperature at which one working point settles. */
export interface SettledPoint {
  temperatureC: number
  lossW: number
  /** Hotter than the laws of loss hold. */
  runaway: boolean
}

export interface Heat {
  /** The full-load corner with the greatest loss. */
  hottest: CornerState | null
  /** Copper loss there at the settled temperature. */
  copper: CopperLoss | null
  /** The same in the one-dimensional field; null where it is the only one. */
  flat: CopperLoss | null
  losses: LossResult
  lossesByCorner: LossResult[]
  thermal: ThermalResult
  /** Derivative of the rise by temperature at the settled point; null when it did not settle. */
  loopGain: number | null
  temperatureC: number | null
  /** Any working point, such as one under fault; null where losses, ambient or surface are not known. */
  settleAt: (corner: CornerState) => SettledPoint | null
}

interface HeatInput {
  copper: CopperStage
  corners: readonly CornerState[]
}

interface Loss {
  copper: CopperLoss | null
  flat?: CopperLoss | null
  copperW: number | null
  coreW: number | null
}

function lossAt(context: Context, stage: CopperStage, corner: CornerState | null, temperatureC: number): Loss {
  const copper = stage.at(corner, temperatureC)
  return { copper, copperW: stage.complete && copper ? copper.totalW : null, coreW: coreHeat(context, corner, temperatureC)?.lossW ?? null }
}

const total = ({ copperW, coreW }: Pick<Loss, 'copperW' | 'coreW'>) => (copperW ?? 0) + (coreW ?? 0)

/** Losses and temperature in the corner that heats most, iterated to a fixed point. */
export function heatBalance(context: Context, { copper, corners }: HeatInput): Heat {
  const fullLoad = corners.filter(({ result }) => atFullLoad(result))
  const quiet = { ...context, findings: [] }
  const hottest = fullLoad.reduce<{ corner: CornerState; lossW: number } | null>((worst, corner) => {
    const lossW = attempt(quiet, 'windings', () => total(lossAt(quiet, copper, corner, COMPARISON_C))) ?? 0
    return worst && worst.lossW >= lossW ? worst : { corner, lossW }
  }, null)?.corner ?? null
  const ambientC = context.requirement?.ambientC ?? context.specification.insulation.maximumAmbientC.value
  const surfaceMm2 = surfaceOf(context)
  const settled = ambientC === null || surfaceMm2 === null ? null : settle(context, { copper, hottest, ambientC, surfaceMm2 })
  const temperatureC = settled?.state === 'settled' ? settled.temperatureC : null
  const lossIn = (corner: CornerState | null) => attempt(quiet, 'windings', () => lossAt(quiet, copper, corner, temperatureC ?? COMPARISON_C)) ?? { copper: null, copperW: null, coreW: null }
  const flat = copper.flatAt(hottest, temperatureC ?? COMPARISON_C)
  const loss = { ...lossIn(hottest), flat }
  reportRest(context, loss.copper)
  return {
    hottest,
    settleAt: (corner) => settledPoint(ambientC === null || surfaceMm2 === null ? null : settle(quiet, { copper, hottest: corner, ambientC, surfaceMm2 })),
    copper: loss.copper,
    flat,
    temperatureC,
    loopGain: settled?.state === 'settled' ? settled.loopGain : null,
    losses: lossResult(context, hottest, loss),
    lossesByCorner: corners.map((corner) => lossResult(context, corner, corner === hottest ? loss : { ...lossIn(corner), flat: copper.flatAt(corner, temperatureC ?? COMPARISON_C) })),
    thermal: thermalResult(context, { ambientC, surfaceMm2, temperatureC, lossW: total(loss) }),
  }
}

/** Says where so many harmonics count that the sum ends before the rest is small. */
function reportRest(context: Context, loss: CopperLoss | null): void {
  if (loss && loss.tailShare > TAIL_SHARE * 1.5) report(context, 'harmonic-sum-capped', 'note', 'windings', { harmonics: loss.orders, tailShare: loss.tailShare })
}

const settledPoint = (point: FixedPoint | null): SettledPoint | null => point && { temperatureC: point.temperatureC, lossW: point.lossW, runaway: point.state === 'runaway' }

function settle(context: Context, input: { copper: CopperStage; hottest: CornerState | null; ambientC: number; surfaceMm2: number }): FixedPoint | null {
  const { copper, hottest, ambientC, surfaceMm2 } = input
  const quiet = { ...context, findings: [] }
  const probe = lossAt(quiet, copper, hottest, COMPARISON_C)
  // A rise from copper alone would be half the truth where the core's loss is not known.
  if (probe.copperW === null || (probe.coreW === null && hottest !== null)) return null
  const point = attempt(context, 'requirement.ambientC', () =>
    settleTemperature({
      ambientC,
      lossW: sampled((temperatureC) => total(lossAt(quiet, copper, hottest, temperatureC)), { from: ambientC, to: CEILING_C, count: 6 }),
      riseK: (lossW) => temperatureRiseK({ kind: 'mclyman-surface', surfaceMm2 }, Math.max(0, lossW)),
      ceilingC: CEILING_C,
    }),
  )
  if (point?.state === 'runaway') report(context, 'thermal-runaway', 'error', 'requirement.ambientC', { ceilingC: CEILING_C, lossW: point.lossW })
  return point
}

function surfaceOf(context: Context): number | null {
  const { former, specification } = context
  const stated = specification.former.envelope.value
  const box = stated ?? (former ? { lengthMm: former.envelopeMm.length, widthMm: former.envelopeMm.width, heightMm: former.envelopeMm.height } : null)
  return box && attempt(context, 'former.envelope', () => boxSurfaceMm2({ ...box, withoutBase: true }))
}

function lossResult(context: Context, corner: CornerState | null, { copper, flat, copperW, coreW }: Loss): LossResult {
  const { core, sets } = context
  const complete = copperW !== null && coreW !== null
  return {
    corner: corner?.result.name ?? 'nominal-input',
    copperW,
    coreW,
    totalW: complete ? copperW + coreW : null,
    coreDensityWPerM3: coreW !== null && core ? coreW / (core.effectiveVolumeMm3 * sets * 1e-9) : null,
    model: LOSS_MODEL,
    copperOneDimensionalW: copperW === null ? null : (flat?.totalW ?? null),
    harmonics: copper?.orders ?? null,
    harmonicTailShare: copper?.tailShare ?? null,
  }
}

/** Winding temperature that the insulation system allows, °C, by the resistance method. */
export function temperatureLimitC(context: Context): number | null {
  const { insulation } = context.specification
  const classC = insulation.systemThermalClassC.value
  const row = THERMAL_CLASSES.find((one) => one.classC === classC)
  const byClass = row ? windingLimitC(row.classC as ThermalClassC) : null
  const stated = insulation.maximumWindingC.value
  const limits = [byClass?.state === 'known' ? byClass.value : null, stated ? stated.temperatureC + (stated.method === 'thermocouple' ? THERMOCOUPLE_DEDUCTION_K : 0) : null].filter((limit) => limit !== null)
  return limits.length > 0 ? Math.min(...limits) : null
}

function thermalResult(context: Context, input: { ambientC: number | null; surfaceMm2: number | null; temperatureC: number | null; lossW: number }): ThermalResult {
  const { ambientC, surfaceMm2, temperatureC } = input
  const limitC = temperatureLimitC(context)
  const riseK = temperatureC !== null && ambientC !== null ? temperatureC - ambientC : null
  explain(context, 'thermal.riseK', () => ({
    symbol: 'ΔT', value: riseK, unit: 'K', formula: '450·(P/A)^0.826, P at the settled temperature', source: 'C. McLyman, Transformer and Inductor Design Handbook, 3rd ed. 2004, ch. 6',
    inputs: [
      { name: 'P', value: input.lossW, unit: 'W', origin: 'losses.totalW' },
      { name: 'A', value: surfaceMm2 ?? 'not known', unit: 'mm²', origin: 'former.envelope, five faces' },
      { name: 'T_amb', value: ambientC ?? 'not known', unit: '°C', origin: context.requirement ? 'requirement.ambientC' : 'insulation.maximumAmbientC' },
    ],
  }))
  explain(context, 'thermal.hotSpotC', () => ({
    symbol: 'T_hs', value: temperatureC === null ? null : temperatureC + HOT_SPOT_ALLOWANCE_K, unit: '°C', formula: 'T + 10 K', source: 'practice with IEC 60085 classes (from memory)',
    inputs: [{ name: 'T', value: temperatureC ?? 'not known', unit: '°C', origin: 'thermal.windingC' }],
  }))
  return {
    riseK,
    ambientC,
    windingC: temperatureC,
    hotSpotC: temperatureC === null ? null : temperatureC + HOT_SPOT_ALLOWANCE_K,
    riseByVolumeK: riseByVolumeK(context, temperatureC === null ? null : input.lossW),
    limitC,
    marginK: limitC !== null && temperatureC !== null ? limitC - temperatureC : null,
    surfaceMm2,
    model: THERMAL_MODEL,
  }
}

function riseByVolumeK(context: Context, lossW: number | null): number | null {
  const { core, sets } = context
  if (!core || lossW === null) return null
  const effectiveVolumeMm3 = core.effectiveVolumeMm3 * sets
  const value = attempt(context, 'core.core', () => temperatureRiseK({ kind: 'ferrite-volume', effectiveVolumeMm3 }, lossW))
  explain(context, 'thermal.riseByVolumeK', () => ({
    symbol: 'ΔT_V', value, unit: 'K', formula: '53·V_e^−0.54·P, V_e in cm³', source: 'S. Mulder, ferrite handbook (from memory)',
    inputs: [{ name: 'P', value: lossW, unit: 'W', origin: 'losses.totalW' }, { name: 'V_e', value: effectiveVolumeMm3, unit: 'mm³', origin: originOf(context, 'core') }],
  }))
  return value
}
