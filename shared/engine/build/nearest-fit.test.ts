import { describe, expect, it } from 'vitest'
import type { FormerRow, TapeRow } from '../library'
import type { SequenceStep, Winding, WindingStep } from '../specification'
import { layOutCoil, nearestFit } from './index'
import type { BuildWire, NearestFitInput } from './index'

const entered = { status: 'mandatory' as const, origin: { kind: 'entered' as const } }
const row = { version: 1, source: 'test', edition: '', confidence: 'high' as const, unverified: [], note: '' }

const tape: TapeRow = { ...row, kind: 'tape', id: 'tape', name: 'film', use: 'insulation', material: 'polyester film', thicknessMm: 0.06, widthsMm: [], thermalClassC: 130, layerWithstandVRms: null, materialGroup: 'IIIa' }

const former = (windingHeightMm: number): FormerRow => ({
  ...row, kind: 'former', id: 'former', name: 'former', coreId: 'core', windingWidthMm: 20, windingHeightMm, sections: 1, tube: { shape: 'round', diameterMm: 13 },
  tubeWallMm: 1, flangeThicknessMm: 1, meanTurnLengthMm: null, pins: [], pinRowSpacingMm: 25, pinPitchMm: 5, pinSection: { shape: 'round', sizeMm: 0.8 }, pinLengthMm: 3.5,
  standoffMm: 0.5, mounting: 'horizontal', material: 'phenolic', plastic: 'thermoset', flammability: 'V-0', materialGroup: 'IIIa', thermalClassC: 155, envelopeMm: { length: 36, width: 36, height: 30 },
})

const winding = (id: string, parallel: number): Winding => ({
  ...entered, id, name: id.toUpperCase(), role: 'primary', side: 'primary', outputId: null, startTerminal: '1', finishTerminal: '2', turns: 10,
  wire: { wire: { kind: 'wire', id, version: 1 }, parallel, thermalClassC: 155, insulation: 'enamel-grade-1', certificate: null, lay: null },
  rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null,
})

const turnsOf = (windingId: string, turns: number): WindingStep => ({
  ...entered, id: `s-${windingId}`, kind: 'winding', remark: '', windingId, startTerminal: '1', finishTerminal: '2', turns, section: 1, direction: 'clockwise', lay: 'close-wound',
  layers: null, marginLeftMm: 0, marginRightMm: 0, interlayerTape: null, leadExitStart: 'left', leadExitFinish: 'left', startSleeve: null, finishSleeve: null,
})

const tapes = (layers: number, purpose: 'interwinding' | 'outer'): SequenceStep => ({ ...entered, id: `t-${purpose}`, kind: 'tape', remark: '', tape: { kind: 'tape', id: 'tape', version: 1 }, layers, widthMm: null, purpose })

const wire = (overallMm: number): BuildWire => ({ form: 'round', overallMm, conductorMm: overallMm * 0.9, copperAreaMm2: (Math.PI / 4) * (overallMm * 0.9) ** 2, widthMm: null })

const input = (windingHeightMm: number, sequence: SequenceStep[], change: Partial<NearestFitInput> = {}): NearestFitInput => ({
  former: former(windingHeightMm), windings: [winding('p', 1)], sequence, wireOf: () => wire(0.5), tapeOf: () => tape, thinnerWires: () => [{ name: '0.45', wire: wire(0.45) }, { name: '0.40', wire: wire(0.4) }], ...change,
})

const fit = (one: NearestFitInput) => nearestFit(one, layOutCoil(one))

describe('nearestFit', () => {
  it('leaves out the few turns of a last layer', () => {
    // 39 turns a layer: 80 turns leave two in a third layer of 0.55 mm with the bulge.
    expect(fit(input(1.2, [turnsOf('p', 80)]))).toMatchObject({ change: 'turns', index: 0, from: 80, to: 78 })
  })

  it('takes a layer of outer tape where that is enough, before any insulation between windings', () => {
    const one = input(1.29, [turnsOf('p', 39), tapes(3, 'interwinding'), turnsOf('p', 1), tapes(2, 'outer')], { thinnerWires: () => [] })
    expect(fit(one)).toBeNull()
    expect(fit(input(1.38, one.sequence as SequenceStep[], { thinnerWires: () => [] }))).toMatchObject({ change: 'tape-layers', index: 3, from: 2, to: 1 })
  })

  it('takes the thickest of the thinner wires that fits, and the build says so', () => {
    const found = fit(input(1.05, [turnsOf('p', 60)]))!
    expect(found).toMatchObject({ change: 'wire', windingId: 'p', to: '0.45' })
    expect(found.buildMm).toBeLessThanOrEqual(1.05)
  })

  it('takes a wire less in parallel where no wire is thinner', () => {
    expect(fit(input(1.2, [turnsOf('p', 30)], { windings: [winding('p', 3)], thinnerWires: () => [] }))).toMatchObject({ change: 'parallel', from: 3, to: 2 })
  })

  it('finds none where everything is far too much', () => expect(fit(input(0.5, [turnsOf('p', 300)]))).toBeNull())
})
