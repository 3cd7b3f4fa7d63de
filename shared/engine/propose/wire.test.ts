import { describe, expect, it } from 'vitest'
import type { Library, WireRow } from '../library'
import { evenLayers, fitToLayers, layersOf } from './layer-fit'
import { DEFAULT_PREFERENCES } from './preferences'
import { chooseWire, roundStock } from './wire'
import type { WireNeed } from './wire'

/** Round wire by IEC 60317-0-1, grade 1, and litz; areas from the diameters. */
const wire = (id: string, of: Partial<WireRow>): WireRow => ({
  kind: 'wire', id, version: 1, name: id, source: 'IEC 60317-0-1', edition: '', confidence: 'high', unverified: [], note: null,
  form: 'round', standard: 'IEC 60317-0-1', size: id, conductorToleranceMm: null, strands: 1, resistance20: { nominalOhmPerM: 1, minimumOhmPerM: null, maximumOhmPerM: null }, widthMm: null,
  conductorMm: 1, copperAreaMm2: 1, overallMm: { 'enamel-grade-1': 1, 'enamel-grade-2': null, 'enamel-grade-3': null, 'triple-insulated': null, 'fully-insulated': null, bare: null },
  ...of,
} as WireRow)
const round = (conductorMm: number, overallMm: number) => wire(`r${conductorMm}`, { conductorMm, copperAreaMm2: (Math.PI / 4) * conductorMm ** 2, overallMm: { ...wire('', {}).overallMm, 'enamel-grade-1': overallMm } })
const litz = (strands: number, conductorMm: number) => wire(`l${strands}x${conductorMm}`, { form: 'litz', strands, conductorMm, copperAreaMm2: (strands * Math.PI * conductorMm ** 2) / 4, overallMm: { ...wire('', {}).overallMm, 'enamel-grade-1': 1.2 * Math.sqrt(strands) * conductorMm * 1.2 } })

const ROUNDS = [round(0.09, 0.105), round(0.1, 0.117), round(0.16, 0.182), round(0.2, 0.226), round(0.355, 0.392), round(0.4, 0.439), round(0.45, 0.491), round(0.5, 0.544), round(0.56, 0.606)]
const library = { wires: [...ROUNDS, litz(40, 0.071), litz(100, 0.071), litz(180, 0.071), litz(225, 0.05), litz(100, 0.05), litz(100, 0.1)] } as unknown as Library
const need = (of: Partial<WireNeed>): WireNeed => ({ rmsA: 1, acShare: 0.7, style: 'round', currentDensityAPerMm2: 5, frequencyHz: 100e3, temperatureC: 100, insulation: 'enamel-grade-1', thermalClassC: 155, ...of })
const choose = (of: Partial<WireNeed>) => {
  const chosen = chooseWire(library, need(of), DEFAULT_PREFERENCES)!
  return { id: chosen.row.id, parallel: chosen.use.parallel, makeshift: chosen.makeshift }
}

describe('the wire of a winding', () => {
  it.each([
    // 100 kHz, 100 °C: δ = 0.24 mm. 0.2 mm² less 2 %: one wire of 0.500 mm is too thick, two of 0.355 mm are not.
    { title: 'is within two skin depths', of: {}, id: 'r0.355', parallel: 2 },
    { title: 'is as thick as it likes where the current is nearly direct', of: { acShare: 0.2 }, id: 'r0.5', parallel: 1 },
    { title: 'is no thinner than 0.10 mm', of: { rmsA: 0.01 }, id: 'r0.1', parallel: 1 },
    { title: 'is a litz of the thickest strand up to a third of the skin depth', of: { rmsA: 2.8, style: 'litz' as const }, id: 'l180x0.071', parallel: 1 },
    { title: 'is a litz with little copper too much', of: { rmsA: 4.8, style: 'litz' as const }, id: 'l100x0.071', parallel: 3 },
    { title: 'is a litz of the finest strand where none is fine enough', of: { rmsA: 1, style: 'litz' as const, frequencyHz: 400e3 }, id: 'l100x0.05', parallel: 1 },
  ])('$title', ({ of, id, parallel }) => {
    expect(choose(of)).toEqual({ id, parallel, makeshift: false })
  })

  it('is a makeshift where only more wires than a machine lays carry the current', () => {
    expect(choose({ rmsA: 13 })).toEqual({ id: 'r0.56', parallel: 11, makeshift: true })
  })
})

describe('layers', () => {
  it('tell how full the last one is', () => {
    // 20 turns of 1 mm in 20 mm: 19 in a layer, one left.
    expect(layersOf(20, 20, 1)).toEqual({ layers: 2, most: 19, lastFill: 1 / 19 })
    expect(evenLayers(20, 20, 1)).toBe(2)
    expect(evenLayers(36, 20, 1)).toBeNull()
    expect(evenLayers(19, 20, 1)).toBeNull()
  })

  const fit = (rmsA: number, turns: number, availableMm: number) => {
    const wanted = need({ rmsA })
    const fitted = fitToLayers(chooseWire(library, wanted, DEFAULT_PREFERENCES)!, wanted, { room: { availableMm, parts: [turns] }, stock: roundStock(library, DEFAULT_PREFERENCES, 'enamel-grade-1') })
    return `${fitted.use.parallel} × ${fitted.row.id}`
  }

  it('are saved by the next thinner wire when one would hold a few turns only', () => {
    // 0.7 A: 0.14 mm², 0.450 mm. 21 turns of 0.491 mm take 10.8 mm of 10.2; of 0.439 mm 9.7 mm, at 5.6 A/mm².
    expect(fit(0.7, 21, 11)).toBe('1 × r0.45')
    expect(fit(0.7, 21, 10.2)).toBe('1 × r0.4')
  })

  it('are never bought with much more current density', () => {
    // 0.355 mm would carry 7.1 A/mm².
    expect(fit(0.7, 21, 9)).toBe('1 × r0.45')
  })

  it('take sturdier wire where it costs none', () => {
    // 0.02 A: 0.10 mm does; ten turns of 0.20 mm lie in one layer as well.
    expect(fit(0.02, 10, 10)).toBe('1 × r0.2')
    // 60 turns of 0.117 mm fill one layer of 8 mm, those of 0.16 mm do not.
    expect(fit(0.02, 60, 8)).toBe('1 × r0.1')
  })
})
