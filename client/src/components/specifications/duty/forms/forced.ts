import type { BridgeOutput, FullBridgeDuty, HalfBridgeDuty, PushPullDuty } from '#shared/engine/duties/bridges'
import type { FilteredOutput } from '#shared/engine/duties/converter'
import type { ForwardDuty } from '#shared/engine/duties/forward'
import { choice, figure, type FieldSpec } from '../../field-types'
import { clampSpike, currentLimit, D, efficiency, frequency, newOutput, outputColumns, switchDrop, switchRating, type DutyForm, type OutputColumn } from './fields'

const filterColumns: readonly OutputColumn[] = [
  { header: 'Filter', field: figure('filterInductanceH', 'Inductance of the output filter; empty follows from the ripple', 'µH', { optional: true }), figure: true },
  { header: 'Ripple', field: figure('rippleRatio', 'Ripple of the filter over full load, at maximum input', '%', { min: 0.01, max: 2 }), figure: true },
]

export const rectifierColumn: OutputColumn = { header: 'Rectifier form', field: choice('rectifier', 'Form of the rectifier', [{ value: 'centre-tapped', label: 'centre-tapped' }, { value: 'full-wave', label: 'full-wave' }]) }

const filtered = <T extends object>(output: T) => ({ ...output, filterInductanceH: null, rippleRatio: 0.3 })
const newFiltered = (id: string, number: number): FilteredOutput => filtered(newOutput(id, number))
const newBridge = (id: string, number: number): BridgeOutput => ({ ...filtered(newOutput(id, number)), rectifier: 'centre-tapped' })

const longestPulse = (most: number, help: string): FieldSpec => figure(`${D}.maximumDutyRatio`, 'Longest conduction of one switch', '%', { min: 0.03, max: most, help })
const converterFields = (pulse: FieldSpec): FieldSpec[] => [frequency, pulse, efficiency, switchDrop, clampSpike, switchRating, currentLimit]
const HALF = 'Over the period of the flux; two sides take turns, so at most 50 %.'

const TELECOM = { kind: 'dc', minimumV: 36, nominalV: 48, maximumV: 75 } as const
const RECTIFIED = { kind: 'dc', minimumV: 340, nominalV: 390, maximumV: 410 } as const
const common = { efficiency: 0.9, switchDropV: 0.2, currentLimit: null, clampSpikeV: null, switchRatingV: null } as const

export const FORWARD_FORM: DutyForm<ForwardDuty> = {
  title: 'forward',
  text: 'One switch with reset winding, two switches, or an active clamp; an inductor in every output.',
  supplies: ['dc', 'mains'],
  outputs: { columns: [...outputColumns, ...filterColumns], make: newFiltered },
  kinds: ({ reset }) => [
    {
      label: 'Core reset by', place: `${D}.reset`, value: reset,
      choices: [{ value: 'reset-winding', label: 'reset winding' }, { value: 'two-switch', label: 'two switches' }, { value: 'active-clamp', label: 'active clamp' }],
      write: (kind) => ({ [`${D}.reset`]: kind }),
    },
  ],
  fields: () => converterFields(longestPulse(0.97, 'Over the period; reset needs the rest of it.')),
  start: { topology: 'forward', supply: TELECOM, reset: 'reset-winding', outputs: [{ ...newFiltered('o1', 1), voltageV: 5, rectifierDropV: 0.5, fullLoadCurrentA: 10, lightLoadCurrentA: 1 }], switchingFrequencyHz: 200e3, maximumDutyRatio: 0.47, ...common },
}

const bridgeOutputsForm = { columns: [...outputColumns, ...filterColumns, rectifierColumn], make: newBridge }
const bridgeOutputs: BridgeOutput[] = [{ ...newBridge('o1', 1), voltageV: 12, rectifierDropV: 0.7, fullLoadCurrentA: 20, lightLoadCurrentA: 2 }]

export const HALF_BRIDGE_FORM: DutyForm<HalfBridgeDuty> = {
  title: 'half-bridge',
  text: 'Two switches and two capacitors; half the input voltage at the primary.',
  supplies: ['dc', 'mains'],
  outputs: bridgeOutputsForm,
  kinds: () => [],
  fields: () => converterFields(longestPulse(0.5, HALF)),
  start: { topology: 'half-bridge', supply: RECTIFIED, outputs: bridgeOutputs, switchingFrequencyHz: 100e3, maximumDutyRatio: 0.45, ...common, switchDropV: 1 },
}

export const FULL_BRIDGE_FORM: DutyForm<FullBridgeDuty> = {
  title: 'full-bridge',
  text: 'Four switches; the whole input voltage at the primary.',
  supplies: ['dc', 'mains'],
  outputs: bridgeOutputsForm,
  kinds: ({ control }) => [
    {
      label: 'Control', place: `${D}.control`, value: control,
      choices: [{ value: 'pulse-width', label: 'pulse width' }, { value: 'phase-shift', label: 'phase shift' }],
      write: (kind) => ({ [`${D}.control`]: kind }),
    },
  ],
  fields: () => converterFields(longestPulse(0.5, HALF)),
  start: { topology: 'full-bridge', supply: RECTIFIED, control: 'phase-shift', outputs: [{ ...bridgeOutputs[0]!, fullLoadCurrentA: 60, lightLoadCurrentA: 6 }], switchingFrequencyHz: 100e3, maximumDutyRatio: 0.45, ...common, switchDropV: 1 },
}

export const PUSH_PULL_FORM: DutyForm<PushPullDuty> = {
  title: 'push-pull',
  text: 'Two switches at the ends of a tapped primary; for low input voltages.',
  supplies: ['dc'],
  outputs: bridgeOutputsForm,
  kinds: () => [],
  fields: () => converterFields(longestPulse(0.5, HALF)),
  start: { topology: 'push-pull', supply: { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 }, outputs: [{ ...bridgeOutputs[0]!, fullLoadCurrentA: 8, lightLoadCurrentA: 1 }], switchingFrequencyHz: 100e3, maximumDutyRatio: 0.45, ...common },
}
