import type { LossResult, ThermalResult } from '../evaluation'
import { THERMAL_CLASSES, windingLimitC } from '../thermal/classes'
import type { ThermalClassC } from '../thermal/classes'
import { settleTemperature } from '../thermal/fixed-point'
import type { FixedPoint } from '../thermal/fixed-point'
import { boxSurfaceMm2, temperatureRiseK } from '../thermal/temperature-rise'
import { coreHeat } from './core-loss'
import { attempt, explain, report } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'
import { copperLoss } from './windings'
import type { WindingCopper } from './windings'

/** No hotter than this is searched: beyond it the laws of copper and ferrite loss do not hold. */
const CEILING_C = 250

/** Temperature at which the corners are compared, °C. */
const COMPARISON_C = 100

export const THERMAL_MODEL = 'ΔT = 450·ψ^0.826, mean of the part, natural convection, box without its base (McLyman); ±25 %'
export const LOSS_MODEL = 'copper: Dowell, one-dimensional, each harmonic; core: improved generalised Steinmetz'

export interface Heat {
  /** The full-load corner with the greatest loss. */
  hottest: CornerState | null
  losses: LossResult
  thermal: ThermalResult
  /** Derivative of the rise by temperature at the settled point; null when it did not settle. */
  loopGain: number | null
  temperatureC: number | null
}

interface HeatInput {
  coppers: readonly WindingCopper[]
  corners: readonly CornerState[]
}

interface Loss {
  copperW: number | null
  coreW: number | null
}

function lossAt(context: Context, coppers: readonly WindingCopper[], corner: CornerState | null, temperatureC: number): Loss {
  const complete = coppers.length > 0 && coppers.length === context.specification.windings.length
  const parts = coppers.map((copper) => copperLoss(context, copper, corner, temperatureC))
  const known = complete && parts.every((part) => part !== null)
  return { copperW: known ? parts.reduce((sum, part) => sum + part!.lossW, 0) : null, coreW: coreHeat(context, corner, temperatureC)?.lossW ?? null }
}

const total = ({ copperW, coreW }: Loss) => (copperW ?? 0) + (coreW ?? 0)

/** Losses and temperature in the corner that heats most, iterated to a fixed point. */
export function heatBalance(context: Context, { coppers, corners }: HeatInput): Heat {
  const fullLoad = corners.filter(({ result }) => ['minimum-input', 'nominal-input', 'maximum-input'].includes(result.name))
  const quiet = { ...context, findings: [] }
  const hottest = fullLoad.reduce<{ corner: CornerState; lossW: number } | null>((worst, corner) => {
    const lossW = attempt(quiet, 'windings', () => total(lossAt(quiet, coppers, corner, COMPARISON_C))) ?? 0
    return worst && worst.lossW >= lossW ? worst : { corner, lossW }
  }, null)?.corner ?? null
  const ambientC = context.requirement?.ambientC ?? context.specification.insulation.maximumAmbientC.value
  const surfaceMm2 = surfaceOf(context)
  const settled = ambientC === null || surfaceMm2 === null ? null : settle(context, { coppers, hottest, ambientC, surfaceMm2 })
  const temperatureC = settled?.state === 'settled' ? settled.temperatureC : null
  const loss = attempt(quiet, 'windings', () => lossAt(quiet, coppers, hottest, temperatureC ?? COMPARISON_C)) ?? { copperW: null, coreW: null }
  return {
    hottest,
    temperatureC,
    loopGain: settled?.state === 'settled' ? settled.loopGain : null,
    losses: lossResult(context, hottest, loss),
    thermal: thermalResult(context, { ambientC, surfaceMm2, temperatureC, lossW: total(loss) }),
  }
}

function settle(context: Context, input: { coppers: readonly WindingCopper[]; hottest: CornerState | null; ambientC: number; surfaceMm2: number }): FixedPoint | null {
  const quiet = { ...context, findings: [] }
  const probe = lossAt(quiet, input.coppers, input.hottest, Math.min(Math.max(input.ambientC, -60), CEILING_C))
  // A rise from copper alone would be half the truth where the core's loss is not known.
  if (probe.copperW === null || (probe.coreW === null && input.hottest !== null)) return null
  const point = attempt(context, 'requirement.ambientC', () =>
    settleTemperature({
      ambientC: input.ambientC,
      lossW: (temperatureC) => total(lossAt(quiet, input.coppers, input.hottest, temperatureC)),
      riseK: (lossW) => temperatureRiseK({ kind: 'mclyman-surface', surfaceMm2: input.surfaceMm2 }, lossW),
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

function lossResult(context: Context, hottest: CornerState | null, { copperW, coreW }: Loss): LossResult {
  const { core, sets } = context
  const complete = copperW !== null && coreW !== null
  return {
    corner: hottest?.result.name ?? 'nominal-input',
    copperW,
    coreW,
    totalW: complete ? copperW + coreW : null,
    coreDensityWPerM3: coreW !== null && core ? coreW / (core.effectiveVolumeMm3 * sets * 1e-9) : null,
    model: LOSS_MODEL,
  }
}

/** Winding temperature that the insulation system allows, °C, by the resistance method. */
export function temperatureLimitC(context: Context): number | null {
  const { insulation } = context.specification
  const classC = insulation.systemThermalClassC.value
  const row = THERMAL_CLASSES.find((one) => one.classC === classC)
  const byClass = row ? windingLimitC(row.classC as ThermalClassC) : null
  const stated = insulation.maximumWindingC.value
  const limits = [byClass?.state === 'known' ? byClass.value : null, stated ? stated.temperatureC + (stated.method === 'thermocouple' ? 10 : 0) : null].filter((limit) => limit !== null)
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
  return {
    riseK,
    ambientC,
    windingC: temperatureC,
    limitC,
    marginK: limitC !== null && temperatureC !== null ? limitC - temperatureC : null,
    surfaceMm2,
    model: THERMAL_MODEL,
  }
}
