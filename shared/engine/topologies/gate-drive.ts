import { requireBetween, requireNotNegative, requirePositive } from '../require'
import { differenceOfWaveforms, offsetWaveform, runningIntegral, scaleWaveform, sumWaveforms } from '../waveforms/combine'
import { maximum, mean, minimum, positiveVoltSeconds } from '../waveforms/statistics'
import { constantWaveform, createWaveform, waveformFromRamps } from '../waveforms/waveform'
import type { RampSegment, Waveform, WaveformPoint } from '../waveforms/waveform'
import type { WindingWaveforms } from './flyback'

/** A winding that charges and discharges a gate at each edge. */
export interface GateWinding {
  turns: number
  /** Charge for the gate's step of voltage. */
  gateChargeC: number
}

export interface GateDriveStageDuty {
  /**
   * `bipolar`: +V for D·T, nothing, −V for D·T, nothing, D ≤ ½.
   * `unipolar-dc-restored`: a series capacitor takes the mean, so that the winding sees V·(1 − D) and −V·D.
   */
  drive: 'bipolar' | 'unipolar-dc-restored'
  driverVoltageV: number
  frequencyHz: number
  dutyCycle: number
  primaryTurns: number
  primaryInductanceH: number
  /** Of the driver and what stands in series with the primary. */
  driverResistanceOhm: number
  /** In series with the primary; null without. */
  couplingCapacitanceF: number | null
  /** In which a gate is charged. */
  transitionS: number
  gates: readonly GateWinding[]
}

export interface GateDriveState {
  primary: WindingWaveforms
  gates: readonly WindingWaveforms[]
  magnetisingCurrentA: Waveform
  fluxWb: Waveform
  /** Volt-seconds of one pulse at the primary in steady state. */
  voltSecondsVs: number
  /** Of the first pulse, before a coupling capacitor has taken its voltage: the whole driver voltage. */
  firstPulseVs: number
  peakMagnetisingA: number
  /** Fall of the pulse by the magnetising current in the driver's resistance. */
  droop: number
  /** Peak to peak across the coupling capacitor; null without one. */
  capacitorRippleV: number | null
  /** Taken from the driver for the gates, W. */
  gatePowerW: number
}

/**
 * Steady state of a gate-drive transformer: ideal levels, magnetising current from their integral, a pulse of current that
 * falls in a straight line to zero at each edge, with the charge of the gate's step.
 *
 *     i_m: Δ = V·D·T/L (bipolar), V·D·(1 − D)·T/L (with dc restored), about zero
 *     droop = 1 − e^(−R·t/L) of a pulse that lasts t (IEC 61007)
 *     capacitor: ΔV = (Σ Q·N_s/N_p + Î_m·T/4)/C
 *
 * Source: Faraday’s law; L. Balogh, Texas Instruments SLUA618 (transformer-coupled gate drive, volt-seconds and capacitor).
 *
 * @throws RangeError on a value out of its range
 */
export function gateDriveState(duty: GateDriveStageDuty): GateDriveState {
  check(duty)
  const { frequencyHz, primaryTurns, primaryInductanceH, driverVoltageV, gates, dutyCycle } = duty
  const voltageV = waveformFromRamps(levels(duty))
  const { periodS } = voltageV
  const swing = scaleWaveform(runningIntegral(voltageV), 1 / primaryInductanceH)
  const magnetisingCurrentA = offsetWaveform(swing, -(maximum(swing) + minimum(swing)) / 2)
  const steps = stepsOf(voltageV, driverVoltageV)
  const gateWaves = gates.map(({ turns, gateChargeC }): WindingWaveforms => ({
    voltageV: scaleWaveform(voltageV, turns / primaryTurns),
    currentA: scaleWaveform(gatePulses(periodS, steps, { chargeC: gateChargeC, transitionS: duty.transitionS }), -1),
  }))
  const load = sumWaveforms([constantWaveform(periodS, 0), ...gateWaves.map(({ currentA }, index) => scaleWaveform(currentA, gates[index]!.turns / primaryTurns))])
  const peakMagnetisingA = maximum(magnetisingCurrentA)
  const chargeC = gates.reduce((sum, { turns, gateChargeC }) => sum + (gateChargeC * turns) / primaryTurns, 0)
  const capacitance = duty.couplingCapacitanceF
  return {
    primary: { currentA: differenceOfWaveforms(magnetisingCurrentA, load), voltageV },
    gates: gateWaves,
    magnetisingCurrentA,
    fluxWb: scaleWaveform(magnetisingCurrentA, primaryInductanceH / primaryTurns),
    voltSecondsVs: positiveVoltSeconds(voltageV),
    firstPulseVs: (driverVoltageV * dutyCycle) / frequencyHz,
    peakMagnetisingA,
    droop: -Math.expm1((-duty.driverResistanceOhm * dutyCycle) / (frequencyHz * primaryInductanceH)),
    capacitorRippleV: capacitance === null ? null : (chargeC + (peakMagnetisingA * periodS) / 4) / capacitance,
    gatePowerW: chargeC * driverVoltageV * frequencyHz * (duty.drive === 'bipolar' ? 2 : 1),
  }
}

function check(duty: GateDriveStageDuty): void {
  for (const name of ['driverVoltageV', 'frequencyHz', 'primaryTurns', 'primaryInductanceH', 'transitionS'] as const) requirePositive(name, duty[name])
  requireNotNegative('driverResistanceOhm', duty.driverResistanceOhm)
  if (duty.couplingCapacitanceF !== null) requirePositive('couplingCapacitanceF', duty.couplingCapacitanceF)
  duty.gates.forEach(({ turns, gateChargeC }, index) => {
    requirePositive(`gates.${index}.turns`, turns)
    requireNotNegative(`gates.${index}.gateChargeC`, gateChargeC)
  })
  if (duty.drive === 'bipolar') requireBetween('dutyCycle', duty.dutyCycle, Number.MIN_VALUE, 0.5)
  else if (!(duty.dutyCycle > 0 && duty.dutyCycle < 1)) throw new RangeError(`dutyCycle must lie between 0 and 1: ${duty.dutyCycle}`)
}

function levels({ drive, driverVoltageV: volts, dutyCycle, frequencyHz, transitionS }: GateDriveStageDuty): RampSegment[] {
  const level = (share: number, value: number): RampSegment => ({ durationS: share / frequencyHz, from: value, to: value })
  if (drive === 'unipolar-dc-restored') return [level(dutyCycle, volts * (1 - dutyCycle)), level(1 - dutyCycle, -volts * dutyCycle)]
  // A rest shorter than the edges is none.
  const restShare = (0.5 - dutyCycle) / frequencyHz < transitionS ? 0 : 0.5 - dutyCycle
  const pulseShare = 0.5 - restShare
  return [level(pulseShare, volts), level(restShare, 0), level(pulseShare, -volts), level(restShare, 0)]
}

interface Step {
  tS: number
  /** Over the driver's voltage. */
  share: number
}

/** Jumps of a waveform of levels, the one from its end to its start included. */
function stepsOf({ points }: Waveform, unitV: number): Step[] {
  const first: Step = { tS: 0, share: (points[0]![1] - points[points.length - 1]![1]) / unitV }
  const later = points.slice(1).map(([tS, value], index): Step => ({ tS, share: (value - points[index]![1]) / unitV }))
  return [first, ...later].filter(({ share }) => Math.abs(share) > 1e-12)
}

/** At each step a current that falls from 2·Q/t to zero within the transition, or by the next step where that is sooner. */
function gatePulses(periodS: number, steps: readonly Step[], { chargeC, transitionS }: { chargeC: number; transitionS: number }): Waveform {
  const points = steps.flatMap(({ tS, share }, index): WaveformPoint[] => {
    const nextS = steps[index + 1]?.tS ?? periodS
    const lastsS = Math.min(transitionS, nextS - tS)
    return [[tS, (2 * chargeC * share) / lastsS], [tS + lastsS, 0], [nextS, 0]]
  })
  const pulses = createWaveform(periodS, points.map(([tS, value], index) => [index === points.length - 1 ? periodS : tS, value] as const))
  // Charge and discharge are equal; what rounding leaves would be a direct current.
  return offsetWaveform(pulses, -mean(pulses))
}
