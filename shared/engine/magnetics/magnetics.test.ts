import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { effectiveParameters, ePairSections, roundLegPairSections, toroidEffectiveParameters } from './effective-parameters'
import { fluxDensitySwingT, peakFluxDensityT, saturationFluxDensityT, turnsForFlux } from './flux'
import { fringingFactor, gapForInductance, gappedInductanceH, inductanceSpread } from './gap'
import type { FringingModel, GappedCore } from './gap'
import { effectivePermeability, inductanceFactorH, inductanceFactorOfPathH, inductanceFromFactorH, turnsForInductance } from './inductance'

const core: GappedCore = {
  effectiveAreaMm2: 100, effectiveLengthMm: 80, permeability: 2000, windingLengthMm: 20, legDiameterMm: 11, fringing: 'none',
}
const models: FringingModel[] = ['none', 'mclyman-gap', 'mclyman-path', 'dixon-round-leg']

describe('effectiveParameters', () => {
  it('is the path itself where the section is uniform', () => {
    expect(effectiveParameters([{ lengthMm: 30, areaMm2: 20 }, { lengthMm: 70, areaMm2: 20 }])).toMatchObject({ lengthMm: 100, areaMm2: 20, volumeMm3: 2000 })
  })

  it('approaches the mean path for a thin ring', () => {
    const ring = toroidEffectiveParameters({ outerDiameterMm: 101, innerDiameterMm: 99, heightMm: 5 })
    expect(ring.lengthMm).toBeCloseTo(Math.PI * 100, 1)
    expect(ring.areaMm2).toBeCloseTo(5, 3)
  })

  it.each([
    { name: 'no section', run: () => effectiveParameters([]) },
    { name: 'a window wider than the core', run: () => ePairSections({ aMm: 20, bMm: 10, cMm: 5, dMm: 6, eMm: 21, fMm: 5 }) },
    { name: 'a depth beyond the hollow', run: () => roundLegPairSections({ aMm: 40, bMm: 20, cMm: 31, dMm: 14, eMm: 30, fMm: 12 }) },
    { name: 'a hole wider than the ring', run: () => toroidEffectiveParameters({ outerDiameterMm: 10, innerDiameterMm: 11, heightMm: 5 }) },
  ])('refuses $name', ({ run }) => expect(run).toThrow(RangeError))
})

describe('inductance factor', () => {
  it('goes there and back', () => {
    const factorH = inductanceFactorOfPathH({ areaMm2: 97.1, lengthMm: 78.6, permeability: 1670 })
    expect(effectivePermeability({ areaMm2: 97.1, lengthMm: 78.6, inductanceFactorH: factorH })).toBeCloseTo(1670, 9)
    expect(inductanceFactorH({ inductanceH: inductanceFromFactorH({ inductanceFactorH: factorH, turns: 30 }), turns: 30 })).toBeCloseTo(factorH, 15)
    expect(turnsForInductance({ inductanceH: 400e-6, inductanceFactorH: 250e-9 })).toBeCloseTo(40, 9)
  })
})

describe('gap', () => {
  it.each(models)('inverts the inductance in the model %s', (fringing) => {
    fc.assert(
      fc.property(fc.double({ min: 0.02, max: 4, noNaN: true }), fc.integer({ min: 3, max: 100 }), (gapMm, turns) => {
        const solution = gapForInductance({ ...core, fringing }, gappedInductanceH({ ...core, fringing }, gapMm, turns), turns)
        expect(solution).toMatchObject({ state: 'found', model: fringing })
        expect(solution.state === 'found' && solution.gapMm).toBeCloseTo(gapMm, 6)
      }),
    )
  })

  it('needs a longer gap with fringing than without', () => {
    const gaps = models.map((fringing) => gapForInductance({ ...core, fringing }, 400e-6, 50)).map((s) => (s.state === 'found' ? s.gapMm : 0))
    expect(Math.min(...gaps)).toBe(gaps[0])
    expect(fringingFactor({ ...core, fringing: 'mclyman-gap' }, 0)).toBe(1)
  })

  it('says when the core alone has too little inductance, or no gap is long enough', () => {
    expect(gapForInductance(core, 1, 10).state).toBe('ungapped-too-low')
    expect(gapForInductance(core, 1e-9, 10).state).toBe('gap-too-long')
  })

  it('widens the spread with both tolerances', () => {
    const gapOnly = inductanceSpread(core, 50, { gapMm: 0.5, gapToleranceMm: 0.03 })
    const both = inductanceSpread(core, 50, { gapMm: 0.5, gapToleranceMm: 0.03, permeabilityToleranceFraction: 0.25 })
    expect(gapOnly.lowestFraction).toBeLessThan(0)
    expect(both.lowestH).toBeLessThan(gapOnly.lowestH)
    expect(both.highestH).toBeGreaterThan(gapOnly.highestH)
  })

  it('refuses a model without its dimension', () => {
    expect(() => fringingFactor({ ...core, fringing: 'mclyman-gap', windingLengthMm: undefined }, 0.5)).toThrow(/windingLengthMm/)
    expect(() => fringingFactor({ ...core, fringing: 'dixon-round-leg', legDiameterMm: undefined }, 0.5)).toThrow(/legDiameterMm/)
  })
})

describe('flux', () => {
  it('agrees between current and volt-seconds', () => {
    expect(peakFluxDensityT({ inductanceH: 600e-6, currentA: 1.2, turns: 60, areaMm2: 52 })).toBeCloseTo(0.230769, 6)
    expect(fluxDensitySwingT({ fluxSwingWb: (600e-6 * 1.2) / 60, areaMm2: 52 })).toBeCloseTo(0.230769, 6)
    expect(turnsForFlux({ inductanceH: 600e-6, currentA: 1.2, fluxDensityT: 0.25, areaMm2: 52 })).toBeCloseTo(55.384615, 6)
  })

  const points = [{ temperatureC: 100, fluxDensityT: 0.39 }, { temperatureC: 25, fluxDensityT: 0.51 }]
  it('interpolates saturation and does not extend it', () => {
    const at80 = saturationFluxDensityT(points, 80)
    expect(at80.state === 'known' && at80.value).toBeCloseTo(0.422, 12)
    expect(saturationFluxDensityT(points, 110)).toMatchObject({ state: 'not-checkable', reason: 'past-last-row' })
  })
})
