import { coreLoss } from '../losses/core-loss'
import type { CoreLoss, CoreLossFit } from '../losses/core-loss'
import type { LossFit } from '../library'
import { attempt, report } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'

/** A library row's fit as the loss stage takes it. */
export const coreLossFit = ({ cm, x, y, ct0, ct1, ct2, minimumHz, maximumHz, minimumC, maximumC, minimumT, maximumT, source }: LossFit): CoreLossFit => ({
  k: cm,
  alpha: x,
  beta: y,
  temperature: { ct0, ct1, ct2 },
  frequencyRangeHz: [minimumHz, maximumHz],
  ...temperatureRange({ ct1, ct2, minimumC, maximumC }),
  ...(minimumT != null || maximumT != null ? { fluxRangeT: [minimumT ?? 0, maximumT ?? Infinity] as const } : {}),
  source,
})

/** A set without terms of temperature holds where it was measured: at room temperature, unless it says otherwise. */
const ROOM_C = [15, 35] as const

function temperatureRange({ ct1, ct2, minimumC, maximumC }: Pick<LossFit, 'ct1' | 'ct2' | 'minimumC' | 'maximumC'>): Pick<CoreLossFit, 'temperatureRangeC'> {
  if (minimumC != null || maximumC != null) return { temperatureRangeC: [minimumC ?? -Infinity, maximumC ?? Infinity] }
  return ct1 === 0 && ct2 === 0 ? { temperatureRangeC: ROOM_C } : {}
}

export interface CoreHeat extends CoreLoss {
  lossW: number
}

/** Core loss of one corner at a temperature; null without core, loss fit or waveform. */
export function coreHeat(context: Context, corner: CornerState | null, temperatureC: number): CoreHeat | null {
  const { core, material, sets } = context
  const fluxDensityT = corner?.fluxDensityT
  if (!core || !material || !fluxDensityT) return null
  const answer = attempt(context, 'core.material', () =>
    coreLoss({
      fits: material.lossFits.map(coreLossFit),
      fluxDensityT,
      temperatureC,
      path: 'core.material',
    }),
  )
  if (answer?.state !== 'known') return null
  return { ...answer.value, lossW: answer.value.lossWPerM3 * core.effectiveVolumeMm3 * sets * 1e-9 }
}

/** Says once where the loss figure is outside its fit, or that there is none. */
export function reportCoreLoss(context: Context, heat: CoreHeat | null): void {
  if (heat) context.findings.push(...heat.findings)
  else if (context.material && context.material.lossFits.length === 0) report(context, 'no-core-loss-data', 'warning', 'core.material', { material: context.material.name })
}
