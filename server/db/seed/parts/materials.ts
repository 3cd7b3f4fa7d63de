import { genericPowderBias } from '#shared/engine/magnetics/bias'
import type { LossFit, MaterialRow } from '#shared/engine/library'

/**
 * Classes of magnetic material. A class row holds typical values of its class; a maker's grade named in `source`
 * says where a fit or a point was published, and is not a promise about another maker's grade.
 */
export function shippedMaterials(): MaterialRow[] {
  return [...POWER, ...COMMON_MODE, ...POWDER]
}

const FIT_SOURCE = 'Ferroxcube, Design of planar power transformers, loss fit parameters'
const CLASS_NOTE = 'Typical values of a class, no limits: name the grade and its maker’s values before release.'
const KW = 1e3

/** The brochure gives mW/cm³, which is kW/m³. */
const fit = (grade: string, kHz: readonly [number, number], cmKw: number, x: number, y: number, ct: readonly [number, number, number]): LossFit => ({
  cm: cmKw * KW,
  x,
  y,
  ct0: ct[0],
  ct1: ct[1],
  ct2: ct[2],
  minimumHz: kHz[0] * 1e3,
  maximumHz: kHz[1] * 1e3,
  source: `${FIT_SOURCE}, ${grade}`,
  confidence: 'high',
})

const point = (kHz: number, mT: number, temperatureC: number, kwPerM3: number) => ({
  frequencyHz: kHz * 1e3,
  fluxDensityT: mT / 1e3,
  temperatureC,
  lossWPerM3: kwPerM3 * KW,
})

const saturation = (...points: readonly (readonly [temperatureC: number, mT: number])[]) =>
  points.map(([temperatureC, mT]) => ({ temperatureC, fluxDensityT: mT / 1e3 }))

const ferrite = { kind: 'material', version: 1, permeabilityTolerance: 0.25, densityKgPerM3: 4800, unverified: [] } as const

const CATALOGUES = 'TDK, Ferrite Cores catalogue; Magnetics, Ferrite Cores catalogue'
const CATALOGUE_EDITIONS = '1998; 2013'

const POWER: readonly MaterialRow[] = [
  {
    ...ferrite,
    id: 'mnzn-25-100khz',
    name: 'MnZn power ferrite, standard 25–100 kHz',
    source: 'Class values rounded from published grades of the N27 type; loss limit per set from TDK, ETD34/17/11 data sheet',
    edition: 'Data sheet October 2022',
    confidence: 'low',
    unverified: ['lossFits'],
    note: `${CLASS_NOTE} No loss fit is shipped for this class. The loss point is a limit per set divided by Ve.`,
    use: 'power',
    initialPermeability: 2000,
    saturation: saturation([25, 500], [100, 400]),
    remanenceT: null,
    curieC: 220,
    lossFits: [],
    lossPoints: [point(25, 200, 100, 194)],
    frequencyRangeHz: { minimum: 25e3, maximum: 100e3 },
  },
  {
    ...ferrite,
    id: 'mnzn-100khz',
    name: 'MnZn power ferrite, standard 100 kHz',
    source: `Saturation and Curie temperature: ${CATALOGUES} (PC40, P). Loss: ${FIT_SOURCE} (3C90)`,
    edition: `${CATALOGUE_EDITIONS}; brochure without date`,
    confidence: 'medium',
    note: `${CLASS_NOTE} The fit lies above later grades of this class at 0.2 T. Loss points are limits per set (ETD29, 3C90) divided by Ve.`,
    use: 'power',
    initialPermeability: 2300,
    saturation: saturation([25, 510], [60, 450], [100, 390], [120, 350]),
    remanenceT: 0.16,
    curieC: 215,
    lossFits: [fit('3C90', [20, 200], 3.2e-3, 1.46, 2.75, [2.45, 3.1e-2, 1.65e-4])],
    lossPoints: [point(25, 200, 100, 121), point(100, 100, 100, 126)],
    frequencyRangeHz: { minimum: 20e3, maximum: 200e3 },
  },
  {
    ...ferrite,
    id: 'mnzn-100khz-low-loss',
    name: 'MnZn power ferrite, low-loss 100 kHz',
    source: `Saturation and Curie temperature: ${CATALOGUES} (PC44, R). Loss: ${FIT_SOURCE} (3C94)`,
    edition: `${CATALOGUE_EDITIONS}; brochure without date`,
    confidence: 'medium',
    note: `${CLASS_NOTE} Loss points are limits per set (ETD29, 3C94) divided by Ve.`,
    use: 'power',
    initialPermeability: 2300,
    saturation: saturation([25, 510], [60, 450], [100, 390], [120, 350]),
    remanenceT: 0.16,
    curieC: 210,
    lossFits: [
      fit('3C94', [20, 200], 2.37e-3, 1.46, 2.75, [2.45, 3.1e-2, 1.65e-4]),
      fit('3C94', [200, 400], 2e-9, 2.6, 2.75, [2.45, 3.1e-2, 1.65e-4]),
    ],
    lossPoints: [point(100, 100, 100, 91), point(100, 200, 100, 548)],
    frequencyRangeHz: { minimum: 20e3, maximum: 400e3 },
  },
  {
    ...ferrite,
    id: 'mnzn-flat-temperature',
    name: 'MnZn power ferrite, flat loss over temperature',
    source: 'Class values rounded from published grades of the 3C95 type; loss limits per set from Ferroxcube, ETD29 data sheet',
    edition: 'Not stated',
    confidence: 'low',
    unverified: ['lossFits'],
    note: `${CLASS_NOTE} No loss fit is shipped for this class. Loss points are limits per set (ETD29, 3C95) divided by Ve.`,
    use: 'power',
    initialPermeability: 3000,
    saturation: saturation([25, 530], [100, 410]),
    remanenceT: null,
    curieC: 215,
    lossFits: [],
    lossPoints: [point(100, 200, 25, 590), point(100, 200, 100, 559)],
    frequencyRangeHz: null,
  },
  {
    ...ferrite,
    id: 'mnzn-500khz',
    name: 'MnZn power ferrite, 500 kHz',
    source: `Saturation and Curie temperature: TDK, Ferrite Cores catalogue (PC50). Loss: ${FIT_SOURCE} (3F3)`,
    edition: '1998; brochure without date',
    confidence: 'medium',
    note: `${CLASS_NOTE} Loss points are limits per set (ETD29, 3F3) divided by Ve.`,
    use: 'power',
    initialPermeability: 1450,
    saturation: saturation([25, 470], [60, 440], [100, 380]),
    remanenceT: 0.15,
    curieC: 240,
    lossFits: [
      fit('3F3', [100, 300], 0.25e-3, 1.63, 2.45, [1.26, 1.05e-2, 0.79e-4]),
      fit('3F3', [300, 500], 2e-5, 1.8, 2.5, [1.28, 1.05e-2, 0.77e-4]),
      fit('3F3', [500, 1000], 3.6e-9, 2.4, 2.25, [1.14, 0.81e-2, 0.67e-4]),
    ],
    lossPoints: [point(100, 100, 100, 119), point(400, 50, 100, 201)],
    frequencyRangeHz: { minimum: 100e3, maximum: 1000e3 },
  },
  {
    ...ferrite,
    id: 'mnzn-1-3mhz',
    name: 'MnZn power ferrite, 1–3 MHz',
    source: `Class values rounded from published grades. Loss: ${FIT_SOURCE} (3F4)`,
    edition: 'Brochure without date',
    confidence: 'medium',
    note: `${CLASS_NOTE} Factor of the 500–1000 kHz fit is printed ten times too large; 1.2e-4 reproduces the brochure’s own example.`,
    use: 'power',
    initialPermeability: 900,
    saturation: saturation([25, 410], [100, 350]),
    remanenceT: null,
    curieC: 220,
    lossFits: [
      fit('3F4', [500, 1000], 1.2e-4, 1.75, 2.9, [1.15, 1.1e-2, 0.95e-4]),
      fit('3F4', [1000, 3000], 1.1e-11, 2.8, 2.4, [0.67, 0.01e-2, 0.34e-4]),
    ],
    lossPoints: [point(530, 100, 100, 1580)],
    frequencyRangeHz: { minimum: 500e3, maximum: 3000e3 },
  },
]

const COMMON_MODE: readonly MaterialRow[] = [
  {
    ...ferrite,
    id: 'mnzn-5000',
    name: 'MnZn ferrite, wideband and common mode, µi 5000',
    source: 'Magnetics, Ferrite Cores catalogue (J)',
    edition: '2013, page 3',
    confidence: 'medium',
    note: `${CLASS_NOTE} Not for power: no loss data.`,
    use: 'common-mode',
    initialPermeability: 5000,
    permeabilityTolerance: 0.2,
    saturation: saturation([25, 430]),
    remanenceT: 0.1,
    curieC: 145,
    lossFits: [],
    lossPoints: [],
    frequencyRangeHz: null,
  },
  {
    ...ferrite,
    id: 'mnzn-10000',
    name: 'MnZn ferrite, common mode, µi 10000',
    source: 'Magnetics, Ferrite Cores catalogue (W)',
    edition: '2013, page 3',
    confidence: 'medium',
    note: `${CLASS_NOTE} Not for power: no loss data.`,
    use: 'common-mode',
    initialPermeability: 10000,
    permeabilityTolerance: 0.3,
    saturation: saturation([25, 390]),
    remanenceT: 0.08,
    curieC: 135,
    densityKgPerM3: 4900,
    lossFits: [],
    lossPoints: [],
    frequencyRangeHz: null,
  },
]

const powder = (id: string, name: string, initialPermeability: number, saturationMT: number, read: 'read' | 'recalled', note: string): MaterialRow => ({
  kind: 'material',
  id,
  version: 1,
  name,
  source: read === 'read' ? 'Maker’s catalogue, saturation flux density of the alloy' : 'Handbook value of the alloy, recalled',
  edition: 'Not stated',
  confidence: read === 'read' ? 'medium' : 'low',
  unverified: ['densityKgPerM3', 'permeabilityTolerance', 'lossFits', 'biasPoints'],
  note: `${note} The bias curve is a generic one, reckoned from saturation and permeability; loss data are not shipped: name the grade and its maker’s values before release.`,
  use: 'powder',
  initialPermeability,
  permeabilityTolerance: 0.08,
  saturation: saturation([25, saturationMT]),
  biasPoints: genericPowderBias({ saturationT: saturationMT / 1e3, permeability: initialPermeability }),
  remanenceT: null,
  curieC: null,
  lossFits: [],
  lossPoints: [],
  densityKgPerM3: POWDER_DENSITY_KG_PER_M3,
  frequencyRangeHz: null,
})

/** About the same for all pressed metal powders; only used for mass. */
const POWDER_DENSITY_KG_PER_M3 = 6500

const POWDER: readonly MaterialRow[] = [
  powder('powder-fesial-60', 'FeSiAl powder, µ 60', 60, 1050, 'read', 'Sold in permeabilities 14…125.'),
  powder('powder-fesial-125', 'FeSiAl powder, µ 125', 125, 1050, 'read', 'Sold in permeabilities 14…125.'),
  powder('powder-nifemo-125', 'NiFeMo powder, µ 125', 125, 750, 'recalled', 'Sold in permeabilities 14…550.'),
  powder('powder-nife-60', 'NiFe 50/50 powder, µ 60', 60, 1500, 'recalled', 'Sold in permeabilities 14…160.'),
  powder('powder-fesi-60', 'FeSi 6.5 % powder, µ 60', 60, 1600, 'recalled', 'Sold in permeabilities 26…90.'),
]
