import { effectiveParameters, ePairSections, roundLegPairSections, toroidEffectiveParameters } from '#shared/engine/magnetics/effective-parameters'
import { peakFluxDensityT } from '#shared/engine/magnetics/flux'
import { fringingFactor, gapForInductance, gappedInductanceFactorH, inductanceSpread } from '#shared/engine/magnetics/gap'
import type { FringingModel, GappedCore } from '#shared/engine/magnetics/gap'
import { effectivePermeability, inductanceFactorH, inductanceFromFactorH, turnsForInductance } from '#shared/engine/magnetics/inductance'
import { describe, expect, it } from 'vitest'
import cores from './data/core-effective.json'
import { expectWithin } from './relative'

const parametersOf = ({ kind, dims }: (typeof cores.rows)[number]) => {
  if (kind === 'toroid') return toroidEffectiveParameters({ outerDiameterMm: dims[0]!, innerDiameterMm: dims[1]!, heightMm: dims[2]! })
  const dimensions = { aMm: dims[0]!, bMm: dims[1]!, cMm: dims[2]!, dMm: dims[3]!, eMm: dims[4]!, fMm: dims[5]! }
  return effectiveParameters(kind === 'E' ? ePairSections(dimensions) : roundLegPairSections(dimensions))
}

/** Catalogue figures that the printed dimensions do not give within 2 %; ETD 29 is printed with 72.0 mm here and 70.6 mm by another maker, as computed. */
const PRINTED_APART = ['ETD29/16/10', 'E30/15/7', 'E42/33/20', 'T 4.83x2.29x1.27', 'T 5.84x3.05x1.52', 'T 26.9x14.2x12.2']

// Source: dimensions and effective values of the Magnetics ferrite cores catalogue, 2013; method IEC 60205.
describe('IEC 60205 against catalogue rows', () => {
  it.each(cores.rows.map((row) => ({ ...row, name: row.designation })))('$kind $name', (row) => {
    const { areaMm2, lengthMm } = parametersOf(row)
    const printed = PRINTED_APART.includes(row.designation) ? 0.03 : 0.02
    expectWithin(areaMm2, row.areaMm2, printed)
    expectWithin(lengthMm, row.lengthMm, printed)
    // The fixture's own computation is rounded to 0.01; for ETD it is an approximation of its own.
    const computed = row.kind === 'ETD' ? 2e-3 : 0.006 / Math.min(row.computedAreaMm2, row.computedLengthMm) + 1e-4
    expectWithin(areaMm2, row.computedAreaMm2, computed)
    expectWithin(lengthMm, row.computedLengthMm, computed)
  })

  it('three quarters of the rows agree within 1 %', () => {
    const close = cores.rows.filter((row) => {
      const { areaMm2, lengthMm } = parametersOf(row)
      return Math.abs(areaMm2 / row.areaMm2 - 1) < 0.01 && Math.abs(lengthMm / row.lengthMm - 1) < 0.01
    })
    expect(close.length / cores.rows.length).toBeGreaterThan(0.75)
  })
})

// Source: own calculation by IEC 60205 with the catalogue's nominal dimensions.
describe('IEC 60205 check values', () => {
  it.each([
    { core: 'E42/21/20', dims: [42.15, 21, 19.6, 15.1, 30.2, 11.95], le: 97.3, ae: 233.38, ve: 22708 },
    { core: 'E42/21/15', dims: [42.15, 21, 14.9, 15.1, 30.2, 11.95], le: 97.3, ae: 177.41 },
    { core: 'E55/28/21', dims: [55.15, 27.5, 20.6, 18.9, 38.25, 16.95], le: 123.7, ae: 350.22 },
    { core: 'E65/32/27', dims: [65.15, 32.5, 27, 22.4, 45.1, 19.65], le: 146.49, ae: 538.49 },
    { core: 'E25/13/7', dims: [25.05, 12.6, 7.2, 9, 17.95, 7.25], le: 57.99, ae: 51.7 },
    { core: 'E19/8/5', dims: [19.1, 8.1, 4.75, 5.7, 14.33, 4.75], le: 39.89, ae: 22.67 },
    { core: 'E80/38/20', dims: [80, 38.1, 19.8, 28.2, 60, 19.8], le: 184.18, ae: 393.4 },
  ])('$core: $le mm, $ae mm²', ({ dims, le, ae, ve }) => {
    const own = effectiveParameters(ePairSections({ aMm: dims[0]!, bMm: dims[1]!, cMm: dims[2]!, dMm: dims[3]!, eMm: dims[4]!, fMm: dims[5]! }))
    expectWithin(own.lengthMm, le, 2e-4)
    expectWithin(own.areaMm2, ae, 2e-4)
    if (ve) expectWithin(own.volumeMm3, ve, 1e-4)
  })

  it.each([
    { core: 'T25/15/10', od: 25, id: 15, h: 10, le: 60.18, ae: 48.927, ve: 2944.4, c1: 1.23 },
    { core: 'T107/65/25', od: 107, id: 65, h: 25, le: 259.306, ae: 514.264 },
    { core: 'T36/23/15', od: 36, id: 23, h: 15, le: 89.648, ae: 95.885, ve: 8596 },
  ])('$core: $le mm, $ae mm²', ({ od, id, h, le, ae, ve, c1 }) => {
    const own = toroidEffectiveParameters({ outerDiameterMm: od, innerDiameterMm: id, heightMm: h })
    expectWithin(own.lengthMm, le, 2e-5)
    expectWithin(own.areaMm2, ae, 2e-5)
    if (ve) expectWithin(own.volumeMm3, ve, 1e-4)
    if (c1) expect(own.coreConstantC1PerMm).toBeCloseTo(c1, 4)
  })
})

const etd34: GappedCore = {
  effectiveAreaMm2: 97.1, effectiveLengthMm: 78.6, permeability: 1670, windingLengthMm: 24.2, legDiameterMm: 10.8, fringing: 'none',
}
const gapOf = (core: GappedCore, inductanceH: number, turns: number) => {
  const solution = gapForInductance(core, inductanceH, turns)
  return solution.state === 'found' ? solution : { gapMm: Number.NaN, fringingFactor: Number.NaN }
}

// Source: own calculation on ETD 34, N 60, 600 µH, after C. McLyman and L. Dixon; catalogue line TDK, October 2022.
describe('gap of ETD 34', () => {
  it('0.6851 mm without fringing', () => expectWithin(gapOf(etd34, 600e-6, 60).gapMm, 0.6851, 1e-4))

  it('0.9433 mm with one step of F = 1.3770, the first of the iteration', () => {
    const straightMm = gapOf(etd34, 600e-6, 60).gapMm
    const factor = fringingFactor({ ...etd34, fringing: 'mclyman-gap' }, straightMm)
    expectWithin(1 + (straightMm / Math.sqrt(97.1)) * Math.log(48.4 / straightMm), factor, 1e-12)
    // Carried to its end the iteration F(l) = l/l_0 leads further.
    const settled = gapOf({ ...etd34, fringing: 'mclyman-gap' }, 600e-6, 60)
    expectWithin(settled.gapMm / straightMm, settled.fringingFactor, 1e-6)
    expectWithin(settled.fringingFactor, 1.377, 1e-3)
    expectWithin(settled.gapMm, 0.9433, 1e-3)
  })

  it('the gap by the catalogue line is 0.887 mm, between straight lines and McLyman', () => {
    const catalogueMm = ((600e-6 / 60 ** 2) * 1e9 / 153) ** (1 / -0.713)
    expectWithin(catalogueMm, 0.887, 1e-3)
    expect(catalogueMm).toBeGreaterThan(gapOf(etd34, 600e-6, 60).gapMm)
    expect(catalogueMm).toBeLessThan(gapOf({ ...etd34, fringing: 'mclyman-gap' }, 600e-6, 60).gapMm)
  })

  it('A_L 166.67 nH, gapped µ_e 107.36; 2600 nH ungapped is µ_e 1674', () => {
    const factorH = inductanceFactorH({ inductanceH: 600e-6, turns: 60 })
    expectWithin(factorH * 1e9, 166.67, 1e-4)
    expectWithin(effectivePermeability({ areaMm2: 97.1, lengthMm: 78.6, inductanceFactorH: factorH }), 107.36, 1e-4)
    expectWithin(effectivePermeability({ areaMm2: 97.1, lengthMm: 78.6, inductanceFactorH: 2600e-9 }), 1674, 1e-3)
  })

  // Published: ETD 34, N87, TDK, October 2022. The centre leg has 91.6 mm²; McLyman stays within 7 %, the others fall short at long gaps.
  it.each([
    { gapMm: 0.1, published: 790, ideal: 830, mclyman: 832, dixon: 807 },
    { gapMm: 0.2, published: 482, ideal: 494, mclyman: 514, dixon: 485 },
    { gapMm: 0.5, published: 251, ideal: 223, mclyman: 257, dixon: 230 },
    { gapMm: 1, published: 153, ideal: 116.5, mclyman: 152.3, dixon: 130.5 },
    { gapMm: 2.5, published: 80, ideal: 47.9, mclyman: 79.2, dixon: 68 },
  ])('A_L at $gapMm mm: published $published nH', ({ gapMm, published, ideal, mclyman, dixon }) => {
    const nH = (fringing: FringingModel, gapAreaMm2?: number) => gappedInductanceFactorH({ ...etd34, fringing, gapAreaMm2 }, gapMm) * 1e9
    expectWithin(nH('none'), ideal, 2e-3)
    expectWithin(nH('mclyman-gap', 91.6), mclyman, 2e-3)
    expectWithin(nH('dixon-round-leg', 91.6), dixon, 2e-3)
    expectWithin(nH('mclyman-gap', 91.6), published, 0.07)
  })

  it('A_L spreads from 245.8 to 269.4 nH for 0.50 ± 0.03 mm, and by 2.6 % for ± 25 % of permeability', () => {
    const core = { ...etd34, fringing: 'mclyman-gap', gapAreaMm2: 91.6 } as const
    const byGap = inductanceSpread(core, 1, { gapMm: 0.5, gapToleranceMm: 0.03 })
    expectWithin(byGap.lowestH * 1e9, 245.8, 1e-3)
    expectWithin(byGap.highestH * 1e9, 269.4, 1e-3)
    const byPermeability = inductanceSpread(core, 1, { gapMm: 0.5, gapToleranceMm: 0, permeabilityToleranceFraction: 0.25 })
    expectWithin(byPermeability.lowestH * 1e9, 248.8, 4e-3)
    expectWithin(byPermeability.highestH * 1e9, 262.2, 4e-3)
  })
})

// Source: own calculation: 600 µH, N 60, A_e 52 mm², l_e 58 mm, µ_r 2000, winding 17.4 mm long.
describe('flyback with 600 µH on 52 mm²', () => {
  const core: GappedCore = { effectiveAreaMm2: 52, effectiveLengthMm: 58, permeability: 2000, windingLengthMm: 17.4, fringing: 'none' }

  it('A_L 166.67 nH; 0.2308 T at 1.20 A, 0.2856 T at 1.35 A and 10 % more inductance', () => {
    expectWithin(inductanceFactorH({ inductanceH: 600e-6, turns: 60 }) * 1e9, 166.67, 1e-4)
    expectWithin(peakFluxDensityT({ inductanceH: 600e-6, currentA: 1.2, turns: 60, areaMm2: 52 }), 0.2308, 3e-4)
    expectWithin(peakFluxDensityT({ inductanceH: 660e-6, currentA: 1.35, turns: 60, areaMm2: 52 }), 0.2856, 3e-4)
  })

  it.each([
    { fringing: 'none', gapMm: 0.363, factor: 1, spreads: [] },
    { fringing: 'mclyman-gap', gapMm: 0.464, factor: 1.278, spreads: [[0.02, -3.2, 3.5], [0.03, -4.7, 5.3], [0.05, -7.6, 9.2]] },
    { fringing: 'mclyman-path', gapMm: 0.474, factor: 1.282, spreads: [[0.02, -3.1, 3.4], [0.03, -4.6, 5.2], [0.05, -7.4, 9]] },
  ] as const)('$fringing: $gapMm mm, F $factor, and its spread by the gap', ({ fringing, gapMm, factor, spreads }) => {
    const solution = gapOf({ ...core, fringing }, 600e-6, 60)
    expect(solution.gapMm).toBeCloseTo(gapMm, 3)
    expect(solution.fringingFactor).toBeCloseTo(factor, 3)
    for (const [toleranceMm, low, high] of spreads) {
      const spread = inductanceSpread({ ...core, fringing }, 60, { gapMm: solution.gapMm, gapToleranceMm: toleranceMm })
      expect(Math.abs(spread.lowestFraction * 100 - low)).toBeLessThan(0.06)
      expect(Math.abs(spread.highestFraction * 100 - high)).toBeLessThan(0.06)
    }
  })
})

// Source: Magnetics, inductor design, section 4: turns are always rounded up; and own A_L table.
describe('turns and inductance', () => {
  it.each([[250, 20.7], [315, 18.4], [400, 16.4]])('0.107 mH on A_L %d nH needs %d turns', (nH, turns) => {
    expectWithin(turnsForInductance({ inductanceH: 0.107e-3, inductanceFactorH: nH * 1e-9 }), turns, 3e-3)
  })
  it('A_L 250 nH with 40 turns is 400 µH', () => expectWithin(inductanceFromFactorH({ inductanceFactorH: 250e-9, turns: 40 }), 400e-6, 1e-12))
})
