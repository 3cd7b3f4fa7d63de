import { LINE_PITCH, textWidthMm, wrapText } from './text-metrics'
import type { Align, BoxMm, CircleShape, Fill, FontRole, Ink, LabelShape, Layer, PathShape, PointMm, Shape } from './model'

/** Heights of lettering, ISO 3098-1 nominal sizes, mm. */
export const LETTERING = { small: 1.8, body: 2.5, heading: 3.5, number: 5 } as const

interface PathOptions {
  layer?: Layer
  fill?: Fill
  closed?: boolean
  stroked?: boolean
  tag?: string
}

export function path(from: PointMm, steps: PathShape['steps'], options: PathOptions = {}): PathShape {
  const { layer = 'thin', fill = 'none', closed = false, stroked = true, tag } = options
  return { kind: 'path', layer, from, steps, closed, fill, stroked, ...(tag !== undefined && { tag }) }
}

export const polyline = ([from, ...rest]: readonly PointMm[], options: PathOptions = {}): PathShape =>
  path(from!, rest.map((to) => ({ to })), options)

export const line = (from: PointMm, to: PointMm, layer: Layer = 'thin', tag?: string): PathShape =>
  polyline([from, to], { layer, tag })

export function rectangle(box: BoxMm, options: PathOptions = {}): PathShape {
  const { leftMm, rightMm, bottomMm, topMm } = box
  const corners: PointMm[] = [[leftMm, bottomMm], [rightMm, bottomMm], [rightMm, topMm], [leftMm, topMm]]
  return polyline(corners, { ...options, closed: true })
}

/** A box by its lower left corner and size. */
export const box = (leftMm: number, bottomMm: number, widthMm: number, heightMm: number): BoxMm => ({
  leftMm,
  bottomMm,
  rightMm: leftMm + widthMm,
  topMm: bottomMm + heightMm,
})

export const circle = (center: PointMm, radiusMm: number, options: { layer?: Layer; fill?: Fill; tag?: string } = {}): CircleShape => ({
  kind: 'circle',
  layer: options.layer ?? 'thin',
  center,
  radiusMm,
  fill: options.fill ?? 'none',
  ...(options.tag !== undefined && { tag: options.tag }),
})

export interface LabelOptions {
  align?: Align
  heightMm?: number
  font?: FontRole
  ink?: Ink
  rotationDeg?: number
  tag?: string
}

export function label(anchor: PointMm, text: string, options: LabelOptions = {}): LabelShape {
  const { align = 'start', heightMm = LETTERING.body, font = 'sans', ink = 'ink', rotationDeg = 0, tag } = options
  const clean = text.normalize('NFC')
  return { kind: 'label', anchor, align, heightMm, font, text: clean, ink, rotationDeg, ...(tag !== undefined && { tag }) }
}

/** Lines of text below each other; `top` is the upper edge of the first line's capitals. */
export function labelLines(leftMm: number, topMm: number, lines: readonly string[], options: LabelOptions = {}): LabelShape[] {
  const heightMm = options.heightMm ?? LETTERING.body
  return lines.map((text, index) => label([leftMm, topMm - heightMm - index * heightMm * LINE_PITCH], text, options))
}

/** Height of so many lines of text, from the top of the capitals to the descenders of the last line, mm. */
export const linesHeightMm = (count: number, heightMm: number): number =>
  count === 0 ? 0 : heightMm * 1.3 + (count - 1) * heightMm * LINE_PITCH

export interface FittedText {
  heightMm: number
  lines: string[]
}

/** The tallest of the given letterings whose lines fit into a field; the last one is taken when none fits. */
export function fitText(text: string, font: FontRole, widthMm: number, fieldHeightMm: number, heights: readonly number[]): FittedText {
  const tries = heights.map((heightMm) => ({ heightMm, lines: wrapText(text, font, heightMm, widthMm) }))
  const fits = ({ heightMm, lines }: FittedText) =>
    linesHeightMm(lines.length, heightMm) <= fieldHeightMm && lines.every((row) => textWidthMm(row, font, heightMm) <= widthMm)
  return tries.find(fits) ?? tries.at(-1)!
}

function movePoint([x, y]: PointMm, dxMm: number, dyMm: number): PointMm {
  return [x + dxMm, y + dyMm]
}

function move(shape: Shape, dxMm: number, dyMm: number): Shape {
  switch (shape.kind) {
    case 'path':
      return {
        ...shape,
        from: movePoint(shape.from, dxMm, dyMm),
        steps: shape.steps.map((step) => ({ ...step, to: movePoint(step.to, dxMm, dyMm) })),
      }
    case 'circle':
      return { ...shape, center: movePoint(shape.center, dxMm, dyMm) }
    case 'label':
      return { ...shape, anchor: movePoint(shape.anchor, dxMm, dyMm) }
    case 'modules':
      return { ...shape, corner: movePoint(shape.corner, dxMm, dyMm) }
  }
}

export const moved = (shapes: readonly Shape[], dxMm: number, dyMm: number): Shape[] =>
  shapes.map((shape) => move(shape, dxMm, dyMm))

/** Parallel lines under 45° across a rectangle, `pitchMm` apart along x. */
export function hatchRectangle(area: BoxMm, pitchMm: number, slope: 1 | -1 = 1, layer: Layer = 'hatch'): Shape[] {
  const { leftMm, rightMm, bottomMm, topMm } = area
  const height = topMm - bottomMm
  const shapes: Shape[] = []
  for (let start = leftMm - height + pitchMm / 2; start < rightMm; start += pitchMm) {
    const from = Math.max(start, leftMm)
    const to = Math.min(start + height, rightMm)
    if (to - from < 0.05) continue
    const rise = (x: number) => (slope === 1 ? bottomMm + (x - start) : topMm - (x - start))
    shapes.push(line([from, rise(from)], [to, rise(to)], layer))
  }
  return shapes
}

/** Filled arrow head of a dimension line, ISO 129-1; the tip lies at `tip` and points along (dx, dy). */
export function arrowHead(tip: PointMm, dx: number, dy: number, lengthMm = 2.2): PathShape {
  const size = Math.hypot(dx, dy)
  const [ux, uy] = [dx / size, dy / size]
  const half = lengthMm * 0.13
  const back: PointMm = [tip[0] - ux * lengthMm, tip[1] - uy * lengthMm]
  const points: PointMm[] = [tip, [back[0] - uy * half, back[1] + ux * half], [back[0] + uy * half, back[1] - ux * half]]
  return polyline(points, { layer: 'dimension', fill: 'ink', closed: true })
}

