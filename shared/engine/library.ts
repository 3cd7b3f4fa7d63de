/**
 * Rows of the parts library as the engine reads them. Lengths in mm, areas in mm², everything else SI.
 * Every row says where its figures come from; fields that no source gives are listed in `unverified`.
 */

export type LibraryKind = 'core' | 'former' | 'material' | 'wire' | 'tape' | 'sleeve'

/**
 * `high` … `low`: how sure the source is. `generic`: derived from an open standard or from geometry,
 * to be replaced by a maker's value before release.
 */
export type Confidence = 'high' | 'medium' | 'low' | 'generic'

export interface LibraryRow {
  id: string
  version: number
  name: string
  source: string
  edition: string
  confidence: Confidence
  /** Names of fields that no source gives; release needs a person's value with its source for those it uses. */
  unverified: readonly string[]
  note: string
}

export type CoreShape = 'E' | 'ETD' | 'ER' | 'EFD' | 'EP' | 'EQ' | 'PQ' | 'RM' | 'P' | 'U' | 'EI' | 'E-planar' | 'toroid' | 'other'

export interface CoreRow extends LibraryRow {
  kind: 'core'
  shape: CoreShape
  /** Standard that fixes the dimensions, e.g. `IEC 63093-5`. */
  standard: string
  /** A…F of the shape's dimension drawing (full width, half height, depth, half window height, window outer width, centre leg). Ring core: A outside, B inside diameter, C height, uncoated. Null where not published. */
  dimensionsMm: { a: number | null; b: number | null; c: number | null; d: number | null; e: number | null; f: number | null }
  /** Ring cores: greatest outside, least inside diameter and greatest height over the coating; absent where not published. */
  coatedMm?: { outside: number; inside: number; height: number } | null
  /** Set of two halves. IEC 60205. */
  effectiveAreaMm2: number
  minimumAreaMm2: number
  effectiveLengthMm: number
  effectiveVolumeMm3: number
  massG: number | null
  centreLeg: { shape: 'round'; diameterMm: number } | { shape: 'rectangular'; widthMm: number; depthMm: number } | null
}

export interface FormerRow extends LibraryRow {
  kind: 'former'
  coreId: string
  /** Between the flanges, one section. */
  windingWidthMm: number
  windingHeightMm: number
  sections: number
  /** Outside of the winding tube, on which the first turn lies. */
  tube: { shape: 'round'; diameterMm: number } | { shape: 'rectangular'; widthMm: number; depthMm: number; cornerRadiusMm: number }
  tubeWallMm: number
  flangeThicknessMm: number
  /** Mean length of turn of the full window; null: from the geometry. */
  meanTurnLengthMm: number | null
  pins: readonly { number: string; xMm: number; yMm: number }[]
  pinRowSpacingMm: number
  pinPitchMm: number
  pinSection: { shape: 'round' | 'square'; sizeMm: number }
  pinLengthMm: number
  standoffMm: number
  mounting: 'vertical' | 'horizontal'
  material: string
  plastic: 'thermoset' | 'thermoplastic'
  flammability: string
  /** Comparative tracking index group; `IIIb` when unknown. */
  materialGroup: 'I' | 'II' | 'IIIa' | 'IIIb'
  thermalClassC: number
  /** Outside of core and former together. */
  envelopeMm: { length: number; width: number; height: number }
}

/** P = Cm · f^x · B^y · (ct0 − ct1·T + ct2·T²), f in Hz, B peak in T, T in °C, P in W/m³. */
export interface LossFit {
  cm: number
  x: number
  y: number
  ct0: number
  ct1: number
  ct2: number
  minimumHz: number
  maximumHz: number
  /** Temperature and peak flux density at which the set was measured; left out where its source does not say. */
  minimumC?: number | null | undefined
  maximumC?: number | null | undefined
  minimumT?: number | null | undefined
  maximumT?: number | null | undefined
  source: string
  confidence: Confidence
}

export interface MaterialRow extends LibraryRow {
  kind: 'material'
  /** What it is for: `power`, `wideband`, `common-mode`, `powder`. */
  use: 'power' | 'wideband' | 'common-mode' | 'powder'
  initialPermeability: number
  permeabilityTolerance: number
  /** Points of saturation flux density over temperature, ascending. */
  saturation: readonly { temperatureC: number; fluxDensityT: number }[]
  /** Powder: share of the initial permeability left under a static field, ascending; left out where nothing is known. */
  biasPoints?: readonly { fieldAPerM: number; permeabilityShare: number }[] | undefined
  remanenceT: number | null
  curieC: number | null
  lossFits: readonly LossFit[]
  /** Published loss points, for checking the fit. */
  lossPoints: readonly { frequencyHz: number; fluxDensityT: number; temperatureC: number; lossWPerM3: number }[]
  densityKgPerM3: number
  frequencyRangeHz: { minimum: number; maximum: number } | null
}

export interface WireRow extends LibraryRow {
  kind: 'wire'
  form: 'round' | 'litz' | 'foil'
  standard: string
  /** `AWG 24`, `0.500 mm`, `60 × 0.10 mm`. */
  size: string
  /** Conductor: diameter of the wire or of one strand; thickness of a foil. */
  conductorMm: number
  conductorToleranceMm: number | null
  strands: number
  copperAreaMm2: number
  resistance20: { nominalOhmPerM: number; minimumOhmPerM: number | null; maximumOhmPerM: number | null }
  /** Largest overall diameter by insulation; null where the table has no value. */
  overallMm: {
    'enamel-grade-1': number | null
    'enamel-grade-2': number | null
    'enamel-grade-3': number | null
    'triple-insulated': number | null
    'fully-insulated': number | null
    bare: number | null
  }
  /** Foil only. */
  widthMm: number | null
}

export interface TapeRow extends LibraryRow {
  kind: 'tape'
  use: 'insulation' | 'margin'
  material: string
  thicknessMm: number
  /** Widths that are sold, mm; empty when slit to order. */
  widthsMm: readonly number[]
  thermalClassC: number
  /** Type-test voltage that one layer withstands; null where not known. */
  layerWithstandVRms: number | null
  materialGroup: 'I' | 'II' | 'IIIa' | 'IIIb'
}

export interface SleeveRow extends LibraryRow {
  kind: 'sleeve'
  material: string
  boreMm: number
  wallMm: number
  thermalClassC: number
  withstandVRms: number | null
}

export type AnyLibraryRow = CoreRow | FormerRow | MaterialRow | WireRow | TapeRow | SleeveRow

/** The rows that one evaluation may look at. A released document carries its own. */
export interface Library {
  cores: readonly CoreRow[]
  formers: readonly FormerRow[]
  materials: readonly MaterialRow[]
  wires: readonly WireRow[]
  tapes: readonly TapeRow[]
  sleeves: readonly SleeveRow[]
}
