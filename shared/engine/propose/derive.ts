import { toDigits } from '../digits'
import type { Evaluation, WindingResult } from '../evaluation'
import { proposeTests } from '../limits'
import type { DcResistanceLimit, InsulationBoundary, LeakageLimit, SaturationLimit, SpecificationDocument, TurnsRatio, Winding, WindingSpecification, WithstandTest } from '../specification'
import { isInsulatedWire, windingsAt } from '../evaluate/insulation-paths'
import { atFullLoad } from '../evaluate/corner-result'
import { topologyOf } from '../topologies'
import { isProposed, isStatable, PROPOSED, proposed, toStepUp } from './stated'

/**
 * The figures of a document that follow from an evaluation: currents, resistance, leakage, saturation, ratios, boundaries and the
 * test table. Only fields and rows whose origin is `proposed` are written; a new document is returned.
 */
export function derive(document: SpecificationDocument, evaluation: Evaluation): SpecificationDocument {
  const specification: WindingSpecification = { ...document.specification }
  specification.windings = specification.windings.map((winding, index) => derivedWinding(winding, evaluation.windings[index], specification, evaluation))
  specification.electrical = derivedElectrical(document.requirement, specification, evaluation)
  specification.core = derivedCore(specification, evaluation)
  specification.former = { ...specification.former, massG: isOpen(specification.former.massG) && isStatable(evaluation.mass.totalG) ? proposed(toDigits(evaluation.mass.totalG, 2), 'reference') : specification.former.massG }
  specification.insulation = { ...specification.insulation, boundaries: specification.insulation.boundaries.map((boundary, index) => derivedBoundary(boundary, evaluation.boundaries[index], specification)) }
  specification.windings = specification.windings.map((winding) => certified(winding, specification))
  specification.tests = proposeTests({ ...document, specification }, specification.tests)
  return { ...document, specification }
}

const isOpen = ({ value, origin }: { value: unknown; origin: Winding['origin'] }) => value === null || origin.kind === 'proposed'

/** Follows the engine unless a person replaced the proposal and gave a reason. */
const follows = ({ origin }: Winding) => origin.kind !== 'entered' || origin.reason === undefined

function derivedWinding(winding: Winding, result: WindingResult | undefined, specification: WindingSpecification, evaluation: Evaluation): Winding {
  if (!result || winding.role === 'shield' || !follows(winding)) return winding
  const fromDuty = evaluation.corners.length > 0
  return {
    ...winding,
    rmsCurrentA: fromDuty && isStatable(result.rmsA) ? toDigits(result.rmsA, 3, 'up') : winding.rmsCurrentA,
    peakCurrentA: fromDuty && isStatable(result.peakA) ? toDigits(result.peakA, 3, 'up') : winding.peakCurrentA,
    dcCurrentA: fromDuty && isStatable(result.dcA) ? toDigits(result.dcA, 3, 'up') : winding.dcCurrentA,
    dcResistance: isStatable(result.dcResistance20Ohm) ? resistanceLimit(result.dcResistance20Ohm) : winding.dcResistance,
  }
}

/** Below this a reading varies more with contact and lead length. Source: common practice, 20 mΩ. */
const SMALL_RESISTANCE_OHM = 0.02

function resistanceLimit(resistanceOhm: number): DcResistanceLimit {
  const share = resistanceOhm < SMALL_RESISTANCE_OHM ? 1.2 : 1.15
  const nominalOhm = toDigits(resistanceOhm, 3)
  return { nominalOhm, maximumOhm: toDigits(nominalOhm * share, 3, 'down'), minimumOhm: null, temperatureC: 20, fourTerminal: true }
}

// ---------------------------------------------------------------------------------------------

/** Parts whose flux follows the volt-seconds have those limited, not their inductance under bias. */
const transforms = (requirement: SpecificationDocument['requirement']): requirement is NonNullable<typeof requirement> => requirement !== null && topologyOf(requirement.duty).core !== 'stores-energy'

/** Worst volt-seconds applied over what is rated. Source: common practice, 20 %. */
const VOLT_SECOND_MARGIN = 1.2

function voltSecondProduct({ duty }: NonNullable<SpecificationDocument['requirement']>, specification: WindingSpecification, { magnetics }: Evaluation): WindingSpecification['electrical']['voltSecondProduct'] {
  const { worstCurrentA, inductanceMinimumH } = magnetics
  const primary = primaryOf(specification)
  const worstVs = worstCurrentA !== null && inductanceMinimumH !== null ? worstCurrentA * inductanceMinimumH : null
  if (!primary || !isStatable(worstVs)) return specification.electrical.voltSecondProduct
  return proposed({ windingId: primary.id, minimumVs: toDigits(VOLT_SECOND_MARGIN * worstVs, 2, 'up'), waveform: topologyOf(duty).core === 'unipolar' ? 'unipolar-pulse' : 'bipolar-pulse', temperatureC: 100 })
}

function derivedElectrical(requirement: SpecificationDocument['requirement'], specification: WindingSpecification, evaluation: Evaluation): WindingSpecification['electrical'] {
  const { electrical } = specification
  const ratios = evaluation.corners.filter(atFullLoad).map(({ dutyRatio }) => dutyRatio)
  return {
    ...electrical,
    dutyRatio: isOpen(electrical.dutyRatio) && ratios.length > 0 ? proposed({ minimum: toDigits(Math.min(...ratios), 2), maximum: toDigits(Math.max(...ratios), 2) }, 'reference') : electrical.dutyRatio,
    leakage: rowsOr(electrical.leakage, () => leakageLimits(specification, evaluation)),
    saturation: rowsOr(electrical.saturation, () => (transforms(requirement) ? [] : saturationLimits(specification, evaluation))),
    voltSecondProduct: transforms(requirement) && isOpen(electrical.voltSecondProduct) ? voltSecondProduct(requirement, specification, evaluation) : electrical.voltSecondProduct,
    turnsRatios: rowsOr(electrical.turnsRatios, () => turnsRatios(specification)),
  }
}

/** Rows that a person entered stay, and then no rows are proposed beside them. */
function rowsOr<T extends { origin: Winding['origin'] }>(rows: T[], propose: () => T[]): T[] {
  return rows.some((row) => !isProposed(row)) ? rows : propose()
}

const primaryOf = ({ windings, electrical }: WindingSpecification) => windings.find(({ id }) => id === electrical.inductance.value?.windingId) ?? windings.find(({ role }) => role === 'primary')

/** Limit over the estimate: the closed form is good for ±40 % where layers do not fill the breadth. */
const LEAKAGE_LIMIT_SHARE = 1.5

function leakageLimits(specification: WindingSpecification, { leakages }: Evaluation): LeakageLimit[] {
  const secondaries = specification.windings.filter(({ role }) => role === 'secondary').map(({ id }) => id)
  const all = leakages.find(({ shortedWindingIds }) => shortedWindingIds.length === secondaries.length && secondaries.every((id) => shortedWindingIds.includes(id)))
  if (!all || !isStatable(all.inductanceH)) return []
  return [{ id: 'k1', status: 'mandatory', origin: PROPOSED, windingId: all.windingId, shortedWindingIds: all.shortedWindingIds, maximumH: toDigits(all.inductanceH * LEAKAGE_LIMIT_SHARE, 2, 'up'), minimumH: null, frequencyHz: 100e3, levelV: 0.25, temperatureC: 25, model: 'series' }]
}

/** Share of the inductance without bias that is left at the worst current. Source: common practice, 80 to 90 %. */
const REMAINING_SHARE = 0.9

function saturationLimits(specification: WindingSpecification, evaluation: Evaluation): SaturationLimit[] {
  const primary = primaryOf(specification)
  const peakA = Math.max(0, ...evaluation.corners.flatMap(({ windings }) => windings.filter(({ windingId }) => windingId === primary?.id).map(({ peakA: value }) => value)))
  const currentA = evaluation.magnetics.worstCurrentA ?? peakA
  if (!primary || !isStatable(currentA)) return []
  const limit = (id: string, temperatureC: number): SaturationLimit => ({ id, status: 'mandatory', origin: PROPOSED, windingId: primary.id, currentA: toDigits(currentA, 3, 'up'), temperatureC, remainingShare: REMAINING_SHARE, method: 'pulse' })
  return [limit('x1', 25), limit('x2', 100)]
}

function turnsRatios(specification: WindingSpecification): TurnsRatio[] {
  const primary = primaryOf(specification)
  if (!primary) return []
  return specification.windings
    .filter(({ id, role }) => id !== primary.id && role !== 'shield')
    .map((winding, index) => ({
      id: `r${index + 1}`,
      status: 'mandatory' as const,
      origin: PROPOSED,
      numeratorWindingId: primary.id,
      denominatorWindingId: winding.id,
      // One turn changes the ratio by 1/N; the limit must see it.
      tolerance: Math.min(0.01, Math.floor((0.6 / Math.max(primary.turns, winding.turns)) * 1000) / 1000 || 0.0005),
      frequencyHz: 100e3,
      levelV: 0.25,
    }))
}

function derivedCore(specification: WindingSpecification, evaluation: Evaluation): WindingSpecification['core'] {
  const { core } = specification
  const primary = primaryOf(specification)
  const nominalH = specification.electrical.inductance.value?.nominalH
  const alH = isProposed(core.gap.alH) && primary && nominalH && isStatable(nominalH / primary.turns ** 2) ? proposed(toDigits(nominalH / primary.turns ** 2, 3)) : core.gap.alH
  const gapMm = evaluation.magnetics.gapMm
  const lengthMm = isProposed(core.gap.lengthMm) && isStatable(gapMm) ? proposed(toDigits(gapMm, 2), 'reference') : core.gap.lengthMm
  return { ...core, gap: { ...core.gap, alH, lengthMm } }
}

// ---------------------------------------------------------------------------------------------

function derivedBoundary(boundary: InsulationBoundary, result: Evaluation['boundaries'][number] | undefined, specification: WindingSpecification): InsulationBoundary {
  if (!result || !isProposed(boundary)) return boundary
  const { required } = result
  const covered = boundary.between.every((end) => end.kind === 'core' || windingsAt(specification, end).length > 0)
  return {
    ...boundary,
    workingVoltageVRms: isStatable(result.workingVoltageVRms) ? toStepUp(result.workingVoltageVRms, 1) : null,
    recurringPeakV: isStatable(result.recurringPeakV) ? toStepUp(result.recurringPeakV, 1) : null,
    frequencyHz: greatestFrequencyHz(specification),
    clearanceMm: isStatable(required.clearanceMm.value) ? toStepUp(required.clearanceMm.value, 0.1) : null,
    creepageMm: isStatable(required.creepageMm.value) ? toStepUp(required.creepageMm.value, 0.1) : null,
    distanceThroughInsulationMm: required.distanceThroughInsulationMm.value,
    insulationLayers: required.layers.value,
    test: covered && isStatable(required.testVoltageVRms.value) ? withstandTest(boundary, required.testVoltageVRms.value, specification) : boundary.test,
  }
}

/** Least voltage that finds a fault to the core of a part on the mains, V rms. Source: common practice. */
const MAINS_CORE_TEST_V = 1500

function withstandTest({ between, insulation }: InsulationBoundary, requiredV: number, { insulation: { mainsVoltageV } }: WindingSpecification): WithstandTest {
  const core = between.some(({ kind }) => kind === 'core')
  const least = mainsVoltageV.value !== null && core && insulation === 'functional' ? MAINS_CORE_TEST_V : 500
  const asked = Math.max(requiredV, least)
  const voltageV = toStepUp(asked, asked > 2000 ? 500 : 100)
  return { voltageV, kind: 'ac-rms', frequencyHz: 50, rampS: 2, dwellS: 60, tripA: voltageV > 1000 ? 5e-3 : 2e-3, routineDwellS: 2, routineVoltageV: voltageV }
}

function greatestFrequencyHz({ electrical }: WindingSpecification): number | null {
  const frequencyHz = electrical.switchingFrequencyHz.value?.maximum
  return isStatable(frequencyHz) ? frequencyHz : null
}

/** What the certificate of an insulated wire must cover, from the boundaries that rest on it. */
function certified(winding: Winding, specification: WindingSpecification): Winding {
  if (!isInsulatedWire(winding) || (winding.wire.certificate && !isProposed(winding))) return winding
  const peaks = specification.insulation.boundaries.filter(({ between, insulation }) => insulation !== 'functional' && between.some((end) => windingsAt(specification, end).some(({ id }) => id === winding.id))).map(({ recurringPeakV }) => recurringPeakV ?? 0)
  const peakV = Math.max(0, ...peaks)
  const peakVoltageV = isStatable(peakV) ? toStepUp(peakV, 50) : null
  const frequencyHz = greatestFrequencyHz(specification)
  return { ...winding, wire: { ...winding.wire, certificate: { standard: 'IEC 62368-1 Annex J', number: winding.wire.certificate?.number ?? '', peakVoltageV, maximumFrequencyHz: frequencyHz === null ? null : toStepUp(frequencyHz, 50e3) } } }
}
