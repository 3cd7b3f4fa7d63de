import type { Answer } from '../answer'
import type { Coil } from '../build'
import type { BoundaryResult, CheckState, SourcedValue } from '../evaluation'
import { ratedImpulseV } from '../insulation/coordination'
import { boundaryRequirements } from '../insulation/product-standards'
import type { BoundaryRequirements } from '../insulation/product-standards'
import type { Citation } from '../insulation/citation'
import type { RequiredDistance } from '../insulation/distances'
import type { BoundaryEnd, InsulationBoundary, MaterialGroup, Side } from '../specification'
import { dutyTraits } from '../topologies'
import { attempt, report } from './context'
import type { Context } from './context'
import { explainBoundary } from './explain-boundaries'
import { ratedMainsV } from './mains'
import { insulationOf, windingsAt } from './insulation-paths'
import type { ProvidedInsulation } from './insulation-paths'
import { boundaryVoltage } from './working-voltage'
import type { VoltageCorners } from './working-voltage'

/** What a boundary bears, V; null where nothing tells. */
export interface Stress {
  rmsV: number | null
  peakV: number | null
}

/** Group of insulating material that creepage is asked for, and where it comes from. */
export interface CreepageGroup {
  value: MaterialGroup
  origin: string
}

/** Every boundary of the document: what stresses it, what the standard asks, what the build gives. */
export function boundaryResults(context: Context, coil: Coil | null, corners: VoltageCorners): BoundaryResult[] {
  return context.specification.insulation.boundaries.map((boundary, index) => boundaryResult(context, { boundary, index, coil, corners }))
}

function boundaryResult(context: Context, input: { boundary: InsulationBoundary; index: number; coil: Coil | null; corners: VoltageCorners }): BoundaryResult {
  const { boundary, index, coil, corners } = input
  const path = `insulation.boundaries.${index}`
  const calculated = attempt(context, path, () => boundaryVoltage(context, boundary, corners))
  // What a person states beyond the calculated stress is the harder requirement.
  const stress: Stress = { rmsV: larger(calculated?.rmsV, boundary.workingVoltageVRms), peakV: larger(calculated?.recurringPeakV, boundary.recurringPeakV) }
  if (stress.rmsV === null || stress.peakV === null) report(context, 'working-voltage-not-known', 'warning', path, { boundary: boundary.name })
  const group = creepageGroup(context)
  const needs = requirements(context, { boundary, stress, group, path })
  const provided = insulationOf({ ...context, coil }, boundary)
  const required = requiredValues(needs, boundary, stress.peakV)
  const testVoltageVRms = boundary.test ? (boundary.test.kind === 'dc' ? boundary.test.voltageV / Math.SQRT2 : boundary.test.voltageV) : null
  explainBoundary(context, { index, boundary, stress, group, needs: needs && 'reason' in needs ? null : needs, required, provided, onMains: corners.onMains })
  return {
    boundaryId: boundary.id,
    name: boundary.name,
    insulation: boundary.insulation,
    workingVoltageVRms: stress.rmsV,
    recurringPeakV: stress.peakV,
    required,
    provided: {
      clearanceMm: provided?.clearanceMm ?? null,
      creepageMm: provided?.creepageMm ?? null,
      distanceThroughInsulationMm: provided?.distanceThroughInsulationMm ?? null,
      layers: provided?.layers ?? null,
      testVoltageVRms,
      how: provided?.how ?? 'no coil layout',
      paths: provided?.paths ?? [],
    },
    state: judge(required, provided, testVoltageVRms),
  }
}

const larger = (calculated: number | null | undefined, stated: number | null): number | null => {
  const values = [calculated, stated].filter((value): value is number => value != null)
  return values.length > 0 ? Math.max(...values) : null
}

// ---------------------------------------------------------------------------------------------

/** The side that an end of a boundary belongs to; the core that of its potential. */
export const sideOf = (context: Pick<Context, 'specification'>, end: BoundaryEnd): Side => {
  if (end.kind === 'side') return end.side
  if (end.kind === 'core') return context.specification.core.potential.value?.side ?? 'floating'
  return windingsAt(context.specification, end)[0]?.side ?? 'floating'
}

/** Mains transients lie between the mains side and every other. */
export function crossesMains(context: Pick<Context, 'specification'>, { between }: InsulationBoundary): boolean {
  const [one, other] = between.map((end) => sideOf(context, end))
  return (one === 'primary') !== (other === 'primary')
}

/** The highest frequency that stresses a boundary, Hz: one stated at the boundary never lies below the switching frequency. */
export function boundaryFrequencyHz({ specification, requirement }: Pick<Context, 'specification' | 'requirement'>, { frequencyHz }: InsulationBoundary): number {
  return Math.max(frequencyHz ?? 0, specification.electrical.switchingFrequencyHz.value?.maximum ?? 0, requirement ? dutyTraits(requirement.duty).frequencyHz.maximum : 0)
}

/** Group that creepage is asked for: as stated, else that of the coil former, else the poorest of the common ones. */
function creepageGroup({ specification, former }: Pick<Context, 'specification' | 'former'>): CreepageGroup {
  const stated = specification.insulation.materialGroup.value
  if (stated !== null) return { value: stated, origin: 'insulation.materialGroup' }
  return former?.materialGroup ? { value: former.materialGroup, origin: `${former.name}: ${former.source}` } : { value: 'IIIb', origin: 'not stated: the poorest group' }
}

function requirements(context: Context, { boundary, stress: { rmsV, peakV }, group, path }: { boundary: InsulationBoundary; stress: Stress; group: CreepageGroup; path: string }): BoundaryRequirements | { reason: string } | null {
  const { insulation } = context.specification
  if (rmsV === null || peakV === null) return null
  const mainsV = ratedMainsV(context)
  const crossing = crossesMains(context, boundary)
  const impulse = mainsV !== null && crossing ? attempt(context, 'insulation.mainsVoltageV', () => ratedImpulseV({ lineToNeutralV: mainsV, overvoltageCategory: insulation.overvoltageCategory.value ?? 'II' })) : null
  // A mains voltage beyond the table has an impulse voltage that nobody here knows: no distance follows from the rest alone.
  if (impulse?.state === 'not-checkable') return { reason: impulse.reason }
  return attempt(context, path, () =>
    boundaryRequirements({
      standard: insulation.productStandard.value ?? 'IEC 60664-1',
      insulation: boundary.insulation,
      workingVoltageRmsV: rmsV,
      recurringPeakV: peakV,
      frequencyHz: boundaryFrequencyHz(context, boundary),
      ratedImpulseV: impulse?.state === 'known' ? impulse.value : null,
      pollutionDegree: insulation.pollutionDegree.value ?? 2,
      materialGroup: group.value,
      altitudeM: insulation.altitudeM.value ?? 2000,
      nominalMainsV: crossing ? mainsV : null,
      ...(boundary.meansOfProtection ? { meansOfProtection: boundary.meansOfProtection } : {}),
    }),
  )
}

// ---------------------------------------------------------------------------------------------

const cite = ({ standard, edition, place }: Citation) => `${standard}:${edition}, ${place}`
/** No table was read in the standard itself. */
const standing = ({ basis }: Citation) => ({ fromMemory: true, basis: basis === 'memory' ? ('memory' as const) : ('secondary-copy' as const) })
const absent = (reason: string, source = ''): SourcedValue => ({ value: null, source, fromMemory: false, reason })

function requiredDistance(answer: Answer<RequiredDistance>): SourcedValue {
  if (answer.state !== 'known') return absent(answer.reason)
  const { distanceMm, governedBy, contributions, unchecked } = answer.value
  const citation = contributions.find(({ rule }) => rule === governedBy)!.citation
  return { value: distanceMm, source: cite(citation), ...standing(citation), reason: (unchecked.find(({ reason }) => reason === 'table-not-held') ?? unchecked[0])?.reason ?? null }
}

function requiredValues(needs: BoundaryRequirements | { reason: string } | null, { insulation }: InsulationBoundary, peakV: number | null): BoundaryResult['required'] {
  if (needs === null || 'reason' in needs) {
    const none = absent(needs?.reason ?? 'working-voltage-not-known')
    return { clearanceMm: none, creepageMm: none, distanceThroughInsulationMm: none, layers: none, testVoltageVRms: functionalTest(insulation, peakV, none.reason!) }
  }
  const { throughInsulation: solid, testVoltage: test } = needs
  const notSolid = absent(solid.state === 'not-checkable' ? solid.reason : 'not-required')
  const layers = solid.state === 'known' ? Math.max(...solid.value.sheetAlternatives.map((sheet) => sheet.layers)) : null
  return {
    clearanceMm: requiredDistance(needs.clearance),
    creepageMm: requiredDistance(needs.creepage),
    distanceThroughInsulationMm: solid.state === 'known' ? sourced(solid.value.minimumThicknessMm, solid.value.citation) : notSolid,
    // Nothing is known about one layer alone, so the alternative in which any two of three withstand is taken.
    layers: solid.state === 'known' ? sourced(layers, solid.value.citation) : notSolid,
    testVoltageVRms: test.state === 'known' ? testValue(test.value.acRmsV, test.value) : functionalTest(insulation, peakV, test.state === 'not-checkable' ? test.reason : 'not-required'),
  }
}

const sourced = (value: number | null, citation: Citation): SourcedValue => ({ value, source: cite(citation), ...standing(citation), reason: null })

function testValue(acRmsV: number, { contributions, governedBy }: { contributions: readonly { rule: string; citation: Citation }[]; governedBy: string }): SourcedValue {
  return sourced(acRmsV, contributions.find(({ rule }) => rule === governedBy)!.citation)
}

/** Test voltage that finds damaged enamel between windings of one side, V rms. Source: common practice. */
export const FUNCTIONAL_TEST_V_RMS = 500

/** Peak of a withstand test over the recurring peak that the insulation bears for good. Source: IEC 62368-1, factor for basic insulation. */
const TEST_OVER_RECURRING_PEAK = 1.3

/** At least what finds damaged enamel, and never less than what the insulation bears in use. */
function functionalTest(insulation: InsulationBoundary['insulation'], peakV: number | null, reason: string): SourcedValue {
  if (insulation !== 'functional') return absent(reason)
  const inUseV = (TEST_OVER_RECURRING_PEAK * (peakV ?? 0)) / Math.SQRT2
  return { value: Math.max(FUNCTIONAL_TEST_V_RMS, inUseV), source: 'common practice for functional insulation', fromMemory: false, reason: null }
}

// ---------------------------------------------------------------------------------------------

const compare = ({ value, reason }: SourcedValue, provided: number | null, covered: boolean): CheckState => {
  if (value === null) return reason === 'not-required' ? 'met' : 'not-checkable'
  if (provided === null) return covered ? 'met' : 'not-checkable'
  if (provided < value * (1 - 1e-9)) return 'not-met'
  // What the tables at hand ask is met; the product standard's own, which may ask for more, is not at hand.
  return reason === 'table-not-held' ? 'not-checkable' : 'met'
}

/** State of each requirement of a boundary, for the boundary itself and for the checks. */
export interface BoundaryStates {
  clearance: CheckState
  creepage: CheckState
  solid: CheckState
  test: CheckState
}

export function boundaryStates(required: BoundaryResult['required'], provided: Omit<ProvidedInsulation, 'how' | 'paths'>, testVoltageVRms: number | null): BoundaryStates {
  const covered = provided.byInsulatedWire
  const thickness = compare(required.distanceThroughInsulationMm, provided.distanceThroughInsulationMm, covered)
  const layers = compare(required.layers, provided.layers, covered)
  return {
    clearance: provided.known ? compare(required.clearanceMm, provided.clearanceMm, covered) : 'not-checkable',
    creepage: provided.known ? compare(required.creepageMm, provided.creepageMm, covered) : 'not-checkable',
    // Thick solid insulation or thin sheets: either is enough.
    solid: !provided.known ? 'not-checkable' : thickness === 'met' || layers === 'met' ? 'met' : thickness === 'not-checkable' ? layers : thickness,
    test: testVoltageVRms === null ? 'not-met' : compare(required.testVoltageVRms, testVoltageVRms, false),
  }
}

function judge(required: BoundaryResult['required'], provided: ProvidedInsulation | null, testVoltageVRms: number | null): CheckState {
  if (!provided) return 'not-checkable'
  const states = Object.values(boundaryStates(required, provided, testVoltageVRms))
  if (states.includes('not-met')) return 'not-met'
  return states.includes('not-checkable') ? 'not-checkable' : 'met'
}
