import { requireBetween, requireNotNegative, requirePositive } from '../require'
import { differenceOfWaveforms, offsetWaveform, scaleWaveform } from '../waveforms/combine'
import { createWaveform } from '../waveforms/waveform'
import type { Waveform, WaveformPoint } from '../waveforms/waveform'
import type { WindingWaveforms } from './flyback'

/** A current transformer that measures pulses through a rectifier into a burden and is reset between them. */
export interface PulseSenseDuty {
  primaryTurns: number
  secondaryTurns: number
  /** Seen at the secondary. */
  secondaryInductanceH: number
  burdenOhm: number
  /** Of the secondary, in series with the burden. */
  windingOhm?: number
  /** Of the rectifier in series; 0 without one. */
  rectifierDropV: number
  /** Height of the rectangular pulse in the primary. */
  primaryCurrentA: number
  dutyCycle: number
  frequencyHz: number
  /** Voltage at the secondary that the magnetising current is reset against, rectifier included. */
  resetVoltageV: number
}

export interface CurrentSenseState {
  /** Into the dotted ends, so that the ampere-turns add up to those of the core. */
  primary: WindingWaveforms
  secondary: WindingWaveforms
  /** Referred to the secondary, with the sense of the primary's current. */
  magnetisingCurrentA: Waveform
  burdenVoltageV: Waveform
  /** Flux linkage of one turn, in weber. */
  fluxWb: Waveform
  /** Volt-seconds at the secondary while the pulse is measured. */
  voltSecondsVs: number
  /** Peak magnetising current over the transformed current: the error of the reading at the end of the pulse. */
  magnetisingError: number
  /** Fall of the burden's voltage from the beginning to the end of the pulse. */
  droop: number
  /** Time that the reset takes, and the time there is; null where nothing is reset. */
  resetS: number | null
  resetAvailableS: number | null
}

/** Straight pieces that an exponential or a sine is drawn with. */
const PIECES = 8
const SINE_PIECES = 96

/**
 * Steady state of a current transformer with rectifier, burden and reset by a voltage.
 *
 *     i_m(t) = (V_F/R + I/n)·(1 − e^(−R·t/L)) during the pulse, R = burden and winding
 *     reset: t_r = L·i_m/V_r;  droop = i_m(t_on)/(I/n)
 *
 * Source: L·di/dt = V_F + R·(I/n − i_m), integrated.
 *
 * @throws RangeError on a value out of its range
 */
export function pulseSenseState(duty: PulseSenseDuty): CurrentSenseState {
  checkPulse(duty)
  const { secondaryInductanceH: L, frequencyHz, dutyCycle, rectifierDropV, burdenOhm, resetVoltageV } = duty
  const resistanceOhm = burdenOhm + (duty.windingOhm ?? 0)
  const n = duty.secondaryTurns / duty.primaryTurns
  const transformedA = duty.primaryCurrentA / n
  const onS = dutyCycle / frequencyHz
  const restS = (1 - dutyCycle) / frequencyHz
  const tauS = L / resistanceOhm
  const finalA = rectifierDropV / resistanceOhm + transformedA
  const magnetisingAt = (tS: number) => -finalA * Math.expm1(-tS / tauS)
  const peakA = magnetisingAt(onS)
  const resetS = (L * peakA) / resetVoltageV
  const doneS = Math.min(resetS, restS)
  const periodS = 1 / frequencyHz
  const pulse = Array.from({ length: PIECES + 1 }, (_, index): WaveformPoint => [(onS * index) / PIECES, magnetisingAt((onS * index) / PIECES)])
  const leftA = peakA - (resetVoltageV * doneS) / L
  const magnetisingCurrentA = closed(periodS, [...pulse, [onS + doneS, leftA], ...(doneS < restS ? [[periodS, leftA] as const] : [])])
  const burden = waveformOf(periodS, pulse.map(([tS, im]) => [tS, burdenOhm * (transformedA - im)]), onS)
  const winding = pulse.map(([tS, im]): WaveformPoint => [tS, rectifierDropV + resistanceOhm * (transformedA - im)])
  const secondaryV = closed(periodS, [...winding, [onS, -resetVoltageV], [onS + doneS, -resetVoltageV], ...(doneS < restS ? [[onS + doneS, 0] as const, [periodS, 0] as const] : [])])
  return senseState({ primaryA: rectangle(periodS, onS, duty.primaryCurrentA), magnetisingCurrentA, secondaryV, n, L, turns: duty.secondaryTurns }, {
    burdenVoltageV: burden,
    voltSecondsVs: L * peakA,
    magnetisingError: peakA / transformedA,
    droop: peakA / transformedA,
    resetS,
    resetAvailableS: restS,
  })
}

function checkPulse(duty: PulseSenseDuty): void {
  checkSense(duty)
  requirePositive('primaryCurrentA', duty.primaryCurrentA)
  requireNotNegative('rectifierDropV', duty.rectifierDropV)
  requirePositive('resetVoltageV', duty.resetVoltageV)
  if (!(duty.dutyCycle > 0 && duty.dutyCycle < 1)) throw new RangeError(`dutyCycle must lie between 0 and 1: ${duty.dutyCycle}`)
}

function checkSense(duty: Pick<PulseSenseDuty, 'primaryTurns' | 'secondaryTurns' | 'secondaryInductanceH' | 'burdenOhm' | 'windingOhm' | 'frequencyHz'>): void {
  requirePositive('primaryTurns', duty.primaryTurns)
  requirePositive('secondaryTurns', duty.secondaryTurns)
  requirePositive('secondaryInductanceH', duty.secondaryInductanceH)
  requirePositive('burdenOhm', duty.burdenOhm)
  requireNotNegative('windingOhm', duty.windingOhm ?? 0)
  requirePositive('frequencyHz', duty.frequencyHz)
}

const rectangle = (periodS: number, onS: number, value: number) =>
  createWaveform(periodS, [[0, value], [onS, value], [onS, 0], [periodS, 0]])

/** Times in order and the last one at the end of the period, whatever rounding has made of their sums. */
function closed(periodS: number, points: readonly WaveformPoint[]): Waveform {
  let reachedS = 0
  return createWaveform(periodS, points.map(([tS, value], index) => {
    reachedS = index === points.length - 1 ? periodS : Math.min(Math.max(tS, reachedS), periodS)
    return [reachedS, value] as const
  }))
}

/** Points up to a time, and zero from there on. */
const waveformOf = (periodS: number, points: readonly WaveformPoint[], endS: number): Waveform =>
  createWaveform(periodS, [...points, [endS, 0], [periodS, 0]])

interface SenseParts {
  primaryA: Waveform
  magnetisingCurrentA: Waveform
  secondaryV: Waveform
  /** Secondary over primary turns. */
  n: number
  L: number
  turns: number
}

type Reading = Omit<CurrentSenseState, 'primary' | 'secondary' | 'magnetisingCurrentA' | 'fluxWb'>

function senseState({ primaryA, magnetisingCurrentA, secondaryV, n, L, turns }: SenseParts, reading: Reading): CurrentSenseState {
  return {
    ...reading,
    primary: { currentA: primaryA, voltageV: scaleWaveform(secondaryV, 1 / n) },
    secondary: { currentA: differenceOfWaveforms(magnetisingCurrentA, scaleWaveform(primaryA, 1 / n)), voltageV: secondaryV },
    magnetisingCurrentA,
    fluxWb: scaleWaveform(magnetisingCurrentA, L / turns),
  }
}

// ---------------------------------------------------------------------------------------------

/** A current transformer whose burden is passed in both directions. */
export interface AlternatingSenseDuty {
  waveform: 'bipolar-pulse' | 'sine'
  primaryTurns: number
  secondaryTurns: number
  secondaryInductanceH: number
  burdenOhm: number
  windingOhm?: number
  /** Rectifiers in series, which conduct in turn; 0 without. */
  rectifierDropV?: number
  /** Peak of the alternating current. */
  primaryCurrentA: number
  /** Share of the period that each pulse lasts, at most ½; not used for a sine. */
  dutyCycle?: number
  frequencyHz: number
  /** Direct component in the primary, which biases the core. */
  directCurrentA?: number
}

/**
 * Steady state of a current transformer that passes both directions.
 *
 *     sine: i_m = (I/n)·R/√(R² + ω²L²), lagging the secondary current by 90°; error = 1 − ωL/√(R² + ω²L²)
 *     pulses: i_m rises as with one direction, from what the idle time has left of the half period before
 *
 * A direct component stays in the primary alone: i_m is shifted by I_dc/n.
 *
 * Source: E. Snelling, Soft Ferrites, 2nd ed., ch. 9; IEC 61007 (droop); L·di/dt.
 *
 * @throws RangeError on a value out of its range
 */
export function alternatingSenseState(duty: AlternatingSenseDuty): CurrentSenseState {
  checkSense(duty)
  requirePositive('primaryCurrentA', duty.primaryCurrentA)
  return duty.waveform === 'sine' ? sineSense(duty) : bipolarSense(duty)
}

function sineSense(duty: AlternatingSenseDuty): CurrentSenseState {
  const { secondaryInductanceH: L, frequencyHz, burdenOhm } = duty
  const n = duty.secondaryTurns / duty.primaryTurns
  const resistanceOhm = burdenOhm + (duty.windingOhm ?? 0)
  const reactanceOhm = 2 * Math.PI * frequencyHz * L
  const impedanceOhm = Math.hypot(resistanceOhm, reactanceOhm)
  const transformedA = duty.primaryCurrentA / n
  const magnetisingPeakA = (transformedA * resistanceOhm) / impedanceOhm
  const secondaryPeakA = (transformedA * reactanceOhm) / impedanceOhm
  // The primary leads: I/n·sin(ωt) = i_s + i_m with i_s leading i_m by a quarter of a period.
  const phase = Math.atan2(resistanceOhm, reactanceOhm)
  const periodS = 1 / frequencyHz
  const sine = (amplitude: number, shift: number) =>
    createWaveform(periodS, Array.from({ length: SINE_PIECES + 1 }, (_, index) => [index === SINE_PIECES ? periodS : (periodS * index) / SINE_PIECES, amplitude * Math.sin((2 * Math.PI * index) / SINE_PIECES + shift)] as const))
  const bias = (duty.directCurrentA ?? 0) / n
  const burdenA = sine(secondaryPeakA, phase)
  return senseState({
    primaryA: offsetWaveform(sine(duty.primaryCurrentA, 0), duty.directCurrentA ?? 0),
    magnetisingCurrentA: offsetWaveform(sine(magnetisingPeakA, phase - Math.PI / 2), bias),
    secondaryV: scaleWaveform(burdenA, resistanceOhm),
    n, L, turns: duty.secondaryTurns,
  }, {
    burdenVoltageV: scaleWaveform(burdenA, burdenOhm),
    voltSecondsVs: (resistanceOhm * secondaryPeakA) / (Math.PI * frequencyHz),
    magnetisingError: magnetisingPeakA / transformedA,
    droop: 1 - secondaryPeakA / transformedA,
    resetS: null,
    resetAvailableS: null,
  })
}

function bipolarSense(duty: AlternatingSenseDuty): CurrentSenseState {
  const { secondaryInductanceH: L, frequencyHz, burdenOhm } = duty
  const dutyCycle = duty.dutyCycle ?? 0.5
  requireBetween('dutyCycle', dutyCycle, Number.MIN_VALUE, 0.5)
  const dropV = duty.rectifierDropV ?? 0
  requireNotNegative('rectifierDropV', dropV)
  const n = duty.secondaryTurns / duty.primaryTurns
  const transformedA = duty.primaryCurrentA / n
  const resistanceOhm = burdenOhm + (duty.windingOhm ?? 0)
  const onS = dutyCycle / frequencyHz
  const swing = bipolarSwing({ onS, idleS: Math.max(0, 0.5 / frequencyHz - onS), tauS: L / resistanceOhm, transformedA, offsetA: dropV / resistanceOhm })
  const periodS = 1 / frequencyHz
  const both = (of: (point: SwingPoint) => number): Waveform => {
    const half = (sign: 1 | -1): WaveformPoint[] => swing.points.map((point) => [point.tS + (sign < 0 ? periodS / 2 : 0), sign * of(point)])
    return closed(periodS, [...half(1), ...half(-1)])
  }
  const bias = (duty.directCurrentA ?? 0) / n
  return senseState({
    primaryA: offsetWaveform(both(({ on }) => (on ? duty.primaryCurrentA : 0)), duty.directCurrentA ?? 0),
    magnetisingCurrentA: offsetWaveform(both(({ currentA }) => currentA), bias),
    secondaryV: both(({ on, currentA, live }) => (live ? (on ? dropV + resistanceOhm * (transformedA - currentA) : -dropV - resistanceOhm * currentA) : 0)),
    n, L, turns: duty.secondaryTurns,
  }, {
    burdenVoltageV: both(({ on, currentA }) => burdenOhm * ((on ? transformedA : 0) - currentA)),
    voltSecondsVs: L * (swing.peakA + swing.restA),
    magnetisingError: swing.peakA / transformedA,
    droop: (swing.peakA + swing.restA) / (transformedA + swing.restA),
    resetS: null,
    resetAvailableS: null,
  })
}

interface SwingPoint {
  tS: number
  /** Magnetising current in the first half period. */
  currentA: number
  on: boolean
  /** The winding has a voltage. */
  live: boolean
}

interface SwingInput {
  onS: number
  idleS: number
  tauS: number
  transformedA: number
  /** Rectifier drop over resistance. */
  offsetA: number
}

/**
 * Half a period of the magnetising current: from −rest to the peak while the pulse lasts, then back towards zero through
 * the burden, which the secondary current passes the other way.
 */
function bipolarSwing({ onS, idleS, tauS, transformedA, offsetA }: SwingInput): { peakA: number; restA: number; points: SwingPoint[] } {
  const finalA = offsetA + transformedA
  const pulseLeft = Math.exp(-onS / tauS)
  const idleLeft = Math.exp(-idleS / tauS)
  const linkedA = (-finalA * Math.expm1(-onS / tauS) - pulseLeft * offsetA * Math.expm1(-idleS / tauS)) / (1 + pulseLeft * idleLeft)
  const restA = Math.max(0, (linkedA + offsetA) * idleLeft - offsetA)
  const peakA = restA > 0 ? linkedA : -finalA * Math.expm1(-onS / tauS)
  const decayS = restA > 0 ? idleS : Math.min(idleS, offsetA > 0 ? tauS * Math.log((peakA + offsetA) / offsetA) : idleS)
  const ramp = (startS: number, durationS: number, of: (tS: number) => number, on: boolean) =>
    durationS > 0 ? Array.from({ length: PIECES + 1 }, (_, index): SwingPoint => ({ tS: startS + (durationS * index) / PIECES, currentA: of((durationS * index) / PIECES), on, live: true })) : []
  const endA = restA
  const quiet = idleS - decayS > 1e-12 * onS ? [{ tS: onS + decayS, currentA: 0, on: false, live: false }, { tS: onS + idleS, currentA: 0, on: false, live: false }] : []
  return {
    peakA,
    restA: endA,
    points: [
      ...ramp(0, onS, (tS) => finalA - (finalA + endA) * Math.exp(-tS / tauS), true),
      ...ramp(onS, decayS, (tS) => Math.max(0, (peakA + offsetA) * Math.exp(-tS / tauS) - offsetA), false),
      ...quiet,
    ],
  }
}
