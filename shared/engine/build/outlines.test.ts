import { describe, expect, it } from 'vitest'
import type { FormerRow, SleeveRow } from '../library'
import type { SequenceStep, Winding, WindingStep } from '../specification'
import { layOutCoil } from './index'

const entered = { status: 'mandatory' as const, origin: { kind: 'entered' as const } }
const row = { version: 1, source: 'test', edition: '', confidence: 'high' as const, unverified: [], note: '' }

const former = (change: Partial<FormerRow> = {}): FormerRow => ({
  ...row, kind: 'former', id: 'former', name: 'former', coreId: 'core', windingWidthMm: 10, windingHeightMm: 3, sections: 1, tube: { shape: 'round', diameterMm: 13 },
  tubeWallMm: 1, flangeThicknessMm: 1, meanTurnLengthMm: null, pins: [], pinRowSpacingMm: 25, pinPitchMm: 5, pinSection: { shape: 'round', sizeMm: 0.8 }, pinLengthMm: 3.5,
  standoffMm: 0.5, mounting: 'horizontal', material: 'phenolic', plastic: 'thermoset', flammability: 'V-0', materialGroup: 'IIIa', thermalClassC: 155, envelopeMm: { length: 36, width: 36, height: 30 }, ...change,
})

const winding: Winding = {
  ...entered, id: 'p', name: 'P', role: 'primary', side: 'primary', outputId: null, startTerminal: '1', finishTerminal: '2', turns: 10,
  wire: { wire: { kind: 'wire', id: 'w', version: 1 }, parallel: 1, thermalClassC: 155, insulation: 'enamel-grade-1', certificate: null, lay: null },
  rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null,
}

const sleeveRow: SleeveRow = { ...row, kind: 'sleeve', id: 's', name: 'sleeve', material: 'PTFE', boreMm: 0.8, wallMm: 0.25, thermalClassC: 200, withstandVRms: null }
const sleeve = { sleeve: { kind: 'sleeve' as const, id: 's', version: 1 }, lengthMm: 20, intoWindingMm: 2 }

const step = (change: Partial<WindingStep> = {}): WindingStep => ({
  ...entered, id: 's1', kind: 'winding', remark: '', windingId: 'p', startTerminal: '1', finishTerminal: '2', turns: 10, section: 1, direction: 'clockwise', lay: 'close-wound',
  layers: null, marginLeftMm: 0, marginRightMm: 0, interlayerTape: null, leadExitStart: 'left', leadExitFinish: 'left', startSleeve: null, finishSleeve: null, ...change,
})

const layOut = (sequence: SequenceStep[], change: Partial<FormerRow> = {}) =>
  layOutCoil({ former: former(change), windings: [winding], sequence, wireOf: () => ({ form: 'round', overallMm: 0.5, conductorMm: 0.45, copperAreaMm2: 0.16, widthMm: null }), tapeOf: () => null, sleeveOf: () => sleeveRow })

describe('outlines', () => {
  it('lead the finish of a single layer back over the turns to the flange where the start leaves', () => {
    // Ten turns of 0.5 mm end at 5.5 mm, half a turn past the last one's middle.
    expect(layOut([step()]).layout.outlines).toEqual([{ kind: 'lead-crossing', stepId: 's1', xMm: 0, yMm: 0.5, widthMm: 5.25, heightMm: 0.5 }])
    expect(layOut([step({ turns: 19, leadExitFinish: 'right' })]).layout.outlines).toEqual([])
  })

  it('put a sleeve of its own thickness over the lead', () => {
    const [crossing, sleeved] = layOut([step({ finishSleeve: sleeve })]).layout.outlines!
    expect(crossing).toMatchObject({ kind: 'lead-crossing', heightMm: 1.3 })
    expect(sleeved).toEqual({ kind: 'lead-sleeve', stepId: 's1', xMm: 0, yMm: 0.5, widthMm: 7.25, heightMm: 1.3 })
  })

  it('end a sleeve at the far flange, however far it reaches along the turn', () => {
    const sleeved = layOut([step({ turns: 19, finishSleeve: sleeve })]).layout.outlines!.find(({ kind }) => kind === 'lead-sleeve')
    expect(sleeved).toMatchObject({ xMm: 0, widthMm: 10 })
  })

  it('stand walls between the sections of a former', () => {
    expect(layOut([step(), step({ id: 's2', section: 2 })], { sections: 3 }).layout.outlines!.filter(({ kind }) => kind === 'section-wall').map(({ xMm, widthMm, heightMm }) => [xMm, widthMm, heightMm])).toEqual([[10, 1, 3], [21, 1, 3]])
  })

  it('lay the overlap of a shield upon it', () => {
    const shield: SequenceStep = { ...entered, id: 'sh', kind: 'shield', remark: '', windingId: 'p', form: 'foil', thicknessMm: 0.05, widthMm: 8, overlapMm: 5, overlapInsulation: 'tape', connectedTerminal: '1' }
    expect(layOut([shield]).layout.outlines).toEqual([{ kind: 'shield-overlap', stepId: 'sh', xMm: 1, yMm: 0.05, widthMm: 8, heightMm: 0.05 }])
  })

  it('say where a sleeved crossing stands out of the window', () => {
    const low = layOut([step({ finishSleeve: sleeve })], { windingHeightMm: 1.5 })
    expect(low.findings).toMatchObject([{ code: 'lead-crossing-too-high', severity: 'warning', path: 'sequence.0' }])
    expect(low.findings[0]!.values.overMm).toBeCloseTo(0.3, 9)
    expect(layOut([step({ finishSleeve: sleeve })]).findings).toEqual([])
  })
})
