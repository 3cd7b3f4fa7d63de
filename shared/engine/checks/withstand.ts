import { terminalsAt } from '../limits/terminals'
import type { TestRow, WindingSpecification } from '../specification'
import { boundaries, protective } from './boundary-input'
import type { Judged } from './boundary-input'
import { atLeast, atMost, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const testVoltages = (input: CheckInput): Outcome[] =>
  boundaries(input).map(({ boundary, result, path }) =>
    atLeast({ value: result.provided.testVoltageVRms ?? 0, limit: result.required.testVoltageVRms.value, unit: 'V', path: `${path}.test`, values: { boundary: boundary.name, standard: result.required.testVoltageVRms.source } }))

/** Share of the type test's voltage that the test of every part may have. Source: IEC 62368-1, 5.4.9.2: reduced by 10 % at most. */
const routineShare = ({ document }: CheckInput) => (document.specification.insulation.productStandard.value === 'IEC 62368-1' ? 0.9 : 1)

const TYPE_DWELL_S = 60
const ROUTINE_DWELL_S = 1

/** Two groups of terminals, without a terminal in common, that hold the whole of one end each. */
function partsBothEnds(specification: WindingSpecification, { between }: Judged['boundary'], row: TestRow): boolean {
  const [one, other] = between.map((end) => terminalsAt(specification, end))
  const groups = [...row.shortedTerminals, row.drivenTerminals]
  const holds = (group: readonly string[], terminals: readonly string[]) => terminals.length > 0 && terminals.every((terminal) => group.includes(terminal))
  return groups.some((a) => holds(a, one!) && groups.some((b) => holds(b, other!) && !b.some((terminal) => a.includes(terminal))))
}

/** What a hipot row lacks for its boundary. */
function gapsOf(specification: WindingSpecification, judged: Judged, row: TestRow): string[] {
  return [
    ...(partsBothEnds(specification, judged.boundary, row) ? [] : ['terminals of both ends']),
    ...(protective(judged) && row.extent !== 'every-part' ? ['every part'] : []),
    ...(protective(judged) && row.status !== 'mandatory' ? ['mandatory'] : []),
  ]
}

/** Direct voltage counts by its equal alternating one, V rms. */
const asRmsV = (voltageV: number, direct: boolean) => (direct ? voltageV / Math.SQRT2 : voltageV)

/** The vendor tests by the row: its voltage, its groups, and that every part is tested. The best row of a boundary counts. */
function rowsOf(input: CheckInput, judged: Judged): Outcome[] {
  const { specification } = input.document
  const { boundary, result } = judged
  const requiredV = result.required.testVoltageVRms.value
  const limit = requiredV === null ? null : requiredV * routineShare(input)
  const rated = specification.tests.flatMap((row, index) => {
    if (row.characteristic !== 'hipot' || row.boundaryId !== boundary.id) return []
    const level = row.levelV === null ? null : asRmsV(row.levelV, row.frequencyHz === null)
    const gaps = gapsOf(specification, judged, row)
    const low = limit !== null && (level ?? 0) < limit * (1 - 1e-9)
    return [{ row, index, level, gaps, faults: gaps.length + Number(low) }]
  })
  const best = [...rated].sort((a, b) => a.faults - b.faults)[0]
  if (!best) return []
  const values = { boundary: boundary.name, row: best.row.symbol }
  return [
    atLeast({ value: best.level ?? 0, limit, unit: 'V', path: `tests.${best.index}.levelV`, values }),
    yesNo(best.gaps.length === 0, `tests.${best.index}`, { ...values, missing: best.gaps.join(', ') }),
  ]
}

/** What the boundary says of the test of every part, and how long both tests last. */
function statedTest(input: CheckInput, { boundary, result, path }: Judged): Outcome[] {
  const { test } = boundary
  const requiredV = result.required.testVoltageVRms.value
  if (!test) return []
  const values = { boundary: boundary.name }
  return [
    atLeast({ value: asRmsV(test.routineVoltageV, test.kind === 'dc'), limit: requiredV === null ? null : requiredV * routineShare(input), unit: 'V', path: `${path}.test.routineVoltageV`, values }),
    atLeast({ value: test.dwellS, limit: TYPE_DWELL_S, unit: 's', path: `${path}.test.dwellS`, values }),
    atLeast({ value: test.routineDwellS, limit: ROUTINE_DWELL_S, unit: 's', path: `${path}.test.routineDwellS`, values }),
  ]
}

const withstandRows = (input: CheckInput): Outcome[] => boundaries(input).flatMap((judged) => [...rowsOf(input, judged), ...statedTest(input, judged)])

/** A breakdown must trip the tester: the capacitive current of a wound part is far below this. */
const GREATEST_TRIP_A = 5e-3

/** Times the capacitive current that a good part may draw without tripping. Source: common practice, 3 to 10. */
const TRIP_FACTOR = 3

function tripCurrents(input: CheckInput): Outcome[] {
  return boundaries(input).flatMap(({ boundary, path }) => {
    const { test } = boundary
    if (!test) return []
    const at = { unit: 'A', path: `${path}.test.tripA`, values: { boundary: boundary.name } }
    const capacitanceF = input.evaluation.boundaryCapacitances.find(({ boundaryId }) => boundaryId === boundary.id)?.capacitanceF ?? null
    const drawnA = test.kind === 'dc' || capacitanceF === null ? null : 2 * Math.PI * test.frequencyHz * capacitanceF * test.voltageV
    return [atMost({ ...at, value: test.tripA, limit: GREATEST_TRIP_A }), ...(drawnA === null ? [] : [{ ...atLeast({ ...at, value: test.tripA, limit: TRIP_FACTOR * drawnA }), severity: 'N' as const }])]
  })
}

export const WITHSTAND_CHECKS: Readonly<Record<string, Check>> = {
  I16: { severity: 'S', source: 'product standard', run: testVoltages },
  I17: { severity: 'S', source: 'routine test of the product standard; IEC 62368-1, 5.4.9', run: withstandRows },
  I18: { severity: 'M', source: 'I = 2πf·C·V; common practice', run: tripCurrents },
}
