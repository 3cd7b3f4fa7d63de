import type { WireRow } from '#shared/engine/library'
import { figure, readTable, rounded } from './table'
import { AWG_TABLE, METRIC_TABLE } from './wire-tables'

const AWG_COLUMNS = ['bare', 'area', 'resistance', 'single', 'heavy', 'triple', 'insulated'] as const
const METRIC_COLUMNS = ['tolerance', 'area', 'nominal', 'least', 'greatest', 'grade1', 'grade2', 'grade3'] as const

/** Round wire by gauge and by metric size, and litz wire by geometry. */
export function shippedWires(): WireRow[] {
  return [...gaugeWires(), ...metricWires(), ...LITZ.map(litzWire)]
}

function gaugeWires(): WireRow[] {
  return readTable(AWG_TABLE, AWG_COLUMNS).map(({ label, cells }) => ({
    kind: 'wire',
    id: `awg-${label}`,
    version: 1,
    name: `AWG ${label}`,
    source:
      'Bare: ASTM B258, computed; resistance: IEC 60028, 1/58 Ω·mm²/m; overall: NEMA MW 1000 after McLyman, Transformer and Inductor Design Handbook, tables 4-10 and 4-16',
    edition: 'Handbook 3rd edition, 2004',
    confidence: Number(label) <= 44 ? 'high' : 'low',
    unverified: Number(label) <= 44 ? [] : ['overallMm.enamel-grade-2'],
    note:
      'The overall diameters of grades 1, 2 and 3 are those of the NEMA single, heavy and triple build. Later editions of MW 1000 differ by up to 0.008 mm.' +
      (cells.insulated === null ? '' : ' Triple-insulated: three layers of 0.002 in.'),
    form: 'round',
    standard: 'ASTM B258 / NEMA MW 1000',
    size: `AWG ${label}`,
    conductorMm: figure(label, cells.bare),
    conductorToleranceMm: null,
    strands: 1,
    copperAreaMm2: figure(label, cells.area),
    resistance20: { nominalOhmPerM: figure(label, cells.resistance), minimumOhmPerM: null, maximumOhmPerM: null },
    overallMm: {
      'enamel-grade-1': cells.single,
      'enamel-grade-2': cells.heavy,
      'enamel-grade-3': cells.triple,
      'triple-insulated': cells.insulated,
      'fully-insulated': null,
      bare: cells.bare,
    },
    widthMm: null,
  }))
}

/** Three layers of about 0.033 mm on each side; makers differ. */
const GENERIC_TRIPLE_INSULATION_MM = 0.1

/** Conductors that are commonly offered with three layers of extruded insulation. */
const TRIPLE_INSULATED_MM = { least: 0.2, greatest: 1 }

function metricWires(): WireRow[] {
  return readTable(METRIC_TABLE, METRIC_COLUMNS).map(({ label, cells }) => {
    const conductorMm = Number(label)
    const insulated = conductorMm >= TRIPLE_INSULATED_MM.least && conductorMm <= TRIPLE_INSULATED_MM.greatest
    return {
      kind: 'wire',
      id: `iec-${label}`,
      version: 1,
      name: `${label} mm`,
      source: 'IEC 60317-0-1, table 1: tolerances read from a wire maker’s copy, overall diameters recalled, resistances computed',
      edition: 'Edition not stated; check against the one in force',
      confidence: 'medium',
      unverified: insulated ? ['overallMm.enamel-grade-3', 'overallMm.triple-insulated'] : ['overallMm.enamel-grade-3'],
      note: insulated
        ? 'Triple-insulated: generic, conductor plus 2 × 0.10 mm; unverified, replace by the wire maker’s certificate before release.'
        : '',
      form: 'round',
      standard: 'IEC 60317-0-1',
      size: `${label} mm`,
      conductorMm,
      conductorToleranceMm: cells.tolerance,
      strands: 1,
      copperAreaMm2: figure(label, cells.area),
      resistance20: { nominalOhmPerM: figure(label, cells.nominal), minimumOhmPerM: cells.least, maximumOhmPerM: cells.greatest },
      overallMm: {
        'enamel-grade-1': cells.grade1,
        'enamel-grade-2': cells.grade2,
        'enamel-grade-3': cells.grade3,
        'triple-insulated': insulated ? rounded(conductorMm + 2 * GENERIC_TRIPLE_INSULATION_MM) : null,
        'fully-insulated': null,
        bare: rounded(conductorMm + (cells.tolerance ?? 0)),
      },
      widthMm: null,
    }
  })
}

const LITZ = [
  { strands: 10, strandMm: '0.100' },
  { strands: 20, strandMm: '0.100' },
  { strands: 30, strandMm: '0.100' },
  { strands: 60, strandMm: '0.100' },
  { strands: 100, strandMm: '0.100' },
  { strands: 40, strandMm: '0.071' },
  { strands: 60, strandMm: '0.071' },
  { strands: 100, strandMm: '0.071' },
  { strands: 180, strandMm: '0.071' },
  { strands: 100, strandMm: '0.050' },
  { strands: 225, strandMm: '0.050' },
] as const

/** Overall diameter over √n · strand overall diameter, for closely packed round bundles. */
const LITZ_PACKING = 1.155

/** Lengthening of the strands by the lay, as published tables of fine litz have it. */
const LITZ_LAY = 1.02

function litzWire({ strands, strandMm }: (typeof LITZ)[number]): WireRow {
  const strand = metricWires().find((row) => row.id === `iec-${strandMm}`)!
  const overall = (strandOverallMm: number | null) => (strandOverallMm === null ? null : rounded(LITZ_PACKING * Math.sqrt(strands) * strandOverallMm))
  const size = `${strands} × ${strandMm} mm`
  return {
    ...strand,
    id: `litz-${strands}x${strandMm}`,
    name: `Litz ${size}`,
    source: 'Geometry: overall diameter 1.155 · √n · strand overall diameter; resistance of the strand (IEC 60317-0-1) over n, times 1.02 for the lay',
    edition: 'Formula as given in winding handbooks',
    confidence: 'generic',
    unverified: ['overallMm.enamel-grade-1', 'overallMm.enamel-grade-2', 'overallMm.enamel-grade-3', 'resistance20.nominalOhmPerM'],
    note: 'Generic, unverified, replace before release. Without serving; made litz runs to 1.35 · √n · strand overall diameter. Grade is that of the strand.',
    form: 'litz',
    standard: 'IEC 60317-11',
    size,
    strands,
    copperAreaMm2: rounded(strands * strand.copperAreaMm2, 6),
    resistance20: {
      nominalOhmPerM: rounded((LITZ_LAY * strand.resistance20.nominalOhmPerM) / strands, 7),
      minimumOhmPerM: null,
      maximumOhmPerM: null,
    },
    overallMm: {
      'enamel-grade-1': overall(strand.overallMm['enamel-grade-1']),
      'enamel-grade-2': overall(strand.overallMm['enamel-grade-2']),
      'enamel-grade-3': overall(strand.overallMm['enamel-grade-3']),
      'triple-insulated': null,
      'fully-insulated': null,
      bare: null,
    },
  }
}
