import DxfParser from 'dxf-parser'
import { describe, expect, it } from 'vitest'
import { outlineDxf } from '#server/dxf/outline-dxf'
import { terminals } from '#shared/drawing/sheets/terminals'
import { evaluate } from '#shared/engine/index'
import { buoySupply, coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'
import { stressPart } from '../support/stress-specification'

interface Entity {
  type: string
  layer: string
  center?: { x: number; y: number }
  radius?: number
  vertices?: { x: number; y: number }[]
  text?: string
}

function drawn(make: typeof mainsFlyback, specificationHash: string | null = 'c0ffee'.padEnd(64, '0')) {
  const document = make()
  const dxf = outlineDxf({ specification: document.specification, library: sampleLibrary, layout: evaluate(document, sampleLibrary).layout, revision: 'B', specificationHash })
  const parsed = new DxfParser().parseSync(dxf)!
  const entities = parsed.entities as unknown as Entity[]
  return { dxf, header: parsed.header as Record<string, unknown>, on: (layer: string) => entities.filter((entity) => entity.layer === layer), specification: document.specification }
}

describe.each(Object.entries({ mainsFlyback, buoySupply, coupledInductor, stressPart }))('the DXF of %s', (_, make) => {
  const { dxf, header, on, specification } = drawn(make)
  const fitted = specification.former.pins.filter(({ state }) => state !== 'missing')

  it('is in millimetres and pure ASCII', () => {
    expect(header.$INSUNITS).toBe(4)
    expect(/^[\x00-\x7f]*$/.test(dxf)).toBe(true)
  })

  it('has a hole of the stated diameter at the place of each pin that is not missing', () => {
    const holes = on('HOLES').map(({ center, radius }) => `${center!.x.toFixed(3)} ${center!.y.toFixed(3)} ${(2 * radius!).toFixed(3)}`)
    const wanted = fitted.map(({ xMm, yMm }) => `${xMm.toFixed(3)} ${yMm.toFixed(3)} ${specification.former.recommendedHoleMm.value!.toFixed(3)}`)
    expect(holes.sort()).toEqual(wanted.sort())
  })

  it('names the pins of the terminal table', () => {
    const names = terminals(specification).flatMap(({ name, pin }) => (pin && pin.state !== 'missing' ? [name] : []))
    expect(on('PIN_NUMBER').map(({ text }) => text).sort()).toEqual(names.sort())
    expect(on('PIN_USE')).toHaveLength(names.length)
  })

  it('encloses the stated envelope', () => {
    const [envelope] = on('ENVELOPE')
    const { lengthMm, widthMm } = specification.former.envelope.value!
    const size = (index: 'x' | 'y') => Math.max(...envelope!.vertices!.map((vertex) => vertex[index])) - Math.min(...envelope!.vertices!.map((vertex) => vertex[index]))
    expect(size('x')).toBeCloseTo(lengthMm, 6)
    expect(size('y')).toBeCloseTo(widthMm, 6)
  })
})

describe('the DXF of an outline', () => {
  it('is equal when made again', () => {
    expect(drawn(mainsFlyback).dxf).toBe(drawn(mainsFlyback).dxf)
  })

  it('names part, revision and hash, and a draft as a draft', () => {
    const words = (hash: string | null) => drawn(mainsFlyback, hash).on('INFO').map(({ text }) => text).join(' | ')
    expect(words('ab'.repeat(32))).toContain(`SHA-256 ${'ab'.repeat(32)}`)
    expect(words('ab'.repeat(32))).toContain('BM-T-4710-01, revision B')
    expect(words(null)).toContain('DRAFT - NOT RELEASED')
  })
})
