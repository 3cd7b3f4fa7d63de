import { requirePositive } from '../require'
import { solveLinear } from '../solve-linear'

/** The tank of a series-resonant half bridge, seen from its middle: the source is a square wave of half the input voltage. */
export interface LlcTank {
  /** Half of the input voltage. */
  sourceV: number
  resonantInductanceH: number
  resonantCapacitanceF: number
  magnetisingInductanceH: number
}

/** Inductor current, capacitor voltage (without its direct part) and magnetising current. */
export interface LlcPoint {
  resonantA: number
  capacitorV: number
  magnetisingA: number
}

/**
 * `P` and `N`: the rectifier conducts while the dotted ends are positive, or negative, and clamps the magnetising inductance;
 * `O`: it does not conduct, and the magnetising inductance resonates with the rest.
 */
export type LlcMode = 'P' | 'O' | 'N'

export interface LlcSegment {
  mode: LlcMode
  startS: number
  durationS: number
  from: LlcPoint
}

/** A periodic steady state. Currents are those of the primary; the second half period mirrors the first. */
export interface LlcState {
  tank: LlcTank
  frequencyHz: number
  /** Output voltage with drops, at the primary. */
  outputV: number
  /** Mean of the rectified current, at the primary. */
  outputA: number
  segments: LlcSegment[]
  /** What is left of half-wave symmetry, relative to the source's own scale. */
  residual: number
}

const { sqrt, cos, sin, abs } = Math

export const seriesResonanceHz = ({ resonantInductanceH, resonantCapacitanceF }: LlcTank): number => 1 / (2 * Math.PI * sqrt(resonantInductanceH * resonantCapacitanceF))

function checkTank({ sourceV, resonantInductanceH, resonantCapacitanceF, magnetisingInductanceH }: LlcTank): void {
  requirePositive('sourceV', sourceV)
  requirePositive('resonantInductanceH', resonantInductanceH)
  requirePositive('resonantCapacitanceF', resonantCapacitanceF)
  requirePositive('magnetisingInductanceH', magnetisingInductanceH)
}

/** State after a time in one mode: sinusoids of the tank that the mode leaves. Exact. Source: series resonant circuit under a direct voltage. */
export function llcAfter(tank: LlcTank, outputV: number, { mode, from }: Pick<LlcSegment, 'mode' | 'from'>, tS: number): LlcPoint {
  const { sourceV, resonantInductanceH, resonantCapacitanceF, magnetisingInductanceH } = tank
  const clampV = mode === 'O' ? 0 : mode === 'P' ? outputV : -outputV
  const inductanceH = mode === 'O' ? resonantInductanceH + magnetisingInductanceH : resonantInductanceH
  const impedance = sqrt(inductanceH / resonantCapacitanceF)
  const angle = tS / sqrt(inductanceH * resonantCapacitanceF)
  const driveV = sourceV - clampV
  const [c, s] = [cos(angle), sin(angle)]
  const resonantA = from.resonantA * c + ((driveV - from.capacitorV) / impedance) * s
  return {
    resonantA,
    capacitorV: driveV + (from.capacitorV - driveV) * c + from.resonantA * impedance * s,
    magnetisingA: mode === 'O' ? resonantA : from.magnetisingA + (clampV * tS) / magnetisingInductanceH,
  }
}

/** Voltage that the magnetising inductance would have without rectifier. */
const openV = ({ sourceV, resonantInductanceH, magnetisingInductanceH }: LlcTank, { capacitorV }: LlcPoint): number => (magnetisingInductanceH / (resonantInductanceH + magnetisingInductanceH)) * (sourceV - capacitorV)

function openMode(tank: LlcTank, outputV: number, point: LlcPoint): LlcMode {
  const voltageV = openV(tank, point)
  return voltageV > outputV ? 'P' : voltageV < -outputV ? 'N' : 'O'
}

/** Relative size below which the rectified current counts as none. */
const NO_CURRENT = 1e-12

/** Positive while the mode lasts. */
function lasts(tank: LlcTank, outputV: number, mode: LlcMode, point: LlcPoint): number {
  if (mode === 'O') return (outputV - abs(openV(tank, point))) / tank.sourceV
  const impedance = sqrt(tank.resonantInductanceH / tank.resonantCapacitanceF)
  return ((mode === 'P' ? 1 : -1) * (point.resonantA - point.magnetisingA) * impedance) / tank.sourceV
}

/** Angle of the faster resonance between two looks at whether a mode still lasts. */
const LOOK_RAD = 0.1
const MOST_SEGMENTS = 16

interface HalfPeriod {
  segments: LlcSegment[]
  end: LlcPoint
  /** Integral of the rectified current. */
  chargeC: number
}

/** The first half period from a state, mode by mode. */
function halfPeriod(tank: LlcTank, outputV: number, start: LlcPoint, halfS: number): HalfPeriod {
  const segments: LlcSegment[] = []
  let from = start
  let tS = 0
  let chargeC = 0
  let mode: LlcMode = startMode(tank, outputV, start)
  while (tS < halfS && segments.length < MOST_SEGMENTS) {
    const leftS = halfS - tS
    const durationS = segments.length === MOST_SEGMENTS - 1 ? leftS : endOfMode(tank, outputV, { mode, from }, leftS)
    segments.push({ mode, startS: tS, durationS, from })
    const next = llcAfter(tank, outputV, { mode, from }, durationS)
    if (mode !== 'O') chargeC += (mode === 'P' ? 1 : -1) * (tank.resonantCapacitanceF * (next.capacitorV - from.capacitorV) - ((from.magnetisingA + next.magnetisingA) / 2) * durationS)
    from = next
    // A mode that lasts to the end is not followed by another one that rounding would make room for.
    tS = durationS === leftS ? halfS : tS + durationS
    if (tS < halfS) mode = mode === 'O' ? (openV(tank, from) > 0 ? 'P' : 'N') : openMode(tank, outputV, from)
  }
  return { segments, end: from, chargeC }
}

function startMode(tank: LlcTank, outputV: number, start: LlcPoint): LlcMode {
  const difference = lasts(tank, outputV, 'P', start)
  return difference > NO_CURRENT ? 'P' : difference < -NO_CURRENT ? 'N' : openMode(tank, outputV, start)
}

/** How long a mode lasts, at most `mostS`: looked for in steps, then by regula falsi. */
function endOfMode(tank: LlcTank, outputV: number, segment: Pick<LlcSegment, 'mode' | 'from'>, mostS: number): number {
  const margin = (tS: number) => lasts(tank, outputV, segment.mode, llcAfter(tank, outputV, segment, tS))
  const periodS = sqrt(tank.resonantInductanceH * tank.resonantCapacitanceF)
  const looks = Math.min(4096, Math.max(2, Math.ceil(mostS / (periodS * LOOK_RAD))))
  let [beforeS, before] = [0, Math.max(0, margin(0))]
  for (let look = 1; look <= looks; look++) {
    const tS = (mostS * look) / looks
    const now = margin(tS)
    if (now < -NO_CURRENT) return crossing(margin, [beforeS, before], [tS, now])
    ;[beforeS, before] = [tS, Math.max(0, now)]
  }
  return mostS
}

/** Root between two times of opposite sign, by the Illinois form of regula falsi. */
function crossing(margin: (tS: number) => number, [lowS, low]: [number, number], [highS, high]: [number, number]): number {
  let [a, fa, b, fb] = [lowS, low, highS, high]
  for (let round = 0; round < 60 && b !== a && abs(fb) > 1e-15; round++) {
    const c = fa === fb ? (a + b) / 2 : (a * fb - b * fa) / (fb - fa)
    const fc = margin(c)
    if (fc * fb < 0) [a, fa] = [b, fb]
    else fa /= 2
    ;[b, fb] = [c, fc]
    if (abs(b - a) <= 1e-15 * highS) break
  }
  return Math.min(Math.max(b, lowS), highS)
}

type Unknowns = readonly [resonantA: number, capacitorV: number, magnetisingA: number, outputV: number]

interface Asked {
  halfS: number
  outputA: number
  /** The half period begins without rectified current, as it does below the resonance: one unknown and one condition less. */
  tied: boolean
}

interface Shot {
  unknowns: Unknowns
  half: HalfPeriod
  /** Half-wave symmetry of current, voltage and magnetising current, and the output current, each relative to the tank's own scale. */
  residuals: readonly [number, number, number, number]
}

const scaleOf = (tank: LlcTank): Unknowns => {
  const scaleA = tank.sourceV / sqrt(tank.resonantInductanceH / tank.resonantCapacitanceF)
  return [scaleA, tank.sourceV, scaleA, tank.sourceV]
}

/** Half-wave symmetry x(T/2) = −x(0) and the asked output current. */
function shoot(tank: LlcTank, unknowns: Unknowns, { halfS, outputA }: Asked): Shot {
  const [resonantA, capacitorV, magnetisingA, outputV] = unknowns
  const half = halfPeriod(tank, outputV, { resonantA, capacitorV, magnetisingA }, halfS)
  const [scaleA] = scaleOf(tank)
  return {
    unknowns,
    half,
    residuals: [(half.end.resonantA + resonantA) / scaleA, (half.end.capacitorV + capacitorV) / tank.sourceV, (half.end.magnetisingA + magnetisingA) / scaleA, (half.chargeC / halfS - outputA) / scaleA],
  }
}

const FREE = [0, 1, 2, 3] as const
const TIED = [0, 1, 3] as const

const moved = (unknowns: Unknowns, by: readonly number[], tied: boolean): Unknowns => {
  const [resonantA, capacitorV, magnetisingA, outputV] = unknowns.map((value, index) => value + by[index]!) as unknown as Unknowns
  return [resonantA, capacitorV, tied ? resonantA : magnetisingA, outputV]
}

const size = ({ residuals }: Shot) => Math.hypot(...residuals)

/** Residual at which a steady state counts as found. */
const FOUND = 1e-11
/** Residual that is accepted where rounding lets no step lower it further. */
const ACCEPTED = 1e-9
const MOST_STEPS = 40
/** Step of the difference quotients, relative to the tank's scale. */
const PROBE = 1e-7

/** A Newton step that lowers the residual, damped as far as needed; null where none does. The probe's sign chooses the side of a kink between modes. */
function newtonStep(tank: LlcTank, shot: Shot, asked: Asked, probe: number): Shot | null {
  const places = asked.tied ? TIED : FREE
  const scales = scaleOf(tank)
  const by = (amounts: readonly number[]) => FREE.map((place) => scales[place] * (amounts[places.indexOf(place as never)] ?? 0))
  const columns = places.map((place) => {
    const probed = shoot(tank, moved(shot.unknowns, by(places.map((other) => (other === place ? probe : 0))), asked.tied), asked)
    return places.map((row) => (probed.residuals[row] - shot.residuals[row]) / probe)
  })
  const change = solveLinear(places.map((_, row) => columns.map((column) => column[row]!)), places.map((row) => shot.residuals[row]))
  if (!change) return null
  for (const share of [1, 0.5, 0.25, 0.1, 0.03, 0.01]) {
    const trial = moved(shot.unknowns, by(change.map((value) => -share * value)), asked.tied)
    if (!(trial[3] > 0)) continue
    const result = shoot(tank, trial, asked)
    if (size(result) < size(shot) * (1 - 1e-4)) return result
  }
  return null
}

/** Damped Newton on the unknowns; null where it does not settle. */
function settle(tank: LlcTank, guess: Unknowns, asked: Asked): Shot | null {
  let now = shoot(tank, moved(guess, [0, 0, 0, 0], asked.tied), asked)
  for (let step = 0; step < MOST_STEPS && size(now) >= FOUND; step++) {
    const next = newtonStep(tank, now, asked, PROBE) ?? newtonStep(tank, now, asked, -PROBE)
    if (!next) break
    now = next
  }
  return size(now) < ACCEPTED ? now : null
}

/** At the series resonance only one mode lasts: i = −Î_m·cos ωt + (π/2)·I·sin ωt. */
function atResonance(tank: LlcTank, outputA: number): Unknowns {
  const impedance = sqrt(tank.resonantInductanceH / tank.resonantCapacitanceF)
  const peakA = tank.sourceV / (4 * seriesResonanceHz(tank) * tank.magnetisingInductanceH)
  return [-peakA, (-impedance * Math.PI * outputA) / 2, -peakA, tank.sourceV]
}

/**
 * Steady state at a frequency and a load. The unknown state at the beginning of the half period and the output voltage are found by
 * shooting: half-wave symmetry, x(T/2) = −x(0), and the mean of the rectified current.
 *
 * Ideal square wave without dead time, large output capacitor, one rectifier drop inside the output voltage.
 * Source: modes P, O, N of R. Lazar and A. Martinelli, Steady-state analysis of the LLC series resonant converter, APEC 2001; shooting by Newton.
 *
 * @throws RangeError on a value out of its range, or where no steady state is found
 */
export function llcAtFrequency(tank: LlcTank, asked: { frequencyHz: number; outputA: number }, near?: LlcState): LlcState {
  checkTank(tank)
  requirePositive('frequencyHz', asked.frequencyHz)
  requirePositive('outputA', asked.outputA)
  const state = steadyState(tank, asked, near)
  if (!state) throw new RangeError(`no steady state found at frequencyHz ${asked.frequencyHz} and outputA ${asked.outputA}`)
  return state
}

const unknownsOf = ({ segments, outputV }: LlcState): Unknowns => {
  const { resonantA, capacitorV, magnetisingA } = segments[0]!.from
  return [resonantA, capacitorV, magnetisingA, outputV]
}

/** Steps of the frequency on the way from the resonance, where the first guess is exact. */
const WAY_STEP = 0.08
const BESIDE = 1.02

function steadyState(tank: LlcTank, { frequencyHz, outputA }: { frequencyHz: number; outputA: number }, near?: LlcState): LlcState | null {
  const solveAt = (atHz: number, guess: Unknowns): LlcState | null => {
    const halfS = 1 / (2 * atHz)
    const below = atHz < seriesResonanceHz(tank)
    const found = settle(tank, guess, { halfS, outputA, tied: below }) ?? settle(tank, guess, { halfS, outputA, tied: !below })
    return found && { tank, frequencyHz: atHz, outputV: found.unknowns[3], outputA, segments: found.half.segments, residual: size(found) }
  }
  const resonance = atResonance(tank, outputA)
  const direct = (near && solveAt(frequencyHz, unknownsOf(near))) ?? solveAt(frequencyHz, resonance)
  if (direct) return direct
  // At the resonance itself modes change without a slope to follow: the way begins a little beside it, on either side.
  const resonanceHz = seriesResonanceHz(tank)
  for (const besideHz of [resonanceHz * BESIDE, resonanceHz / BESIDE]) {
    const steps = Math.max(1, Math.ceil(abs(Math.log(frequencyHz / besideHz)) / WAY_STEP))
    let state = solveAt(besideHz, resonance)
    for (let step = 1; step <= steps && state; step++) state = solveAt(besideHz * (frequencyHz / besideHz) ** (step / steps), unknownsOf(state))
    if (state) return state
  }
  return null
}

/** Frequencies that are looked at, over the series resonance. */
const LOWEST = 0.1
const HIGHEST = 12

/** Relative distance from the gain asked beyond which a frequency is none. */
const MISSED = 1e-6

export type LlcAnswer = { state: 'found'; llc: LlcState } | { state: 'not-reached'; nearestGain: number }

/**
 * The frequency that gives an output voltage at a load, on the side where the gain falls with frequency (the inductive side); where
 * the peak of the gain lies below what is asked, or the gain does not fall so far, the nearest gain is told.
 *
 * Source: as `llcAtFrequency`.
 *
 * @throws RangeError on a value out of its range
 */
export function llcForOutput(tank: LlcTank, { outputV, outputA }: { outputV: number; outputA: number }): LlcAnswer {
  checkTank(tank)
  requirePositive('outputV', outputV)
  requirePositive('outputA', outputA)
  const gainOf = (state: LlcState) => state.outputV / tank.sourceV
  const needed = outputV / tank.sourceV
  const resonanceHz = seriesResonanceHz(tank)
  const first = steadyState(tank, { frequencyHz: resonanceHz, outputA })
  if (!first) return { state: 'not-reached', nearestGain: 1 }
  const factor = gainOf(first) < needed ? 0.94 : 1.08
  let [near, far] = [first, first]
  while ((gainOf(far) < needed) === (gainOf(first) < needed) && gainOf(far) !== needed) {
    const frequencyHz = far.frequencyHz * factor
    const next = frequencyHz > LOWEST * resonanceHz && frequencyHz < HIGHEST * resonanceHz ? steadyState(tank, { frequencyHz, outputA }, far) : null
    const turnedBack = next !== null && factor < 1 && gainOf(next) < gainOf(far)
    if (!next || turnedBack) return { state: 'not-reached', nearestGain: gainOf(far) }
    ;[near, far] = [far, next]
  }
  const llc = between(tank, { outputA, needed }, near, far)
  return abs(gainOf(llc) / needed - 1) < MISSED ? { state: 'found', llc } : { state: 'not-reached', nearestGain: gainOf(llc) }
}

/** Frequency between two states whose gains lie on both sides of what is needed: secant with brackets. */
function between(tank: LlcTank, { outputA, needed }: { outputA: number; needed: number }, one: LlcState, other: LlcState): LlcState {
  const excess = (state: LlcState) => state.outputV / tank.sourceV - needed
  let [a, fa, b, fb] = [one, excess(one), other, excess(other)]
  for (let round = 0; round < 60 && abs(fb) > 1e-12; round++) {
    const straightHz = (a.frequencyHz * fb - b.frequencyHz * fa) / (fb - fa)
    const frequencyHz = fb === fa || !Number.isFinite(straightHz) ? sqrt(a.frequencyHz * b.frequencyHz) : straightHz
    if (frequencyHz === b.frequencyHz) break
    const c = steadyState(tank, { frequencyHz, outputA }, b) ?? steadyState(tank, { frequencyHz: sqrt(a.frequencyHz * b.frequencyHz), outputA }, a)
    if (!c) break
    const fc = excess(c)
    if (fc * fb < 0) [a, fa] = [b, fb]
    else fa /= 2
    ;[b, fb] = [c, fc]
  }
  return b
}

/**
 * Gain by the first harmonic, M = |V_o'|/E: the approximation by which tanks are chosen; near the resonance it is exact, away from it off by several percent.
 *
 *     M = 1/√((1 + (1/m)·(1 − 1/x²))² + (Q·(x − 1/x))²),  m = L_m/L_r, x = f/f_r, Q = Z/R_ac, R_ac = (8/π²)·V_o'/I_o'
 *
 * Source: first-harmonic approximation; S. De Simone and others, Design-oriented steady-state analysis of LLC resonant converters, SPEEDAM 2006.
 *
 * @throws RangeError on a value out of its range
 */
export function firstHarmonicGain(tank: Omit<LlcTank, 'sourceV'>, { frequencyHz, loadOhm }: { frequencyHz: number; loadOhm: number }): number {
  checkTank({ ...tank, sourceV: 1 })
  requirePositive('frequencyHz', frequencyHz)
  requirePositive('loadOhm', loadOhm)
  const x = frequencyHz / seriesResonanceHz({ ...tank, sourceV: 1 })
  const quality = sqrt(tank.resonantInductanceH / tank.resonantCapacitanceF) / ((8 / Math.PI ** 2) * loadOhm)
  const ratio = tank.magnetisingInductanceH / tank.resonantInductanceH
  return 1 / Math.hypot(1 + (1 - 1 / x ** 2) / ratio, quality * (x - 1 / x))
}
