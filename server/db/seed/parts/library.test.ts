import { describe, expect, it } from 'vitest'
import { partRowSchema } from '#shared/contracts/part-rows'
import { partProblems } from '#shared/contracts/part-rules'
import type { AnyLibraryRow, CoreRow, FormerRow } from '#shared/engine/library'
import { deriveFormer } from './former-geometry'
import { shippedLibrary } from './library'

const library = shippedLibrary()
const all: AnyLibraryRow[] = Object.values(library).flat()
const byId = <R extends { id: string }>(rows: readonly R[], id: string) => rows.find((row) => row.id === id)!

describe('shippedLibrary', () => {
  it('names every row once per kind, with an identifier that fits an address', () => {
    const keys = all.map((row) => `${row.kind}/${row.id}`)
    expect(keys.filter((key, index) => keys.indexOf(key) !== index)).toEqual([])
    expect(all.filter((row) => !/^[a-z0-9][a-z0-9.-]{0,63}$/.test(row.id)).map((row) => row.id)).toEqual([])
  })

  it('gives every row a source, and says of every generic row that it is to be replaced', () => {
    expect(all.filter((row) => row.source === '' || row.edition === '').map((row) => row.id)).toEqual([])
    const silent = all.filter((row) => row.confidence === 'generic' && (row.unverified.length === 0 || !row.note.includes('replace before release')))
    expect(silent.map((row) => row.id)).toEqual([])
  })

  it('holds finite figures only', () => {
    const wrong: string[] = []
    const walk = (path: string, value: unknown) => {
      if (typeof value === 'number' && !Number.isFinite(value)) wrong.push(path)
      else if (value && typeof value === 'object') for (const [key, inner] of Object.entries(value)) walk(`${path}.${key}`, inner)
    }
    for (const row of all) walk(`${row.kind}/${row.id}`, row)
    expect(wrong).toEqual([])
  })

  it('marks as unverified only fields that the row has', () => {
    const holds = (row: AnyLibraryRow, path: string) => {
      let value: unknown = row
      for (const [index, key] of path.split('.').entries()) {
        if (value === null || typeof value !== 'object') return index > 0 && value === null
        if (!(key in value)) return false
        value = (value as Record<string, unknown>)[key]
      }
      return true
    }
    const wrong = all.flatMap((row) => row.unverified.filter((path) => !holds(row, path)).map((path) => `${row.id}: ${path}`))
    expect(wrong).toEqual([])
  })
})

describe('cores', () => {
  it('ships at least 200 sizes in at least ten shapes', () => {
    expect(library.cores.length).toBeGreaterThanOrEqual(200)
    expect(new Set(library.cores.map((core) => core.shape)).size).toBeGreaterThanOrEqual(10)
  })

  // IEC 60205: the effective volume is the effective area times the effective length.
  it('agrees with itself: Ae · le within 3 % of Ve, least area not above Ae', () => {
    const deviates = (core: CoreRow) => Math.abs((core.effectiveAreaMm2 * core.effectiveLengthMm) / core.effectiveVolumeMm3 - 1) > 0.03
    expect(library.cores.filter(deviates).map((core) => core.name)).toEqual([])
    expect(library.cores.filter((core) => core.minimumAreaMm2 > core.effectiveAreaMm2).map((core) => core.name)).toEqual([])
  })

  it('leaves out the sizes whose printed figures contradict one another', () => {
    const names = library.cores.map((core) => core.name)
    for (const name of ['U22/21/6', 'U25/13/13', 'T22.1x13.7x12.7']) expect(names).not.toContain(name)
  })

  // Magnetics, Ferrite Cores catalogue 2013, PDF page 47.
  it('reads ETD34/17/11 as printed', () => {
    expect(byId(library.cores, 'etd34-17-11')).toMatchObject({
      shape: 'ETD',
      standard: 'IEC 63093-6',
      effectiveAreaMm2: 97.1,
      minimumAreaMm2: 91.6,
      effectiveLengthMm: 78.6,
      effectiveVolumeMm3: 7640,
      massG: 40,
      dimensionsMm: { a: 34.2, b: 17.3, c: 10.8, d: 12.1, e: 26.3, f: 10.8 },
      centreLeg: { shape: 'round', diameterMm: 10.8 },
    })
  })

  it('makes room for the winding in every window: E above F, B above D', () => {
    const closed = library.cores.filter(({ shape, dimensionsMm: { b, d, e, f } }) => shape !== 'toroid' && f !== null && !(e! > f && b! > d!))
    expect(closed.map((core) => core.name)).toEqual([])
  })
})

describe('rings', () => {
  it('ships ferrite and powder sizes with a hole, an outside and a height', () => {
    const rings = library.cores.filter(({ shape }) => shape === 'toroid')
    expect(rings.length).toBeGreaterThanOrEqual(75)
    expect(rings.filter(({ dimensionsMm: { a, b, c } }) => !(a! > b! && b! > 0 && c! > 0)).map(({ name }) => name)).toEqual([])
  })
})

describe('formers', () => {
  it('ships at least 40 for at least six shapes', () => {
    const shapes = new Set(library.formers.map((former) => byId(library.cores, former.coreId).shape))
    expect(library.formers.length).toBeGreaterThanOrEqual(40)
    expect(shapes.size).toBeGreaterThanOrEqual(6)
  })

  it('ships formers of two sections for at least five cores of two shapes', () => {
    const two = library.formers.filter(({ sections }) => sections === 2)
    expect(two.length).toBeGreaterThanOrEqual(5)
    expect(new Set(two.map(({ coreId }) => byId(library.cores, coreId).shape)).size).toBeGreaterThanOrEqual(2)
  })

  it('fits every former into its core', () => {
    const tooBig = library.formers.filter((former) => {
      const { d, e, f } = byId(library.cores, former.coreId).dimensionsMm
      const builtMm = former.windingHeightMm + former.tubeWallMm
      const widthMm = former.sections * (former.windingWidthMm + former.flangeThicknessMm) + former.flangeThicknessMm
      return widthMm > 2 * d! || builtMm > (e! - f!) / 2
    })
    expect(tooBig.map((former) => former.name)).toEqual([])
  })

  it('numbers the pins once each, in two rows about the middle', () => {
    const wrong = library.formers.filter(({ pins }) => {
      const sum = pins.reduce((total, pin) => ({ x: total.x + pin.xMm, y: total.y + pin.yMm }), { x: 0, y: 0 })
      return new Set(pins.map((pin) => pin.number)).size !== pins.length || Math.abs(sum.x) > 1e-9 || Math.abs(sum.y) > 1e-9
    })
    expect(wrong.map((former) => former.name)).toEqual([])
  })

  const derived = (former: FormerRow) => deriveFormer(byId(library.cores, former.coreId), null)!
  const knownOf = (field: string) =>
    library.formers.filter((former) => former.confidence !== 'generic' && !former.unverified.includes(field)).map((former) => ({ name: former.name, former }))

  // Known widths and areas: typical one-section formers, recalled; ETD34/17/11 from Dixon, SLUP127 page 5-14.
  it.each(knownOf('windingWidthMm'))('derives the known width of $name within 6 %', ({ former }) => {
    expect(Math.abs(derived(former).windingWidthMm / former.windingWidthMm - 1)).toBeLessThan(0.06)
  })

  it.each(knownOf('windingHeightMm'))('derives the known height of $name within 7 %', ({ former }) => {
    expect(Math.abs(derived(former).windingHeightMm / former.windingHeightMm - 1)).toBeLessThan(0.07)
  })

  const areaKnown = library.formers.filter((former) => former.confidence !== 'generic').map((former) => ({ name: former.name, former }))
  it.each(areaKnown)('derives the known window area of $name within 30 %', ({ former }) => {
    const area = derived(former).windingWidthMm * derived(former).windingHeightMm
    expect(Math.abs(area / (former.windingWidthMm * former.windingHeightMm) - 1)).toBeLessThan(0.3)
  })
})

describe('wires', () => {
  // ASTM B258: d = 0.127 mm · 92^((36 − n)/39). McLyman, table 4-10: AWG 24 heavy 0.5817 mm; table 4-16: 0.8153 mm.
  it('holds AWG 24', () => {
    const wire = byId(library.wires, 'awg-24')
    expect(wire.conductorMm).toBeCloseTo(0.127 * 92 ** ((36 - 24) / 39), 5)
    expect(wire.overallMm).toMatchObject({ 'enamel-grade-1': 0.5537, 'enamel-grade-2': 0.5817, 'triple-insulated': 0.8153 })
  })

  // IEC 60317-0-1, table 1.
  it.each([
    { id: 'iec-0.100', grade1: 0.117, grade2: 0.125 },
    { id: 'iec-0.200', grade1: 0.226, grade2: 0.239 },
    { id: 'iec-0.500', grade1: 0.544, grade2: 0.566 },
    { id: 'iec-1.000', grade1: 1.062, grade2: 1.094 },
  ])('holds the overall diameters of $id', ({ id, grade1, grade2 }) => {
    expect(byId(library.wires, id).overallMm).toMatchObject({ 'enamel-grade-1': grade1, 'enamel-grade-2': grade2 })
  })

  it('grows with every grade of enamel', () => {
    const shrinking = library.wires.filter(({ overallMm, form }) => {
      const sizes = [form === 'litz' ? 0 : overallMm.bare, overallMm['enamel-grade-1'], overallMm['enamel-grade-2'], overallMm['enamel-grade-3']]
      const given = sizes.filter((size): size is number => size !== null)
      return given.some((size, index) => index > 0 && size <= given[index - 1]!)
    })
    expect(shrinking.map((wire) => wire.name)).toEqual([])
  })

  // IEC 60317-11: 1.28 · √60 · 0.117 mm of bunched strands, and a serving of 0.035 mm on the radius.
  it('holds litz of 60 strands, as three or more of each strand do', () => {
    expect(byId(library.wires, 'litz-60x0.100').overallMm['enamel-grade-1']).toBeCloseTo(1.28 * Math.sqrt(60) * 0.117 + 0.07, 2)
    for (const strandMm of [0.05, 0.071, 0.1, 0.2]) expect(library.wires.filter(({ form, conductorMm }) => form === 'litz' && conductorMm === strandMm).length).toBeGreaterThanOrEqual(8)
  })

  it('holds foil from 0.025 to 0.3 mm in a dozen widths', () => {
    const foils = library.wires.filter(({ form }) => form === 'foil')
    expect(new Set(foils.map(({ conductorMm }) => conductorMm)).size).toBe(6)
    expect(foils.filter(({ conductorMm }) => conductorMm === 0.1)).toHaveLength(12)
  })

  it('gives copper the resistance of its area: 1/58 to 1/58.5 Ω·mm²/m, litz 2 % more', () => {
    const off = library.wires.filter(({ form, copperAreaMm2, resistance20 }) => {
      const product = resistance20.nominalOhmPerM * copperAreaMm2 * (form === 'litz' ? 1 / 1.02 : 1)
      return product < 1 / 58.6 || product > 1 / 57.95
    })
    expect(off.map((wire) => wire.name)).toEqual([])
  })
})

describe('materials', () => {
  const loss = (id: string, frequencyHz: number, fluxDensityT: number, temperatureC: number) => {
    const fit = byId(library.materials, id).lossFits.find((entry) => frequencyHz >= entry.minimumHz && frequencyHz <= entry.maximumHz)!
    return fit.cm * frequencyHz ** fit.x * fluxDensityT ** fit.y * (fit.ct0 - fit.ct1 * temperatureC + fit.ct2 * temperatureC ** 2)
  }

  // Recomputed from the fit parameters of Ferroxcube, Design of planar power transformers; mW/cm³ = kW/m³.
  it.each([
    { id: 'mnzn-100khz', frequencyHz: 100e3, fluxDensityT: 0.1, temperatureC: 100, kwPerM3: 113.5 },
    { id: 'mnzn-100khz', frequencyHz: 100e3, fluxDensityT: 0.2, temperatureC: 25, kwPerM3: 1358 },
    { id: 'mnzn-100khz-low-loss', frequencyHz: 100e3, fluxDensityT: 0.2, temperatureC: 100, kwPerM3: 565.7 },
    { id: 'mnzn-500khz', frequencyHz: 400e3, fluxDensityT: 0.05, temperatureC: 100, kwPerM3: 135.6 },
  ])('$id loses $kwPerM3 kW/m³ at $frequencyHz Hz, $fluxDensityT T, $temperatureC °C', ({ id, frequencyHz, fluxDensityT, temperatureC, kwPerM3 }) => {
    expect(loss(id, frequencyHz, fluxDensityT, temperatureC) / 1e3 / kwPerM3).toBeCloseTo(1, 2)
  })

  it('lists saturation by rising temperature and falling flux density', () => {
    const wrong = library.materials.filter(({ saturation }) =>
      saturation.some((point, index) => index > 0 && (point.temperatureC <= saturation[index - 1]!.temperatureC || point.fluxDensityT >= saturation[index - 1]!.fluxDensityT)),
    )
    expect(wrong.map((material) => material.id)).toEqual([])
  })

  it('has no overlapping fits, so that one frequency has one answer', () => {
    const overlapping = library.materials.filter(({ lossFits }) => lossFits.some((fit, index) => index > 0 && fit.minimumHz < lossFits[index - 1]!.maximumHz))
    expect(overlapping.map((material) => material.id)).toEqual([])
  })
})

describe('tapes and sleeves', () => {
  it('states no withstand voltage that no maker gave', () => {
    expect(library.tapes.filter((tape) => tape.layerWithstandVRms !== null)).toEqual([])
    expect(library.sleeves.filter((sleeve) => sleeve.withstandVRms !== null)).toEqual([])
  })

  it('declares PTFE as PFAS', () => {
    expect(library.sleeves.filter((sleeve) => sleeve.material === 'PTFE' && !sleeve.note.includes('PFAS'))).toEqual([])
  })
})

describe('the contract of the library', () => {
  it('accepts every shipped row', () => {
    const refused = all.flatMap((row) => partRowSchema.safeParse(row).error?.issues.map((issue) => `${row.id} ${issue.path.join('.')}: ${issue.message}`) ?? [])
    expect(refused).toEqual([])
  })

  it('finds no contradiction in any shipped row', () => {
    const contradictions = all.flatMap((row) => partProblems(partRowSchema.parse(row)).map((problem) => `${row.id} ${problem.path}: ${problem.message}`))
    expect(contradictions).toEqual([])
  })
})
