import { textWidthMm } from './text-metrics'
import type { PointMm, Shape } from './model'
import { arrowHead, label, LETTERING, line } from './shapes'

const OVERSHOOT_MM = 1.5
const OFFSET_MM = 1

/** A horizontal dimension, ISO 129-1: text above the line, or beside it where the arrows leave no room. */
export function horizontalDimension(left: PointMm, right: PointMm, yMm: number, text: string): Shape[] {
  const extend = ([x, y]: PointMm) => {
    const away = Math.sign(yMm - y) || 1
    return line([x, y + away * OFFSET_MM], [x, yMm + away * OVERSHOOT_MM], 'dimension')
  }
  const wide = right[0] - left[0] > 7
  const outside = textWidthMm(text, 'sans', LETTERING.body) > right[0] - left[0] - 1
  const anchor: PointMm = outside ? [right[0] + (wide ? 1.5 : 6), yMm + 0.8] : [(left[0] + right[0]) / 2, yMm + 0.8]
  return [
    extend(left),
    extend(right),
    ...(wide
      ? [line([left[0], yMm], [right[0], yMm], 'dimension'), arrowHead([left[0], yMm], -1, 0), arrowHead([right[0], yMm], 1, 0)]
      : [line([left[0] - 5, yMm], [right[0] + 5, yMm], 'dimension'), arrowHead([left[0], yMm], 1, 0), arrowHead([right[0], yMm], -1, 0)]),
    label(anchor, text, { align: outside ? 'start' : 'middle' }),
  ]
}

/** A vertical dimension, read from the right; text left of the line, or past its end where it would not fit. */
export function verticalDimension(bottom: PointMm, top: PointMm, xMm: number, text: string): Shape[] {
  const extend = ([x, y]: PointMm) => {
    const away = Math.sign(xMm - x) || 1
    return line([x + away * OFFSET_MM, y], [xMm + away * OVERSHOOT_MM, y], 'dimension')
  }
  const wide = top[1] - bottom[1] > 7
  const outside = textWidthMm(text, 'sans', LETTERING.body) > top[1] - bottom[1] - 1
  const anchor: PointMm = outside ? [xMm - 0.8, top[1] + (wide ? 1.5 : 6)] : [xMm - 0.8, (bottom[1] + top[1]) / 2]
  return [
    extend(bottom),
    extend(top),
    ...(wide
      ? [line([xMm, bottom[1]], [xMm, top[1]], 'dimension'), arrowHead([xMm, bottom[1]], 0, -1), arrowHead([xMm, top[1]], 0, 1)]
      : [line([xMm, bottom[1] - 5], [xMm, top[1] + 5], 'dimension'), arrowHead([xMm, bottom[1]], 0, 1), arrowHead([xMm, top[1]], 0, -1)]),
    label(anchor, text, { align: outside ? 'start' : 'middle', rotationDeg: 90 }),
  ]
}
