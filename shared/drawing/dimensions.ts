import { labelBox, textWidthMm } from './text-metrics'
import type { LabelShape, PointMm, Shape } from './model'
import { arrowHead, label, LETTERING, line, rectangle } from './shapes'

const OVERSHOOT_MM = 1.5
const OFFSET_MM = 1
/** Arrows stand inside from this length on; below it they point from outside. */
const INSIDE_MM = 7
const TAIL_MM = 5
/** From a vertical line to the baseline of its text, clear of the arrows. */
const TEXT_GAP_MM = 1.1

/** A label with the paper behind it cleared, so that lines below do not run through the text. */
export function clearedLabel(shape: LabelShape): Shape[] {
  const area = labelBox(shape)
  const air = 0.3
  const behind = { leftMm: area.leftMm - air, rightMm: area.rightMm + air, bottomMm: area.bottomMm - air, topMm: area.topMm + air }
  return [rectangle(behind, { fill: 'paper', stroked: false }), shape]
}

/** A horizontal dimension, ISO 129-1: text above the line, or beside it where the arrows leave no room. */
export function horizontalDimension(left: PointMm, right: PointMm, yMm: number, text: string): Shape[] {
  const extend = ([x, y]: PointMm) => {
    const away = Math.sign(yMm - y) || 1
    return line([x, y + away * OFFSET_MM], [x, yMm + away * OVERSHOOT_MM], 'dimension')
  }
  const wide = right[0] - left[0] > INSIDE_MM
  const outside = textWidthMm(text, 'sans', LETTERING.body) > right[0] - left[0] - 1
  const anchor: PointMm = outside ? [right[0] + (wide ? 1.5 : TAIL_MM + 1), yMm + 0.8] : [(left[0] + right[0]) / 2, yMm + 0.8]
  return [
    extend(left),
    extend(right),
    ...(wide
      ? [line([left[0], yMm], [right[0], yMm], 'dimension'), arrowHead([left[0], yMm], -1, 0), arrowHead([right[0], yMm], 1, 0)]
      : [line([left[0] - TAIL_MM, yMm], [right[0] + TAIL_MM, yMm], 'dimension'), arrowHead([left[0], yMm], 1, 0), arrowHead([right[0], yMm], -1, 0)]),
    ...(outside ? clearedLabel(label(anchor, text)) : [label(anchor, text, { align: 'middle' })]),
  ]
}

/**
 * A vertical dimension, read from the right; text left of the line. A text that would not fit stands past the end of the
 * line, or level beside it.
 */
export function verticalDimension(bottom: PointMm, top: PointMm, xMm: number, text: string, unfit: 'past' | 'beside' = 'past'): Shape[] {
  const extend = ([x, y]: PointMm) => {
    const away = Math.sign(xMm - x) || 1
    return line([x + away * OFFSET_MM, y], [xMm + away * OVERSHOOT_MM, y], 'dimension')
  }
  const wide = top[1] - bottom[1] > INSIDE_MM
  const outside = textWidthMm(text, 'sans', LETTERING.body) > top[1] - bottom[1] - 1
  const middle = (bottom[1] + top[1]) / 2
  const hand = xMm < Math.min(bottom[0], top[0]) ? -1 : 1
  const upright = (): Shape => label(outside ? [xMm - TEXT_GAP_MM, top[1] + (wide ? 1.5 : TAIL_MM + 1)] : [xMm - TEXT_GAP_MM, middle], text, { align: outside ? 'start' : 'middle', rotationDeg: 90 })
  const level = (): Shape => label([xMm + hand * 1.8, middle - LETTERING.body / 2], text, { align: hand > 0 ? 'start' : 'end' })
  return [
    extend(bottom),
    extend(top),
    ...(wide
      ? [line([xMm, bottom[1]], [xMm, top[1]], 'dimension'), arrowHead([xMm, bottom[1]], 0, -1), arrowHead([xMm, top[1]], 0, 1)]
      : [line([xMm, bottom[1] - TAIL_MM], [xMm, top[1] + TAIL_MM], 'dimension'), arrowHead([xMm, bottom[1]], 0, 1), arrowHead([xMm, top[1]], 0, -1)]),
    outside && unfit === 'beside' ? level() : upright(),
  ]
}

/** A leader from a feature to a text beside it, ISO 128-2: an arrow on the edge, a short level shoulder. */
export function leader(tip: PointMm, shoulder: PointMm, text: string): Shape[] {
  const hand = shoulder[0] >= tip[0] ? 1 : -1
  const end: PointMm = [shoulder[0] + hand * 2, shoulder[1]]
  return [
    line(tip, shoulder, 'dimension'),
    line(shoulder, end, 'dimension'),
    arrowHead(tip, tip[0] - shoulder[0], tip[1] - shoulder[1]),
    label([end[0] + hand * 0.8, end[1] - LETTERING.body / 2], text, { align: hand > 0 ? 'start' : 'end' }),
  ]
}
