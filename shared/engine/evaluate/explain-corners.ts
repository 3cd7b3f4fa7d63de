import type { CornerOutput, CornerResult, CornerWinding, Evaluation, Working } from '../evaluation'
import { dutyTraits, topologyOf } from '../topologies'
import { explain } from './context'
import type { Context } from './context'

type Input = Working['inputs'][number]
type Told = Pick<Working, 'symbol' | 'unit' | 'formula' | 'source'> & { inputs?: Input[] }

const WAVEFORM_SOURCE = 'integral over the straight pieces of the waveform, exact'

const FIGURES: Readonly<Partial<Record<keyof CornerWinding, Told>>> = {
  dcA: { symbol: 'I_dc', unit: 'A', formula: '|1/T·∫i dt|', source: WAVEFORM_SOURCE },
  rmsA: { symbol: 'I_rms', unit: 'A', formula: '√(1/T·∫i² dt)', source: WAVEFORM_SOURCE },
  acRmsA: { symbol: 'I_ac', unit: 'A', formula: '√(I_rms² − I_dc²)', source: WAVEFORM_SOURCE },
  peakA: { symbol: 'Î', unit: 'A', formula: 'max |i|', source: WAVEFORM_SOURCE },
  positivePeakV: { symbol: 'Û+', unit: 'V', formula: 'max u', source: WAVEFORM_SOURCE },
  negativePeakV: { symbol: 'Û−', unit: 'V', formula: 'min u', source: WAVEFORM_SOURCE },
  rmsV: { symbol: 'U_rms', unit: 'V', formula: '√(1/T·∫u² dt)', source: WAVEFORM_SOURCE },
}

const OUTPUT_FIGURES: Readonly<Partial<Record<keyof CornerOutput, Told>>> = {
  voltageV: { symbol: 'U_out', unit: 'V', formula: 'volts per turn and turns, less the drops', source: 'circuit equation' },
  rippleA: { symbol: 'ΔI', unit: 'A', formula: 'max i − min i behind the rectifier', source: WAVEFORM_SOURCE },
  capacitorRmsA: { symbol: 'I_C', unit: 'A', formula: '√(I_rms² − I_dc²)', source: WAVEFORM_SOURCE },
  rippleChargeC: { symbol: 'ΔQ', unit: 'C', formula: 'max ∫(i − I_dc) dt − min ∫(i − I_dc) dt', source: WAVEFORM_SOURCE },
}

/** How each figure of the corners came about. */
export function explainCorners(context: Context, corners: Evaluation['corners']): void {
  if (!context.working) return
  corners.forEach((corner, index) => {
    const tell = (field: keyof CornerResult, told: Told) => explain(context, `corners.${index}.${field}`, () => ({ inputs: [], ...told, value: corner[field] as number | null }))
    for (const [field, told] of Object.entries(circuit(context, corner))) tell(field as keyof CornerResult, told)
    corner.outputs.forEach((output, position) => {
      for (const [field, told] of Object.entries(OUTPUT_FIGURES)) explain(context, `corners.${index}.outputs.${position}.${field}`, () => ({ ...told, inputs: dutyInputs(context, corner), value: output[field as keyof CornerOutput] as number }))
    })
    corner.rectifiers.forEach(({ reversePeakV }, position) =>
      explain(context, `corners.${index}.rectifiers.${position}.reversePeakV`, () => ({ symbol: 'Û_R', value: reversePeakV, unit: 'V', formula: 'greatest reverse voltage, without spike', source: 'circuit equation', inputs: dutyInputs(context, corner) })))
    corner.figures.forEach(({ code, value, unit, formula, source }, position) =>
      explain(context, `corners.${index}.figures.${position}`, () => ({ symbol: code, value, unit, formula, source, inputs: dutyInputs(context, corner) })))
    corner.windings.forEach((winding, position) => {
      for (const [field, told] of Object.entries(FIGURES)) {
        explain(context, `corners.${index}.windings.${position}.${field}`, () => ({ ...told, inputs: dutyInputs(context, corner), value: winding[field as keyof CornerWinding] as number }))
      }
    })
  })
}

function dutyInputs({ requirement, specification }: Context, corner: CornerResult): Input[] {
  const efficiency = requirement && dutyTraits(requirement.duty).efficiency
  return [
    { name: 'U_in', value: corner.inputV, unit: 'V', origin: 'requirement.duty.supply' },
    { name: 'mode', value: corner.mode, unit: '', origin: 'found by the circuit equations' },
    { name: 'D', value: corner.dutyRatio, unit: '', origin: 'corner' },
    { name: 'f', value: corner.frequencyHz, unit: 'Hz', origin: 'requirement.duty' },
    { name: 'L', value: specification.electrical.inductance.value?.nominalH ?? 'from A_L', unit: 'H', origin: 'electrical.inductance' },
    ...(efficiency === null ? [] : [{ name: 'η', value: efficiency, unit: '', origin: 'requirement.duty.efficiency' }]),
  ]
}

function circuit(context: Context, corner: CornerResult): Partial<Record<keyof CornerResult, Told>> {
  const duty = context.requirement?.duty
  if (!duty) return {}
  const { words } = topologyOf(duty)
  const inputs = dutyInputs(context, corner)
  const { source } = words
  const flux: Told = { symbol: 'B', unit: 'T', formula: words.flux, source: 'Faraday’s law', inputs: [...inputs, { name: 'A_e', value: context.core ? context.core.effectiveAreaMm2 * context.sets : 'not known', unit: 'mm²', origin: 'core' }] }
  return {
    inputV: { symbol: 'U_in', unit: 'V', formula: inputFormula(dutyTraits(duty).supply?.kind === 'mains', corner.name), source: 'requirement sheet; Power Integrations AN-17 for the bulk capacitor' },
    dutyRatio: { symbol: 'D', unit: '', formula: words.dutyRatio(corner.mode), source, inputs },
    frequencyHz: { symbol: 'f', unit: 'Hz', formula: words.frequency ?? 'as stated', source, inputs },
    voltSecondsVs: { symbol: 'λ', unit: 'V·s', formula: 'N·ΔΦ of the primary', source: 'Faraday’s law', inputs },
    fluxSwingT: { ...flux, symbol: 'ΔB' },
    fluxPeakT: { ...flux, symbol: 'B̂' },
    // Losses in the input power pass through the secondaries too, which is on the safe side for their wire.
    inputPowerW: { symbol: 'P_in', unit: 'W', formula: 'U_in·mean of the current from the supply; losses by the efficiency included', source: `energy balance; ${source}`, inputs },
    ...(corner.switchPeakV === null ? {} : { switchPeakV: { symbol: 'Û_sw', unit: 'V', formula: words.switchPeakV, source: 'circuit equation', inputs } }),
    ...(corner.commutationS === null ? {} : { commutationS: { symbol: 't_c', unit: 's', formula: words.commutation ?? 'L_leak·ΔI/U', source: 'circuit equation of the leakage inductance', inputs } }),
  }
}

function inputFormula(mains: boolean, name: CornerResult['name']): string {
  if (!mains) return 'as stated'
  return name === 'minimum-input' || name === 'light-load-minimum-input' || name === 'current-limit' ? '√(2·U_ac² − 2·P·t_d/C)' : '√2·U_ac'
}
