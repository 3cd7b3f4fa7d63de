import { describe, expect, it } from 'vitest'
import { sheetShapes, type Shape, type Sheet } from '#shared/drawing/model'
import { pinView } from '#shared/drawing/figures/pin-view'
import { holePattern } from '#shared/drawing/figures/outline/hole-pattern'
import { outline } from '#shared/drawing/figures/outline/outline'
import { schematic } from '#shared/drawing/figures/schematic'
import { drawSheets } from '#shared/drawing/sheets/index'
import { terminals } from '#shared/drawing/sheets/terminals'
import type { SpecificationDocument, WindingSpecification } from '#shared/engine/specification'
import { evaluate } from '#shared/engine/index'
import { buoySupply, coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'
import { fullSpecification } from '../support/full-specification'

const RELEASE = { revision: 'B', issuedOn: '2026-09-02', createdBy: 'E. Halloran', checkedBy: 'M. Okafor', approvedBy: 'J. Lindqvist' }

type Path = (string | number)[]

function leaves(value: unknown, path: Path = []): { path: Path; value: unknown }[] {
  if (value === null || typeof value !== 'object') return [{ path, value }]
  return Object.entries(value).flatMap(([key, inner]) => leaves(inner, [...path, Array.isArray(value) ? Number(key) : key]))
}

function withLeaf(specification: WindingSpecification, path: Path, value: unknown): WindingSpecification {
  const copy = structuredClone(specification)
  let at = copy as unknown as Record<string, unknown>
  for (const key of path.slice(0, -1)) at = at[key] as Record<string, unknown>
  at[path.at(-1)!] = value
  return copy
}

const squeeze = (text: string) => text.replace(/[\s\u00a0\u202f]/g, '')

/** Text of all labels, each by itself, so that no figure arises from two neighbours. */
function sheetText(sheets: readonly Sheet[]): string {
  return squeeze(sheets.flatMap(sheetShapes).flatMap((shape) => (shape.kind === 'label' ? [shape.text] : [])).join('|'))
}

const document = fullSpecification()
const evaluation = evaluate(document, sampleLibrary)
const draw = (specification: WindingSpecification) =>
  sheetText(drawSheets({ specification, evaluation, library: sampleLibrary, revision: 'B', release: RELEASE, specificationHash: null, status: 'released' }))

/** What is no content of the drawing: identities, ties between rows, how a value came about, versions of rows. */
function isContent(path: Path): boolean {
  const text = path.join('.')
  const last = String(path.at(-1))
  if (text === 'schema' || text.includes('.origin') || /(^|\.)(id|outputId|boundaryId|windingId|status|kind)$/.test(text)) return false
  if (/WindingIds?(\.|$)|windingIds/.test(text) || last === 'fields' || /notes\.\d+\.fields/.test(text)) return false
  return true
}

/** A figure that is found whatever prefix or percent sign it is shown with. */
function markedFigure(value: number): { value: number; digits: RegExp } {
  const whole = Number.isInteger(value) && Math.abs(value) < 1000
  if (whole) return { value: 739, digits: /739/ }
  const scale = 10 ** Math.floor(Math.log10(Math.abs(value)))
  return { value: Number((Math.sign(value) * 7.3931 * scale).toPrecision(6)), digits: /7\.?3\.?9\.?3\.?1/ }
}

describe('every figure of the record', () => {
  const figures = leaves(document.specification).filter(({ path, value }) => typeof value === 'number' && value !== 0 && isContent(path))

  it('is looked for by marks that the record itself does not hold', () => {
    expect(draw(document.specification)).not.toMatch(/739|7\.?3\.?9\.?3\.?1|Qxz7/)
  })

  it.each(figures.map(({ path, value }) => [path.join('.'), path, value as number] as const))('%s stands on a sheet', (_, path, value) => {
    const marked = markedFigure(value)
    expect(draw(withLeaf(document.specification, path, marked.value))).toMatch(marked.digits)
  })
})

describe('every free text of the record', () => {
  const texts = leaves(document.specification).filter(({ path, value }) => typeof value === 'string' && isContent(path) && !isChoice(path))
  it.each(texts.map(({ path }) => [path.join('.'), path] as const))('%s stands on a sheet', (_, path) => {
    expect(draw(withLeaf(document.specification, path, 'Qxz7'))).toContain('Qxz7')
  })
})

/** Values from a closed list are drawn in words; library references by the row's name. */
function isChoice(path: Path): boolean {
  return /contract|documentStatus|topology|polarity|waveform|method$|model|equivalenceRule|control|position\.value$|grinding|potential|connection|side$|plastic|mounting|pinView|shape|role|insulation$|direction|lay$|leadExit|purpose|form|process|extent|between|unit|characteristic|record|reaction\.|projection|productStandard|paperSize|core\.core|interlayerTape|tape|sleeve|wire\.wire|former\.former|core\.material|dateCode|machineReadable|solderProfile|overvoltage|materialGroup/.test(path.join('.'))
}

const pinsOf = (shapes: readonly Shape[]) => new Set(shapes.flatMap((shape) => (shape.tag?.startsWith('pin:') ? [shape.tag.slice(4)] : [])))

describe.each(Object.entries({ mainsFlyback, buoySupply, coupledInductor }))('the pins of %s', (_, make: () => SpecificationDocument) => {
  const { specification } = make()
  const fitted = new Set(specification.former.pins.filter(({ state }) => state === 'fitted').map(({ number }) => number))

  it('are the same in both views and in the table of terminals', () => {
    const all = new Set(specification.former.pins.map(({ number }) => number))
    expect(pinsOf(pinView(specification, 'top', 63, 50).shapes)).toEqual(all)
    expect(pinsOf(pinView(specification, 'bottom', 63, 50).shapes)).toEqual(all)
    expect(new Set(terminals(specification).map(({ name }) => name))).toEqual(all)
  })

  it('that are not missing are those of the outline and of the holes', () => {
    const present = new Set(specification.former.pins.filter(({ state }) => state !== 'missing').map(({ number }) => number))
    const views = outline({ specification, library: sampleLibrary, layout: null, widthMm: 228, heightMm: 200 })!
    expect(pinsOf(views.shapes)).toEqual(present)
    expect(pinsOf(holePattern(specification, 146, 80)!.shapes)).toEqual(present)
  })

  it('that are fitted are those of the schematic and of the windings', () => {
    const circuit = pinsOf(schematic({ specification, library: sampleLibrary, widthMm: 116, maximumHeightMm: 200 }).shapes)
    expect(circuit).toEqual(fitted)
  })

  it('that the tests name exist', () => {
    const tested = specification.tests.flatMap((test) => [...test.drivenTerminals, ...test.shortedTerminals.flat(), ...test.openTerminals])
    expect([...new Set(tested)].filter((name) => name !== '' && !fitted.has(name))).toEqual([])
  })

  it('mirror each other between the views', () => {
    const place = (view: 'top' | 'bottom') => new Map(pinView(specification, view, 63, 50).shapes.flatMap((shape) => (shape.kind === 'label' && shape.font === 'sans-bold' && shape.tag ? [[shape.text, shape.anchor] as const] : [])))
    const bottom = place('bottom')
    for (const [name, [x, y]] of place('top')) {
      expect(bottom.get(name)![0] + x).toBeCloseTo(63, 6)
      expect(bottom.get(name)![1]).toBeCloseTo(y, 6)
    }
  })
})
