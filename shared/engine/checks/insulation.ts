import { boundaryFrequencyHz, boundaryStates } from '../evaluate/boundaries'
import { isInsulatedWire, windingsAt, withTapedMargins } from '../evaluate/insulation-paths'
import { altitudeFactor } from '../insulation/coordination'
import type { BoundaryEnd, Winding } from '../specification'
import { boundaries, protective, reinforced } from './boundary-input'
import type { Judged } from './boundary-input'
import { atLeast, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

function standardNamed({ document }: CheckInput): Outcome[] {
  const { productStandard, standardEdition } = document.specification.insulation
  return [yesNo(productStandard.value !== null && (standardEdition.value ?? '') !== '', 'insulation.productStandard', { standard: productStandard.value ?? '', edition: standardEdition.value ?? '' })]
}

/** Every pair of windings, and every winding with the core, lies at the two ends of some boundary. */
function matrixComplete({ document }: CheckInput): Outcome[] {
  const { specification } = document
  const { windings } = specification
  const isAt = (end: BoundaryEnd, winding: Winding | 'core') => (winding === 'core' ? end.kind === 'core' : windingsAt(specification, end).includes(winding))
  const covered = (one: Winding, other: Winding | 'core') =>
    specification.insulation.boundaries.some(({ between: [a, b] }) => (isAt(a, one) && isAt(b, other)) || (isAt(b, one) && isAt(a, other)))
  const missing = windings.flatMap((one, index) => [...windings.slice(index + 1), 'core' as const].filter((other) => !covered(one, other)).map((other) => `${one.name}–${other === 'core' ? 'core' : other.name}`))
  return [yesNo(missing.length === 0 && specification.insulation.boundaries.length > 0, 'insulation.boundaries', { missing: missing.join(', ') })]
}

/** The drawing is what the vendor and the laboratory work by: what it states must not lie below what the duty gives. */
const workingVoltages = (input: CheckInput): Outcome[] =>
  boundaries(input).flatMap(({ result, boundary, path }) => {
    const values = { boundary: boundary.name }
    if (result.workingVoltageVRms === null || result.recurringPeakV === null) return [notCheckable(path, values)]
    const stated = (value: number | null, limit: number, field: string): Outcome[] => (value === null ? [] : [atLeast({ value, limit, unit: 'V', path: `${path}.${field}`, values })])
    const rows = [...stated(boundary.workingVoltageVRms, result.workingVoltageVRms, 'workingVoltageVRms'), ...stated(boundary.recurringPeakV, result.recurringPeakV, 'recurringPeakV')]
    return rows.length > 0 ? rows : [yesNo(true, path, { ...values, rmsV: result.workingVoltageVRms, peakV: result.recurringPeakV })]
  })

/** The greater of what the standard asks and what the drawing states. */
function distanceOutcome({ result, boundary, provided, path }: Judged, kind: 'creepage' | 'clearance'): Outcome {
  const required = kind === 'creepage' ? result.required.creepageMm : result.required.clearanceMm
  const offered = kind === 'creepage' ? result.provided.creepageMm : result.provided.clearanceMm
  const state = provided ? boundaryStates(result.required, provided, null)[kind] : 'not-checkable'
  return { state, value: offered, limit: required.value, unit: 'mm', path: `${path}.${kind}Mm`, values: { boundary: boundary.name, how: result.provided.how, standard: required.source } }
}

/** A specified distance smaller than the standard's is an error of the drawing, whatever the build gives. */
function specifiedOutcome({ result, boundary, path }: Judged, kind: 'creepage' | 'clearance'): Outcome[] {
  const specified = kind === 'creepage' ? boundary.creepageMm : boundary.clearanceMm
  const required = (kind === 'creepage' ? result.required.creepageMm : result.required.clearanceMm).value
  if (specified === null || required === null || specified >= required * (1 - 1e-9)) return []
  return [{ state: 'not-met', value: specified, limit: required, unit: 'mm', path: `${path}.${kind}Mm`, values: { boundary: boundary.name, how: 'as specified on the drawing' } }]
}

const distances = (kind: 'creepage' | 'clearance') => (input: CheckInput): Outcome[] =>
  boundaries(input).flatMap((judged) => [distanceOutcome(judged, kind), ...specifiedOutcome(judged, kind)])

function highFrequency(input: CheckInput): Outcome[] {
  return boundaries(input).filter(protective).flatMap(({ result, boundary, path }) => {
    const frequencyHz = boundaryFrequencyHz(input.document, boundary)
    if (frequencyHz <= 30e3) return []
    const { clearanceMm, creepageMm } = result.required
    // The creepage table of IEC 60664-4 is not held: a person looks it up and answers with its value.
    const open = [clearanceMm, creepageMm].find(({ value, reason }) => value === null || reason === 'high-frequency-table-not-held' || reason === 'table-not-held')
    return open ? notCheckable(path, { boundary: boundary.name, frequencyHz, reason: open.reason ?? '' }) : yesNo(true, path, { boundary: boundary.name, frequencyHz })
  })
}

function altitude({ document }: CheckInput): Outcome[] {
  const path = 'insulation.altitudeM'
  const altitudeM = document.specification.insulation.altitudeM.value
  if (altitudeM === null) return [notCheckable(path)]
  const factor = altitudeFactor(altitudeM)
  if (factor.state !== 'known') return [notCheckable(path, { altitudeM })]
  // Below the sea lies no place of use that a clearance could be made smaller for: the figure is a slip.
  return [{ ...yesNo(altitudeM >= 0, path, { altitudeM, factor: factor.value }), value: factor.value, unit: '1' }]
}

/** Margins side by side of two recessed windings: together they are the creepage path round the tape. */
function margins(input: CheckInput): Outcome[] {
  const { specification } = input.document
  return boundaries(input).filter(protective).flatMap(({ boundary, result, path }) => {
    if (boundary.between.some(({ kind }) => kind === 'core')) return []
    const [one, other] = boundary.between.map((end) => windingsAt(specification, end))
    const pairs = one!.flatMap((a) => other!.map((b) => [a, b] as const)).filter(([a, b]) => a.id !== b.id && !isInsulatedWire(a) && !isInsulatedWire(b))
    if (pairs.length === 0 || !input.coil) return []
    const { placements } = withTapedMargins(input.coil, specification.sequence)
    const margin = ({ id }: Winding, side: 'marginLeftMm' | 'marginRightMm') => Math.min(...placements.filter(({ windingId }) => windingId === id).map((placement) => placement[side]))
    const sums = pairs.flatMap(([a, b]) => (['marginLeftMm', 'marginRightMm'] as const).map((side) => margin(a, side) + margin(b, side)))
    const least = Math.min(...sums)
    return [atLeast({ value: Number.isFinite(least) ? least : null, limit: result.required.creepageMm.value, unit: 'mm', path, values: { boundary: boundary.name } })]
  })
}

const solidInsulation = (input: CheckInput): Outcome[] =>
  boundaries(input).filter(protective).map(({ boundary, result, provided, path }) => ({
    state: provided ? boundaryStates(result.required, provided, null).solid : ('not-checkable' as const),
    value: result.provided.layers,
    limit: result.required.layers.value,
    unit: 'layers',
    path: `${path}.distanceThroughInsulationMm`,
    values: { boundary: boundary.name, how: result.provided.how, standard: result.required.distanceThroughInsulationMm.source },
  }))

function tapeLayers(input: CheckInput): Outcome[] {
  return boundaries(input).filter(reinforced).flatMap(({ boundary, provided, path }) => {
    if (boundary.between.some(({ kind }) => kind === 'core') || provided?.byInsulatedWire) return []
    return [atLeast({ value: provided?.layers, limit: 3, unit: 'layers', path, values: { boundary: boundary.name } })]
  })
}

/** What the drawing asks of the insulated wire's certificate must cover the boundary that relies on it. */
function wireCertificates({ document, evaluation }: CheckInput): Outcome[] {
  const { specification } = document
  const frequencyHz = specification.electrical.switchingFrequencyHz.value?.maximum ?? 0
  return specification.windings.flatMap((winding, index) => {
    if (!isInsulatedWire(winding)) return []
    const path = `windings.${index}.wire.certificate`
    const { certificate } = winding.wire
    const stressed = specification.insulation.boundaries.flatMap((boundary, position) => (boundary.insulation !== 'functional' && boundary.between.some((end) => windingsAt(specification, end).includes(winding)) ? [evaluation.boundaries[position]?.recurringPeakV ?? null] : []))
    const peakV = stressed.filter((value) => value !== null).reduce((most, value) => Math.max(most, value), 0)
    if (!certificate || certificate.standard === '' || certificate.peakVoltageV === null) return [yesNo(false, path, { winding: winding.name })]
    // The number is the maker's of the wire that is bought: it may be open while the part is only enquired for.
    const number = certificate.number.trim() === '' ? [{ ...notCheckable(`${path}.number`, { winding: winding.name, missing: 'number' }), severity: 'M' as const }] : []
    if (certificate.maximumFrequencyHz === null) return [notCheckable(path, { winding: winding.name, missing: 'frequency' }), ...number]
    const fits = certificate.peakVoltageV >= peakV && certificate.maximumFrequencyHz >= frequencyHz
    return [yesNo(fits, path, { winding: winding.name, peakV, certifiedPeakV: certificate.peakVoltageV }), ...number]
  })
}

export const INSULATION_CHECKS: Readonly<Record<string, Check>> = {
  I01: { severity: 'S', source: 'common practice', run: standardNamed },
  I02: { severity: 'S', source: 'IEC 60664-1', run: matrixComplete },
  I03: { severity: 'S', source: 'IEC 60664-1:2020, 3.1', run: workingVoltages },
  I04: { severity: 'S', source: 'IEC 60664-1:2020, Table F.5', run: distances('creepage') },
  I05: { severity: 'S', source: 'IEC 60664-1:2020, Tables F.2 and F.8', run: distances('clearance') },
  I06: { severity: 'S', source: 'IEC 60664-4; IEC 62368-1, Table 11', run: highFrequency },
  I07: { severity: 'S', source: 'IEC 60664-1:2020, Table A.2', run: altitude },
  I08: { severity: 'S', source: 'creepage path round the end of the tape: geometry', run: margins },
  I09: { severity: 'S', source: 'IEC 62368-1, 5.4.4; product standard', run: solidInsulation },
  I10: { severity: 'S', source: 'three layers, any two withstand: IEC 62368-1, 5.4.4.6', run: tapeLayers },
  I11: { severity: 'S', source: 'IEC 62368-1 Annex J; IEC 60317-0-7', run: wireCertificates },
}
