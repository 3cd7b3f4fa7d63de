import type { CoreRow } from '../../../engine/library'
import { horizontalDimension, verticalDimension } from '../../dimensions'
import type { Picture, PointMm, Shape } from '../../model'
import { box, circle, line, moved, polyline, rectangle } from '../../shapes'
import { plain } from '../../sheets/figures'
import { standardScale } from '../scales'

export interface CorePicture extends Picture {
  scale: number
  /** Letters of the shape's dimension drawing that the library does not hold. */
  missing: string[]
}

const ROOM = { left: 20, right: 20, bottom: 16, top: 22 } as const
const BETWEEN_MM = 26

/** For reference: the part's library row, not an inspected dimension. */
const reference = (value: number) => `(${plain(value)})`

/** One half (or the ring) with the dimensions A to F of its library row; null when too few are known to draw it. */
export function coreFigure(core: CoreRow, widthMm: number, heightMm: number): CorePicture | null {
  return core.shape === 'toroid' ? ringFigure(core, widthMm, heightMm) : halfFigure(core, widthMm, heightMm)
}

const missingOf = ({ dimensionsMm }: CoreRow, letters: readonly ('a' | 'b' | 'c' | 'd' | 'e' | 'f')[]) =>
  letters.filter((letter) => dimensionsMm[letter] === null).map((letter) => letter.toUpperCase())

function halfFigure(core: CoreRow, widthMm: number, heightMm: number): CorePicture | null {
  const { a, b, c, d, e, f } = core.dimensionsMm
  const missing = missingOf(core, ['a', 'b', 'c', 'd', 'e', 'f'])
  if (a === null || b === null || d === null || e === null || f === null) return null
  const depth = c ?? 0
  const scale = standardScale({ width: a + depth, height: b }, { width: widthMm - ROOM.left - ROOM.right - BETWEEN_MM, height: heightMm - ROOM.bottom - ROOM.top })
  const at = (x: number, y: number): PointMm => [x * scale, y * scale]
  const points = [at(-a / 2, 0), at(a / 2, 0), at(a / 2, b), at(e / 2, b), at(e / 2, b - d), at(f / 2, b - d), at(f / 2, b), at(-f / 2, b), at(-f / 2, b - d), at(-e / 2, b - d), at(-e / 2, b), at(-a / 2, b)]
  const top = b * scale
  const left = (-a / 2) * scale
  const right = (a / 2) * scale
  const front: Shape[] = [
    polyline(points, { layer: 'outline', closed: true, tag: 'core' }),
    line([0, -2], [0, top + 2], 'centre'),
    ...horizontalDimension(at(-e / 2, b), at(e / 2, b), top + 12, reference(e)),
    ...horizontalDimension(at(-f / 2, b), at(f / 2, b), top + 5, reference(f)),
    ...horizontalDimension(at(-a / 2, 0), at(a / 2, 0), -8, reference(a)),
    ...verticalDimension(at(-a / 2, 0), at(-a / 2, b), left - 8, reference(b), 'beside'),
    ...verticalDimension(at(a / 2, b - d), at(a / 2, b), right + 9, reference(d), 'beside'),
    line(at(e / 2, b - d), [right + 9, (b - d) * scale], 'dimension'),
  ]
  const sideX = right + BETWEEN_MM
  const side: Shape[] = c === null ? [] : [rectangle(box(sideX, 0, c * scale, top), { layer: 'outline', tag: 'core' }), ...horizontalDimension([sideX, 0], [sideX + c * scale, 0], -8, reference(c))]
  return picture([...front, ...side], ROOM.left - left, widthMm, top, scale, missing)
}

function ringFigure(core: CoreRow, widthMm: number, heightMm: number): CorePicture | null {
  const { a, b, c } = core.dimensionsMm
  if (a === null || b === null) return null
  const depth = c ?? 0
  const scale = standardScale({ width: a + depth, height: a }, { width: widthMm - ROOM.left - ROOM.right - BETWEEN_MM, height: heightMm - ROOM.bottom - ROOM.top })
  const radius = (a / 2) * scale
  const inner = (b / 2) * scale
  const front: Shape[] = [
    circle([0, radius], radius, { layer: 'outline', tag: 'core' }),
    circle([0, radius], inner, { layer: 'outline', tag: 'core' }),
    line([-radius - 2, radius], [radius + 2, radius], 'centre'),
    line([0, -2], [0, 2 * radius + 2], 'centre'),
    ...horizontalDimension([-inner, radius], [inner, radius], 2 * radius + 5, `(Ø ${plain(b)})`),
    ...horizontalDimension([-radius, radius], [radius, radius], -8, `(Ø ${plain(a)})`),
  ]
  const sideX = radius + BETWEEN_MM
  const side: Shape[] = c === null ? [] : [rectangle(box(sideX, 0, c * scale, 2 * radius), { layer: 'outline', tag: 'core' }), ...horizontalDimension([sideX, 0], [sideX + c * scale, 0], -8, reference(c))]
  return picture([...front, ...side], ROOM.left + radius, widthMm, 2 * radius, scale, missingOf(core, ['a', 'b', 'c']))
}

const picture = (shapes: readonly Shape[], leftMm: number, widthMm: number, bodyMm: number, scale: number, missing: string[]): CorePicture => ({
  widthMm,
  heightMm: bodyMm + ROOM.bottom + ROOM.top,
  shapes: moved(shapes, leftMm, ROOM.bottom),
  scale,
  missing,
})
