import { describe, expect, it } from 'vitest'
import { foilResistanceOhmPerM, foilWidthMm } from './foil'
import { layLengthFactor, litzFigures } from './litz'

describe('litzFigures', () => {
  const construct = { stages: [12, 5], strandConductorMm: 0.1, strandOverallMm: 0.117, servingMm: 0.035, layLengthMm: null }

  it('counts the strands of all stages and adds the serving', () => {
    const figures = litzFigures(construct)
    expect(figures.strands).toBe(60)
    // IEC 60317-11: 1.28 · √60 · 0.117 mm and two thicknesses of serving.
    expect(figures.overallMm).toBeCloseTo(1.28 * Math.sqrt(60) * 0.117 + 0.07, 9)
    expect(figures.copperAreaMm2).toBeCloseTo(60 * 0.00785398, 6)
    expect(figures.resistanceOhmPerM).toBeCloseTo((1.02 * 2.1765) / 60, 5)
  })

  it('takes a rope of more strands than the standard lists looser', () => {
    expect(litzFigures({ ...construct, stages: [20, 5, 5], servingMm: 0 }).overallMm).toBeCloseTo(1.35 * Math.sqrt(500) * 0.117, 9)
  })

  it('refuses two strands', () => expect(() => litzFigures({ ...construct, stages: [2] })).toThrow(/stages/))
})

describe('layLengthFactor', () => {
  // By Simpson's rule over the section: mean of √(1 + (2πr/lay)²) weighted with r.
  it.each([5, 11, 20])('is the mean length of helices for a lay of %d diameters', (lay) => {
    const steps = 200
    let sum = 0
    for (let index = 0; index < steps; index++) {
      const r = ((index + 0.5) / steps) * 0.5
      sum += 8 * r * Math.sqrt(1 + ((2 * Math.PI * r) / lay) ** 2) * (0.5 / steps)
    }
    expect(layLengthFactor({ bundleMm: 1, layLengthMm: lay })).toBeCloseTo(sum, 5)
  })
  it('gives the usual two percent at eleven diameters', () => expect(layLengthFactor({ bundleMm: 1, layLengthMm: 11 })).toBeCloseTo(1.02, 3))
})

describe('foil', () => {
  it('stays off both flanges', () => expect(foilWidthMm({ availableMm: 20 })).toBeCloseTo(19.6, 12))
  it('has nothing left in a narrow window', () => expect(foilWidthMm({ availableMm: 0.3 })).toBe(0))
  it('has the resistance of its section', () => expect(foilResistanceOhmPerM({ thicknessMm: 0.1, widthMm: 20 })).toBeCloseTo(1 / 58 / 2, 12))
})
