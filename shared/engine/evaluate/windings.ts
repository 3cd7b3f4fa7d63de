import type { Coil } from '../build'
import type { WindingResult } from '../evaluation'
import type { CopperLoss } from '../losses/copper-loss'
import type { Winding } from '../specification'
import { resistanceFactor } from '../wires/resistance'
import { skinDepthMm } from '../wires/skin-depth'
import { attempt, positive } from './context'
import type { Context } from './context'
import type { CopperStage } from './copper-loss'
import { atFullLoad } from './corner-result'
import type { CornerState } from './corner-result'
import { explainWinding } from './explain-windings'

export interface WindingResultInput {
  copper: CopperStage
  coil: Coil | null
  corners: readonly CornerState[]
  /** Copper loss in the corner that heats the part. */
  loss: CopperLoss | null
  flat: CopperLoss | null
  hotC: number | null
}

/** Each winding as the person sees it; currents are the largest over the full-load corners. */
export function windingResults(context: Context, input: WindingResultInput): WindingResult[] {
  return context.specification.windings.map((winding, index) => {
    const copper = input.copper.coppers.find((one) => one.winding.id === winding.id) ?? null
    const build = input.coil?.windings.get(winding.id)
    const currents = largestCurrents(winding, input.corners)
    const hotC = input.hotC ?? 100
    const loss = copper || winding.role === 'shield' ? (input.loss?.windings[index] ?? null) : null
    const result: WindingResult = {
      windingId: winding.id,
      copperAreaMm2: copper?.copperAreaMm2 ?? 0,
      wireLengthM: copper?.wireLengthM ?? null,
      meanTurnLengthMm: build?.meanTurnLengthMm ?? null,
      dcResistance20Ohm: copper?.resistance20Ohm ?? null,
      dcResistanceHotOhm: copper ? copper.resistance20Ohm * resistanceFactor(hotC) : null,
      acFactor: loss?.acFactor ?? null,
      acFactorOneDimensional: (loss && input.flat?.windings[index]?.acFactor) ?? null,
      ...currents,
      currentDensityAPerMm2: copper && currents.rmsA !== null && copper.copperAreaMm2 > 0 ? currents.rmsA / copper.copperAreaMm2 : null,
      layers: build?.layers ?? 0,
      turnsPerLayer: build?.turnsPerLayer ?? [],
      copperLossW: loss && loss.dcW + loss.skinW + loss.proximityW,
      dcLossW: loss?.dcW ?? null,
      skinLossW: loss?.skinW ?? null,
      proximityLossW: loss?.proximityW ?? null,
      idleLossW: loss?.idleW ?? null,
      copperMassG: copper?.massG ?? null,
      skinDepthMm: skinDepthOf(context, hotC),
    }
    if (copper) explainWinding(context, { index, copper, result, hotC, field: input.copper.field ?? 'not known' })
    return result
  })
}

function skinDepthOf(context: Context, temperatureC: number): number | null {
  const frequencyHz = context.specification.electrical.switchingFrequencyHz.value?.minimum
  return positive(frequencyHz) ? attempt(context, 'electrical.switchingFrequencyHz', () => skinDepthMm({ frequencyHz, temperatureC })) : null
}

function largestCurrents(winding: Winding, corners: readonly CornerState[]): Pick<WindingResult, 'rmsA' | 'peakA' | 'dcA'> {
  const own = corners.filter(({ result }) => atFullLoad(result)).flatMap(({ result }) => result.windings.filter(({ windingId }) => windingId === winding.id))
  if (own.length === 0) return { rmsA: winding.rmsCurrentA, peakA: winding.peakCurrentA, dcA: winding.dcCurrentA }
  return { rmsA: Math.max(...own.map(({ rmsA }) => rmsA)), peakA: Math.max(...own.map(({ peakA }) => peakA)), dcA: Math.max(...own.map(({ dcA }) => dcA)) }
}
