import type { PointMm, Shape } from '../model'
import { circle, line, polyline } from '../shapes'

const LARGE_MM = 5
const SMALL_MM = 2.5
const LENGTH_MM = 5
const GAP_MM = 6.5

/**
 * Projection symbol of ISO 5456-2 about its centre: a truncated cone with its small end at the left, and the view of
 * it from the left, which stands on the right in first-angle and on the left in third-angle projection.
 */
export function projectionSymbol([x, y]: PointMm, method: 'first-angle' | 'third-angle'): Shape[] {
  const side = method === 'first-angle' ? 1 : -1
  const cone = x - (side * GAP_MM) / 2
  const view: PointMm = [x + (side * GAP_MM) / 2, y]
  const [left, right] = [cone - LENGTH_MM / 2, cone + LENGTH_MM / 2]
  return [
    polyline([[left, y - SMALL_MM / 2], [right, y - LARGE_MM / 2], [right, y + LARGE_MM / 2], [left, y + SMALL_MM / 2]], { layer: 'symbol', closed: true }),
    line([left - 1, y], [right + 1, y], 'centre'),
    circle(view, LARGE_MM / 2, { layer: 'symbol' }),
    circle(view, SMALL_MM / 2, { layer: 'symbol' }),
    line([view[0] - LARGE_MM / 2 - 0.6, y], [view[0] + LARGE_MM / 2 + 0.6, y], 'centre'),
    line([view[0], y - LARGE_MM / 2 - 0.6], [view[0], y + LARGE_MM / 2 + 0.6], 'centre'),
  ]
}
