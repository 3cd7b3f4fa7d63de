import { coreLoss } from '../losses/core-loss'
import type { CoreLoss, CoreLossFit } from '../losses/core-loss'
import type { LossFit } from '../library'
import { attempt, report } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'

/** A library row's fit as the loss stage takes it. */
export const coreLossFit = ({ cm, x, y, ct0, ct1, ct2, minimumHz, maximumHz, source }: LossFit): CoreLossFit => ({
  k: cm,
  alpha: x,
  beta: y,
  temperature: { ct0, ct1, ct2 },
  frequencyRangeHz: [minimumHz, maximumHz],
  source,
})

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
