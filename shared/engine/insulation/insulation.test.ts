import { describe, expect, it } from 'vitest'
import {
  altitudeFactor, creepageMm, grooveWidthMm, highFrequencyClearanceMm, impulseClearanceMm, marginPerSideMm, materialGroupOf,
  ratedImpulseV, recurringPeakClearanceMm, reinforcedImpulseV,
} from './coordination'
import { boundaryRequirements } from './product-standards'
import type { BoundaryDuty } from './product-standards'

const offLine: BoundaryDuty = {
  standard: 'IEC 62368-1', insulation: 'reinforced', workingVoltageRmsV: 250, recurringPeakV: 420, frequencyHz: 50, ratedImpulseV: 2500,
  nominalMainsV: 230, pollutionDegree: 2, materialGroup: 'IIIa', altitudeM: 2000,
}
const past = { state: 'not-checkable', reason: 'past-last-row' }

describe('tables are never extended', () => {
  it.each([
    { name: 'rated impulse of 1250 V a.c.', got: ratedImpulseV({ lineToNeutralV: 1250, overvoltageCategory: 'II' }) },
    { name: 'reinforced impulse above 12 kV', got: reinforcedImpulseV(12000) },
    { name: 'impulse clearance above 100 kV', got: impulseClearanceMm({ impulseV: 100_001, pollutionDegree: 2 }) },
    { name: 'homogeneous clearance above 20 kV', got: impulseClearanceMm({ impulseV: 21_000, pollutionDegree: 2, field: 'homogeneous' }) },
    { name: 'recurring peak above 10 kV', got: recurringPeakClearanceMm({ peakV: 10_001, pollutionDegree: 2 }) },
    { name: 'peak above 30 kHz beyond 2 kV', got: highFrequencyClearanceMm({ peakV: 2001, pollutionDegree: 2, insulation: 'basic' }) },
    { name: 'altitude above 20 km', got: altitudeFactor(20_001) },
    { name: 'creepage above 10 kV', got: creepageMm({ workingVoltageRmsV: 10_001, pollutionDegree: 2, materialGroup: 'I' }) },
    { name: 'printed wiring above 1000 V', got: creepageMm({ workingVoltageRmsV: 1001, pollutionDegree: 1, materialGroup: 'I', printedWiring: true }) },
  ])('$name', ({ got }) => expect(got).toMatchObject(past))

  it('says what a table does not cover', () => {
    expect(creepageMm({ workingVoltageRmsV: 250, pollutionDegree: 4, materialGroup: 'I' })).toMatchObject({ reason: 'pollution-degree-not-in-table' })
    expect(creepageMm({ workingVoltageRmsV: 631, pollutionDegree: 3, materialGroup: 'IIIb' })).toMatchObject({ reason: 'material-group-not-permitted' })
    expect(materialGroupOf(99)).toMatchObject({ reason: 'before-first-row' })
  })
})

describe('rows', () => {
  it.each([
    { name: 'd.c. row of 1500 V', got: ratedImpulseV({ lineToNeutralV: 1500, overvoltageCategory: 'III', directCurrent: true }), value: 10000 },
    { name: 'off the preferred series 160 %', got: reinforcedImpulseV(2000), value: 3200 },
    { name: 'impulse between rows takes the next', got: impulseClearanceMm({ impulseV: 2501, pollutionDegree: 2 }), value: 2 },
    { name: 'homogeneous field', got: impulseClearanceMm({ impulseV: 2500, pollutionDegree: 2, field: 'homogeneous' }), value: 0.6 },
    { name: 'minimum of pollution degree 3', got: recurringPeakClearanceMm({ peakV: 500, pollutionDegree: 3 }), value: 0.8 },
    { name: 'next row of altitude', got: altitudeFactor(2500, false), value: 1.14 },
    { name: 'below sea level', got: altitudeFactor(-100), value: 1 },
    { name: 'creepage below the first row', got: creepageMm({ workingVoltageRmsV: 5, pollutionDegree: 2, materialGroup: 'II' }), value: 0.4 },
    { name: 'creepage by the next row', got: creepageMm({ workingVoltageRmsV: 281, pollutionDegree: 2, materialGroup: 'IIIa', interpolate: false }), value: 3.2 },
    { name: 'groove below 3 mm clearance', got: grooveWidthMm({ pollutionDegree: 2, clearanceMm: 1.5 }), value: 0.5 },
    { name: 'index 250 is group IIIa', got: materialGroupOf(250), value: 'IIIa' },
    { name: 'unknown index is group IIIb', got: materialGroupOf(null), value: 'IIIb' },
  ])('$name', ({ got, value }) => expect(got).toEqual({ state: 'known', value }))
  it('halves the creepage at each end', () => expect(marginPerSideMm(6)).toBe(3))
})

describe('boundaryRequirements', () => {
  it('cites every value and says which are from memory', () => {
    const { clearance, testVoltage } = boundaryRequirements(offLine)
    expect(clearance.state === 'known' && clearance.value.contributions[0]).toMatchObject({ rule: 'impulse', citation: { standard: 'IEC 60664-1', edition: '2020' } })
    expect(testVoltage.state === 'known' && testVoltage.value.contributions.every(({ citation }) => citation.basis === 'memory')).toBe(true)
  })

  it('adds the high-frequency clearance of IEC 62368-1 and says that its creepage table is not held', () => {
    const { clearance, creepage } = boundaryRequirements({ ...offLine, frequencyHz: 100e3, recurringPeakV: 1150 })
    expect(clearance.state === 'known' && clearance.value).toMatchObject({ governedBy: 'high-frequency-peak', distanceMm: 3.36, unchecked: [] })
    expect(creepage.state === 'known' && creepage.value.unchecked).toMatchObject([{ reason: 'high-frequency-table-not-held' }])
  })

  it('says under other standards that the high-frequency clearance is not checked', () => {
    const { clearance } = boundaryRequirements({ ...offLine, standard: 'IEC 60335-1', frequencyHz: 100e3 })
    expect(clearance.state === 'known' && clearance.value).toMatchObject({ distanceMm: 3, unchecked: [{ reason: 'high-frequency-table-not-held' }] })
  })

  it('asks nothing but distances of functional insulation', () => {
    const need = boundaryRequirements({ ...offLine, insulation: 'functional' })
    expect(need.testVoltage).toEqual({ state: 'not-required' })
    expect(need.throughInsulation).toEqual({ state: 'not-required' })
    expect(need.clearance.state).toBe('known')
  })

  it('asks no distance through insulation up to 71 V peak', () => {
    const low = { ...offLine, recurringPeakV: 71, workingVoltageRmsV: 50, ratedImpulseV: null, nominalMainsV: null }
    expect(boundaryRequirements(low).throughInsulation).toEqual({ state: 'not-required' })
    expect(boundaryRequirements({ ...low, recurringPeakV: 72 }).throughInsulation).toMatchObject({ state: 'known', value: { minimumThicknessMm: 0.4 } })
  })

  it('asks for the means of protection before it answers under IEC 60601-1', () => {
    const need = boundaryRequirements({ ...offLine, standard: 'IEC 60601-1', recurringPeakV: 340 })
    expect(need.clearance).toMatchObject({ reason: 'means-of-protection-not-stated' })
    expect(boundaryRequirements({ ...offLine, standard: 'IEC 60601-1', meansOfProtection: 'MOPP' }).testVoltage).toMatchObject(past)
  })

  it('does not know the distance tables of IEC 61558-1, and says so', () => {
    const need = boundaryRequirements({ ...offLine, standard: 'IEC 61558-1' })
    expect(need.creepage.state === 'known' && need.creepage.value.unchecked).toMatchObject([{ reason: 'table-not-held' }])
    expect(need.throughInsulation).toMatchObject({ reason: 'table-not-held' })
    expect(boundaryRequirements({ ...offLine, standard: 'IEC 61558-1', workingVoltageRmsV: 1001 }).testVoltage).toMatchObject(past)
  })

  it('has the household test for mains up to 250 V only', () => {
    expect(boundaryRequirements({ ...offLine, standard: 'IEC 60335-1', nominalMainsV: 400 }).testVoltage).toMatchObject(past)
    expect(boundaryRequirements({ ...offLine, standard: 'IEC 60335-1', nominalMainsV: null }).testVoltage).toMatchObject({ reason: 'no-row-for-input' })
  })

  it('refuses a negative working voltage', () => {
    expect(() => boundaryRequirements({ ...offLine, workingVoltageRmsV: -1 })).toThrow(/workingVoltageRmsV/)
  })
})
