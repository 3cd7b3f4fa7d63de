import { describe, expect, it } from 'vitest'
import { awgDiameterMm, nearestAwg } from './awg'
import { wireCandidates } from './choice'
import { layeredWireDiameterMm, litzDiameterMm, litzResistanceOhmPerM } from './insulated-diameter'
import { iecWireResistance, resistanceFactor, temperatureByResistanceC, windingLengthM, windingResistanceOhm } from './resistance'
import { skinDepthMm } from './skin-depth'

describe('awg', () => {
  it('finds each gauge back from its diameter', () => {
    for (let gauge = -3; gauge <= 56; gauge++) expect(nearestAwg(awgDiameterMm(gauge))).toBe(gauge)
  })
  it('refuses half a gauge', () => expect(() => awgDiameterMm(22.5)).toThrow(RangeError))
})

describe('windingResistanceOhm', () => {
  it.each([
    { name: '58 m of 1 mm² at 20 °C is 1 Ω', lengthM: 58, strandAreaMm2: 1, temperatureC: 20, ohm: 1 },
    { name: 'rises by 39.3 % at 120 °C', lengthM: 58, strandAreaMm2: 1, temperatureC: 120, ohm: 1.393 },
    { name: 'halves with two in parallel', lengthM: 58, strandAreaMm2: 1, parallelCount: 2, temperatureC: 20, ohm: 0.5 },
  ])('$name', ({ ohm, ...input }) => expect(windingResistanceOhm(input)).toBeCloseTo(ohm, 10))

  it('refuses a wire without copper and a temperature beyond the law', () => {
    expect(() => windingResistanceOhm({ lengthM: 1, strandAreaMm2: 0, temperatureC: 20 })).toThrow(/strandAreaMm2/)
    expect(() => resistanceFactor(400)).toThrow(/temperatureC/)
  })

  it('adds the leads to the length', () => expect(windingLengthM({ turns: 30, meanTurnLengthMm: 61, leadsMm: 80 })).toBeCloseTo(1.91, 12))
})

describe('iecWireResistance', () => {
  it('needs a tolerance above 0.063 mm only', () => {
    expect(iecWireResistance({ diameterMm: 0.05 }).maximumOhmPerM / iecWireResistance({ diameterMm: 0.05 }).nominalOhmPerM).toBeCloseTo(1.1, 12)
    expect(() => iecWireResistance({ diameterMm: 0.5 })).toThrow(/toleranceMm/)
  })
})

describe('temperatureByResistanceC', () => {
  it('agrees with the law of copper within 1 K from 20 to 120 °C', () => {
    expect(Math.abs(temperatureByResistanceC({ resistanceRatio: resistanceFactor(120), coldTemperatureC: 20 }) - 120)).toBeLessThan(1)
  })
})

describe('skinDepthMm', () => {
  it('halves at four times the frequency', () => {
    const at = (frequencyHz: number) => skinDepthMm({ frequencyHz, temperatureC: 100 })
    expect(at(100e3) / at(400e3)).toBeCloseTo(2, 12)
  })
  it('is deeper in aluminium', () => {
    expect(skinDepthMm({ frequencyHz: 1e5, temperatureC: 20, metal: 'aluminium' }) / skinDepthMm({ frequencyHz: 1e5, temperatureC: 20 })).toBeCloseTo(1.279, 3)
  })
})

describe('insulated diameters', () => {
  it('adds three layers on both sides', () => expect(layeredWireDiameterMm({ conductorDiameterMm: 0.5 })).toBeCloseTo(0.8048, 12))
  it('bunches seven strands', () => {
    const bundle = litzDiameterMm({ strandCount: 7, strandOuterDiameterMm: 0.12, servingThicknessMm: 0.03 })
    expect(bundle.state === 'known' && bundle.value).toBeCloseTo(1.25 * Math.sqrt(7) * 0.12 + 0.06, 12)
  })
  it('does not extend the packing table', () => {
    expect(litzDiameterMm({ strandCount: 401, strandOuterDiameterMm: 0.1 })).toMatchObject({ state: 'not-checkable', reason: 'past-last-row' })
    expect(litzDiameterMm({ strandCount: 2, strandOuterDiameterMm: 0.1 })).toMatchObject({ state: 'not-checkable', reason: 'before-first-row' })
  })
  it('lets litz resistance fall with the strands', () => {
    expect(litzResistanceOhmPerM({ strandCount: 20, strandDiameterMm: 0.1 })).toBeCloseTo(litzResistanceOhmPerM({ strandCount: 10, strandDiameterMm: 0.1 }) / 2, 12)
  })
})

describe('wireCandidates', () => {
  const stock = [0.2, 0.315, 0.4, 0.5, 1.0].map((d) => ({ designation: `${d} mm`, conductorDiameterMm: d, outerDiameterMm: d * 1.1 }))
  const input = { rmsCurrentA: 1, currentDensityLimitAPerMm2: 5, frequencyHz: 100e3, temperatureC: 100, stock }

  it('proposes first the single wire that keeps both limits', () => {
    const [first] = wireCandidates({ ...input, rmsCurrentA: 0.6 })
    expect(first).toMatchObject({ wire: { designation: '0.4 mm' }, parallelCount: 1, rejections: [] })
  })

  it('keeps the current density with wires in parallel', () => {
    for (const candidate of wireCandidates(input)) expect(candidate.currentDensityAPerMm2).toBeLessThanOrEqual(5)
  })

  it('says why a wire falls out', () => {
    const byName = new Map(wireCandidates(input).map((c) => [c.wire.designation, c.rejections]))
    expect(byName.get('1 mm')).toEqual(['thicker-than-skin-depth-limit'])
    expect(byName.get('0.2 mm')).toEqual(['needs-too-many-in-parallel'])
  })

  it('refuses an empty stock', () => expect(() => wireCandidates({ ...input, stock: [] })).toThrow(RangeError))
})
