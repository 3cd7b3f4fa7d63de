import { requireBetween, requireNotNegative, requirePositive } from '../require'
import { scaleWaveform } from '../waveforms/combine'
import { waveformFromRamps } from '../waveforms/waveform'
import type { Waveform } from '../waveforms/waveform'

/** One output or auxiliary winding; a negative output has a negative voltage and a positive current. */
export interface FlybackOutput {
  turns: number
  /** Voltage at the load, negative for a negative output. Only the regulated output's value is taken; the others follow from turns. */
  voltageV: number
  /** Drop of the rectifier and the winding's resistance, ≥ 0. */
  rectifierDropV: number
  /** Mean load current, ≥ 0. */
  currentA: number
}

/**
 * How the losses enter the currents.
 *
 * - `ideal`: only the stated drops count; each secondary carries its load current exactly.
 * - `losses-transferred`: the core carries P_in = P_out/η, so secondary currents exceed the load currents by the losses.
 *   Conservative; the model of the UC3842 design procedure and of AN-4137. Where the stated drops alone
 *   lose more than the efficiency says, the drops count.
 */
export type FlybackLossModel = { kind: 'ideal' } | { kind: 'losses-transferred'; efficiency: number }

/** Secondaries share the core's ampere-turns in proportion to load: current shapes alike, each with the mean its load takes. */
export const FLYBACK_SHARING_MODEL = 'in-proportion-to-load'

export interface FlybackDuty {
  inputVoltageV: number
  /** Voltage across the closed switch and sense resistor. */
  switchDropV?: number
  frequencyHz: number
  primaryTurns: number
  /** Magnetising inductance at the primary. */
  primaryInductanceH: number
  outputs: readonly FlybackOutput[]
  /** Index of the output whose voltage is held. */
  regulatedOutput: number
  losses: FlybackLossModel
}

export type ConductionMode = 'discontinuous' | 'boundary' | 'continuous'

/**
 * Currents are positive into the dotted end, so that all windings' ampere-turns add up to the core's;
 * voltages are at the dotted end against the other end.
 */
export interface WindingWaveforms {
  currentA: Waveform
  voltageV: Waveform
}

export interface FlybackOutputState extends WindingWaveforms {
  /** Voltage at the load that the turns give, with the sign of the output. */
  loadVoltageV: number
  /** Share of the ampere-turns while the secondaries conduct, 0…1. */
  ampereTurnShare: number
  /** Reverse voltage of the rectifier without spike. */
  rectifierStressV: number
}

export interface FlybackState {
  mode: ConductionMode
  sharingModel: typeof FLYBACK_SHARING_MODEL
  /** Fraction of the period in which the switch conducts. */
  dutyCycle: number
  /** Fraction of the period in which the secondaries conduct. */
  secondaryFraction: number
  /** Output voltage with drops, seen at the primary. */
  reflectedVoltageV: number
  /** Power through the core: drops included, and the losses where the loss model says so. */
  transferredPowerW: number
  /** Primary-referred magnetising current. */
  peakCurrentA: number
  minimumCurrentA: number
  /** ΔI over twice the mean on-time current: 1 at the boundary and below it. */
  rippleRatio: number
  primary: WindingWaveforms
  outputs: FlybackOutputState[]
  magnetisingCurrentA: Waveform
  ampereTurnsA: Waveform
  /** Flux linkage of one turn, in volt-second (= weber), from the inductance: L·i/N. */
  fluxWb: Waveform
  /** Swing of the flux linkage of one turn. */
  fluxSwingWb: number
  /** Voltage across the open switch without leakage spike. */
  switchStressV: number
}

/** Relative distance from the boundary within which the mode is called boundary. */
const BOUNDARY_TOLERANCE = 1e-9

/** Mode by the ripple ratio that continuous conduction would have: below 1 continuous, above it discontinuous. */
export function conductionMode(rippleRatio: number): ConductionMode {
  if (Math.abs(rippleRatio - 1) <= BOUNDARY_TOLERANCE) return 'boundary'
  return rippleRatio < 1 ? 'continuous' : 'discontinuous'
}

/**
 * Steady state of a flyback at one corner: the mode is found, not assumed.
 *
 *     V_R = N_p·(V_o + V_F)/N_s,  D = V_R/(V_R + V_p) in continuous conduction,
 *     D = √(2·L·P·f)/V_p and D_2 = D·V_p/V_R in discontinuous conduction,
 *     I_pk − I_min = V_p·D/(L·f),  ½·L·(I_pk² − I_min²)·f = P
 *
 * V_p is the input voltage less the switch drop. No leakage, no ringing in the idle interval.
 * Source: L. Dixon, Unitrode/TI SLUP127, 5-13…5-19; R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 5 and 6.
 *
 * @throws RangeError on a value out of its range, or when no output takes current
 */
export function flybackState(duty: FlybackDuty): FlybackState {
  checkDuty(duty)
  const { frequencyHz, primaryInductanceH, primaryTurns, outputs } = duty
  const primaryVoltageV = duty.inputVoltageV - (duty.switchDropV ?? 0)
  const voltsPerTurn = flybackVoltsPerTurn(duty)
  const reflectedVoltageV = voltsPerTurn * primaryTurns
  const idealPowerW = voltsPerTurn * outputs.reduce((sum, { currentA, turns }) => sum + currentA * turns, 0)
  const transferredPowerW = powerThroughCoreW(duty, voltsPerTurn, idealPowerW)
  const timing = flybackTiming({ primaryVoltageV, reflectedVoltageV, transferredPowerW, frequencyHz, primaryInductanceH })
  const waveforms = flybackWaveforms(duty, timing, primaryVoltageV, voltsPerTurn)
  return {
    ...timing,
    ...waveforms,
    sharingModel: FLYBACK_SHARING_MODEL,
    reflectedVoltageV,
    transferredPowerW,
    fluxSwingWb: (primaryVoltageV * timing.dutyCycle) / (frequencyHz * primaryTurns),
    switchStressV: duty.inputVoltageV + reflectedVoltageV,
  }
}

function checkDuty(duty: FlybackDuty): void {
  const switchDropV = duty.switchDropV ?? 0
  requirePositive('inputVoltageV', duty.inputVoltageV)
  requireNotNegative('switchDropV', switchDropV)
  requirePositive('inputVoltageV - switchDropV', duty.inputVoltageV - switchDropV)
  requirePositive('frequencyHz', duty.frequencyHz)
  requirePositive('primaryTurns', duty.primaryTurns)
  requirePositive('primaryInductanceH', duty.primaryInductanceH)
  duty.outputs.forEach((output, index) => {
    requirePositive(`outputs.${index}.turns`, output.turns)
    requireNotNegative(`outputs.${index}.rectifierDropV`, output.rectifierDropV)
    requireNotNegative(`outputs.${index}.currentA`, output.currentA)
  })
  const regulated = duty.outputs[duty.regulatedOutput]
  if (!regulated) throw new RangeError(`regulatedOutput must be an index of outputs: ${duty.regulatedOutput}`)
  requirePositive(`|outputs.${duty.regulatedOutput}.voltageV|`, Math.abs(regulated.voltageV))
  if (!duty.outputs.some(({ currentA }) => currentA > 0)) throw new RangeError('outputs must take current: 0 A in all of them')
  if (duty.losses.kind === 'losses-transferred') requireBetween('losses.efficiency', duty.losses.efficiency, Number.MIN_VALUE, 1)
}

function flybackVoltsPerTurn({ outputs, regulatedOutput }: FlybackDuty): number {
  const { voltageV, rectifierDropV, turns } = outputs[regulatedOutput]!
  return (Math.abs(voltageV) + rectifierDropV) / turns
}

function powerThroughCoreW(duty: FlybackDuty, voltsPerTurn: number, idealPowerW: number): number {
  if (duty.losses.kind === 'ideal') return idealPowerW
  const loadPowerW = duty.outputs.reduce((sum, { currentA, turns, rectifierDropV }) => sum + currentA * (voltsPerTurn * turns - rectifierDropV), 0)
  return Math.max(idealPowerW, loadPowerW / duty.losses.efficiency)
}

interface TimingInput {
  primaryVoltageV: number
  reflectedVoltageV: number
  transferredPowerW: number
  frequencyHz: number
  primaryInductanceH: number
}

type FlybackTiming = Pick<FlybackState, 'mode' | 'dutyCycle' | 'secondaryFraction' | 'peakCurrentA' | 'minimumCurrentA' | 'rippleRatio'>

function flybackTiming(input: TimingInput): FlybackTiming {
  const { primaryVoltageV, reflectedVoltageV, transferredPowerW, frequencyHz, primaryInductanceH } = input
  const continuousDuty = reflectedVoltageV / (reflectedVoltageV + primaryVoltageV)
  const meanOnCurrentA = transferredPowerW / (primaryVoltageV * continuousDuty)
  const rippleA = (primaryVoltageV * continuousDuty) / (primaryInductanceH * frequencyHz)
  const rippleRatio = rippleA / (2 * meanOnCurrentA)
  const mode = conductionMode(rippleRatio)
  if (mode !== 'discontinuous') {
    const onBoundary = mode === 'boundary'
    return {
      mode,
      dutyCycle: continuousDuty,
      secondaryFraction: 1 - continuousDuty,
      peakCurrentA: meanOnCurrentA + rippleA / 2,
      minimumCurrentA: onBoundary ? 0 : meanOnCurrentA - rippleA / 2,
      rippleRatio: onBoundary ? 1 : rippleRatio,
    }
  }
  const peakCurrentA = Math.sqrt((2 * transferredPowerW) / (primaryInductanceH * frequencyHz))
  const dutyCycle = (primaryInductanceH * peakCurrentA * frequencyHz) / primaryVoltageV
  const secondaryFraction = (dutyCycle * primaryVoltageV) / reflectedVoltageV
  return { mode, dutyCycle, secondaryFraction, peakCurrentA, minimumCurrentA: 0, rippleRatio: 1 }
}

function flybackWaveforms(duty: FlybackDuty, timing: FlybackTiming, primaryVoltageV: number, voltsPerTurn: number) {
  const { primaryTurns, primaryInductanceH, outputs } = duty
  const { peakCurrentA: peak, minimumCurrentA: low } = timing
  const shape = threeIntervals(duty.frequencyHz, timing)
  const voltageShape = (turns: number) =>
    shape([(primaryVoltageV * turns) / primaryTurns, (primaryVoltageV * turns) / primaryTurns], [-voltsPerTurn * turns, -voltsPerTurn * turns])
  const ampereTurns = outputs.reduce((sum, { currentA, turns }) => sum + currentA * turns, 0)
  const magnetisingCurrentA = shape([low, peak], [peak, low])

  const outputState = (output: FlybackOutput): FlybackOutputState => {
    const ampereTurnShare = (output.currentA * output.turns) / ampereTurns
    const scale = (ampereTurnShare * primaryTurns) / output.turns
    const magnitudeV = voltsPerTurn * output.turns - output.rectifierDropV
    return {
      currentA: shape([0, 0], [peak * scale, low * scale]),
      voltageV: voltageShape(output.turns),
      loadVoltageV: output.voltageV < 0 ? -magnitudeV : magnitudeV,
      ampereTurnShare,
      rectifierStressV: (primaryVoltageV * output.turns) / primaryTurns + magnitudeV,
    }
  }
  return {
    primary: { currentA: shape([low, peak], [0, 0]), voltageV: voltageShape(primaryTurns) },
    outputs: outputs.map(outputState),
    magnetisingCurrentA,
    ampereTurnsA: scaleWaveform(magnetisingCurrentA, primaryTurns),
    fluxWb: scaleWaveform(magnetisingCurrentA, primaryInductanceH / primaryTurns),
  }
}

type Ends = readonly [from: number, to: number]

/** On interval, secondary interval, idle interval: equal times in every waveform of one state. */
export function threeIntervals(frequencyHz: number, { dutyCycle, secondaryFraction }: Pick<FlybackTiming, 'dutyCycle' | 'secondaryFraction'>) {
  const periodS = 1 / frequencyHz
  const idleFraction = Math.max(0, 1 - dutyCycle - secondaryFraction)
  // Rounding may leave a sliver of idle time at the boundary; it is no interval.
  const idleS = idleFraction < 1e-12 ? 0 : idleFraction * periodS
  return (on: Ends, off: Ends, idle: Ends = [0, 0]): Waveform =>
    waveformFromRamps([
      { durationS: dutyCycle * periodS, from: on[0], to: on[1] },
      { durationS: secondaryFraction * periodS, from: off[0], to: off[1] },
      { durationS: idleS, from: idle[0], to: idle[1] },
    ])
}
