import type { SleeveRow, TapeRow } from '#shared/engine/library'

/** Thicknesses are those of common constructions; none is a maker's figure, so each is to be replaced. */
const GENERIC = {
  version: 1,
  source: 'Common construction, no maker’s figure',
  edition: 'None',
  confidence: 'generic',
} as const

const REPLACE = 'Generic, unverified, replace before release.'

const tape = (id: string, name: string, use: TapeRow['use'], material: string, thicknessMm: number, thermalClassC: number, note: string, widthsMm: readonly number[] = []): TapeRow => ({
  ...GENERIC,
  kind: 'tape',
  id,
  name,
  unverified: ['thicknessMm', 'thermalClassC', 'layerWithstandVRms', 'materialGroup', ...(widthsMm.length > 0 ? ['widthsMm'] : [])],
  note: `${REPLACE} ${note}`,
  use,
  material,
  thicknessMm,
  widthsMm,
  thermalClassC,
  layerWithstandVRms: null,
  materialGroup: 'IIIb',
})

const MARGIN_WIDTHS_MM = [1.5, 2, 2.5, 3, 3.2, 4, 5, 6, 6.4, 8] as const

/** Insulation tapes are slit to order; margin tapes are sold in a few widths. */
export function shippedTapes(): TapeRow[] {
  return [
    tape('polyester-0.055', 'Polyester film tape 0.055 mm', 'insulation', 'polyester film, acrylic adhesive', 0.055, 130, '0.025 mm film with adhesive.'),
    tape('polyester-0.065', 'Polyester film tape 0.065 mm', 'insulation', 'polyester film, acrylic adhesive', 0.065, 130, '0.025 mm film with thick adhesive.'),
    tape('polyester-0.080', 'Polyester film tape 0.080 mm', 'insulation', 'polyester film, acrylic adhesive', 0.08, 130, '0.050 mm film with adhesive.'),
    tape('polyimide-0.065', 'Polyimide film tape 0.065 mm', 'insulation', 'polyimide film, silicone adhesive', 0.065, 180, '0.025 mm film with adhesive.'),
    tape('aramid-0.130', 'Aramid paper tape 0.130 mm', 'insulation', 'aramid paper, acrylic adhesive', 0.13, 155, '0.08 mm paper with adhesive.'),
    tape('margin-polyester-0.165', 'Margin tape, polyester mat 0.165 mm', 'margin', 'polyester film and mat, acrylic adhesive', 0.165, 130, 'Wound up to the height of the winding.', MARGIN_WIDTHS_MM),
    tape('margin-polyester-0.250', 'Margin tape, polyester mat 0.250 mm', 'margin', 'polyester film and mat, acrylic adhesive', 0.25, 130, 'Wound up to the height of the winding.', MARGIN_WIDTHS_MM),
    tape('margin-aramid-0.250', 'Margin tape, aramid 0.250 mm', 'margin', 'aramid paper, acrylic adhesive', 0.25, 155, 'Wound up to the height of the winding.', MARGIN_WIDTHS_MM),
  ]
}

const sleeve = (id: string, name: string, material: string, boreMm: number, wallMm: number, thermalClassC: number, note: string): SleeveRow => ({
  ...GENERIC,
  kind: 'sleeve',
  id,
  name,
  unverified: ['boreMm', 'wallMm', 'thermalClassC', 'withstandVRms'],
  note: `${REPLACE} ${note}`.trim(),
  material,
  boreMm,
  wallMm,
  thermalClassC,
  withstandVRms: null,
})

const BORES_MM = [0.5, 0.8, 1, 1.5, 2, 3] as const
const bore = (boreMm: number) => boreMm.toFixed(1)

/** Insulation sleeves for leads; bores by the wire that goes through. */
export function shippedSleeves(): SleeveRow[] {
  return BORES_MM.flatMap((boreMm) => [
    sleeve(`ptfe-${bore(boreMm)}`, `PTFE sleeve, bore ${bore(boreMm)} mm`, 'PTFE', boreMm, 0.25, 250, 'PTFE is a PFAS: declare it.'),
    sleeve(`polyolefin-${bore(boreMm)}`, `Polyolefin heat-shrink sleeve, bore ${bore(boreMm)} mm`, 'cross-linked polyolefin', boreMm, 0.4, 105, 'Bore and wall after shrinking.'),
    sleeve(`silicone-glass-${bore(boreMm)}`, `Silicone-coated glass sleeve, bore ${bore(boreMm)} mm`, 'glass braid, silicone coating', boreMm, 0.4, 180, ''),
  ])
}
