import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { evaluate, propose } from '#shared/engine/index'
import type { FlybackDuty, SpecificationDocument } from '#shared/engine/specification'
import { describe, expect, it } from 'vitest'

const library = shippedLibrary()
const harbour = propose(HARBOUR_SUPPLY, library).document
const buoy = propose(BUOY_SUPPLY, library).document
const edited = (document: SpecificationDocument, edit: (copy: SpecificationDocument) => void): SpecificationDocument => {
  const copy = structuredClone(document)
  edit(copy)
  return copy
}
const flyback = ({ requirement }: SpecificationDocument) => requirement!.duty as FlybackDuty
const faultsOf = (document: SpecificationDocument) => evaluate(document, library).faults

describe('temperatures under fault', () => {
  it('asks for the overload and for each output shorted', () => {
    expect(faultsOf(buoy).map(({ kind, output }) => `${kind} ${output ?? ''}`.trim())).toEqual(['overload', ...flyback(buoy).outputs.map(({ name }) => `shorted-output ${name}`)])
  })

  it('is hotter under overload than in normal operation, and hotter the higher the limit', () => {
    const overloadC = (document: SpecificationDocument) => faultsOf(document)[0]!.windingC!
    const higher = edited(harbour, (copy) => (flyback(copy).currentLimit!.nominalA *= 1.3))
    expect(overloadC(harbour)).toBeGreaterThan(evaluate(harbour, library).thermal.windingC!)
    expect(overloadC(higher)).toBeGreaterThan(overloadC(harbour))
  })

  // Source: overload limits of IEC 60950-1 Table C.1 as taken up in IEC 62368-1 (from memory): class 130 B 175 °C, class 105 A 150 °C.
  it('is held against the overload limit of the class', () => {
    const cooler = edited(harbour, (copy) => (copy.specification.insulation.systemThermalClassC.value = 105))
    expect(faultsOf(harbour)[0]).toMatchObject({ limitC: 175, state: 'met' })
    expect(faultsOf(cooler)[0]).toMatchObject({ limitC: 150 })
    const hot = edited(harbour, (copy) => (copy.requirement!.ambientC = 165))
    expect(faultsOf(hot)[0]!.state).toBe('not-met')
  })

  it('is not checkable without a current limit, nor where the class has no limit', () => {
    const unlimited = edited(harbour, (copy) => (flyback(copy).currentLimit = null))
    expect(faultsOf(unlimited).every(({ state, windingC }) => state === 'not-checkable' && windingC === null)).toBe(true)
    const unlisted = edited(harbour, (copy) => (copy.specification.insulation.systemThermalClassC.value = 220))
    expect(faultsOf(unlisted).every(({ state }) => state === 'not-checkable')).toBe(true)
  })

  // Source: arithmetic. With all of the core's ampere-turns in one winding its current is at most the limit times the ratio of turns.
  it('loses no more in a shorted winding than the limit’s ampere-turns can', () => {
    const { faults, windings, magnetics } = evaluate(buoy, library)
    const [primary, main] = buoy.specification.windings
    const currentA = (magnetics.worstCurrentA! * primary!.turns) / main!.turns
    const factor = windings[1]!.acFactor!
    const bound = windings[1]!.dcResistanceHotOhm! * 1.4 * currentA ** 2 * Math.max(1, factor) + 1.4 * windings[0]!.dcResistanceHotOhm! * magnetics.worstCurrentA! ** 2 * windings[0]!.acFactor! + 1
    expect(faults[1]!.lossW!).toBeLessThan(bound)
    expect(faults[1]!.lossW!).toBeGreaterThan(0)
  })

  it('names both other readings of the temperature', () => {
    const { thermal } = evaluate(harbour, library)
    expect(thermal.hotSpotC).toBeCloseTo(thermal.windingC! + 10, 9)
    // Source: the two models differ by a quarter at most for bodies of this size (comparison of both laws, stated beside them).
    expect(thermal.riseByVolumeK! / thermal.riseK!).toBeGreaterThan(0.5)
    expect(thermal.riseByVolumeK! / thermal.riseK!).toBeLessThan(2)
  })
})
