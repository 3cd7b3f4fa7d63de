import type { CornerResult, CornerWinding, Evaluation, Working } from '../evaluation'
import { explain } from './context'
import type { Context } from './context'

type Input = Working['inputs'][number]
type Told = Pick<Working, 'symbol' | 'unit' | 'formula' | 'source'> & { inputs?: Input[] }

const WAVEFORM_SOURCE = 'integral over the straight pieces of the waveform, exact'

const FIGURES: Readonly<Partial<Record<keyof CornerWinding, Told>>> = {
  dcA: { symbol: 'I_dc', unit: 'A', formula: '1/T·∫i dt', source: WAVEFORM_SOURCE },
  rmsA: { symbol: 'I_rms', unit: 'A', formula: '√(1/T·∫i² dt)', source: WAVEFORM_SOURCE },
  acRmsA: { symbol: 'I_ac', unit: 'A', formula: '√(I_rms² − I_dc²)', source: WAVEFORM_SOURCE },
  peakA: { symbol: 'Î', unit: 'A', formula: 'max |i|', source: WAVEFORM_SOURCE },
  positivePeakV: { symbol: 'Û+', unit: 'V', formula: 'max u', source: WAVEFORM_SOURCE },
  negativePeakV: { symbol: 'Û−', unit: 'V', formula: 'min u', source: WAVEFORM_SOURCE },
  rmsV: { symbol: 'U_rms', unit: 'V', formula: '√(1/T·∫u² dt)', source: WAVEFORM_SOURCE },
}

/** How each figure of the corners came about. */
export function explainCorners(context: Context, corners: Evaluation['corners']): void {
  if (!context.working) return
  corners.forEach((corner, index) => {
    const tell = (field: keyof CornerResult, told: Told) => explain(context, `corners.${index}.${field}`, () => ({ inputs: [], ...told, value: corner[field] as number | null }))
    for (const [field, told] of Object.entries(circuit(context, corner))) tell(field as keyof CornerResult, told)
    corner.windings.forEach((winding, position) => {
      for (const [field, told] of Object.entries(FIGURES)) {
        explain(context, `corners.${index}.windings.${position}.${field}`, () => ({ ...told, inputs: dutyInputs(context, corner), value: winding[field as keyof CornerWinding] as number }))
      }
    })
  })
}

function dutyInputs({ requirement, specification }: Context, corner: CornerResult): Input[] {
  const duty = requirement?.duty
  return [
    { name: 'U_in', value: corner.inputV, unit: 'V', origin: 'requirement.duty.supply' },
    { name: 'mode', value: corner.mode, unit: '', origin: 'found by the circuit equations' },
    { name: 'D', value: corner.dutyRatio, unit: '', origin: 'corner' },
    { name: 'f', value: duty?.switchingFrequencyHz ?? 0, unit: 'Hz', origin: 'requirement.duty.switchingFrequencyHz' },
    { name: 'L', value: specification.electrical.inductance.value?.nominalH ?? 'from A_L', unit: 'H', origin: 'electrical.inductance' },
    { name: 'η', value: duty?.efficiency ?? 1, unit: '', origin: 'requirement.duty.efficiency' },
  ]
}

function circuit(context: Context, corner: CornerResult): Partial<Record<keyof CornerResult, Told>> {
  const duty = context.requirement?.duty
  const inputs = dutyInputs(context, corner)
  const flyback = duty?.topology === 'flyback'
  const source = flyback ? 'L. Dixon, SLUP127; Erickson and Maksimović, Fundamentals of Power Electronics, ch. 5 and 6' : 'Severns and Bloom, coupled inductors; Erickson and Maksimović, ch. 5'
  const flux: Told = { symbol: 'B', unit: 'T', formula: 'L·i/(N·A_e)', source: 'Faraday’s law', inputs: [...inputs, { name: 'A_e', value: context.core ? context.core.effectiveAreaMm2 * context.sets : 'not known', unit: 'mm²', origin: 'core' }] }
  return {
    inputV: { symbol: 'U_in', unit: 'V', formula: inputFormula(duty?.topology === 'flyback' && duty.supply.kind === 'mains', corner.name), source: 'requirement sheet; Power Integrations AN-17 for the bulk capacitor' },
    dutyRatio: { symbol: 'D', unit: '', formula: corner.mode === 'discontinuous' ? '√(2·L·P·f)/U_p' : 'U_R/(U_R + U_p)', source, inputs },
    fluxSwingT: { ...flux, symbol: 'ΔB' },
    fluxPeakT: { ...flux, symbol: 'B̂' },
    // Losses in the input power pass through the secondaries too, which is on the safe side for their wire.
    inputPowerW: { symbol: 'P_in', unit: 'W', formula: 'U_in·mean of the primary current; losses by the efficiency pass the core', source: 'energy balance; design procedures of UC3842 and AN-4137', inputs },
    ...(corner.switchPeakV === null ? {} : { switchPeakV: { symbol: 'Û_sw', unit: 'V', formula: flyback ? 'U_in + U_R + spike' : 'U_in + U_out + U_F', source: 'circuit equation', inputs } }),
  }
}

function inputFormula(mains: boolean, name: CornerResult['name']): string {
  if (!mains) return 'as stated'
  return name === 'minimum-input' || name === 'current-limit' ? '√(2·U_ac² − 2·P·t_d/C)' : '√2·U_ac'
}
