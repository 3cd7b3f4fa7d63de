import type { Confidence, CoreRow, FormerRow } from '#shared/engine/library'
import { deriveFormer, type DerivedFormer } from './former-geometry'
import { KNOWN_FORMERS, KNOWN_PINS } from './former-tables'
import { readTable, rounded, rowId } from './table'

/** Shapes that carry a one-section former with pins; planar and ring cores do not. */
const SHAPES: readonly CoreRow['shape'][] = ['E', 'ETD', 'ER', 'EFD', 'EP', 'PQ', 'RM', 'P', 'other']

/** Below this no wire can be laid in layers, so no former is offered. */
const LEAST_WINDING_MM = { width: 1.5, height: 0.8 }

interface Known {
  confidence: Confidence
  source: string
  edition: string
  areaMm2: number | null
  widthMm: number | null
  heightMm: number | null
  meanTurnMm: number | null
  pins: number | null
}

/** One former for each core whose window is published: known figures where there are any, geometry for the rest. */
export function shippedFormers(cores: readonly CoreRow[]): FormerRow[] {
  const known = knownFormers()
  return cores.filter((core) => SHAPES.includes(core.shape)).flatMap((core) => {
    const former = formerFor(core, known.get(core.id.replace(/-hole$/, '')) ?? null)
    if (!former) return []
    return [former, ...(SECTIONED.has(core.id) ? sectioned(former) : [])]
  })
}

/** Cores for which formers with a wall in the middle are common, for windings side by side. */
const SECTIONED = new Set(['e20-10-6', 'e25-13-7', 'e30-15-7', 'e42-21-15', 'etd29-16-10', 'etd34-17-11', 'etd39-20-13'])

/** The same former parted into two sections by a wall as thick as its flanges. */
function sectioned(former: FormerRow): FormerRow[] {
  const windingWidthMm = rounded((former.windingWidthMm - former.flangeThicknessMm) / 2)
  return [
    {
      ...former,
      id: `${former.id}-2s`,
      name: `${former.name}, 2 sections`,
      windingWidthMm,
      sections: 2,
      confidence: 'generic',
      source: `Geometry: ${former.name} parted by a wall as thick as its flanges`,
      edition: 'None',
      unverified: [...new Set([...former.unverified, 'windingWidthMm', 'windingHeightMm', 'sections'])],
      note: 'Generic, unverified, replace before release.',
    },
  ]
}

function formerFor(core: CoreRow, recalled: Known | null): FormerRow | null {
  const derived = deriveFormer(core, recalled?.pins ?? null)
  if (!derived) return null
  const known = recalled && fits(core, derived, recalled) ? recalled : withoutWindow(recalled)
  const winding = windingSpace(derived, known)
  if (winding.windingWidthMm < LEAST_WINDING_MM.width || winding.windingHeightMm < LEAST_WINDING_MM.height) return null
  return {
    ...derived,
    ...winding,
    kind: 'former',
    id: `${core.id}-${derived.mounting === 'horizontal' ? 'h' : 'v'}`,
    version: 1,
    name: `${core.name}, ${derived.mounting}, ${derived.pins.length} pins`,
    coreId: core.id,
    ...origin(known),
    sections: 1,
    meanTurnLengthMm: known?.meanTurnMm ?? null,
    material: 'phenolic moulding compound',
    plastic: 'thermoset',
    flammability: 'UL 94 V-0',
    materialGroup: 'IIIb',
    thermalClassC: 130,
  }
}

/** A recalled window that the core cannot take is not believed. */
function fits(core: CoreRow, derived: DerivedFormer, known: Known): boolean {
  const { e, f } = core.dimensionsMm
  return windingSpace(derived, known).windingHeightMm + derived.tubeWallMm <= (e! - f!) / 2
}

const withoutWindow = (known: Known | null): Known | null => known && { ...known, areaMm2: null, widthMm: null, heightMm: null, meanTurnMm: null }

/** A known area and width give the height; a known area alone gives the height over the derived width. */
function windingSpace(derived: DerivedFormer, known: Known | null): Pick<FormerRow, 'windingWidthMm' | 'windingHeightMm'> {
  const windingWidthMm = known?.widthMm ?? derived.windingWidthMm
  if (known?.heightMm != null) return { windingWidthMm, windingHeightMm: known.heightMm }
  if (known?.areaMm2 != null) return { windingWidthMm, windingHeightMm: rounded(known.areaMm2 / windingWidthMm) }
  return { windingWidthMm, windingHeightMm: derived.windingHeightMm }
}

/** For some formers recalled rather than read; the places of the pins are generic in any case. */
const PIN_SOURCE = 'TDK, Ferrite Cores catalogue, bobbin tables, or recalled'

/** Nothing of this is known of any former shipped. */
const NEVER_KNOWN = [
  'tube',
  'tubeWallMm',
  'flangeThicknessMm',
  'pinRowSpacingMm',
  'pinPitchMm',
  'pinSection',
  'pinLengthMm',
  'standoffMm',
  'material',
  'flammability',
  'materialGroup',
  'thermalClassC',
  'envelopeMm',
]

function origin(known: Known | null): Pick<FormerRow, 'source' | 'edition' | 'confidence' | 'unverified' | 'note'> {
  const areaKnown = known?.areaMm2 != null
  const missing = [
    ...(known?.widthMm == null ? ['windingWidthMm'] : []),
    ...(known?.heightMm == null && !(areaKnown && known.widthMm !== null) ? ['windingHeightMm'] : []),
    ...(known?.meanTurnMm == null ? ['meanTurnLengthMm'] : []),
    'pins',
    ...NEVER_KNOWN,
  ]
  const withPins = known?.pins == null ? { source: '', edition: '' } : { source: `; number of pins: ${PIN_SOURCE}`, edition: '; 1998' }
  if (areaKnown) {
    return {
      source: known.source + withPins.source,
      edition: known.edition + withPins.edition,
      confidence: known.confidence,
      unverified: missing,
      note: 'Walls, pins and plastic are generic, unverified: replace before release.',
    }
  }
  return {
    source: `Geometry: window of the core less flanges, tube wall and clearances${withPins.source}`,
    edition: `None${withPins.edition}`,
    confidence: 'generic',
    unverified: missing,
    note: 'Generic, unverified, replace before release.',
  }
}

const COLUMNS = ['areaMm2', 'widthMm', 'heightMm', 'meanTurnMm', 'pins'] as const

function knownFormers(): Map<string, Known> {
  const nothing = { areaMm2: null, widthMm: null, heightMm: null, meanTurnMm: null }
  const pinsOnly = Object.entries(KNOWN_PINS).map(([core, pins]): [string, Known] => [
    rowId(core),
    { ...nothing, pins, confidence: 'generic', source: '', edition: '' },
  ])
  const measured = KNOWN_FORMERS.flatMap(({ rows, confidence, source, edition }) =>
    readTable(rows, COLUMNS).map(({ label, cells }): [string, Known] => [rowId(label), { ...cells, confidence, source, edition }]),
  )
  return new Map([...pinsOnly, ...measured])
}
