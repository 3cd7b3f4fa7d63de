import { sheetShapes, type BoxMm, type LabelShape, type PointMm, type Shape, type Sheet } from '#shared/drawing/model'
import { labelBox } from '#shared/drawing/text-metrics'

type Segment = readonly [PointMm, PointMm]

/** Descenders and side bearings may come this close to a line, mm. */
const CLEARANCE_MM = 0.12

const isText = (shape: Shape): shape is LabelShape => shape.kind === 'label' && shape.ink === 'ink'

/** Texts of a sheet that touch each other: boxes reach from the descenders to the capitals. */
export function textOverlaps(sheet: Sheet): string[] {
  const boxes = sheetShapes(sheet).filter(isText).map((label) => ({ text: label.text, ...labelBox(label) }))
  return boxes.flatMap((a, index) =>
    boxes.slice(index + 1).flatMap((b) => {
      const width = Math.min(a.rightMm, b.rightMm) - Math.max(a.leftMm, b.leftMm)
      const height = Math.min(a.topMm, b.topMm) - Math.max(a.bottomMm, b.bottomMm)
      return width > 0.05 && height > 0.05 ? [`sheet ${sheet.number}: "${a.text}" and "${b.text}"`] : []
    }),
  )
}

/** Texts through which a line of the sheet runs, unless paper was laid over the line before the text was written. */
export function lineOverlaps(sheet: Sheet): string[] {
  const shapes = sheetShapes(sheet)
  const drawn = shapes.map((shape) => ({ segments: segmentsOf(shape), paper: paperOf(shape) }))
  return shapes.flatMap((shape, index) => {
    if (!isText(shape)) return []
    const area = shrunk(capitalBox(shape))
    const crossed = drawn.some(({ segments }, other) => {
      if (other === index || !segments.some((segment) => crosses(segment, area))) return false
      return !drawn.slice(other + 1, index).some(({ paper }) => paper !== null && holds(paper, area))
    })
    return crossed ? [`sheet ${sheet.number}: a line through "${shape.text}"`] : []
  })
}

/** From the baseline to the capitals: a rule below the descenders is part of every table. */
function capitalBox(label: LabelShape): BoxMm {
  const whole = labelBox(label)
  return label.rotationDeg === 0 ? { ...whole, bottomMm: label.anchor[1] } : whole
}

const shrunk = ({ leftMm, rightMm, bottomMm, topMm }: BoxMm): BoxMm => ({
  leftMm: leftMm + CLEARANCE_MM,
  rightMm: rightMm - CLEARANCE_MM,
  bottomMm: bottomMm + CLEARANCE_MM,
  topMm: topMm - CLEARANCE_MM,
})

function segmentsOf(shape: Shape): Segment[] {
  if (shape.kind === 'circle') return circleSegments(shape.center, shape.radiusMm)
  if (shape.kind !== 'path' || !shape.stroked) return []
  const points = [shape.from, ...shape.steps.map(({ to }) => to), ...(shape.closed ? [shape.from] : [])]
  return points.slice(1).map((point, index): Segment => [points[index]!, point])
}

function circleSegments([x, y]: PointMm, radius: number): Segment[] {
  const at = (step: number): PointMm => [x + radius * Math.cos((step * Math.PI) / 12), y + radius * Math.sin((step * Math.PI) / 12)]
  return Array.from({ length: 24 }, (_, step): Segment => [at(step), at(step + 1)])
}

function paperOf(shape: Shape): BoxMm | null {
  if (shape.kind === 'circle' && shape.fill !== 'none') {
    const inner = shape.radiusMm * Math.SQRT1_2
    const [x, y] = shape.center
    return { leftMm: x - shape.radiusMm, rightMm: x + shape.radiusMm, bottomMm: y - inner, topMm: y + inner }
  }
  if (shape.kind !== 'path' || !shape.closed || shape.fill === 'none' || shape.steps.length !== 3) return null
  const points = [shape.from, ...shape.steps.map(({ to }) => to)]
  const [xs, ys] = [points.map(([x]) => x), points.map(([, y]) => y)]
  return { leftMm: Math.min(...xs), rightMm: Math.max(...xs), bottomMm: Math.min(...ys), topMm: Math.max(...ys) }
}

const holds = (outer: BoxMm, inner: BoxMm) =>
  outer.leftMm <= inner.leftMm && outer.rightMm >= inner.rightMm && outer.bottomMm <= inner.bottomMm && outer.topMm >= inner.topMm

/** Clips a segment to the box (Liang and Barsky); true when some of it is left. */
function crosses([[x0, y0], [x1, y1]]: Segment, box: BoxMm): boolean {
  const [dx, dy] = [x1 - x0, y1 - y0]
  let [from, to] = [0, 1]
  for (const [p, q] of [[-dx, x0 - box.leftMm], [dx, box.rightMm - x0], [-dy, y0 - box.bottomMm], [dy, box.topMm - y0]] as const) {
    if (p === 0 && q < 0) return false
    if (p === 0) continue
    if (p < 0) from = Math.max(from, q / p)
    else to = Math.min(to, q / p)
  }
  return from < to
}
