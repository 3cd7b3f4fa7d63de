import type { FlybackDuty } from '#shared/engine/specification'
import { figure, type FieldSpec } from '../../field-types'
import { clampSpike, currentLimit, D, dcSupply, efficiency, frequency, newOutput, outputColumns, switchDrop, switchRating, type DutyForm, type KindChoice } from './fields'

const MODES = [{ value: 'discontinuous', label: 'discontinuous' }, { value: 'boundary', label: 'boundary' }, { value: 'continuous', label: 'continuous' }, { value: 'quasi-resonant', label: 'quasi-resonant' }]
const SHARING = [{ value: 'in-proportion-to-load', label: 'in proportion to load' }, { value: 'from-leakages', label: 'from the leakages' }]
const NEW_MODES = { discontinuous: { kind: 'discontinuous', idleShare: 0.2 }, boundary: { kind: 'boundary' }, continuous: { kind: 'continuous', rippleRatio: 0.5 }, 'quasi-resonant': { kind: 'quasi-resonant', maximumFrequencyHz: 150e3, nodeCapacitanceF: 100e-12 } } as const

/** What an output may stand on: another one of its sign and side, whose voltage is lower. */
function stacking(outputs: FlybackDuty['outputs'], output: FlybackDuty['outputs'][number], index: number): KindChoice[] {
  const below = outputs.filter(({ id, side, voltageV }) => id !== output.id && side === output.side && voltageV * output.voltageV > 0 && Math.abs(voltageV) < Math.abs(output.voltageV))
  if (below.length === 0 && !output.stackedOn) return []
  const place = `${D}.outputs.${index}.stackedOn`
  return [{
    label: `${output.name || `Output ${index + 1}`} stands on`,
    place,
    choices: [{ value: OWN_RETURN, label: 'its own return' }, ...below.flatMap(({ id, name }) => [{ value: `winding ${id}`, label: `the winding of ${name}` }, { value: `output ${id}`, label: `the output ${name}` }])],
    value: output.stackedOn ? `${output.stackedOn.at} ${output.stackedOn.outputId}` : OWN_RETURN,
    write: (kind) => {
      const [at, outputId] = kind.split(' ')
      return { [place]: kind === OWN_RETURN ? null : { at, outputId } }
    },
  }]
}

const OWN_RETURN = 'own'

function conductionFields(kind: FlybackDuty['conduction']['kind']): FieldSpec[] {
  if (kind === 'boundary') return []
  if (kind === 'quasi-resonant') {
    return [
      figure(`${D}.conduction.maximumFrequencyHz`, 'Greatest frequency of the controller', 'kHz'),
      figure(`${D}.conduction.nodeCapacitanceF`, 'Capacitance at the switched node', 'pF', { help: 'Switch and winding together; it rings with the inductance.' }),
    ]
  }
  if (kind === 'discontinuous') return [figure(`${D}.conduction.idleShare`, 'Share of the period without current', '%', { min: 0, max: 0.9 })]
  return [figure(`${D}.conduction.rippleRatio`, 'Ripple over mean on-time current', '%', { min: 0.01, max: 2 })]
}

export const FLYBACK_FORM: DutyForm<FlybackDuty> = {
  title: 'flyback',
  text: 'The program proposes ratio, inductance, core, turns, wire, sequence and tests.',
  supplies: ['dc', 'mains'],
  outputs: { columns: outputColumns, make: newOutput },
  kinds: ({ conduction, sharing, outputs }) => [
    { label: 'Conduction at minimum input, full load', place: `${D}.conduction`, choices: MODES, value: conduction.kind, write: (kind) => ({ [`${D}.conduction`]: NEW_MODES[kind as keyof typeof NEW_MODES] }) },
    { label: 'Outputs share the current', place: `${D}.sharing`, choices: SHARING, value: sharing ?? 'in-proportion-to-load', write: (kind) => ({ [`${D}.sharing`]: kind }) },
    ...outputs.flatMap((output, index) => stacking(outputs, output, index)),
  ],
  fields: ({ conduction }) => [
    frequency,
    ...conductionFields(conduction.kind),
    efficiency,
    figure(`${D}.maximumDutyRatio`, 'Largest duty ratio', '%', { min: 0.03, max: 0.97, help: 'At minimum input; gives the ratio unless the reflected voltage is stated.' }),
    figure(`${D}.reflectedVoltageV`, 'Reflected voltage', 'V', { optional: true }),
    switchDrop,
    clampSpike,
    switchRating,
    currentLimit,
  ],
  start: {
    topology: 'flyback', supply: dcSupply, outputs: [{ id: 'o1', name: 'S1', role: 'main', voltageV: 5, rectifierDropV: 0.5, fullLoadCurrentA: 1, lightLoadCurrentA: 0.1, side: 'secondary' }],
    switchingFrequencyHz: 100e3, conduction: { kind: 'continuous', rippleRatio: 0.5 }, efficiency: 0.85, maximumDutyRatio: 0.45, reflectedVoltageV: null, switchDropV: 0.2,
    currentLimit: null, clampSpikeV: null, switchRatingV: null,
  },
}
