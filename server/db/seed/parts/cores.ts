import type { CoreRow } from '#shared/engine/library'
import { CORE_TABLES, type CoreTable } from './core-tables'
import { powderRings } from './rings'
import { figure, readTable, rounded, rowId } from './table'

const DIMENSIONS = ['a', 'b', 'c', 'd', 'e', 'f'] as const
const EFFECTIVE = ['area', 'leastArea', 'length', 'volume', 'mass', 'page'] as const

type Cells = Record<string, number | null>

/** Every core whose effective parameters are published and agree with one another. */
export function shippedCores(): CoreRow[] {
  return [...[...CORE_TABLES.flatMap(catalogueCores), ...smallECores()].map(withKnownDoubts), ...powderRings()]
}

function catalogueCores(table: CoreTable): CoreRow[] {
  const columns: readonly string[] = [...DIMENSIONS, ...table.extra, ...EFFECTIVE]
  return readTable(table.rows, columns).map(({ label, cells }) => ({
    kind: 'core',
    id: rowId(label),
    version: 1,
    name: label.replace('-hole', ' with centre hole'),
    source: 'Magnetics, Ferrite Cores catalogue',
    edition: `2013, page ${figure(label, cells.page)} of the PDF`,
    confidence: 'high',
    unverified: [],
    note: coreNote(label, cells),
    shape: table.shape,
    standard: table.standard,
    dimensionsMm: { a: cells.a!, b: cells.b!, c: cells.c!, d: cells.d!, e: cells.e!, f: cells.f! },
    ...(cells.coatedA != null ? { coatedMm: { outside: cells.coatedA, inside: figure(label, cells.coatedB), height: figure(label, cells.coatedC) } } : {}),
    effectiveAreaMm2: figure(label, cells.area),
    minimumAreaMm2: figure(label, cells.leastArea),
    effectiveLengthMm: figure(label, cells.length),
    effectiveVolumeMm3: figure(label, cells.volume),
    massG: cells.mass!,
    centreLeg: centreLeg(table.leg, label, cells),
  }))
}

function centreLeg(leg: CoreTable['leg'], label: string, cells: Cells): CoreRow['centreLeg'] {
  switch (leg) {
    case 'round':
      return { shape: 'round', diameterMm: figure(label, cells.f) }
    case 'rectangular':
      return { shape: 'rectangular', widthMm: figure(label, cells.f), depthMm: figure(label, cells.c) }
    case 'flat':
      return { shape: 'rectangular', widthMm: figure(label, cells.f), depthMm: figure(label, cells.leg) }
    case 'none':
      return null
  }
}

function coreNote(label: string, cells: Cells): string {
  if (cells.coatedA != null) return `Coated: outside at most ${cells.coatedA} mm, inside at least ${cells.coatedB} mm, height at most ${cells.coatedC} mm.`
  if (cells.hole != null) return `Centre hole ${cells.hole} mm. Footprint ${cells.side} mm square.`
  if (cells.side != null) return `Without centre hole. Footprint ${cells.side} mm square.`
  return label.endsWith('C') ? 'Half with clip recess.' : ''
}

/** Columns: A B C D E F, area, length, volume, mass. */
const SMALL_E_TABLE = `
  E13/7/4  12.7  6.4  3.6  4.65  9.2   3.65  13    29.6  385   2
  E16/8/5  16.1  8.05 4.5  5.9  11.6   4.55  20.1  37.6  756   3.9
  E20/10/6 20    9.9  5.65 7.2  14.5   5.7   33.5  44.9 1504   7.4
  E32/16/9 32.1 16.1  9.15 11.5 23.3   9.2   83.2  74.3 6182  32
`

/** Standard sizes for which the catalogue read gives neither the window nor the least area. */
function smallECores(): CoreRow[] {
  const columns = [...DIMENSIONS, 'area', 'length', 'volume', 'mass'] as const
  return readTable(SMALL_E_TABLE, columns).map(({ label, cells }) => ({
    kind: 'core',
    id: rowId(label),
    version: 1,
    name: label,
    source: 'TDK, Ferrite Cores catalogue, E tables; window D and E recalled after IEC 63093-8',
    edition: '1998',
    confidence: 'medium',
    unverified: ['minimumAreaMm2', 'dimensionsMm.d', 'dimensionsMm.e'],
    note: 'Least area taken as the smaller of Ae and the centre leg F · C. Check the window and the least area before release.',
    shape: 'E',
    standard: 'IEC 63093-8',
    dimensionsMm: { a: cells.a, b: cells.b, c: cells.c, d: cells.d, e: cells.e, f: cells.f },
    effectiveAreaMm2: figure(label, cells.area),
    minimumAreaMm2: rounded(Math.min(figure(label, cells.area), figure(label, cells.c) * figure(label, cells.f))),
    effectiveLengthMm: figure(label, cells.length),
    effectiveVolumeMm3: figure(label, cells.volume),
    massG: cells.mass,
    centreLeg: { shape: 'rectangular', widthMm: figure(label, cells.f), depthMm: figure(label, cells.c) },
  }))
}

/** Figures that are printed but cannot be right, or that could not be read, by row. */
const DOUBTS: Readonly<Record<string, Pick<CoreRow, 'unverified' | 'note'> & Partial<Pick<CoreRow, 'centreLeg'>>>> = {
  'efd10-5-3': {
    unverified: ['centreLeg.depthMm'],
    note: 'Thickness of the centre leg is printed as 4.45 mm, which disagrees with the least area; taken as least area over F.',
    centreLeg: { shape: 'rectangular', widthMm: 4.55, depthMm: rounded(6.5 / 4.55) },
  },
  'er14.5-6': { unverified: [], note: 'Last columns of the printed dimensions are not legible.' },
  'e30-15-7': { unverified: [], note: 'Effective length by IEC 60205 from the printed dimensions is 2.3 % below the printed one.' },
}

function withKnownDoubts(row: CoreRow): CoreRow {
  const doubt = DOUBTS[row.id]
  return doubt ? { ...row, ...doubt, confidence: doubt.unverified.length > 0 ? 'medium' : row.confidence } : row
}
