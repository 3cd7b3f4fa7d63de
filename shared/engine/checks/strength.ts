import { isInsulatedWire, windingsAt } from '../evaluate/insulation-paths'
import { isOnMains } from '../evaluate/mains'
import type { TestRow } from '../specification'
import { boundaries, protective } from './boundary-input'
import type { Judged } from './boundary-input'
import { atLeast, atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const rows = ({ document }: CheckInput, characteristic: TestRow['characteristic']) =>
  document.specification.tests.map((row, index) => ({ row, index })).filter(({ row }) => row.characteristic === characteristic)

const isToCore = ({ boundary }: Judged) => boundary.between.some(({ kind }) => kind === 'core')

/** Stripped ends and the place where such wire crosses bare leads under tension are seen on the part only. */
const strippedEnds = ({ document }: CheckInput): Outcome[] =>
  document.specification.windings.flatMap((winding, index) => (isInsulatedWire(winding) ? [notCheckable(`windings.${index}.wire`, { winding: winding.name })] : []))

/** How far a direct test voltage may lie from √2 times the alternating one. */
const DIRECT_SLACK = 0.02

/** A test in direct voltage uses the peak of the alternating one that the standard asks for. */
function directTest(input: CheckInput): Outcome[] {
  const stated = boundaries(input).flatMap(({ boundary, result, path }) => {
    if (boundary.test?.kind !== 'dc') return []
    const requiredV = result.required.testVoltageVRms.value
    const values = { boundary: boundary.name }
    return [atLeast({ value: boundary.test.voltageV, limit: requiredV === null ? null : requiredV * Math.SQRT2 * (1 - DIRECT_SLACK), unit: 'V', path: `${path}.test.voltageV`, values })]
  })
  // The row of a boundary that is tested in alternating voltage may be in direct voltage, with the same peak.
  const changed = rows(input, 'hipot').flatMap(({ row, index }) => {
    const test = input.document.specification.insulation.boundaries.find(({ id }) => id === row.boundaryId)?.test
    if (!test || test.kind === 'dc' || row.frequencyHz !== null || row.levelV === null) return []
    return [atLeast({ value: row.levelV, limit: test.routineVoltageV * Math.SQRT2 * (1 - DIRECT_SLACK), unit: 'V', path: `tests.${index}.levelV`, values: { row: row.symbol } })]
  })
  return [...stated, ...changed]
}

/** A repeated test stresses what the first one has weakened already; how the vendor repeats is read from the row's words. */
const repeatedTest = (input: CheckInput): Outcome[] =>
  rows(input, 'hipot').flatMap(({ row, index }) => {
    const boundary = input.document.specification.insulation.boundaries.find(({ id }) => id === row.boundaryId)
    return boundary && protective({ boundary }) ? [notCheckable(`tests.${index}.reaction`, { row: row.symbol })] : []
  })

/** Least test from a winding to the core, V rms. Source: common practice. */
const CORE_TEST_V = 500

const coreTests = (input: CheckInput): Outcome[] =>
  boundaries(input).filter(isToCore).map(({ boundary, result, path }) => atLeast({ value: result.provided.testVoltageVRms ?? 0, limit: CORE_TEST_V, unit: 'V', path: `${path}.test`, values: { boundary: boundary.name } }))

/** Least insulation resistance and its test voltage. Source: common practice. */
const INSULATION_OHM = 100e6
const INSULATION_TEST_V = 500

/** Between any two sides, and from a protected side to the core. */
function insulationResistance(input: CheckInput): Outcome[] {
  const tested = rows(input, 'insulation-resistance')
  return boundaries(input).flatMap((judged) => {
    const { boundary, path } = judged
    if (isToCore(judged) ? !protective(judged) : !boundary.between.every(({ kind }) => kind === 'side')) return []
    const values = { boundary: boundary.name }
    const found = tested.find(({ row }) => row.boundaryId === boundary.id)
    if (!found) return [yesNo(false, path, { ...values, missing: 'row' })]
    const at = `tests.${found.index}`
    return [
      atLeast({ value: found.row.minimum ?? 0, limit: INSULATION_OHM, unit: 'Ω', path: at, values }),
      atLeast({ value: found.row.levelV ?? 0, limit: INSULATION_TEST_V, unit: 'V', path: at, values }),
    ]
  })
}

/** Recurring peak and mean field from which discharges inside the insulation are to be thought of. */
const DISCHARGE_PEAK_V = { 'IEC 61558-1': 750 } as Readonly<Record<string, number>>
const USUAL_DISCHARGE_PEAK_V = 700
const DISCHARGE_FIELD_V_PER_MM = 1000

function partialDischarge(input: CheckInput): Outcome[] {
  const { insulation } = input.document.specification
  const fromV = DISCHARGE_PEAK_V[insulation.productStandard.value ?? ''] ?? USUAL_DISCHARGE_PEAK_V
  const stated = insulation.partialDischarge.value
  return boundaries(input).filter(protective).flatMap(({ boundary, result, path }) => {
    const peakV = result.recurringPeakV
    const values = { boundary: boundary.name }
    if (peakV === null) return [notCheckable(path, values)]
    if (peakV <= fromV) return []
    const throughMm = result.provided.distanceThroughInsulationMm
    const fieldVPerMm = throughMm !== null && throughMm > 0 ? peakV / throughMm : null
    if (fieldVPerMm !== null && fieldVPerMm <= DISCHARGE_FIELD_V_PER_MM) return []
    const complete = stated !== null && stated.required && stated.extinctionVPeak !== null && stated.limitC !== null
    return [{ ...yesNo(complete && (stated.extinctionVPeak ?? 0) >= peakV, 'insulation.partialDischarge', { ...values, ...(fieldVPerMm === null ? {} : { fieldVPerMm }) }), value: stated?.extinctionVPeak ?? null, limit: peakV, unit: 'V' }]
  })
}

/** Peak between the ends of two layers up to which enamel alone serves, V. Source: common practice, grade 1 with a derating of four to five. */
const LAYER_PEAK_V = 200

/** Between the first turn of one layer and the last of the next lies the voltage of both. */
function layerVoltage(input: CheckInput): Outcome[] {
  const { specification } = input.document
  return (input.coil?.placements ?? []).flatMap((placement) => {
    const step = specification.sequence[placement.index]
    const winding = specification.windings.find(({ id }) => id === placement.windingId)
    if (step?.kind !== 'winding' || !winding || placement.turnsPerLayer.length < 2 || step.interlayerTape !== null || isInsulatedWire(winding)) return []
    const path = `sequence.${placement.index}.interlayerTape`
    const values = { winding: winding.name }
    const peaks = input.evaluation.corners.flatMap(({ windings }) => windings.filter(({ windingId }) => windingId === winding.id).map((one) => Math.max(Math.abs(one.positivePeakV), Math.abs(one.negativePeakV))))
    if (peaks.length === 0 || winding.turns <= 0) return [notCheckable(path, values)]
    const counts = placement.turnsPerLayer
    const across = Math.max(...counts.slice(1).map((turns, index) => turns + counts[index]!))
    return [atMost({ value: (Math.max(...peaks) * across) / winding.turns, limit: LAYER_PEAK_V, unit: 'V', path, values })]
  })
}

/** Directly on the mains, or beyond overvoltage category II, the part bears impulses: their level is stated, and no lower than the table's. */
function impulseStated({ document }: CheckInput): Outcome[] {
  const { insulation } = document.specification
  const category = insulation.overvoltageCategory.value
  const asked = isOnMains(document) || category === 'III' || category === 'IV'
  if (!asked) return []
  const impulse = insulation.impulse.value
  return [yesNo(impulse !== null && impulse.voltageV > 0 && impulse.shots > 0, 'insulation.impulse')]
}

/** A ring core cuts enamel: between the wire and a bare core lies a coating, a box or tape that bears the test. */
function ringCore(input: CheckInput): Outcome[] {
  if (input.context.core?.shape !== 'toroid') return []
  const { specification } = input.document
  const coating = specification.core.coating.value
  const taped = specification.sequence.some((step) => step.kind === 'core-tape' && step.purpose === 'insulation' && step.layers > 0)
  const covered = (coating !== null && coating.material.trim() !== '') || taped
  const path = 'core.coating'
  return [
    yesNo(covered, path, { missing: covered ? '' : 'coating' }),
    ...boundaries(input).filter(isToCore).filter(protective).map(({ boundary, result }) =>
      atLeast({ value: coating?.withstandVRms ?? null, limit: result.required.testVoltageVRms.value, unit: 'V', path, values: { boundary: boundary.name } })),
  ]
}

/** Between windings in two sections of a former the flange is the solid insulation. */
function sectionFlange(input: CheckInput): Outcome[] {
  const { context, coil, document } = input
  if (!coil || !context.former || context.former.sections < 2) return []
  const sectionsOf = (ids: readonly string[]) => new Set(coil.placements.filter(({ windingId }) => ids.includes(windingId)).map(({ section }) => section))
  return boundaries(input).filter(protective).flatMap(({ boundary, result, path }) => {
    const [one, other] = boundary.between.map((end) => sectionsOf(windingsAt(document.specification, end).map(({ id }) => id)))
    const apart = one!.size > 0 && other!.size > 0 && [...one!].every((section) => !other!.has(section))
    if (!apart) return []
    const { value: limit, reason } = result.required.distanceThroughInsulationMm
    if (limit === null && reason === 'not-required') return []
    return [atLeast({ value: context.former!.flangeThicknessMm, limit, unit: 'mm', path: `${path}.distanceThroughInsulationMm`, values: { boundary: boundary.name } })]
  })
}

export const STRENGTH_CHECKS: Readonly<Record<string, Check>> = {
  I12: { severity: 'M', source: 'IEC 62368-1, Annex J and G.5.3', decidedBy: 'person', run: strippedEnds },
  I19: { severity: 'M', source: 'direct test voltage √2 times the alternating one: IEC 62368-1, 5.4.9', run: directTest },
  I20: { severity: 'N', source: 'repeated tests at 80 % at most: common practice', decidedBy: 'person', run: repeatedTest },
  I21: { severity: 'M', source: '500 V from winding to core: common practice', run: coreTests },
  I22: { severity: 'M', source: '100 MΩ at 500 V d.c.: common practice', run: insulationResistance },
  I23: { severity: 'M', source: 'IEC 60664-1, IEC 60270, IEC 61558-1; thresholds from memory', run: partialDischarge },
  I24: { severity: 'M', source: 'IEC 60317-0-1: breakdown of enamel, derated; common practice', run: layerVoltage },
  I25: { severity: 'M', source: 'IEC 61000-4-5, IEC 60664-1', run: impulseStated },
  I29: { severity: 'S', source: 'enamel is no insulation to the core: common practice', run: ringCore },
  I30: { severity: 'M', source: 'distance through insulation of the product standard', run: sectionFlange },
}
