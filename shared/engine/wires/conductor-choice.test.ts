import { describe, expect, it } from 'vitest'
import { conductorCandidates } from './conductor-choice'
import type { ConductorNeed, StockConductor } from './conductor-choice'

const round = (mm: number): StockConductor => ({ designation: `${mm}`, form: 'round', conductorMm: mm, overallMm: mm * 1.1, widthMm: null, strands: 1, copperAreaMm2: (Math.PI / 4) * mm ** 2 })
const litz = (strands: number, mm: number): StockConductor => ({ designation: `${strands}x${mm}`, form: 'litz', conductorMm: mm, overallMm: 1.28 * Math.sqrt(strands) * mm * 1.17, widthMm: null, strands, copperAreaMm2: strands * (Math.PI / 4) * mm ** 2 })
const foil = (mm: number, widthMm: number): StockConductor => ({ designation: `${mm}x${widthMm}`, form: 'foil', conductorMm: mm, overallMm: mm, widthMm, strands: 1, copperAreaMm2: mm * widthMm })

// 100 kHz, 100 °C: δ = 0.240 mm.
const need: ConductorNeed = {
  rmsCurrentA: 5, acShare: 0.8, currentDensityLimitAPerMm2: 5, frequencyHz: 100e3, temperatureC: 100, turns: 4, availableMm: 20, layers: 4, pinMm: 0.8,
  stock: [round(0.2), round(0.4), round(1.2), litz(300, 0.071), litz(60, 0.1), litz(1000, 0.071), foil(0.1, 18), foil(0.3, 18), foil(0.1, 25)],
}

const reasons = (change: Partial<ConductorNeed> = {}) => new Map(conductorCandidates({ ...need, ...change }).map(({ conductor, rejections }) => [conductor.designation, rejections]))

describe('conductorCandidates', () => {
  it('says against each conductor what keeps it from being used', () => {
    expect(Object.fromEntries(reasons())).toEqual({
      '0.2': ['needs-too-many-in-parallel'],
      '0.4': ['needs-too-many-in-parallel'],
      '1.2': ['thicker-than-skin-depth-limit', 'too-thick-for-pin'],
      '300x0.071': ['too-thick-for-pin'],
      '60x0.1': ['strand-thicker-than-third-of-skin-depth'],
      '1000x0.071': ['too-thick-for-pin'],
      '0.1x18': [],
      '0.3x18': ['foil-thicker-than-best'],
      '0.1x25': ['too-wide-for-window'],
    })
  })

  it('puts the proposal of the fewest layers first', () => {
    const [first] = conductorCandidates({ ...need, pinMm: null })
    expect(first).toMatchObject({ conductor: { designation: '300x0.071' }, parallel: 1, layersNeeded: 1, rejections: [] })
  })

  it('lets nearly direct current take thick wire', () => expect(reasons({ acShare: 0.1 }).get('1.2')).toEqual(['too-thick-for-pin']))

  it('counts a layer for each turn of foil', () => expect(reasons({ turns: 5 }).get('0.1x18')).toEqual(['does-not-fit-layers']))

  it('keeps the current density', () => {
    for (const { currentDensityAPerMm2 } of conductorCandidates(need)) expect(currentDensityAPerMm2).toBeLessThanOrEqual(5 * (1 + 1e-9))
  })

  it('refuses an empty stock', () => expect(() => conductorCandidates({ ...need, stock: [] })).toThrow(/stock/))
})
