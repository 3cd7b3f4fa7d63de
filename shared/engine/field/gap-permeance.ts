import { MU_0_H_PER_M } from '../constants'
import { requirePositive } from '../require'
import { bandWave, bandsOf, lastWave, meanCosine, radialWave, turnRoot, windowEnergyH } from './window-energy'
import type { CurrentRectangle } from './window-energy'
import { gapMmf, requireWindow, turnLengthAtMm } from './window'
import type { FieldWindow, GapPlace, WallMmf } from './window'

export const GAP_FIELD_MODEL = 'field of the window with the gap as its magnetomotive force (Roth 1928; round legs Rabins 1956), coil as it lies'

export interface GapFieldInput {
  window: FieldWindow
  /** The winding as rectangles whose shares sum to 1. */
  rectangles: readonly CurrentRectangle[]
  /** Of the gapped centre leg; outer legs together have the same. */
  legAreaMm2: number
  position: 'centre-leg' | 'all-legs-spacer'
  grinding: GapPlace['grinding']
  joint: GapPlace['joint']
}

export interface GapPermeance {
  /** Of gap and window together per turn squared, without the core, H. */
  permeanceH: number
  /** Over that of straight lines across the gap. */
  fringingFactor: number
}

/** Waves in which coil, gap and walls feel each other; shorter ones die away between leg and coil. */
const COIL_WAVES = 48

/**
 * Permeance of an air gap with its fringing field and the coil's own field in the window, as a function of the gap's length
 * in mm: µ0·A/l_g across the gap, and the energy of the window with the gap as an even sheet of magnetomotive force on the leg.
 * What depends on the coil alone is calculated once.
 *
 * Source: as `windowEnergyH`; energy of unit magnetomotive force.
 *
 * @throws RangeError on a window or an area out of range; the returned function unless the gap is positive and shorter than the window
 */
export function gapFieldPermeance(input: GapFieldInput): (gapMm: number) => GapPermeance {
  const { window, rectangles, legAreaMm2, position, grinding, joint } = input
  requireWindow(window)
  requirePositive('legAreaMm2', legAreaMm2)
  const spacer = position === 'all-legs-spacer'
  const unit = MU_0_H_PER_M * 1e-3
  const coil = windowEnergyH({ window, groups: 1, rectangles: rectangles.map((one) => ({ ...one, group: 0 })), outerShare: spacer ? 0.5 : 0 })[0]! / unit
  const waves = coilWaves(input)
  return (gapMm) => {
    requirePositive('gapMm', gapMm)
    if (gapMm >= window.breadthMm) throw new RangeError(`gapMm must be shorter than the window of ${window.breadthMm} mm: ${gapMm}`)
    const gap = gapMmf(window, { position, lengthMm: gapMm, grinding, joint })
    const strips = gap.kind === 'walls' ? gap.strips : []
    const straight = legAreaMm2 / (gapMm * (spacer ? 2 : 1))
    const total = straight + coil + stripEnergy(window, strips, waves, shortWaves(gapMm / window.breadthMm, waves.length, joint))
    return { permeanceH: total * unit, fringingFactor: total / straight }
  }
}

/** What the coil has at both walls in one axial wave, and the walls with themselves and each other. */
interface WallWave {
  coilLeg: number
  coilOuter: number
  leg: number
  outer: number
  across: number
}

function coilWaves({ window, rectangles }: GapFieldInput): WallWave[] {
  const first = Math.PI / window.breadthMm
  const last = lastWave(window, COIL_WAVES)
  const bands = bandsOf(rectangles, first * last)
  return Array.from({ length: last }, (_, index) => {
    const q = (index + 1) * first
    const wave = radialWave(q, window)
    const [atLeg, atOuter] = [wave.at(0), wave.at(window.heightMm)]
    const leg = turnRoot(atLeg, window, 0)
    const outer = turnRoot(atOuter, window, window.heightMm)
    let coilLeg = 0
    let coilOuter = 0
    for (const band of bands) {
      const { inner, outer: outward } = bandWave(band, window, wave, q)
      const amplitude = band.parts.reduce((sum, { rectangle, share }) => sum + share * meanCosine(q, rectangle.axialFromMm, rectangle.axialToMm), 0)
      coilLeg += wave.scale * leg * atLeg.innerA * outward * amplitude
      coilOuter += wave.scale * outer * atOuter.outerA * inner * amplitude
    }
    return {
      coilLeg, coilOuter,
      leg: wave.scale * leg ** 2 * atLeg.innerA * atLeg.outerA,
      outer: wave.scale * outer ** 2 * atOuter.innerA * atOuter.outerA,
      across: wave.scale * leg * outer * atLeg.innerA * atOuter.outerA,
    }
  })
}

/** Energy of the gaps' magnetomotive force with itself and against the coil, mm; `rest` is of the waves beyond those listed. */
function stripEnergy(window: FieldWindow, strips: readonly WallMmf[], waves: readonly WallWave[], rest: number): number {
  const { breadthMm, heightMm, depth } = window
  const first = Math.PI / breadthMm
  let sum = 0
  waves.forEach((wall, index) => {
    let leg = 0
    let outer = 0
    for (const { wall: side, share, fromMm, toMm } of strips) {
      const amplitude = share * meanCosine((index + 1) * first, fromMm, toMm)
      if (side === 'leg') leg += amplitude
      else outer += amplitude
    }
    sum += leg ** 2 * wall.leg + outer ** 2 * wall.outer + 2 * leg * outer * wall.across - 2 * (leg * wall.coilLeg + outer * wall.coilOuter)
  })
  for (const { wall, share } of strips) sum += (share ** 2 * turnLengthAtMm(depth, wall === 'leg' ? 0 : heightMm) * rest) / first
  return (2 / breadthMm) * sum
}

/**
 * Σ sin²(n·x/2)/(n·x/2)²/n over the even n beyond `last`, x = π·l_g/b: the waves too short to feel the other walls or a round
 * leg's curvature, for a gap in the middle. The whole sum is (3/2 − ln 2x + x²/36 + x⁴/2700)/2. A gap beside a yoke has every n, with twice
 * the sum of the even ones.
 *
 * Source: Σ cos(n·x)/n³ by its expansion about 0; M. Abramowitz, I. Stegun, 27.8.
 */
function shortWaves(gapShare: number, last: number, joint: GapPlace['joint']): number {
  if (joint === 'end') return 2 * shortWaves(gapShare, 2 * last, 'middle')
  const x = Math.PI * gapShare
  let sum = (1.5 - Math.log(2 * x) + x ** 2 / 36 + x ** 4 / 2700) / 2
  for (let n = 2; n <= last; n += 2) sum -= Math.sin((n * x) / 2) ** 2 / (((n * x) / 2) ** 2 * n)
  return sum
}

/**
 * Gap that gives an inductance factor in series with a core, mm; null when no gap of up to `longestMm` does.
 *
 * Source: reluctances in series, 1/A_L = l_e/(µ0·µ_r·A_e) + 1/P(l_g).
 *
 * @throws RangeError unless both are positive
 */
export function gapByFieldMm(permeance: (gapMm: number) => GapPermeance, { inductanceFactorH, corePermeanceH, longestMm }: { inductanceFactorH: number; corePermeanceH: number; longestMm: number }): number | null {
  requirePositive('inductanceFactorH', inductanceFactorH)
  requirePositive('corePermeanceH', corePermeanceH)
  const wanted = 1 / inductanceFactorH - 1 / corePermeanceH
  if (!(wanted > 0)) return null
  // Both sides as logarithms are nearly straight, so the rule of false position (Illinois) takes some six steps.
  const excess = (logMm: number) => -Math.log(permeance(Math.exp(logMm)).permeanceH * wanted)
  let [low, high] = [Math.log(longestMm * 1e-4), Math.log(longestMm)]
  let [atLow, atHigh] = [excess(low), excess(high)]
  if (atLow > 0 || atHigh < 0) return null
  for (let step = 0; step < 60 && high - low > 1e-9; step++) {
    const middle = (low * atHigh - high * atLow) / (atHigh - atLow)
    const atMiddle = excess(middle)
    if (Math.abs(atMiddle) < 1e-9) return Math.exp(middle)
    if (atMiddle < 0) {
      ;[low, atLow] = [middle, atMiddle]
      atHigh /= 2
    } else {
      ;[high, atHigh] = [middle, atMiddle]
      atLow /= 2
    }
  }
  return Math.exp((low + high) / 2)
}
