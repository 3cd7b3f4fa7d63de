import type { SequenceStep, WindingSpecification } from '../../engine/specification'
import type { Row, TableContent } from '../table'
import { celsius, joined, quantity, STATUS_LETTERS } from './figures'
import { findRow, rowName, type DrawingInput } from './input'
import { stepWords, WIRE_INSULATION_WORDS } from './words'

const UNKNOWN = '–'

interface Material {
  part: string
  maker?: string
  type: string
  rating: string
  standard?: string
  certificate?: string
  expires?: string
  status?: string
}

/**
 * What the safety laboratory asks of each part and material on which safety depends: the rows that the specification
 * lists, then those that follow from the construction. A dash is for the vendor to declare.
 */
export function criticalMaterialsTable(input: DrawingInput): TableContent {
  const { specification } = input
  const materials = [...listed(specification), former(input), ...wires(input), ...tapes(input), ...sleeves(input), ...resin(specification), ...polymers(specification)]
  return {
    title: 'Critical materials for the safety laboratory (– : to be declared by the vendor)',
    columns: [
      { key: 'part', header: 'Part', font: 'sans-bold' },
      { key: 'maker', header: 'Maker', always: true },
      { key: 'type', header: 'Type or material', always: true },
      { key: 'rating', header: 'Rating', always: true },
      { key: 'standard', header: 'Standard', always: true },
      { key: 'certificate', header: 'Certificate or file', always: true },
      { key: 'expires', header: 'Expires', always: true },
      { key: 'status', header: 'M/R/V', align: 'middle' },
    ],
    rows: merged(materials.filter((material): material is Material => material !== null)).map(toRow),
  }
}

const toRow = ({ part, maker, type, rating, standard, certificate, expires, status }: Material): Row => {
  const said = (text: string | undefined) => (text === undefined || text === '' ? UNKNOWN : text)
  return { cells: { part, maker: said(maker), type: said(type), rating: said(rating), standard: said(standard), certificate: said(certificate), expires: said(expires), status: status ?? '' } }
}

/** The same material in several places is one row. */
function merged(materials: readonly Material[]): Material[] {
  const found = new Map<string, Material>()
  for (const material of materials) {
    const key = JSON.stringify({ ...material, part: '' })
    const same = found.get(key)
    if (!same) found.set(key, { ...material })
    else if (!same.part.split(', ').includes(material.part)) same.part = `${same.part}, ${material.part}`
  }
  return [...found.values()]
}

const listed = ({ insulation }: WindingSpecification): Material[] =>
  (insulation.criticalMaterials ?? []).map(({ expiresOn, status, ...row }) => ({ ...row, expires: expiresOn ?? 'no end', status: STATUS_LETTERS[status] }))

function former({ specification: { former: stated }, library }: DrawingInput): Material | null {
  if (stated.former.value === null && stated.material.value === null) return null
  const group = stated.materialGroup.value
  return {
    part: 'Coil former',
    type: joined([stated.material.value, stated.plastic.value, rowName(library, stated.former.value)]),
    rating: joined([stated.flammability.value, stated.relativeTemperatureIndexC.value === null ? '' : `RTI ${celsius(stated.relativeTemperatureIndexC.value)}`, group === null ? '' : `material group ${group}`]),
    certificate: stated.fileNumber.value ?? '',
  }
}

function wires({ specification: { windings }, library }: DrawingInput): Material[] {
  return windings.map(({ name, wire }) => {
    const row = findRow(library, 'wire', wire.wire)
    const { certificate } = wire
    return {
      part: `Wire ${name}`,
      type: joined([rowName(library, wire.wire), WIRE_INSULATION_WORDS[wire.insulation]]),
      rating: joined([
        `class ${celsius(wire.thermalClassC)}`,
        certificate?.peakVoltageV == null ? '' : `${quantity(certificate.peakVoltageV, 'V')} peak`,
        certificate?.maximumFrequencyHz == null ? '' : `up to ${quantity(certificate.maximumFrequencyHz, 'Hz')}`,
      ]),
      standard: certificate?.standard ?? row?.standard ?? '',
      certificate: certificate?.number ?? '',
    }
  })
}

function tapes({ specification, library }: DrawingInput): Material[] {
  return specification.sequence.flatMap((step) => {
    const reference = tapeOf(step)
    const row = findRow(library, 'tape', reference)
    if (!reference) return []
    const words = step.kind === 'winding' ? 'Interlayer tape' : stepWords(specification, step)
    return [{ part: words, type: joined([rowName(library, reference), row?.material]), rating: row ? joined([`class ${celsius(row.thermalClassC)}`, row.layerWithstandVRms === null ? '' : `${quantity(row.layerWithstandVRms, 'V')} r.m.s. per layer`]) : '' }]
  })
}

function tapeOf(step: SequenceStep) {
  if (step.kind === 'tape' || step.kind === 'margin' || step.kind === 'core-tape') return step.tape
  return step.kind === 'winding' ? step.interlayerTape : null
}

function sleeves({ specification: { sequence }, library }: DrawingInput): Material[] {
  const references = sequence.flatMap((step) => (step.kind === 'sleeve' ? [step.sleeve] : step.kind === 'winding' ? [step.startSleeve?.sleeve ?? null, step.finishSleeve?.sleeve ?? null] : []))
  return references.flatMap((reference) => {
    if (!reference) return []
    const row = findRow(library, 'sleeve', reference)
    return [{ part: 'Sleeve', type: joined([rowName(library, reference), row?.material]), rating: row ? joined([`class ${celsius(row.thermalClassC)}`, row.withstandVRms === null ? '' : `${quantity(row.withstandVRms, 'V')} r.m.s.`]) : '' }]
  })
}

function resin({ impregnation }: WindingSpecification): Material[] {
  if (impregnation.process.value === null || impregnation.process.value === 'none') return []
  return [{ part: impregnation.process.value === 'potting' ? 'Potting compound' : 'Varnish', type: impregnation.resin.value ?? '', rating: impregnation.thermalClassC.value === null ? '' : `class ${celsius(impregnation.thermalClassC.value)}` }]
}

const polymers = ({ insulation }: WindingSpecification): Material[] =>
  insulation.polymers.map(({ use, material, flammability, fileNumber, status }) => ({ part: use, type: material, rating: flammability, certificate: fileNumber, status: STATUS_LETTERS[status] }))
