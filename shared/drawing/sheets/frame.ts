import type { PointMm, Shape } from '../model'
import { box, label, LETTERING, line, rectangle } from '../shapes'

/** A3 landscape, ISO 5457: filing margin 20 mm at the left, 10 mm elsewhere. */
export const SHEET = { widthMm: 420, heightMm: 297 } as const
export const FRAME = box(20, 10, 390, 277)
/** Inside the frame, clear of the centring marks. */
export const SPACE = { leftMm: 25, rightMm: 405, topMm: 281.5, bottomMm: 10 } as const

const BORDER_MM = 5
const FIELD_MM = 50
const LETTERS = 'ABCDEF'

/** Frame of the drawing space, grid reference system and centring marks of ISO 5457 for A3. */
export function sheetFrame(): Shape[] {
  const outer = box(FRAME.leftMm - BORDER_MM, FRAME.bottomMm - BORDER_MM, 390 + 2 * BORDER_MM, 277 + 2 * BORDER_MM)
  return [
    rectangle(outer, { layer: 'zone' }),
    rectangle(FRAME, { layer: 'frame' }),
    ...centringMarks(),
    ...columns(),
    ...rows(),
  ]
}

const CENTRE: PointMm = [FRAME.leftMm + 195, FRAME.bottomMm + 138.5]

function centringMarks(): Shape[] {
  const inward = 4
  return [
    line([CENTRE[0], FRAME.topMm + BORDER_MM], [CENTRE[0], FRAME.topMm - inward], 'frame'),
    line([CENTRE[0], FRAME.bottomMm - BORDER_MM], [CENTRE[0], FRAME.bottomMm], 'frame'),
    line([FRAME.leftMm - BORDER_MM, CENTRE[1]], [FRAME.leftMm + inward, CENTRE[1]], 'frame'),
    line([FRAME.rightMm + BORDER_MM, CENTRE[1]], [FRAME.rightMm - inward, CENTRE[1]], 'frame'),
  ]
}

/** Fields of 50 mm from the centring marks outwards; what is left goes to the corners. */
function columns(): Shape[] {
  const strips = [FRAME.bottomMm - BORDER_MM, FRAME.topMm]
  return strips.flatMap((y) => [
    ...[-3, -2, -1, 1, 2, 3].map((step) => CENTRE[0] + step * FIELD_MM).map((x) => line([x, y], [x, y + BORDER_MM], 'zone')),
    ...Array.from({ length: 8 }, (_, index) => mark([CENTRE[0] + (index - 3.5) * FIELD_MM, y + BORDER_MM / 2], String(index + 1))),
  ])
}

function rows(): Shape[] {
  const strips = [FRAME.leftMm - BORDER_MM, FRAME.rightMm]
  return strips.flatMap((x) => [
    ...[-2, -1, 1, 2].map((step) => CENTRE[1] + step * FIELD_MM).map((y) => line([x, y], [x + BORDER_MM, y], 'zone')),
    ...[...LETTERS].map((letter, index) => mark([x + BORDER_MM / 2, CENTRE[1] + (2.5 - index) * FIELD_MM], letter)),
  ])
}

const mark = ([x, y]: PointMm, text: string): Shape =>
  label([x, y - LETTERING.heading / 2], text, { align: 'middle', heightMm: LETTERING.heading })

/** Grid reference of a place on the sheet, e.g. `C4`. */
export function zoneOf([x, y]: PointMm): string {
  const within = (value: number, count: number) => Math.min(Math.max(value, 0), count - 1)
  const column = within(Math.floor((x - CENTRE[0]) / FIELD_MM) + 4, 8)
  const row = within(2 - Math.floor((y - CENTRE[1]) / FIELD_MM), 6)
  return `${LETTERS[row]}${column + 1}`
}
