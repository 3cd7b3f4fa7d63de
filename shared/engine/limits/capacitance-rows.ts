import type { CapacitanceLimit, TestRow, Winding, WindingSpecification } from '../specification'
import { testRow } from './rows'
import { terminalsBut, terminalsOf } from './terminals'

const BRIDGE = 'Impedance bridge, 1 % or better'

const windingsOf = ({ windings }: WindingSpecification, ids: readonly string[]): Winding[] => ids.flatMap((id) => windings.find((winding) => winding.id === id) ?? [])

const tied = (text: string) => (text.trim() === '' ? '' : `; ${text.trim()}`)

/** One row for each stated limit of capacitance between windings: every winding shorted on itself, the first against the rest. */
export function interwindingRows(specification: WindingSpecification): TestRow[] {
  const limits = specification.electrical.interwindingCapacitance
  return limits.flatMap((limit, index) => interwindingRow(specification, limit, limits.length > 1 ? ` ${index + 1}` : ''))
}

function interwindingRow(specification: WindingSpecification, limit: CapacitanceLimit, suffix: string): TestRow[] {
  const [first, ...others] = windingsOf(specification, limit.windingIds)
  if (!first || others.length === 0) return []
  return [
    testRow('interwinding-capacitance', `C ${first.name}–${others.map(({ name }) => name).join(', ')}${suffix}`, 'F', {
      windingId: first.id,
      drivenTerminals: terminalsOf(first),
      shortedTerminals: [first, ...others].map(terminalsOf),
      openTerminals: terminalsBut(specification, limit.windingIds),
      method: `Each winding shorted on itself, against ${others.map(({ name }) => name).join(', ')}${tied(limit.terminalsTied)}`,
      instrumentClass: BRIDGE,
      frequencyHz: limit.frequencyHz,
      levelV: 1,
      maximum: limit.maximumF,
      extent: 'sample',
      acceptableQualityLimit: 0.65,
    }),
  ]
}

/** The row for a stated least self-resonant frequency. */
export function resonanceRows(specification: WindingSpecification): TestRow[] {
  const limit = specification.electrical.selfResonance.value
  const [winding] = limit ? windingsOf(specification, [limit.windingId]) : []
  if (!limit || !winding) return []
  return [
    testRow('self-resonance', `SRF ${winding.name}`, 'Hz', {
      windingId: winding.id,
      drivenTerminals: terminalsOf(winding),
      openTerminals: terminalsBut(specification, [winding.id]),
      method: `Frequency at which the phase of the impedance passes zero${tied(limit.terminalsTied)}`,
      instrumentClass: 'Impedance analyser',
      levelV: 0.5,
      minimum: limit.minimumHz,
      extent: 'sample',
      acceptableQualityLimit: 0.65,
    }),
  ]
}
