import type { WireRow } from '#shared/engine/library'
import { shippedFoils } from './foils'
import { shippedLitz } from './litz'
import { figure, readTable, rounded } from './table'
import { AWG_TABLE, METRIC_TABLE } from './wire-tables'

const AWG_COLUMNS = ['bare', 'area', 'resistance', 'single', 'heavy', 'triple', 'insulated'] as const
const METRIC_COLUMNS = ['tolerance', 'area', 'nominal', 'least', 'greatest', 'grade1', 'grade2', 'grade3'] as const

/** Round wire by gauge and by metric size; litz and foil by geometry. */
export function shippedWires(): WireRow[] {
  const metric = metricWires()
  return [...gaugeWires(), ...metric, ...shippedLitz(metric), ...shippedFoils()]
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
