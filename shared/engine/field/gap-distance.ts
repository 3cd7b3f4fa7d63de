import type { LaidCoil } from './layout-turns'
import { isConductor } from './layout-turns'
import { gapMmf } from './window'

/** The conductor that lies nearest to an air gap. */
export interface GapDistance {
  windingId: string
  turn: number
  /** From the nearest point of the gap's mouth to the surface of the conductor. */
  distanceMm: number
  gapMm: number
}

/**
 * How far the nearest wire or foil stays away from the air gap in the leg or the outer legs; null without a gap at one place or
 * without conductors. Two to three gap lengths are the usual least.
 *
 * Source: geometry; common practice of keep-away distance.
 */
export function gapKeepAwayMm({ layout, placed, gap }: LaidCoil): GapDistance | null {
  const mmf = gapMmf(placed.window, gap)
  if (mmf.kind !== 'walls') return null
  const mouths = mmf.strips.map(({ wall, fromMm, toMm }) => ({ radialMm: wall === 'leg' ? 0 : placed.window.heightMm, fromMm, toMm }))
  let nearest: GapDistance | null = null
  for (const item of layout.items.filter(isConductor)) {
    const body = item.kind === 'turn'
      ? { left: item.xMm, right: item.xMm, low: item.yMm, high: item.yMm, halfMm: item.conductorMm / 2 }
      : { left: item.xMm, right: item.xMm + item.widthMm, low: item.yMm, high: item.yMm + item.thicknessMm, halfMm: 0 }
    for (const { radialMm, fromMm, toMm } of mouths) {
      const along = apart(body.left + placed.axialOffsetMm, body.right + placed.axialOffsetMm, fromMm, toMm)
      const across = apart(body.low + placed.radialOffsetMm, body.high + placed.radialOffsetMm, radialMm, radialMm)
      const distanceMm = Math.max(0, Math.hypot(along, across) - body.halfMm)
      if (!nearest || distanceMm < nearest.distanceMm) nearest = { windingId: item.windingId, turn: item.turn, distanceMm, gapMm: toMm - fromMm }
    }
  }
  return nearest
}

/** Gap between two stretches of one line; 0 where they overlap. */
const apart = (from: number, to: number, otherFrom: number, otherTo: number): number => Math.max(0, otherFrom - to, from - otherTo)
