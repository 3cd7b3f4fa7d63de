import { blankSpecification } from '#shared/engine/index'
import type { CoreRow, FormerRow, Library, MaterialRow, TapeRow, WireRow } from '#shared/engine/library'
import type { FlybackDuty, LibraryReference, Origin, RequirementSheet, SequenceStep, SpecificationDocument, Stated, Winding, WindingStep } from '#shared/engine/specification'

/** Building blocks for published examples entered as specifications: rows with the figures of the example and nothing else. */

const origin: Origin = { kind: 'entered' }
const stated = <T>(value: T): Stated<T> => ({ value, status: 'mandatory', origin })
const row = { version: 1, source: 'the example', edition: '', confidence: 'high' as const, unverified: [], note: '' }
const reference = (kind: LibraryReference['kind'], id: string): LibraryReference => ({ kind, id, version: 1 })

export interface ExampleCore {
  areaMm2: number
  lengthMm: number
  volumeMm3?: number
  legDiameterMm?: number
  legMm?: { width: number; depth: number }
  /** Half the window's height, dimension D. */
  halfWindowMm: number
  permeability?: number
}

export interface ExampleFormer {
  widthMm: number
  heightMm: number
  tubeDiameterMm: number
}

export interface ExampleWinding {
  id: string
  turns: number
  role?: Winding['role']
  outputId?: string
  wire?: string
  parallel?: number
  rmsA?: number
  dcA?: number
}

export interface Example {
  core: ExampleCore
  former?: ExampleFormer
  windings: ExampleWinding[]
  wires?: WireRow[]
  sequence?: SequenceStep[]
  tapes?: TapeRow[]
  inductanceH: number
  tolerance?: number
  duty?: FlybackDuty
  frequencyHz?: number
  ambientC?: number
  saturationCurrentA?: number
}

export const foil = (id: string, thicknessMm: number, widthMm: number): WireRow => ({
  ...row, kind: 'wire', id, name: id, form: 'foil', standard: '', size: '', conductorMm: thicknessMm, conductorToleranceMm: null, strands: 1,
  copperAreaMm2: thicknessMm * widthMm, resistance20: { nominalOhmPerM: 1 / (58 * thicknessMm * widthMm), minimumOhmPerM: null, maximumOhmPerM: null },
  overallMm: { 'enamel-grade-1': null, 'enamel-grade-2': null, 'enamel-grade-3': null, 'triple-insulated': null, 'fully-insulated': null, bare: thicknessMm }, widthMm,
})

export const roundWire = (id: string, conductorMm: number, overallMm: number, strands = 1): WireRow => {
  const copperAreaMm2 = (strands * Math.PI * conductorMm ** 2) / 4
  return {
    ...row, kind: 'wire', id, name: id, form: strands > 1 ? 'litz' : 'round', standard: '', size: '', conductorMm, conductorToleranceMm: null, strands, copperAreaMm2,
    resistance20: { nominalOhmPerM: 1 / (58 * copperAreaMm2), minimumOhmPerM: null, maximumOhmPerM: null },
    overallMm: { 'enamel-grade-1': overallMm, 'enamel-grade-2': null, 'enamel-grade-3': null, 'triple-insulated': null, 'fully-insulated': null, bare: conductorMm }, widthMm: null,
  }
}

export const tape = (id: string, thicknessMm: number): TapeRow => ({ ...row, kind: 'tape', id, name: id, use: 'insulation', material: 'film', thicknessMm, widthsMm: [], thermalClassC: 130, layerWithstandVRms: null, materialGroup: 'IIIa' })

export const turnsStep = (windingId: string, turns: number, marginMm = 0, interlayerTape: string | null = null): WindingStep => ({
  id: `s-${windingId}`, status: 'mandatory', origin, kind: 'winding', remark: '', windingId, startTerminal: '', finishTerminal: '', turns, section: 1, direction: 'clockwise',
  lay: 'close-wound', layers: null, marginLeftMm: marginMm, marginRightMm: marginMm, interlayerTape: interlayerTape ? reference('tape', interlayerTape) : null,
  leadExitStart: 'left', leadExitFinish: 'left', startSleeve: null, finishSleeve: null,
})

export const tapeStep = (id: string, layers: number): SequenceStep => ({ id: `t-${id}`, status: 'mandatory', origin, kind: 'tape', remark: '', tape: reference('tape', id), layers, widthMm: null, purpose: 'interwinding' })

/** A continuous-conduction flyback sheet; what the example does not state does not act. */
export const flybackDuty = (change: Partial<FlybackDuty> & Pick<FlybackDuty, 'supply' | 'outputs' | 'switchingFrequencyHz'>): FlybackDuty => ({
  topology: 'flyback', conduction: { kind: 'continuous', rippleRatio: 0.5 }, efficiency: 1, maximumDutyRatio: 0.5, reflectedVoltageV: null, switchDropV: 0,
  currentLimit: null, clampSpikeV: null, switchRatingV: null, ...change,
})

export const output = (id: string, voltageV: number, currentA: number, rectifierDropV = 0): FlybackDuty['outputs'][number] => ({ id, name: id, role: 'main', voltageV, rectifierDropV, fullLoadCurrentA: currentA, lightLoadCurrentA: 0, side: 'secondary' })

function libraryOf({ core, former, wires = [], tapes = [] }: Example): Library {
  const leg: CoreRow['centreLeg'] = core.legDiameterMm ? { shape: 'round', diameterMm: core.legDiameterMm } : core.legMm ? { shape: 'rectangular', widthMm: core.legMm.width, depthMm: core.legMm.depth } : null
  const coreRow: CoreRow = {
    ...row, kind: 'core', id: 'core', name: 'core', shape: 'other', standard: '', dimensionsMm: { a: null, b: null, c: null, d: core.halfWindowMm, e: null, f: null },
    effectiveAreaMm2: core.areaMm2, minimumAreaMm2: core.areaMm2, effectiveLengthMm: core.lengthMm, effectiveVolumeMm3: core.volumeMm3 ?? core.areaMm2 * core.lengthMm, massG: null, centreLeg: leg,
  }
  const material: MaterialRow = {
    ...row, kind: 'material', id: 'material', name: 'ferrite', use: 'power', initialPermeability: core.permeability ?? 2000, permeabilityTolerance: 0.25,
    saturation: [{ temperatureC: 25, fluxDensityT: 0.5 }, { temperatureC: 100, fluxDensityT: 0.39 }], remanenceT: null, curieC: null, lossFits: [], lossPoints: [], densityKgPerM3: 4800, frequencyRangeHz: null,
  }
  const formerRow: FormerRow | null = former ? {
    ...row, kind: 'former', id: 'former', name: 'former', coreId: 'core', windingWidthMm: former.widthMm, windingHeightMm: former.heightMm, sections: 1, tube: { shape: 'round', diameterMm: former.tubeDiameterMm },
    tubeWallMm: 1, flangeThicknessMm: 1, meanTurnLengthMm: null, pins: [], pinRowSpacingMm: 25, pinPitchMm: 5, pinSection: { shape: 'round', sizeMm: 0.8 }, pinLengthMm: 3.5, standoffMm: 0.5, mounting: 'horizontal',
    material: 'phenolic', plastic: 'thermoset', flammability: 'V-0', materialGroup: 'IIIa', thermalClassC: 155, envelopeMm: { length: 35, width: 35, height: 30 },
  } : null
  return { cores: [coreRow], formers: formerRow ? [formerRow] : [], materials: [material], wires, tapes, sleeves: [] }
}

/** The example as a document with the library that holds its parts. */
export function enter(example: Example): { document: SpecificationDocument; library: Library } {
  const specification = blankSpecification()
  const { duty, inductanceH, tolerance = 0 } = example
  specification.core.core = stated(reference('core', 'core'))
  specification.core.material = stated(reference('material', 'material'))
  if (example.former) specification.former.former = stated(reference('former', 'former'))
  specification.windings = example.windings.map((winding, index): Winding => ({
    id: winding.id, status: 'mandatory', origin, name: winding.id, role: winding.role ?? (index === 0 ? 'primary' : 'secondary'), side: index === 0 ? 'primary' : 'secondary', outputId: winding.outputId ?? null,
    startTerminal: '', finishTerminal: '', turns: winding.turns,
    wire: { wire: reference('wire', winding.wire ?? 'none'), parallel: winding.parallel ?? 1, thermalClassC: 155, insulation: 'enamel-grade-1', certificate: null, lay: null },
    rmsCurrentA: winding.rmsA ?? null, peakCurrentA: null, dcCurrentA: winding.dcA ?? null, dcResistance: null,
  }))
  specification.sequence = example.sequence ?? []
  const first = example.windings[0]!
  specification.electrical.topology = stated('flyback')
  specification.electrical.inductance = stated({ windingId: first.id, nominalH: inductanceH, lowerTolerance: -tolerance, upperTolerance: tolerance, frequencyHz: 10e3, levelV: 0.25, temperatureC: 25, model: 'series' })
  const frequencyHz = duty?.switchingFrequencyHz ?? example.frequencyHz
  if (frequencyHz !== undefined) specification.electrical.switchingFrequencyHz = stated({ minimum: frequencyHz, maximum: frequencyHz })
  if (example.ambientC !== undefined) specification.insulation.maximumAmbientC = stated(example.ambientC)
  if (example.saturationCurrentA !== undefined) specification.electrical.saturation = [{ id: 'x1', status: 'mandatory', origin, windingId: first.id, currentA: example.saturationCurrentA, temperatureC: 100, remainingShare: 0.9, method: 'pulse' }]
  const requirement: RequirementSheet | null = duty ? { duty, ambientC: example.ambientC ?? 40, permittedRiseK: null, fluxUtilisation: 0.8, targetCurrentDensityAPerMm2: 5, insulationMethod: 'functional', maximumHeightMm: null } : null
  return { document: { specification, requirement }, library: libraryOf(example) }
}
