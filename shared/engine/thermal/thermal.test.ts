import { describe, expect, it } from 'vitest'
import { systemClassC, windingLimitC } from './classes'
import { settleTemperature } from './fixed-point'
import { boxSurfaceMm2, temperatureRiseK } from './temperature-rise'

describe('temperatureRiseK', () => {
  it('multiplies a stated thermal resistance', () => expect(temperatureRiseK({ kind: 'thermal-resistance', thermalResistanceKPerW: 19 }, 2)).toBe(38))
  it('is zero without loss in every model', () => {
    for (const model of [{ kind: 'mclyman-surface', surfaceMm2: 3000 }, { kind: 'powder-catalogue-surface', surfaceMm2: 3000 }, { kind: 'ferrite-volume', effectiveVolumeMm3: 7640 }] as const) {
      expect(temperatureRiseK(model, 0)).toBe(0)
    }
  })
  it('refuses a part without surface', () => expect(() => temperatureRiseK({ kind: 'mclyman-surface', surfaceMm2: 0 }, 1)).toThrow(/surfaceMm2/))
})

describe('boxSurfaceMm2', () => {
  it('leaves out the base on request', () => {
    expect(boxSurfaceMm2({ lengthMm: 10, widthMm: 20, heightMm: 30 })).toBe(2200)
    expect(boxSurfaceMm2({ lengthMm: 10, widthMm: 20, heightMm: 30, withoutBase: true })).toBe(2000)
  })
})

describe('thermal classes', () => {
  it('limits class 130 windings to 120 °C', () => expect(windingLimitC(130)).toEqual({ state: 'known', value: 120 }))
  it('has no winding limit for class 200', () => expect(windingLimitC(200)).toMatchObject({ state: 'not-checkable', reason: 'no-row-for-input' }))
  it('takes the weakest member', () => expect(systemClassC([180, 130, 155])).toBe(130))
})

describe('settleTemperature', () => {
  it('solves a linear loss exactly', () => {
    const point = settleTemperature({ ambientC: 40, lossW: (t) => 1 + 0.01 * (t - 40), riseK: (p) => 20 * p, ceilingC: 200 })
    expect(point).toMatchObject({ state: 'settled' })
    expect(point.temperatureC).toBeCloseTo(65, 5)
    expect(point.state === 'settled' && point.loopGain).toBeCloseTo(0.2, 6)
  })
  it('tells runaway where the loss grows faster than the rise carries', () => {
    expect(settleTemperature({ ambientC: 40, lossW: (t) => Math.exp((t - 40) / 10), riseK: (p) => 20 * p, ceilingC: 200 }).state).toBe('runaway')
  })
  it('stays at ambient without loss', () => {
    expect(settleTemperature({ ambientC: 40, lossW: () => 0, riseK: (p) => 20 * p, ceilingC: 200 }).temperatureC).toBe(40)
  })
  it('refuses a ceiling below ambient', () => {
    expect(() => settleTemperature({ ambientC: 40, lossW: () => 0, riseK: (p) => p, ceilingC: 30 })).toThrow(RangeError)
  })
})
