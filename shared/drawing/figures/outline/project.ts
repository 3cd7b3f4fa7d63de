import type { PointMm, Shape } from '../../model'
import { circle, polyline } from '../../shapes'
import type { PinSolid, Point3, PrismSolid, Solid } from './solids'

/** Where one looks from. `left` and `right` are the two side views, `below` shows the pins. */
export type ViewName = 'front' | 'left' | 'right' | 'below' | 'above'

interface Viewing {
  /** Axis and sign of the view's horizontal, its vertical and of the way towards the eye. */
  u: readonly [axis: 0 | 1 | 2, sign: 1 | -1]
  v: readonly [axis: 0 | 1 | 2, sign: 1 | -1]
  eye: readonly [axis: 0 | 1 | 2, sign: 1 | -1]
}

const VIEWS: Record<ViewName, Viewing> = {
  front: { u: [0, 1], v: [2, 1], eye: [1, -1] },
  left: { u: [1, -1], v: [2, 1], eye: [0, -1] },
  right: { u: [1, 1], v: [2, 1], eye: [0, 1] },
  above: { u: [0, 1], v: [1, 1], eye: [2, 1] },
  below: { u: [0, 1], v: [1, -1], eye: [2, -1] },
}

/** A point of the part in a view, mm of the part. */
export function projected(view: ViewName, point: Point3): PointMm {
  const { u, v } = VIEWS[view]
  return [u[1] * point[u[0]], v[1] * point[v[0]]]
}

/** The bodies as one sees them: those nearer to the eye are painted over those behind. */
export function viewShapes(view: ViewName, solids: readonly Solid[], scale: number): Shape[] {
  const { eye } = VIEWS[view]
  const nearness = (solid: Solid) => eye[1] * bounds(solid)[eye[1] > 0 ? 1 : 0][eye[0]]
  return [...solids].sort((a, b) => nearness(a) - nearness(b)).flatMap((solid) => solidShapes(view, solid, scale))
}

/** Corners of the box around a body. */
export function bounds(solid: Solid): readonly [Point3, Point3] {
  switch (solid.shape) {
    case 'box':
      return [solid.low, solid.high]
    case 'prism':
      return prismBounds(solid)
    case 'pin': {
      const half = solid.sizeMm / 2
      const [x, y] = solid.center
      return [[x - half, y - half, solid.low], [x + half, y + half, solid.high]]
    }
    case 'ring': {
      const half = solid.outsideMm / 2
      return [[-half, -half, solid.low], [half, half, solid.high]]
    }
  }
}

function prismBounds({ along, from, to, profile }: PrismSolid): readonly [Point3, Point3] {
  const [first, second] = [0, 1].map((index) => profile.map((point) => point[index]!))
  const corner = (pick: (values: number[]) => number, end: number): Point3 => {
    const plane = [pick(first!), pick(second!)]
    const axes = [0, 1, 2].map((axis) => (axis === along ? end : plane.shift()!))
    return [axes[0]!, axes[1]!, axes[2]!]
  }
  return [corner((values) => Math.min(...values), from), corner((values) => Math.max(...values), to)]
}

const layerOf = ({ part }: Solid) => (part === 'core' ? 'outline' : 'thin')

function solidShapes(view: ViewName, solid: Solid, scale: number): Shape[] {
  const { eye } = VIEWS[view]
  const style = { layer: layerOf(solid), fill: solid.part === 'coil' ? 'tint' : 'paper', tag: solid.tag } as const
  if (solid.shape === 'prism' && solid.along === eye[0]) return [polyline(profilePoints(view, solid, scale), { ...style, closed: true })]
  if (solid.shape === 'pin' && eye[0] === 2) return pinEnd(view, solid, scale)
  if (solid.shape === 'ring' && eye[0] === 2) return [circle([0, 0], (solid.outsideMm / 2) * scale, style), circle([0, 0], (solid.insideMm / 2) * scale, style)]
  return [polyline(rectanglePoints(view, solid, scale), { ...style, closed: true })]
}

function profilePoints(view: ViewName, { along, from, profile }: PrismSolid, scale: number): PointMm[] {
  return profile.map(([first, second]) => {
    const rest = [first, second]
    const axes = [0, 1, 2].map((axis) => (axis === along ? from : rest.shift()!))
    const [x, y] = projected(view, [axes[0]!, axes[1]!, axes[2]!])
    return [x * scale, y * scale]
  })
}

function rectanglePoints(view: ViewName, solid: Solid, scale: number): PointMm[] {
  const [low, high] = bounds(solid).map((corner) => projected(view, corner))
  const [left, right] = [Math.min(low![0], high![0]) * scale, Math.max(low![0], high![0]) * scale]
  const [bottom, top] = [Math.min(low![1], high![1]) * scale, Math.max(low![1], high![1]) * scale]
  return [[left, bottom], [right, bottom], [right, top], [left, top]]
}

/** Pins small on paper keep a size that can be seen. */
const LEAST_PIN_MM = 0.35

function pinEnd(view: ViewName, { center, low, round, sizeMm, tag }: PinSolid, scale: number): Shape[] {
  const [x, y] = projected(view, [center[0], center[1], low])
  const half = Math.max((sizeMm * scale) / 2, LEAST_PIN_MM)
  const at: PointMm = [x * scale, y * scale]
  if (round) return [circle(at, half, { layer: 'thin', fill: 'dark-tint', tag })]
  return [polyline([[at[0] - half, at[1] - half], [at[0] + half, at[1] - half], [at[0] + half, at[1] + half], [at[0] - half, at[1] + half]], { layer: 'thin', fill: 'dark-tint', closed: true, tag })]
}
