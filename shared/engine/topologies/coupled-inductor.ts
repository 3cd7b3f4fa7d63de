import { requireNotNegative, requirePositive } from '../require'
import { offsetWaveform, scaleWaveform, sumWaveforms } from '../waveforms/combine'
import { mean } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { conductionMode, threeIntervals } from './flyback'
import type { ConductionMode, WindingWaveforms } from './flyback'

/** Two windings on one core; winding 2 has L_1·(N_2/N_1)² and the mutual inductance k·√(L_1·L_2). */
export interface CoupledPair {
  turns: readonly [number, number]
  /** Self inductance of winding 1. */
  inductanceH: number
  /** Coupling factor k, 0 ≤ k ≤ 1; at k = 1 both windings must see the same volts per turn. */
  coupling: number
}

/**
 * Rates of current of both windings, in A/s, from their voltages: v = L·di/dt with the inductance matrix.
 * At equal volts per turn the split is even in ampere-turns, and stays so in the limit k = 1.
 *
 * Source: R. Severns and G. Bloom, Modern DC-to-DC Switchmode Power Converter Circuits, coupled inductors; inductance matrix.
 *
 * @throws RangeError on a value out of its range, or at k = 1 with unequal volts per turn
 */
export function currentSlopesAPerS(pair: CoupledPair, voltageV: readonly [number, number]): [number, number] {
  checkPair(pair)
  const [n1, n2] = pair.turns
  const { inductanceH, coupling: k } = pair
  const n = n2 / n1
  const commonV = (voltageV[0] + voltageV[1] / n) / 2
  const differenceV = (voltageV[0] - voltageV[1] / n) / 2
  if (k === 1 && Math.abs(differenceV) > 1e-9 * Math.abs(commonV)) {
    throw new RangeError(`coupling must be below 1 where the volts per turn differ: ${voltageV[0] / n1} and ${voltageV[1] / n2} V`)
  }
  const common = commonV / (inductanceH * (1 + k))
  const difference = k === 1 ? 0 : differenceV / (inductanceH * (1 - k))
  return [common + difference, (common - difference) / n]
}

function checkPair({ turns, inductanceH, coupling }: CoupledPair): void {
  requirePositive('turns.0', turns[0])
  requirePositive('turns.1', turns[1])
  requirePositive('inductanceH', inductanceH)
  if (!(coupling >= 0 && coupling <= 1)) throw new RangeError(`coupling must lie between 0 and 1: ${coupling}`)
}

/** Both inductors of a converter with a series capacitor between input and output side (SEPIC), wound on one core. */
export interface SeriesCapacitorDuty {
  pair: CoupledPair
  inputVoltageV: number
  outputVoltageV: number
  rectifierDropV: number
  outputCurrentA: number
  frequencyHz: number
}

/** Any two-winding choke in continuous conduction whose windings see one voltage while on and another while off. */
export interface TwoWindingChokeDuty {
  pair: CoupledPair
  frequencyHz: number
  dutyCycle: number
  /** Voltages of both windings at the dotted end. */
  onVoltageV: readonly [number, number]
  offVoltageV: readonly [number, number]
  /** Direct currents into the dotted ends. */
  directCurrentA: readonly [number, number]
}

export interface CoupledInductorState {
  mode: ConductionMode
  dutyCycle: number
  /** Fraction of the period in which the rectifier conducts. */
  secondaryFraction: number
  windings: readonly [WindingWaveforms, WindingWaveforms]
  /** Sum of both windings' ampere-turns. */
  ampereTurnsA: Waveform
  /** Flux linked by one turn of each winding, own leakage included, in weber. */
  fluxWb: readonly [Waveform, Waveform]
}

/**
 * Steady state of a two-winding choke: ripple by the inductance matrix on top of the direct currents.
 *
 * Source: volt-second balance and inductance matrix.
 *
 * @throws RangeError on a value out of its range, or when a winding's volt-seconds do not balance within 10⁻⁶
 */
export function twoWindingChokeState(duty: TwoWindingChokeDuty): CoupledInductorState {
  const { frequencyHz, dutyCycle, onVoltageV, offVoltageV } = duty
  requirePositive('frequencyHz', frequencyHz)
  if (!(dutyCycle > 0 && dutyCycle < 1)) throw new RangeError(`dutyCycle must lie between 0 and 1: ${dutyCycle}`)
  for (const winding of [0, 1] as const) {
    const rest = onVoltageV[winding] * dutyCycle + offVoltageV[winding] * (1 - dutyCycle)
    if (Math.abs(rest) > 1e-6 * Math.abs(onVoltageV[winding] * dutyCycle)) {
      throw new RangeError(`onVoltageV.${winding} and offVoltageV.${winding} must balance over the period: ${rest} V remain`)
    }
  }
  return chokeState({ ...duty, mode: 'continuous', secondaryFraction: 1 - dutyCycle })
}

/**
 * Steady state of a coupled inductor whose windings both see the input voltage while the switch conducts and the output
 * voltage with its drop while the rectifier does. The mode is found, not assumed.
 *
 *     D = V'/(V_in + V') in continuous conduction, V' = V_o + V_F; I_1 = I_o·V'/V_in, I_2 = I_o;
 *     discontinuous: D = √(2·L_e·I_o·V'·f)/V_in, L_e the inductance that the sum of both currents sees
 *
 * Loss-less but for the stated drop; the series capacitor is large.
 * Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 5 (SEPIC conversion ratio).
 *
 * @throws RangeError on a value out of its range
 */
export function seriesCapacitorInductorState(duty: SeriesCapacitorDuty): CoupledInductorState {
  const { pair, inputVoltageV, outputCurrentA, frequencyHz } = duty
  requirePositive('inputVoltageV', inputVoltageV)
  requirePositive('outputVoltageV', duty.outputVoltageV)
  requireNotNegative('rectifierDropV', duty.rectifierDropV)
  requirePositive('outputCurrentA', outputCurrentA)
  requirePositive('frequencyHz', frequencyHz)
  const offV = duty.outputVoltageV + duty.rectifierDropV
  const [slope1, slope2] = currentSlopesAPerS(pair, [inputVoltageV, inputVoltageV])
  const inputCurrentA = (outputCurrentA * offV) / inputVoltageV
  const continuousDuty = offV / (inputVoltageV + offV)
  const rippleOfSumA = ((slope1 + slope2) * continuousDuty) / frequencyHz
  const rippleRatio = rippleOfSumA / (2 * (inputCurrentA + outputCurrentA))
  const continuous = conductionMode(rippleRatio) !== 'discontinuous'
  const sumInductanceH = inputVoltageV / (slope1 + slope2)
  const dutyCycle = continuous ? continuousDuty : Math.sqrt(2 * sumInductanceH * outputCurrentA * offV * frequencyHz) / inputVoltageV
  return chokeState({
    pair,
    frequencyHz,
    dutyCycle,
    secondaryFraction: continuous ? 1 - dutyCycle : (dutyCycle * inputVoltageV) / offV,
    mode: conductionMode(rippleRatio),
    onVoltageV: [inputVoltageV, inputVoltageV],
    offVoltageV: [-offV, -offV],
    directCurrentA: [inputCurrentA, outputCurrentA],
  })
}

function chokeState(duty: TwoWindingChokeDuty & { mode: ConductionMode; secondaryFraction: number }): CoupledInductorState {
  const { pair, mode, dutyCycle, secondaryFraction, onVoltageV, offVoltageV, directCurrentA } = duty
  const shape = threeIntervals(duty.frequencyHz, duty)
  const slopes = currentSlopesAPerS(pair, onVoltageV)
  const winding = (index: 0 | 1): WindingWaveforms => {
    const rippleA = (slopes[index] * dutyCycle) / duty.frequencyHz
    const ripple = shape([0, rippleA], [rippleA, 0])
    return {
      currentA: offsetWaveform(ripple, directCurrentA[index] - mean(ripple)),
      voltageV: shape([onVoltageV[index], onVoltageV[index]], [offVoltageV[index], offVoltageV[index]]),
    }
  }
  const windings = [winding(0), winding(1)] as const
  return { mode, dutyCycle, secondaryFraction, windings, ...chokeFlux(pair, windings[0].currentA, windings[1].currentA) }
}

function chokeFlux({ turns: [n1, n2], inductanceH, coupling }: CoupledPair, firstA: Waveform, secondA: Waveform) {
  const n = n2 / n1
  const own1 = scaleWaveform(firstA, inductanceH / n1)
  const own2 = scaleWaveform(secondA, (inductanceH * n) / n1)
  return {
    ampereTurnsA: sumWaveforms([scaleWaveform(firstA, n1), scaleWaveform(secondA, n2)]),
    fluxWb: [sumWaveforms([own1, scaleWaveform(own2, coupling)]), sumWaveforms([own2, scaleWaveform(own1, coupling)])] as const,
  }
}
