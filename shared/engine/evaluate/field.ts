import type { Coil } from '../build'
import type { LaidCoil } from '../field'
import { isConductor, placedWindow } from '../field'
import type { GapPlace } from '../field'
import { leakageMatrix } from '../parasitics/leakage-matrix'
import type { LeakageMatrix } from '../parasitics/leakage-matrix'
import { attempt } from './context'
import type { Context } from './context'

/** Where the gap lies and how long it is: as stated, else as calculated from the inductance. Without a stated place it is in the centre leg. */
export function gapPlace({ specification, core }: Context, calculatedMm: number | null): GapPlace {
  const { position, lengthMm, grinding, alH } = specification.core.gap
  const stated = position.value ?? (lengthMm.value !== null || alH.value !== null || calculatedMm !== null ? 'centre-leg' : null)
  return { position: stated, lengthMm: lengthMm.value ?? calculatedMm, grinding: grinding.value, joint: core?.shape === 'EI' ? 'end' : 'middle' }
}

/** Beyond this number of conductors the field would take longer than anybody types. */
const MOST_CONDUCTORS = 20_000

/** The laid coil in its window for the stages that rest on the field; null without a rectangular window. `gapMm`: as calculated, where none is stated. */
export function laidCoil(context: Context, coil: Coil, gapMm: number | null = null): LaidCoil | null {
  const { core, former, specification } = context
  if (!former || coil.layout.items.length === 0 || coil.layout.items.filter(isConductor).length > MOST_CONDUCTORS) return null
  const placed = placedWindow({ core, former, layout: coil.layout })
  return placed && { layout: coil.layout, windings: specification.windings, placed, gap: gapPlace(context, gapMm) }
}

const matrices = new WeakMap<Coil, { matrix: LeakageMatrix | null }>()

/** The leakage matrix of a laid coil, made once for each layout. */
export function coilLeakage(context: Context, coil: Coil): LeakageMatrix | null {
  const held = matrices.get(coil)
  if (held) return held.matrix
  const laid = laidCoil(context, coil)
  const matrix = laid && attempt(context, 'sequence', () => leakageMatrix(laid))
  matrices.set(coil, { matrix })
  return matrix
}
