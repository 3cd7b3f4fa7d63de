import { describe, expect, it } from 'vitest'
import { concentricLeakageH } from './leakage'
import { stackLeakageH } from './stack-leakage'

// Own calculation with the closed form: MLT 52 mm, breadth 9.3 mm, N 60, builds 0.6 and 0.5 mm, 0.18 mm at each interface.
const coil = { turns: 60, meanTurnLengthMm: 52, breadthMm: 9.3 }
const simple = { ...coil, driven: [{ bottomMm: 0, topMm: 0.6, share: 1 }], shorted: [[{ bottomMm: 0.78, topMm: 1.28, share: 1 }]] }
const interleaved = {
  ...coil,
  driven: [{ bottomMm: 0, topMm: 0.3, share: 0.5 }, { bottomMm: 1.16, topMm: 1.46, share: 0.5 }],
  shorted: [[{ bottomMm: 0.48, topMm: 0.98, share: 1 }]],
}

describe('stackLeakageH', () => {
  it('gives 13.8 µH for one interface and 4.6 µH for two, as the closed form does', () => {
    expect(stackLeakageH(simple)! * 1e6).toBeCloseTo(13.8, 1)
    expect(stackLeakageH(interleaved)! * 1e6).toBeCloseTo(4.6, 1)
    expect(stackLeakageH(simple)).toBeCloseTo(concentricLeakageH({ ...coil, windingHeightsMm: [0.6, 0.5], interfaceGapsMm: [0.18], interfaces: 1 }), 12)
    expect(stackLeakageH(interleaved)).toBeCloseTo(concentricLeakageH({ ...coil, windingHeightsMm: [0.3, 0.5, 0.3], interfaceGapsMm: [0.18, 0.18], interfaces: 2 }), 12)
  })

  it('takes two secondaries shorted together for no more than the better of them', () => {
    const far = [{ bottomMm: 1.4, topMm: 1.9, share: 1 }]
    const both = stackLeakageH({ ...simple, shorted: [...simple.shorted, far] })!
    expect(both).toBeLessThanOrEqual(stackLeakageH(simple)!)
    expect(both).toBeLessThan(stackLeakageH({ ...simple, shorted: [far] })!)
  })

  it('sees a winding cut into two halves at one place as one winding', () => {
    const halves = [{ bottomMm: 0, topMm: 0.3, share: 0.5 }, { bottomMm: 0.3, topMm: 0.6, share: 0.5 }]
    expect(stackLeakageH({ ...simple, driven: halves })).toBeCloseTo(stackLeakageH(simple)!, 15)
  })
})
