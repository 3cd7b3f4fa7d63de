import type { Coil } from '../build'
import { MU_0_H_PER_M } from '../constants'
import { GAP_FIELD_MODEL, gapByFieldMm, gapFieldPermeance, gapKeepAwayMm } from '../field'
import type { GapDistance } from '../field'
import { windingRectangles } from '../parasitics/leakage-matrix'
import { attempt, explain } from './context'
import type { Context } from './context'
import { gapPlace, laidCoil } from './field'
import { gappedCore, originOf } from './inductance'
import type { InductanceBasis } from './inductance'

/** The gap that gives the inductance by the field of the window, mm, beside the closed model's; null without coil, core or a gap at one place. */
export function gapByWindowField(context: Context, coil: Coil | null, basis: InductanceBasis | null): number | null {
  const gapMm = attempt(context, 'core.gap', () => solvedGap(context, coil, basis))
  explain(context, 'magnetics.gapFieldMm', () => ({
    symbol: 'l_g', value: gapMm, unit: 'mm', formula: '1/A_L = l_e/(µ0·µ_r·A_e) + 1/P(l_g), P the permeance of gap and window', source: `${GAP_FIELD_MODEL}; E. Roth, Rev. Gén. Électr. 23 (1928) 773`,
    inputs: [
      { name: 'A_L', value: basis?.alH ?? 'not known', unit: 'H', origin: 'magnetics.alH' },
      { name: 'A_e', value: gappedCore(context)?.effectiveAreaMm2 ?? 'not known', unit: 'mm²', origin: originOf(context, 'core') },
      { name: 'coil', value: context.primary?.name ?? 'none', unit: '', origin: 'coil layout' },
    ],
  }))
  return gapMm
}

function solvedGap(context: Context, coil: Coil | null, basis: InductanceBasis | null): number | null {
  const core = gappedCore(context)
  const laid = coil && laidCoil(context, coil)
  const position = gapPlace(context, 1).position
  if (!core || !basis || !laid || !context.primary || (position !== 'centre-leg' && position !== 'all-legs-spacer')) return null
  const rectangles = windingRectangles(laid, context.primary.id)
  if (rectangles.length === 0) return null
  const permeance = gapFieldPermeance({ window: laid.placed.window, rectangles, legAreaMm2: core.gapAreaMm2 ?? core.effectiveAreaMm2, position, grinding: laid.gap.grinding, joint: laid.gap.joint })
  return gapByFieldMm(permeance, {
    inductanceFactorH: basis.nominalH / basis.turns ** 2,
    corePermeanceH: (MU_0_H_PER_M * 1e-3 * core.permeability * core.effectiveAreaMm2) / core.effectiveLengthMm,
    longestMm: laid.placed.window.breadthMm / 2,
  })
}

/** How far the nearest conductor stays away from the gap; `gapMm` as calculated, where none is stated. */
export function gapDistance(context: Context, coil: Coil, gapMm: number | null): GapDistance | null {
  const laid = laidCoil(context, coil, gapMm)
  return laid && gapKeepAwayMm(laid)
}
