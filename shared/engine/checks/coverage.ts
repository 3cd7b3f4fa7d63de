import type { TestRow, Winding } from '../specification'
import { atLeast, atMost, notCheckable, storesEnergy, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const rows = ({ document }: CheckInput, characteristic: TestRow['characteristic']) => document.specification.tests.filter((row) => row.characteristic === characteristic)

/** Windings that carry current: all but shields. */
const active = ({ document }: CheckInput): Winding[] => document.specification.windings.filter(({ role }) => role !== 'shield')

function requirementsTested(input: CheckInput): Outcome[] {
  const { electrical } = input.document.specification
  const asked: [boolean, TestRow['characteristic'], string][] = [
    [electrical.inductance.value !== null, 'inductance', 'electrical.inductance'],
    [electrical.leakage.length > 0, 'leakage', 'electrical.leakage'],
    [electrical.saturation.length > 0, 'inductance-at-bias', 'electrical.saturation'],
    [electrical.turnsRatios.length > 0, 'turns-ratio', 'electrical.turnsRatios'],
    [electrical.selfResonance.value !== null, 'self-resonance', 'electrical.selfResonance'],
    [electrical.interwindingCapacitance.length > 0, 'interwinding-capacitance', 'electrical.interwindingCapacitance'],
  ]
  return asked.filter(([required]) => required).map(([, characteristic, path]) => yesNo(rows(input, characteristic).length > 0, path, { characteristic }))
}

function windingsTested(input: CheckInput): Outcome[] {
  const { windings } = input.document.specification
  const resisted = new Set(rows(input, 'dc-resistance').map(({ windingId }) => windingId))
  const touched = (terminals: readonly string[], winding: Winding) => terminals.includes(winding.startTerminal) || terminals.includes(winding.finishTerminal)
  const inRatio = (winding: Winding) =>
    active(input).length < 2 || rows(input, 'turns-ratio').some((row) => row.windingId === winding.id || touched([...row.drivenTerminals, ...row.openTerminals], winding))
  const each = active(input).flatMap((winding) => {
    const path = `windings.${windings.indexOf(winding)}`
    return [yesNo(resisted.has(winding.id), path, { winding: winding.name, row: 'dc-resistance' }), yesNo(inRatio(winding), path, { winding: winding.name, row: 'turns-ratio' })]
  })
  return [...each, ...(active(input).length > 1 ? [yesNo(rows(input, 'polarity').length > 0, 'tests', { row: 'polarity' })] : [])]
}

const boundariesTested = (input: CheckInput): Outcome[] =>
  input.document.specification.insulation.boundaries.map(({ id, name }, index) => yesNo(rows(input, 'hipot').some(({ boundaryId }) => boundaryId === id), `insulation.boundaries.${index}`, { boundary: name }))

function resistanceLimits({ document, evaluation }: CheckInput): Outcome[] {
  return document.specification.windings.flatMap(({ dcResistance, name, role }, index) => {
    const path = `windings.${index}.dcResistance`
    if (role === 'shield') return []
    if (!dcResistance) return [notCheckable(path, { winding: name })]
    const at20 = evaluation.windings[index]?.dcResistance20Ohm ?? null
    const nominal = at20 === null ? null : dcResistance.temperatureC === 25 ? at20 * (1 + 0.00393 * 5) : at20
    if (nominal === null) return [notCheckable(path, { winding: name })]
    const share = dcResistance.maximumOhm / nominal
    const values = { winding: name, nominalOhm: nominal }
    // Below the nominal resistance no part can be made.
    if (share < 1) return [atLeast({ value: share, limit: 1, unit: '1', path, values, severity: 'S' })]
    return [share < 1.1 - 1e-9 ? atLeast({ value: share, limit: 1.1, unit: '1', path, values }) : atMost({ value: share, limit: 1.25, unit: '1', path, values })]
  })
}

const testTemperatures = ({ document }: CheckInput): Outcome[] =>
  document.specification.tests
    .map((row, index) => ({ row, index }))
    .filter(({ row }) => row.characteristic === 'dc-resistance' || row.characteristic === 'inductance')
    .map(({ row, index }) => yesNo(row.temperatureC !== null, `tests.${index}.temperatureC`, { row: row.symbol }))

function routineTests(input: CheckInput): Outcome[] {
  const every = (characteristic: TestRow['characteristic']) => rows(input, characteristic).some(({ extent }) => extent === 'every-part')
  const several = active(input).length > 1
  const asked: [string, boolean][] = [
    ['inductance', every('inductance')],
    ['dc-resistance', every('dc-resistance') || every('turns-ratio')],
    ...(several ? ([['polarity', every('polarity')]] as [string, boolean][]) : []),
    ['hipot', every('hipot')],
  ]
  return asked.map(([characteristic, met]) => yesNo(met, 'tests', { characteristic }))
}

const biasTested = (input: CheckInput): Outcome[] => (storesEnergy(input) ? [yesNo(rows(input, 'inductance-at-bias').length > 0, 'tests', { characteristic: 'inductance-at-bias' })] : [])

export const COVERAGE_CHECKS: Readonly<Record<string, Check>> = {
  Q01: { severity: 'S', source: 'common practice', run: requirementsTested },
  Q02: { severity: 'S', source: 'common practice', run: windingsTested },
  Q05: { severity: 'S', source: 'common practice', run: boundariesTested },
  Q11: { severity: 'M', source: 'IEC 60317-0-1 wire tolerances and winding tension: common practice', run: resistanceLimits },
  Q13: { severity: 'M', source: 'IEC 60317-0-1 refers to 20 °C', run: testTemperatures },
  Q14: { severity: 'S', source: 'routine tests of the product standards; common practice', run: routineTests },
  Q16: { severity: 'S', source: 'common practice', run: biasTested },
}
