import { MU_0_H_PER_M } from '../constants'
import { requireNotNegative } from '../require'
import { GREATEST_ARGUMENT, cylinderWave, planeWave } from './radial-wave'
import type { RadialPoint, RadialWave } from './radial-wave'
import { requireWindow, turnLengthAtMm } from './window'
import type { FieldWindow } from './window'

/** A part of a winding as a rectangle of even current, mm from the face of the centre leg and from one yoke. */
export interface CurrentRectangle {
  /** Index of the winding. */
  group: number
  /** Its ampere-turns per ampere-turn of the whole winding. */
  share: number
  radialFromMm: number
  radialToMm: number
  axialFromMm: number
  axialToMm: number
}

export interface WindowEnergyInput {
  window: FieldWindow
  /** Windings; each gets a row of the matrix. */
  groups: number
  rectangles: readonly CurrentRectangle[]
  /** Share of the net magnetomotive force that gaps in the outer legs take up; the rest lies evenly on the centre leg. */
  outerShare?: number
  waves?: number
}

/** Axial waves that are summed: what is left out falls with their third power. */
const WAVES = 48

/** Bands are cut so thin that a wave grows by e² at most from their middle to their edge. */
const THICKEST_IN_WAVES = 4

/**
 * Energy of the field in the winding window as an inductance matrix referred to one turn, in henry, row by row:
 * W = ½·Σ M_ij·Θ_i·Θ_j with the ampere-turns Θ. Without core and gap: exact where the ampere-turns cancel; a net ampere-turn
 * is taken up evenly along the leg.
 *
 * The mean over the axis is the textbook's one-dimensional integral with the true turn length at each place. To it comes, for
 * each axial wave, the field that margins, partial breadth and sections bend. Straight turns: plane waves, times the root of
 * both turn lengths. Round legs: cylinder functions; the thickness of a band (below half a wave) is integrated as in a plane.
 *
 * Sources: E. Roth, Rev. Gén. Électr. 23 (1928) 773; L. Rabins, Trans. AIEE 75 III (1956) 261; energy as in E. Snelling, Soft
 * Ferrites, 2nd ed., ch. 11.
 *
 * @throws RangeError on a window or a rectangle out of range
 */
export function windowEnergyH(input: WindowEnergyInput): Float64Array {
  requireWindow(input.window)
  const { window, groups, waves = WAVES } = input
  input.rectangles.forEach((rectangle) => requireRectangle(rectangle, window))
  const matrix = new Float64Array(groups * groups)
  const first = Math.PI / window.breadthMm
  const last = lastWave(window, waves)
  const bands = bandsOf(input.rectangles, first * Math.max(1, last))
  addMean(matrix, input, bands)
  for (let n = 1; n <= last; n++) addWave(matrix, input, bands, n * first)
  // mm of turn length over mm of breadth times mm of height: one mm is left.
  const unit = MU_0_H_PER_M * 1e-3
  return matrix.map((value) => value * unit)
}

/** Number of the last axial wave whose cylinder functions stay in range. */
export function lastWave({ breadthMm, heightMm, depth }: FieldWindow, waves: number): number {
  const outerMm = heightMm + (depth.kind === 'round' ? depth.legRadiusMm : 0)
  return Math.min(waves, Math.floor((GREATEST_ARGUMENT * breadthMm) / (Math.PI * outerMm)))
}

/** How one axial wave of wave number q crosses the window. */
export const radialWave = (q: number, { depth, heightMm }: FieldWindow): RadialWave => (depth.kind === 'round' ? cylinderWave(q, depth.legRadiusMm, heightMm) : planeWave(q, heightMm))

function requireRectangle({ radialFromMm, radialToMm, axialFromMm, axialToMm }: CurrentRectangle, { heightMm, breadthMm }: FieldWindow): void {
  requireNotNegative('radialFromMm', radialFromMm)
  requireNotNegative('axialFromMm', axialFromMm)
  if (!(radialToMm > radialFromMm && radialToMm <= heightMm + 1e-9 && axialToMm > axialFromMm && axialToMm <= breadthMm + 1e-9)) {
    throw new RangeError(`a rectangle must lie in the window of ${breadthMm} × ${heightMm} mm: ${axialFromMm}…${axialToMm}, ${radialFromMm}…${radialToMm}`)
  }
}

/** Radial bands that no edge of a rectangle cuts: two bands are either one and the same or apart. */
export interface Band {
  fromMm: number
  toMm: number
  parts: { rectangle: CurrentRectangle; share: number }[]
}

/** Bands so thin that the waves up to `lastWave` (per mm) vary little in them. */
export function bandsOf(rectangles: readonly CurrentRectangle[], lastWave: number): Band[] {
  const thickestMm = THICKEST_IN_WAVES / lastWave
  const edges = [...new Set(rectangles.flatMap(({ radialFromMm, radialToMm }) => [radialFromMm, radialToMm]))].sort((a, b) => a - b)
  return edges.slice(1).flatMap((toMm, index) => {
    const fromMm = edges[index]!
    const inside = rectangles.filter(({ radialFromMm, radialToMm }) => radialFromMm <= fromMm && radialToMm >= toMm)
    if (inside.length === 0 || toMm - fromMm < 1e-9) return []
    const count = Math.ceil((toMm - fromMm) / thickestMm)
    const heightMm = (toMm - fromMm) / count
    return Array.from({ length: count }, (_, cut): Band => ({
      fromMm: fromMm + cut * heightMm,
      toMm: fromMm + (cut + 1) * heightMm,
      parts: inside.map((rectangle) => ({ rectangle, share: (rectangle.share * heightMm) / (rectangle.radialToMm - rectangle.radialFromMm) })),
    }))
  })
}

/** The part that does not vary along the axis: ∫F_i·F_j·l dx/b, F the ampere-turns outside a place. Simpson's rule is exact for it. */
function addMean(matrix: Float64Array, { window, groups, rectangles, outerShare = 0 }: WindowEnergyInput, bands: readonly Band[]): void {
  const net = new Float64Array(groups)
  for (const { group, share } of rectangles) net[group]! += share
  let outside = net.map((share) => share * (1 - outerShare))
  const add = (fromMm: number, toMm: number, before: Float64Array, after: Float64Array) => {
    const [start, middle, end] = [fromMm, (fromMm + toMm) / 2, toMm].map((mm) => turnLengthAtMm(window.depth, mm)) as [number, number, number]
    const factor = (toMm - fromMm) / (6 * window.breadthMm)
    for (let i = 0; i < groups; i++) {
      for (let j = 0; j < groups; j++) {
        const halfway = (before[i]! + after[i]!) * (before[j]! + after[j]!)
        matrix[i * groups + j]! += factor * (start * before[i]! * before[j]! + middle * halfway + end * after[i]! * after[j]!)
      }
    }
  }
  let reached = 0
  for (const { fromMm, toMm, parts } of bands) {
    add(reached, fromMm, outside, outside)
    const after = Float64Array.from(outside)
    for (const { rectangle, share } of parts) after[rectangle.group]! -= share
    add(fromMm, toMm, outside, after)
    outside = after
    reached = toMm
  }
  add(reached, window.heightMm, outside, outside)
}

function addWave(matrix: Float64Array, { window, groups }: WindowEnergyInput, bands: readonly Band[], q: number): void {
  const { breadthMm } = window
  const wave = radialWave(q, window)
  const points = bands.map((band) => bandWave(band, window, wave, q))
  const amplitudes = bands.map(({ parts }) => {
    const row = new Float64Array(groups)
    for (const { rectangle, share } of parts) row[rectangle.group]! += share * meanCosine(q, rectangle.axialFromMm, rectangle.axialToMm)
    return row
  })
  const below = new Float64Array(groups)
  const factor = 2 / breadthMm
  points.forEach(({ inner, outer, own }, band) => {
    const row = amplitudes[band]!
    for (let i = 0; i < groups; i++) {
      if (row[i] === 0) continue
      for (let j = 0; j < groups; j++) {
        const across = factor * wave.scale * outer * row[i]! * below[j]!
        matrix[i * groups + j]! += across + factor * own * row[i]! * row[j]!
        matrix[j * groups + i]! += across
      }
    }
    for (let i = 0; i < groups; i++) below[i]! += inner * row[i]!
  })
}

/** Mean of cos q·y over a stretch of the axis. */
export const meanCosine = (q: number, from: number, to: number): number => (Math.sin(q * to) - Math.sin(q * from)) / (q * (to - from))

/** Root of the turn length (and for cylinder waves of their weight) that a place contributes to a product of two. */
export const turnRoot = (point: RadialPoint, { depth }: FieldWindow, radialMm: number): number =>
  depth.kind === 'round' ? Math.sqrt(2 * Math.PI) * point.weight : Math.sqrt(turnLengthAtMm(depth, radialMm))

/** What a band does in one wave: as source or place of another band, and with itself. */
export interface BandWave {
  inner: number
  outer: number
  own: number
}

export function bandWave({ fromMm, toMm }: Band, window: FieldWindow, wave: RadialWave, q: number): BandWave {
  const middleMm = (fromMm + toMm) / 2
  const point = wave.at(middleMm)
  const root = turnRoot(point, window, middleMm)
  const spread = (q * (toMm - fromMm)) / 2
  const mean = spread < 1e-4 ? 1 : Math.sinh(spread) / spread
  return { inner: root * mean * point.innerA, outer: root * mean * point.outerA, own: ownShare(point, wave.scale, { root, mean, spread, q, lengthMm: turnLengthAtMm(window.depth, middleMm) }) }
}

/**
 * Mean over both places in one band: (sinh s/s)²·G − (sinh 2s − 2s)/(q·(2s)²) with s = q·t/2, exact in a plane.
 *
 * Source: integration of cosh q·x_<·cosh q·(h − x_>).
 */
function ownShare({ innerA, outerA }: RadialPoint, scale: number, { root, mean, spread, q, lengthMm }: { root: number; mean: number; spread: number; q: number; lengthMm: number }): number {
  const twice = 2 * spread
  const kink = twice < 1e-2 ? twice / 6 : (Math.sinh(twice) - twice) / twice ** 2
  return scale * innerA * outerA * (root * mean) ** 2 - (kink * lengthMm) / q
}
