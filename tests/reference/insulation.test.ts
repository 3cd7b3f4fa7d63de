import { altitudeFactor, creepageMm, impulseClearanceMm, marginPerSideMm, ratedImpulseV, recurringPeakClearanceMm, reinforcedImpulseV } from '#shared/engine/insulation/coordination'
import type { MaterialGroup } from '#shared/engine/insulation/coordination'
import { boundaryRequirements } from '#shared/engine/insulation/product-standards'
import type { BoundaryDuty } from '#shared/engine/insulation/product-standards'
import type { OvervoltageCategory, PollutionDegree } from '#shared/engine/insulation/tables'
import type { Answer } from '#shared/engine/answer'
import { describe, expect, it } from 'vitest'

const valueOf = (answer: Answer<number>): number => (answer.state === 'known' ? answer.value : Number.NaN)
const distanceOf = (answer: ReturnType<typeof boundaryRequirements>['clearance']) => (answer.state === 'known' ? answer.value.distanceMm : Number.NaN)

// Source: IEC 60664-1:2020, Table F.1.
describe('rated impulse voltage', () => {
  it.each([
    [50, 330, 500, 800, 1500], [100, 500, 800, 1500, 2500], [150, 800, 1500, 2500, 4000], [300, 1500, 2500, 4000, 6000],
    [600, 2500, 4000, 6000, 8000], [1000, 4000, 6000, 8000, 12000],
  ])('up to %i V line to neutral', (lineToNeutralV, ...impulses) => {
    const categories: OvervoltageCategory[] = ['I', 'II', 'III', 'IV']
    categories.forEach((overvoltageCategory, index) => expect(valueOf(ratedImpulseV({ lineToNeutralV, overvoltageCategory }))).toBe(impulses[index]))
  })
  it('230 V is in the row of 300 V', () => expect(valueOf(ratedImpulseV({ lineToNeutralV: 230, overvoltageCategory: 'II' }))).toBe(2500))
  it.each([[330, 500], [2500, 4000], [4000, 6000], [6000, 8000]])('reinforced for %i V is dimensioned for %i V', (impulseV, next) => {
    expect(valueOf(reinforcedImpulseV(impulseV))).toBe(next)
  })
})

// Source: IEC 60664-1:2020, Table F.2, case A (columns of pollution degree 1 to 4).
describe('clearance by impulse voltage', () => {
  it.each([
    [330, 0.01, 0.2, 0.8, 1.6], [800, 0.1, 0.2, 0.8, 1.6], [1200, 0.25, 0.25, 0.8, 1.6], [1500, 0.5, 0.5, 0.8, 1.6], [2000, 1, 1, 1, 1.6],
    [2500, 1.5, 1.5, 1.5, 1.6], [3000, 2, 2, 2, 2], [4000, 3, 3, 3, 3], [6000, 5.5, 5.5, 5.5, 5.5], [8000, 8, 8, 8, 8], [100000, 170, 170, 170, 170],
  ])('%i V', (impulseV, ...distances) => {
    distances.forEach((mm, index) => expect(valueOf(impulseClearanceMm({ impulseV, pollutionDegree: (index + 1) as PollutionDegree }))).toBe(mm))
  })
})

// Source: IEC 60664-1:2020, Table F.8.
it.each([[1200, 0.42], [1500, 0.76], [2000, 1.27], [4000, 3.8], [10000, 15.2]])('recurring peak of %i V needs %d mm', (peakV, mm) => {
  expect(valueOf(recurringPeakClearanceMm({ peakV, pollutionDegree: 1 }))).toBe(mm)
})

// Source: IEC 60664-1:2020, Table A.2; straight lines between rows.
describe('altitude', () => {
  it.each([[3, 5000, 4.44], [3, 3000, 3.42], [3, 4500, 4.155]])('%d mm at %i m becomes %d mm', (mm, altitudeM, corrected) => {
    expect(mm * valueOf(altitudeFactor(altitudeM))).toBeCloseTo(corrected, 9)
  })
})

// Source: IEC 60664-1:2020, Table F.5.
describe('creepage', () => {
  it.each([
    { v: 50, pd: 2, group: 'IIIa', mm: 1.2 }, { v: 100, pd: 2, group: 'IIIa', mm: 1.4 }, { v: 125, pd: 2, group: 'IIIa', mm: 1.5 },
    { v: 160, pd: 2, group: 'IIIa', mm: 1.6 }, { v: 200, pd: 2, group: 'IIIa', mm: 2 }, { v: 250, pd: 2, group: 'IIIa', mm: 2.5 },
    { v: 320, pd: 2, group: 'IIIb', mm: 3.2 }, { v: 400, pd: 2, group: 'IIIb', mm: 4 }, { v: 500, pd: 2, group: 'IIIa', mm: 5 },
    { v: 630, pd: 2, group: 'IIIa', mm: 6.3 }, { v: 800, pd: 2, group: 'IIIa', mm: 8 }, { v: 1000, pd: 2, group: 'IIIa', mm: 10 },
    { v: 250, pd: 2, group: 'I', mm: 1.25 }, { v: 250, pd: 2, group: 'II', mm: 1.8 }, { v: 250, pd: 3, group: 'I', mm: 3.2 },
    { v: 250, pd: 1, group: 'IIIa', mm: 0.56 }, { v: 300, pd: 2, group: 'II', mm: 1.8 + (50 / 70) * 0.4 },
  ] as const)('$v V, degree $pd, group $group: $mm mm', ({ v, pd, group, mm }) => {
    expect(valueOf(creepageMm({ workingVoltageRmsV: v, pollutionDegree: pd, materialGroup: group }))).toBeCloseTo(mm, 9)
  })

  // Source: test report of an off-line transformer under IEC 60950-1: 281 V rms, reinforced, 5.8 mm (2.81 mm rounded up to 2.9, doubled).
  it('281 V rms interpolates to 2.81 mm', () => {
    const basicMm = valueOf(creepageMm({ workingVoltageRmsV: 281, pollutionDegree: 2, materialGroup: 'IIIa' }))
    expect(basicMm).toBeCloseTo(2.81, 9)
    expect(2 * (Math.ceil(basicMm * 10) / 10)).toBeCloseTo(5.8, 9)
  })

  // Source: test report under IEC 62368-1, 240 V: 5.0 mm from the row of 250 V; interpolated it would be 4.8 mm.
  it('240 V rms, reinforced: 5.0 mm by row, 4.8 mm interpolated', () => {
    const input = { workingVoltageRmsV: 240, pollutionDegree: 2, materialGroup: 'IIIa' } as const
    expect(2 * valueOf(creepageMm({ ...input, interpolate: false }))).toBe(5)
    expect(2 * valueOf(creepageMm(input))).toBeCloseTo(4.8, 9)
  })
})

// Source: own arithmetic from the tables of IEC 60664-1:2020.
describe('worked cases', () => {
  const cases: { name: string; lineV: number; ovc: OvervoltageCategory; pd: PollutionDegree; group: MaterialGroup; rmsV: number; altitudeM?: number; clearance: [number, number]; creepage: [number, number] }[] = [
    { name: '230 V, II', lineV: 230, ovc: 'II', pd: 2, group: 'IIIa', rmsV: 250, clearance: [1.5, 3], creepage: [2.5, 5] },
    { name: '230 V, III: creepage not below clearance', lineV: 230, ovc: 'III', pd: 2, group: 'IIIa', rmsV: 250, clearance: [3, 5.5], creepage: [3, 5.5] },
    { name: '120 V, II', lineV: 120, ovc: 'II', pd: 2, group: 'IIIa', rmsV: 125, clearance: [0.5, 1.5], creepage: [1.5, 3] },
    { name: '230 V, 400 V working', lineV: 230, ovc: 'II', pd: 2, group: 'IIIa', rmsV: 400, clearance: [1.5, 3], creepage: [4, 8] },
    { name: '230 V, group II, 300 V working', lineV: 230, ovc: 'II', pd: 2, group: 'II', rmsV: 300, clearance: [1.5, 3], creepage: [2.086, 4.171] },
    { name: '230 V, degree 3, group I', lineV: 230, ovc: 'II', pd: 3, group: 'I', rmsV: 250, clearance: [1.5, 3], creepage: [3.2, 6.4] },
    { name: '230 V at 5000 m', lineV: 230, ovc: 'II', pd: 2, group: 'IIIa', rmsV: 250, altitudeM: 5000, clearance: [2.22, 4.44], creepage: [2.5, 5] },
    { name: '48 V d.c.', lineV: 48, ovc: 'II', pd: 2, group: 'IIIa', rmsV: 50, clearance: [0.2, 0.2], creepage: [1.2, 2.4] },
  ]
  it.each(cases)('$name', ({ lineV, ovc, pd, group, rmsV, altitudeM = 2000, clearance, creepage }) => {
    const duty: BoundaryDuty = {
      standard: 'IEC 60664-1', insulation: 'basic', workingVoltageRmsV: rmsV, recurringPeakV: rmsV * Math.SQRT2, frequencyHz: 50,
      ratedImpulseV: valueOf(ratedImpulseV({ lineToNeutralV: lineV, overvoltageCategory: ovc })), nominalMainsV: lineV, pollutionDegree: pd,
      materialGroup: group, altitudeM,
    }
    for (const [index, insulation] of (['basic', 'reinforced'] as const).entries()) {
      const need = boundaryRequirements({ ...duty, insulation })
      expect(distanceOf(need.clearance)).toBeCloseTo(clearance[index]!, 9)
      expect(distanceOf(need.creepage)).toBeCloseTo(creepage[index]!, 3)
    }
  })
})

const offLine: BoundaryDuty = {
  standard: 'IEC 62368-1', insulation: 'reinforced', workingVoltageRmsV: 250, recurringPeakV: 420, frequencyHz: 50, ratedImpulseV: 2500,
  nominalMainsV: 240, pollutionDegree: 2, materialGroup: 'IIIa', altitudeM: 2000,
}

describe('product standards', () => {
  // Source: test report under IEC 62368-1: 240 V, category II, reinforced: 3.0 mm, 5.0 mm, 4000 V d.c., 0.4 mm.
  it('IEC 62368-1, 240 V, category II', () => {
    const need = boundaryRequirements(offLine)
    expect(distanceOf(need.clearance)).toBe(3)
    expect(distanceOf(need.creepage)).toBe(5)
    expect(need.testVoltage).toMatchObject({ state: 'known', value: { valueV: 4000, form: 'peak-or-dc', dcV: 4000, typeTestDurationS: 60 } })
    expect(need.testVoltage.state === 'known' && need.testVoltage.value.acRmsV).toBeCloseTo(2828.43, 2)
    expect(need.throughInsulation).toMatchObject({
      state: 'known', value: { minimumThicknessMm: 0.4, sheetAlternatives: [{ layers: 2, layersThatPass: 1 }, { layers: 3, layersThatPass: 2 }] },
    })
  })

  // Source: IEC 60601-1:2005+A1+A2, up to 250 V rms.
  it.each([
    { means: 'MOOP', insulation: 'basic', creepage: 2.5, clearance: 2, volts: 1500 },
    { means: 'MOOP', insulation: 'reinforced', creepage: 5, clearance: 4, volts: 3000 },
    { means: 'MOPP', insulation: 'basic', creepage: 4, clearance: 2.5, volts: 1500 },
    { means: 'MOPP', insulation: 'reinforced', creepage: 8, clearance: 5, volts: 4000 },
  ] as const)('IEC 60601-1, $insulation, $means', ({ means, insulation, creepage, clearance, volts }) => {
    const need = boundaryRequirements({ ...offLine, standard: 'IEC 60601-1', meansOfProtection: means, insulation, recurringPeakV: 350 })
    expect(distanceOf(need.creepage)).toBe(creepage)
    expect(distanceOf(need.clearance)).toBe(clearance)
    expect(need.testVoltage).toMatchObject({ state: 'known', value: { valueV: volts, form: 'ac-rms' } })
  })

  // Source: IEC 61558-1:2005, Table 8a (from memory); interpolation between rows.
  it.each([[150, 2800], [300, 4200], [600, 5000], [1000, 5500], [225, 3500]])('IEC 61558-1: %i V working, reinforced, %i V rms', (workingVoltageRmsV, volts) => {
    expect(boundaryRequirements({ ...offLine, standard: 'IEC 61558-1', workingVoltageRmsV }).testVoltage).toMatchObject({ value: { valueV: volts, form: 'ac-rms' } })
  })

  // Source: IEC 60335-1, Table 4, 29.1 and 29.3 (from memory).
  it.each([['basic', 1000, null], ['supplementary', 1750, 1], ['reinforced', 3000, 2]] as const)('IEC 60335-1, %s: %i V', (insulation, volts, thicknessMm) => {
    const need = boundaryRequirements({ ...offLine, standard: 'IEC 60335-1', insulation })
    expect(need.testVoltage).toMatchObject({ value: { valueV: volts } })
    expect(need.throughInsulation.state === 'known' ? need.throughInsulation.value.minimumThicknessMm : null).toBe(thicknessMm)
    expect(distanceOf(need.clearance)).toBe(insulation === 'reinforced' ? 3 : 1.5)
    expect(distanceOf(need.creepage)).toBe(insulation === 'reinforced' ? 5 : 2.5)
  })
})

// Source: L. Dixon, SLUP127, p. 5-14: 0.3 cm at each end leave 1.5 cm of 2.1 cm.
it('6.0 mm of creepage is 3.0 mm of margin at each end', () => expect(marginPerSideMm(6)).toBe(3))
