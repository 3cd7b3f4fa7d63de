import { describe, expect, it } from 'vitest'
import type { RingLayout } from '../../engine/evaluation'
import { blankSpecification } from '../../engine'
import { ringSection } from './ring-section'

const pass = (turn: number, angleRad: number) => ({
  stepId: 's1', windingId: 'w1', turn, strand: 1, layer: 1, overallMm: 1, conductorMm: 0.9,
  innerXMm: 7 * Math.cos(angleRad), innerYMm: 7 * Math.sin(angleRad), outerXMm: 13 * Math.cos(angleRad), outerYMm: 13 * Math.sin(angleRad),
})

const ring: RingLayout = {
  outsideMm: 25, holeMm: 15, heightMm: 10, passes: [pass(1, 0), pass(2, 1), pass(3, 2)], sectors: [], tapes: [],
  remainingHoleMm: 13, overallOutsideMm: 27, overallHeightMm: 12, sectorGapMm: null,
}

describe('ringSection', () => {
  const picture = ringSection({ specification: blankSpecification(), ring, maximumWidthMm: 100, maximumHeightMm: 80, balloons: false })

  it('draws each wire in the hole and outside, to the scale it states', () => {
    const circles = picture.shapes.filter((shape) => shape.kind === 'circle' && shape.tag === 'winding:w1 step:s1' && shape.fill === 'paper')
    expect(circles).toHaveLength(6)
    const core = picture.shapes.flatMap((shape) => (shape.kind === 'circle' && shape.tag === 'core' ? [shape.radiusMm] : []))
    expect(core).toEqual([12.5 * picture.scale, 7.5 * picture.scale])
  })

  it('stays within its picture', () => {
    for (const shape of picture.shapes) {
      if (shape.kind !== 'circle') continue
      expect(shape.center[0] - shape.radiusMm).toBeGreaterThanOrEqual(0)
      expect(shape.center[0] + shape.radiusMm).toBeLessThanOrEqual(picture.widthMm)
      expect(shape.center[1] + shape.radiusMm).toBeLessThanOrEqual(picture.heightMm)
    }
  })
})
