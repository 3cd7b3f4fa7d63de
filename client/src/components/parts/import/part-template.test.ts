import { describe, expect, it } from 'vitest'
import { PART_KINDS } from '#shared/contracts/part-rows'
import { importColumns } from '#shared/parts/import-columns'
import { takes, unitOfColumn } from './part-template'

const column = (kind: (typeof PART_KINDS)[number], path: string) => importColumns(kind).find((each) => each.path === path)!

describe('the help of a column', () => {
  it.each([
    ['core', 'effectiveAreaMm2', 'mm²'],
    ['core', 'dimensionsMm.a', 'mm'],
    ['core', 'massG', 'g'],
    ['former', 'tube.diameterMm', 'mm'],
    ['former', 'sections', ''],
    ['material', 'permeabilityTolerance', 'share, 0.25 for 25 %'],
    ['material', 'frequencyRangeHz.maximum', 'Hz'],
    ['material', 'densityKgPerM3', 'kg/m³'],
    ['wire', 'resistance20.nominalOhmPerM', 'Ω/m'],
    ['wire', 'overallMm.enamel-grade-2', 'mm'],
    ['tape', 'widthsMm', 'mm'],
    ['tape', 'layerWithstandVRms', 'V rms'],
    ['sleeve', 'thermalClassC', '°C'],
  ] as const)('%s: %s is in “%s”', (kind, path, unit) => {
    expect(unitOfColumn(column(kind, path))).toBe(unit)
  })

  it('says that lists of records are JSON', () => {
    expect(takes(column('former', 'pins'))).toBe('JSON: [{"number": …, "xMm": …, "yMm": …}]')
  })

  it('leaves only numbers without dimension without a unit', () => {
    const bare = PART_KINDS.flatMap((kind) => importColumns(kind).filter((each) => each.holds === 'figure' && unitOfColumn(each) === '').map(({ path }) => path))
    expect(bare.sort()).toEqual(['initialPermeability', 'sections', 'strands'])
  })
})
