import { erf } from './error-function'
import { NEAR_REACH, mirrored } from './near'
import { GREATEST_ARGUMENT, cylinderWave, planeWave } from './radial-wave'
import type { RadialPoint } from './radial-wave'
import { curvatureRoot } from './series'
import type { ChannelFields, CurrentSources, FieldPlace } from './series'

/** Waves with q·R beyond this follow the plane solution with 1/√r to better than 1 %. */
const CURVED_UP_TO = 6
const MOST_WAVES = 40

/**
 * Round legs: puts the exact cylinder functions in the place of the plane ones for the long axial waves, whose length
 * compares with the radius. Adds to `fields`.
 *
 * Source: L. Rabins, Trans. AIEE 75 III (1956) 261.
 */
export function addCurvature(fields: ChannelFields, sources: CurrentSources, places: readonly FieldPlace[], smoothMm: number): void {
  const { window, channels } = sources
  if (window.depth.kind !== 'round') return
  const { legRadiusMm } = window.depth
  const first = Math.PI / window.breadthMm
  const waves = Math.min(MOST_WAVES, Math.ceil(CURVED_UP_TO / (first * legRadiusMm)), Math.floor(GREATEST_ARGUMENT / (first * (legRadiusMm + window.heightMm))))
  const levels = levelsOf(sources, places)
  for (let n = 1; n <= waves; n++) {
    const q = n * first
    const amplitudes = waveAmplitudes(sources, levels, q)
    const exact = cylinderWave(q, legRadiusMm, window.heightMm)
    const plane = planeWave(q, window.heightMm)
    const root = (radialMm: number) => curvatureRoot(window, radialMm)
    const curved = response(levels, amplitudes, channels, exact.at, exact.scale)
    const flat = response(levels, amplitudes, channels, (x) => scaled(plane.at(x), root(x)), plane.scale)
    addWave(fields, places, levels, { q, channels, curved, flat, amount: 2 / window.breadthMm })
  }
  addMean(fields, sources, places, levels, smoothMm)
}

/**
 * The mean over the axis does not bend with the radius (H is N·I/b at any), but the near fields carry 1/√r in their mean too:
 * half the ampere-turns per breadth times erfc(|d|/√2·s) on either side of each layer. That is taken back here.
 */
function addMean(fields: ChannelFields, sources: CurrentSources, places: readonly FieldPlace[], levels: Levels, smoothMm: number): void {
  const { window, channels } = sources
  const amplitudes = waveAmplitudes(sources, levels, 0)
  const changes = new Float64Array(amplitudes.length)
  levels.radialMm.forEach((sourceMm, source) => {
    const sourceRoot = curvatureRoot(window, sourceMm)
    for (const [imageMm] of mirrored(sourceMm, window.heightMm, NEAR_REACH * smoothMm)) {
      levels.radialMm.forEach((placeMm, place) => {
        const distanceMm = placeMm - imageMm
        if (Math.abs(distanceMm) > NEAR_REACH * smoothMm || Math.abs(distanceMm) < 1e-9) return
        const missing = ((1 - sourceRoot / curvatureRoot(window, placeMm)) * Math.sign(distanceMm) * (1 - erf(Math.abs(distanceMm) / (Math.SQRT2 * smoothMm)))) / (2 * window.breadthMm)
        for (let channel = 0; channel < channels; channel++) changes[place * channels + channel]! += missing * amplitudes[source * channels + channel]!
      })
    }
  })
  places.forEach(({ radialMm }, place) => {
    const from = levels.index.get(keyOf(radialMm))! * channels
    for (let channel = 0; channel < channels; channel++) fields.axial[place * channels + channel]! += changes[from + channel]!
  })
}

/** The plane wave with A ~ 1/√r, as the series sums it: source times, place over the root of its radius. */
const scaled = (point: RadialPoint, root: number): RadialPoint => ({ innerA: point.innerA / root, innerH: point.innerH / root, outerA: point.outerA / root, outerH: point.outerH / root, weight: root * root })

interface Levels {
  radialMm: number[]
  index: Map<number, number>
}

const keyOf = (radialMm: number) => Math.round(radialMm * 1e6)

/** Every radial place that has currents or asks for a field, from the leg outwards. */
function levelsOf({ points, sheets }: CurrentSources, places: readonly FieldPlace[]): Levels {
  const keys = new Set([points, sheets, places].flatMap((list) => list.map(({ radialMm }) => keyOf(radialMm))))
  const sorted = [...keys].sort((a, b) => a - b)
  return { radialMm: sorted.map((key) => key / 1e6), index: new Map(sorted.map((key, index) => [key, index])) }
}

/** Σ weight·cos q·y of each level and channel, `[level · channels + channel]`. */
function waveAmplitudes({ points, sheets, channels }: CurrentSources, { radialMm, index }: Levels, q: number): Float64Array {
  const sums = new Float64Array(radialMm.length * channels)
  const place = (mm: number, channel: number) => index.get(keyOf(mm))! * channels + channel
  for (const point of points) sums[place(point.radialMm, point.channel)]! += point.weight * Math.cos(q * point.axialMm)
  for (const { radialMm: mm, fromMm, toMm, weight, channel } of sheets) sums[place(mm, channel)]! += q === 0 ? weight : (weight * (Math.sin(q * toMm) - Math.sin(q * fromMm))) / (q * (toMm - fromMm))
  return sums
}

interface Response {
  potential: Float64Array
  field: Float64Array
}

/** A and axial field at every level by sums over the levels below and above; at its own level a current has the mean of both sides. */
function response({ radialMm }: Levels, amplitudes: Float64Array, channels: number, at: (radialMm: number) => RadialPoint, scale: number): Response {
  const points = radialMm.map(at)
  const potential = new Float64Array(amplitudes.length)
  const field = new Float64Array(amplitudes.length)
  for (let channel = 0; channel < channels; channel++) {
    let above = 0
    points.forEach(({ weight, outerA }, level) => (above += amplitudes[level * channels + channel]! * weight * outerA))
    let below = 0
    points.forEach((point, level) => {
      const index = level * channels + channel
      const own = amplitudes[index]! * point.weight * scale
      above -= amplitudes[index]! * point.weight * point.outerA
      potential[index] = scale * (point.outerA * below + point.innerA * above) + own * point.innerA * point.outerA
      field[index] = scale * (point.outerH * below + point.innerH * above) + (own * (point.innerA * point.outerH + point.outerA * point.innerH)) / 2
      below += amplitudes[index]! * point.weight * point.innerA
    })
  }
  return { potential, field }
}

interface WaveChange {
  q: number
  channels: number
  curved: Response
  flat: Response
  amount: number
}

function addWave(fields: ChannelFields, places: readonly FieldPlace[], { index }: Levels, { q, channels, curved, flat, amount }: WaveChange): void {
  places.forEach(({ radialMm, axialMm }, place) => {
    const from = index.get(keyOf(radialMm))! * channels
    const along = amount * Math.cos(q * axialMm)
    const across = -amount * q * Math.sin(q * axialMm)
    for (let channel = 0; channel < channels; channel++) {
      fields.axial[place * channels + channel]! += along * (curved.field[from + channel]! - flat.field[from + channel]!)
      fields.radial[place * channels + channel]! += across * (curved.potential[from + channel]! - flat.potential[from + channel]!)
    }
  })
}
