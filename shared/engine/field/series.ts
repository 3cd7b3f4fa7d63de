import type { FieldWindow } from './window'

/** A current along the turns at one point of the window; `weight` is its current per ampere of its channel. */
export interface CurrentPoint {
  radialMm: number
  axialMm: number
  weight: number
  channel: number
}

/** A current spread evenly over a thin sheet parallel to the axis (a foil, a wide gap). */
export interface CurrentSheet {
  radialMm: number
  fromMm: number
  toMm: number
  weight: number
  channel: number
}

export interface CurrentSources {
  window: FieldWindow
  /** Windings, and one for the gap. */
  channels: number
  points: readonly CurrentPoint[]
  sheets: readonly CurrentSheet[]
}

export interface FieldPlace {
  radialMm: number
  axialMm: number
}

/** Radial and axial field, `[place · channels + channel]`, in A/mm per ampere of each channel. */
export interface ChannelFields {
  radial: Float64Array
  axial: Float64Array
}

/** Spread of the smoothed currents against the shortest wave that the series keeps: exp(−4²/2) = 3·10⁻⁴ is left out. */
const KEPT_WAVE = 4

/**
 * The field of the smoothed currents: each spread as a Gaussian of standard deviation `smoothMm`, summed as Roth's double
 * cosine series over the window, A = Σ ε_m·ε_n/(h·b)·C_mn·cos p_m·x·cos q_n·y·e^(−K²s²/2)/K², K² = p_m² + q_n².
 *
 * The mean current of each channel is balanced by an even counter-current over the window (the term 0, 0 is left out), so
 * channels add up to a true field where their ampere-turns cancel. Sums run over layers (equal radial places) first, so
 * that the cost grows with turns × axial waves. Round legs: A varies as 1/√r beside the plane solution (leading term of
 * Rabins' cylinder functions for waves shorter than the radius), except in the mean over the axis, where the plane solution
 * is exact.
 *
 * Sources: E. Roth, Rev. Gén. Électr. 23 (1928) 773; P. Ewald, Ann. Phys. 369 (1921) 253; L. Rabins, Trans. AIEE 75 III (1956) 261.
 */
export function smoothFields(sources: CurrentSources, places: readonly FieldPlace[], smoothMm: number): ChannelFields {
  const waves = wavesOf(sources.window, smoothMm)
  const levels = sourceLevels(sources, waves)
  const amplitudes = channelAmplitudes(sources, levels, waves, smoothMm)
  return sumAtPlaces(sources, places, waves, amplitudes)
}

interface Waves {
  axial: number
  radial: number
  q: Float64Array
  p: Float64Array
}

function wavesOf({ breadthMm, heightMm }: FieldWindow, smoothMm: number): Waves {
  const greatest = KEPT_WAVE / smoothMm
  const list = (lengthMm: number) => Float64Array.from({ length: Math.floor((greatest * lengthMm) / Math.PI) + 1 }, (_, n) => (n * Math.PI) / lengthMm)
  const [q, p] = [list(breadthMm), list(heightMm)]
  return { axial: q.length, radial: p.length, q, p }
}

/** Square root of the radius where the leg is round; 1 in a plane field. */
export const curvatureRoot = ({ depth }: FieldWindow, radialMm: number): number => (depth.kind === 'round' ? Math.sqrt(depth.legRadiusMm + radialMm) : 1)

interface Level {
  radialMm: number
  /** Σ weight·cos(q_n·y) of each channel that has current here. */
  cosines: (Float64Array | null)[]
}

function sourceLevels({ window, channels, points, sheets }: CurrentSources, { axial, q }: Waves): Level[] {
  const levels = new Map<number, Level>()
  const rowOf = (radialMm: number, channel: number): Float64Array => {
    const key = Math.round(radialMm * 1e6)
    let level = levels.get(key)
    if (!level) levels.set(key, (level = { radialMm, cosines: new Array<Float64Array | null>(channels).fill(null) }))
    return (level.cosines[channel] ??= new Float64Array(axial))
  }
  for (const { radialMm, axialMm, weight, channel } of points) {
    const row = rowOf(radialMm, channel)
    const root = weight * curvatureRoot(window, radialMm)
    row[0]! += weight
    addCosines(row, root, q[1] === undefined ? 0 : q[1] * axialMm)
  }
  for (const { radialMm, fromMm, toMm, weight, channel } of sheets) {
    const row = rowOf(radialMm, channel)
    const density = (weight * curvatureRoot(window, radialMm)) / (toMm - fromMm)
    row[0]! += weight
    for (let n = 1; n < axial; n++) row[n]! += (density * (Math.sin(q[n]! * toMm) - Math.sin(q[n]! * fromMm))) / q[n]!
  }
  return [...levels.values()]
}

/** Adds weight·cos(n·angle) for n = 1, 2, … by the recurrence of Chebyshev. */
function addCosines(row: Float64Array, weight: number, angle: number): void {
  const twice = 2 * Math.cos(angle)
  let before = 1
  let now = twice / 2
  for (let n = 1; n < row.length; n++) {
    row[n]! += weight * now
    ;[before, now] = [now, twice * now - before]
  }
}

/** Amplitude of each wave of each channel, `[channel][n · radial + m]`, with the smoothing and 1/K². */
function channelAmplitudes({ window, channels }: CurrentSources, levels: readonly Level[], waves: Waves, smoothMm: number): Float64Array[] {
  const { axial, radial, q, p } = waves
  const amplitudes = Array.from({ length: channels }, () => new Float64Array(axial * radial))
  const wave = new Float64Array(radial)
  for (const { radialMm, cosines } of levels) {
    for (let m = 0; m < radial; m++) wave[m] = Math.cos(p[m]! * radialMm)
    cosines.forEach((row, channel) => {
      if (!row) return
      const sums = amplitudes[channel]!
      for (let n = 0; n < axial; n++) {
        const factor = row[n]!
        for (let m = 0; m < radial; m++) sums[n * radial + m]! += factor * wave[m]!
      }
    })
  }
  const area = window.breadthMm * window.heightMm
  for (let n = 0; n < axial; n++) {
    for (let m = 0; m < radial; m++) {
      const square = q[n]! ** 2 + p[m]! ** 2
      const factor = square === 0 ? 0 : ((n === 0 ? 1 : 2) * (m === 0 ? 1 : 2) * Math.exp((-square * smoothMm ** 2) / 2)) / (area * square)
      for (const sums of amplitudes) sums[n * radial + m]! *= factor
    }
  }
  return amplitudes
}

/** Waves of one level of places: what a place needs is then a sum over the axial waves only. */
interface PlaceLevel {
  radial: Float64Array[]
  axial: Float64Array[]
}

function placeLevel(radialMm: number, root: number, { axial, radial, q, p }: Waves, amplitudes: readonly Float64Array[]): PlaceLevel {
  const cosine = Float64Array.from(p, (wave) => Math.cos(wave * radialMm))
  const slope = Float64Array.from(p, (wave) => wave * Math.sin(wave * radialMm))
  const level: PlaceLevel = { radial: [], axial: [] }
  for (const sums of amplitudes) {
    const along = new Float64Array(axial)
    const across = new Float64Array(axial)
    for (let n = 0; n < axial; n++) {
      let a = 0
      let r = 0
      for (let m = 0, index = n * radial; m < radial; m++, index++) {
        a += sums[index]! * slope[m]!
        r += sums[index]! * cosine[m]!
      }
      along[n] = n === 0 ? a : a / root
      across[n] = n === 0 ? 0 : (-q[n]! * r) / root
    }
    level.axial.push(along)
    level.radial.push(across)
  }
  return level
}

function sumAtPlaces({ window, channels }: CurrentSources, places: readonly FieldPlace[], waves: Waves, amplitudes: readonly Float64Array[]): ChannelFields {
  const fields: ChannelFields = { radial: new Float64Array(places.length * channels), axial: new Float64Array(places.length * channels) }
  const levels = new Map<number, PlaceLevel>()
  const { axial, q } = waves
  const cosine = new Float64Array(axial)
  const sine = new Float64Array(axial)
  places.forEach(({ radialMm, axialMm }, place) => {
    const key = Math.round(radialMm * 1e6)
    let level = levels.get(key)
    if (!level) levels.set(key, (level = placeLevel(radialMm, curvatureRoot(window, radialMm), waves, amplitudes)))
    fillWaves(cosine, sine, axial > 1 ? q[1]! * axialMm : 0)
    for (let channel = 0; channel < channels; channel++) {
      const [along, across] = [level.axial[channel]!, level.radial[channel]!]
      let a = 0
      let r = 0
      for (let n = 0; n < axial; n++) {
        a += along[n]! * cosine[n]!
        r += across[n]! * sine[n]!
      }
      fields.axial[place * channels + channel] = a
      fields.radial[place * channels + channel] = r
    }
  })
  return fields
}

function fillWaves(cosine: Float64Array, sine: Float64Array, angle: number): void {
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  cosine[0] = 1
  sine[0] = 0
  for (let n = 1; n < cosine.length; n++) {
    cosine[n] = cosine[n - 1]! * c - sine[n - 1]! * s
    sine[n] = sine[n - 1]! * c + cosine[n - 1]! * s
  }
}
