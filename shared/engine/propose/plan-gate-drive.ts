import type { GateDriveDuty } from '../duties/gate-drive'
import { gateDriveState } from '../topologies/gate-drive'
import { worstDuty } from '../topologies/gate-drive-circuit'
import type { Plan, WindingNeed } from './plan'
import { greatestLoad } from './sizing'

/** Steady swing that a gate-drive transformer begins with, T peak to peak. Source: common practice. */
const STEADY_SWING_T = 0.2

/**
 * A gate-drive transformer solved for the inductance that keeps the magnetising current, L = λ/(2·Î_m); its turns follow from
 * the volt-seconds of the first pulse, U_max·D_max/f. It has no gap, so that the inductance is what turns and core give.
 *
 * Source: Faraday’s law; L. Balogh, Texas Instruments SLUA618.
 *
 * @throws RangeError when the duty cannot be solved
 */
export function planGateDrive(duty: GateDriveDuty): Plan {
  const { supply, switchingFrequencyHz: frequencyHz, outputs, magnetisingCurrentA, dutyRatio } = duty
  const dutyCycle = worstDuty(duty)
  const swingVs = (supply.maximumV * dutyCycle * (duty.drive === 'bipolar' ? 1 : 1 - dutyCycle)) / frequencyHz
  const inductanceH = swingVs / (2 * magnetisingCurrentA)
  const firstPulseVs = (supply.maximumV * dutyRatio.maximum) / frequencyHz
  const stepV = supply.nominalV
  const windings = (least: number): WindingNeed[] => {
    const primary = Math.max(1, Math.ceil(least - 1e-9))
    const turns = outputs.map(({ gateVoltageV }) => Math.max(1, Math.round((primary * gateVoltageV) / stepV)))
    const state = gateDriveState({
      drive: duty.drive, driverVoltageV: supply.maximumV, frequencyHz, dutyCycle, primaryTurns: primary, primaryInductanceH: inductanceH, driverResistanceOhm: duty.driverResistanceOhm,
      couplingCapacitanceF: duty.couplingCapacitanceF, transitionS: duty.transitionS, gates: outputs.map(({ gateChargeC }, index) => ({ turns: turns[index]!, gateChargeC })),
    })
    return [
      { id: 'w1', name: 'P', role: 'primary', side: 'primary', outputId: null, partnerId: null, turns: primary, ...greatestLoad([state.primary.currentA]), powerW: state.gatePowerW },
      ...outputs.map(({ id, side }, index): WindingNeed => ({ id: `w${index + 2}`, name: `G${index + 1}`, role: 'secondary', side, outputId: id, partnerId: null, turns: turns[index]!, ...greatestLoad([state.gates[index]!.currentA]), powerW: state.gatePowerW / outputs.length })),
    ]
  }
  return {
    frequencyHz,
    inductanceH,
    transformer: { worstVs: firstPulseVs, steadyVs: swingVs, steadySwingT: STEADY_SWING_T, gapped: false, leastInductance: true, waveform: duty.drive === 'bipolar' ? 'bipolar-pulse' : 'unipolar-pulse' },
    powerW: 0,
    onMains: false,
    worstCurrentA: (ofH) => firstPulseVs / ofH,
    windings,
    findings: [],
    reasons: [{ code: 'inductance-for-magnetising-current', path: 'electrical.inductance', values: { inductanceH, currentA: magnetisingCurrentA, voltSecondsVs: swingVs, frequencyHz } }],
  }
}
