import type { CoreRow } from '#shared/engine/library'
import { toroidEffectiveParameters } from '#shared/engine/index'
import { readTable, rounded, rowId } from './table'

/**
 * Rings in which pressed powder is commonly made: outside and inside diameter and height before coating, mm. Sizes
 * recalled; makers agree on them within a tenth of a millimetre or so. Coating takes about 0.3 mm on each face.
 */
const POWDER_RINGS = `
  PR6.35   6.35  2.79  2.79
  PR9.65   9.65  4.78  3.96
  PR12.7   12.7  7.62  4.75
  PR16.5   16.5  10.2  6.35
  PR20.3   20.3  12.7  6.35
  PR22.9   22.9  14.0  7.62
  PR26.9   26.9  14.7  11.2
  PR33.0   33.0  19.9  10.7
  PR35.8   35.8  22.4  10.5
  PR39.9   39.9  24.1  14.5
  PR46.7   46.7  24.1  18.0
  PR50.8   50.8  31.8  13.5
  PR57.2   57.2  35.6  14.0
  PR77.8   77.8  49.2  12.7
`

const COATING_MM = 0.3

/** Effective parameters by IEC 60205; no core has a mass before its material is chosen. */
export function powderRings(): CoreRow[] {
  return readTable(POWDER_RINGS, ['a', 'b', 'c'] as const).map(({ label, cells: { a, b, c } }) => {
    const ring = toroidEffectiveParameters({ outerDiameterMm: a!, innerDiameterMm: b!, heightMm: c! })
    const areaMm2 = rounded(ring.areaMm2)
    return {
      kind: 'core',
      id: `powder-ring-${rowId(label.slice(2))}`,
      version: 1,
      name: `Powder ring ${a}/${b}/${c}`,
      source: 'Common size of powder rings, recalled; effective parameters computed by IEC 60205',
      edition: 'IEC 60205:2016',
      confidence: 'generic',
      unverified: ['dimensionsMm.a', 'dimensionsMm.b', 'dimensionsMm.c', 'coatedMm', 'effectiveAreaMm2', 'minimumAreaMm2', 'effectiveLengthMm', 'effectiveVolumeMm3'],
      note: 'Generic, unverified, replace before release. Dimensions before coating; coated by 0.3 mm on each face.',
      shape: 'toroid',
      standard: '',
      dimensionsMm: { a, b, c, d: null, e: null, f: null },
      coatedMm: { outside: rounded(a! + 2 * COATING_MM, 2), inside: rounded(b! - 2 * COATING_MM, 2), height: rounded(c! + 2 * COATING_MM, 2) },
      effectiveAreaMm2: areaMm2,
      minimumAreaMm2: areaMm2,
      effectiveLengthMm: rounded(ring.lengthMm),
      effectiveVolumeMm3: rounded(ring.volumeMm3),
      massG: null,
      centreLeg: null,
    } satisfies CoreRow
  })
}
