import { copperLoss } from '../losses/copper-loss'
import type { CopperLoss, CopperModel } from '../losses/copper-loss'
import { currentSpectrum, phasorSpectrum } from '../losses/spectrum'
import type { CurrentSpectrum } from '../losses/spectrum'
import type { Coil } from '../build'
import { withEdges } from '../waveforms/combine'
import { attempt, positive, report } from './context'
import type { Context } from './context'
import type { WindingCopper } from './copper'
import { copperModels } from './copper-model'
import type { CornerState } from './corner-result'

/** Copper losses of one part, asked by working point and temperature. */
export interface CopperStage {
  coppers: readonly WindingCopper[]
  /** Whether every winding that carries current is laid and its wire known. */
  complete: boolean
  /** Name of the field that the losses rest on; null without a laid coil. */
  field: string | null
  /** Null where neither waveforms nor stated currents are known. */
  at: (corner: CornerState | null, temperatureC: number) => CopperLoss | null
  /** The same in the one-dimensional field; null where it does not apply or is the only one. */
  flatAt: (corner: CornerState | null, temperatureC: number) => CopperLoss | null
}

/** `gapMm`: as calculated from the inductance, where none is stated. */
export function copperStage(context: Context, coil: Coil | null, { coppers, gapMm }: { coppers: readonly WindingCopper[]; gapMm: number | null }): CopperStage {
  const { local, flat } = copperModels(context, coil, { coppers, gapMm })
  const model = local ?? flat
  const spectra = new Map<CornerState | null, CurrentSpectrum | null>()
  const spectrumOf = (corner: CornerState | null) => {
    if (!spectra.has(corner)) spectra.set(corner, attempt(context, 'windings', () => (corner ? cornerSpectrum(context, corner) : statedSpectrum(context))))
    return spectra.get(corner)!
  }
  const carrying = context.specification.windings.filter(({ role }) => role !== 'shield')
  return {
    coppers,
    complete: carrying.length > 0 && carrying.every(({ id }) => coppers.some(({ winding }) => winding.id === id)),
    field: model?.field ?? null,
    at: asked(context, model, spectrumOf),
    flatAt: asked(context, local && flat, spectrumOf),
  }
}

function asked(context: Context, model: CopperModel | null, spectrumOf: (corner: CornerState | null) => CurrentSpectrum | null): CopperStage['at'] {
  const orders = new Map<CornerState | null, number>()
  return (corner, temperatureC) => {
    const spectrum = model && spectrumOf(corner)
    // How many orders there are to sum hardly depends on the temperature.
    const loss = spectrum && attempt(context, 'windings', () => copperLoss(model, spectrum, temperatureC, { orders: orders.get(corner) ?? null }))
    if (loss) orders.set(corner, loss.orders)
    return loss
  }
}

/**
 * Duration of a current's edge where the circuit's model leaves it ideal: a quick commutation through the leakage inductance. Ideal jumps
 * would lose without end in thin strands. Source: common practice, 0.1 to 0.3 µs.
 */
export const ASSUMED_EDGE_S = 1e-7

function cornerSpectrum(context: Context, { waves }: CornerState): CurrentSpectrum | null {
  const currents = context.specification.windings.map(({ id }) => waves.get(id)?.currentA ?? null)
  const first = currents.find((wave) => wave !== null)
  if (!first) return null
  const soft = currents.map((wave) => wave && withEdges(wave, ASSUMED_EDGE_S))
  if (soft.some((wave, index) => wave !== currents[index])) report(context, 'commutation-time-assumed', 'note', 'requirement.duty', { edgeS: ASSUMED_EDGE_S })
  return currentSpectrum(soft, first.periodS)
}

/**
 * Without waveforms: all alternating current at the fundamental, the primary against all others, as in a transformer; what their
 * ampere-turns do not balance the gap takes up. Source: L. Dixon, SLUP127 (all ac at the fundamental).
 */
function statedSpectrum({ specification }: Context): CurrentSpectrum | null {
  const { windings, electrical } = specification
  const carrying = windings.filter(({ role }) => role !== 'shield')
  if (carrying.some(({ rmsCurrentA }) => rmsCurrentA === null)) return null
  const rmsOf = (index: number) => windings[index]!.rmsCurrentA ?? 0
  const dcA = windings.map(({ dcCurrentA }, index) => Math.min(rmsOf(index), Math.abs(dcCurrentA ?? 0)))
  const frequencyHz = electrical.switchingFrequencyHz.value?.minimum
  // Without a frequency all of the current loses as direct current does.
  if (!positive(frequencyHz)) return phasorSpectrum(windings.map(() => ({ re: 0, im: 0 })), 1, windings.map((_, index) => rmsOf(index)))
  return phasorSpectrum(windings.map(({ role }, index) => ({ re: (role === 'primary' ? 1 : -1) * Math.sqrt(rmsOf(index) ** 2 - dcA[index]! ** 2), im: 0 })), frequencyHz, dcA)
}
