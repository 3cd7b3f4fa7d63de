import { describe, expect, it } from 'vitest'
import { sheetShapes, type LabelShape, type Sheet } from '#shared/drawing/model'
import { drawSheets, type DrawingInput } from '#shared/drawing/sheets/index'
import { FRAME } from '#shared/drawing/sheets/frame'
import { labelBox } from '#shared/drawing/text-metrics'
import type { SpecificationDocument } from '#shared/engine/specification'
import { blankSpecification } from '../support/blank-specification'
import { evaluate } from '#shared/engine/index'
import { buoySupply, coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'
import { lineOverlaps, textOverlaps } from '../support/overlaps'
import { fullSpecification } from '../support/full-specification'
import { stressPart } from '../support/stress-specification'

const RELEASE = { revision: 'B', issuedOn: '2026-09-02', createdBy: 'E. Halloran', checkedBy: 'M. Okafor', approvedBy: 'J. Lindqvist' }

function inputFor(document: SpecificationDocument, overrides: Partial<DrawingInput> = {}): DrawingInput {
  return {
    specification: document.specification,
    evaluation: evaluate(document, sampleLibrary),
    library: sampleLibrary,
    revision: 'B',
    release: RELEASE,
    specificationHash: 'c0ffee'.padEnd(64, '0'),
    status: 'released',
    ...overrides,
  }
}

const labels = (sheet: Sheet): LabelShape[] => sheetShapes(sheet).filter((shape): shape is LabelShape => shape.kind === 'label' && shape.ink === 'ink')

/** Labels that say something: all but those of frame and marks. */
const contents = (sheet: Sheet): LabelShape[] => labels({ ...sheet, blocks: sheet.blocks.filter(({ kind }) => kind !== 'artifact') })

const textOf = (sheets: readonly Sheet[]): string => sheets.flatMap((sheet) => labels(sheet).map(({ text }) => text)).join(' ').replace(/[\u00a0\u202f]/g, ' ')

const sheets = (document: SpecificationDocument) => drawSheets(inputFor(document, { release: null, revision: 'P3', status: 'draft' }))

const parts = { mainsFlyback, buoySupply, coupledInductor, fullSpecification, stressPart }

describe.each(Object.entries(parts))('the sheets of %s', (_, make) => {
  const sheets = drawSheets(inputFor(make()))

  it('have no two texts that overlap', () => {
    expect(sheets.flatMap(textOverlaps)).toEqual([])
  })

  it('have no line through a text', () => {
    expect(sheets.flatMap(lineOverlaps)).toEqual([])
  })

  it('keep all text inside the frame', () => {
    const outside = sheets.flatMap(contents).filter((label) => {
      const box = labelBox(label)
      return box.leftMm < FRAME.leftMm || box.rightMm > FRAME.rightMm || box.bottomMm < FRAME.bottomMm || box.topMm > FRAME.topMm
    })
    expect(outside.map(({ text }) => text)).toEqual([])
  })

  it('count themselves and carry number, revision and hash on each', () => {
    sheets.forEach((sheet, index) => {
      const text = textOf([sheet])
      expect(text).toContain(`${index + 1}/${sheets.length}`)
      expect(text).toContain('c0ffee'.padEnd(64, '0'))
    })
  })
})

describe('the title block', () => {
  it('holds the mandatory data fields of ISO 7200', () => {
    const [first] = drawSheets(inputFor(mainsFlyback()))
    const text = textOf([first!])
    const expected = ['Brightmoor Power Works', 'BM-T-4710-01', '2026-09-02', '1/', 'Transformer, flyback, 40 W', 'E. Halloran', 'M. Okafor', 'J. Lindqvist', 'Component drawing – winding specification']
    expect(expected.filter((each) => !text.includes(each))).toEqual([])
  })

  it('says of a draft that it is not released, with a mark across each sheet', () => {
    const sheets = drawSheets(inputFor(coupledInductor(), { release: null, revision: 'P2', status: 'draft', specificationHash: null }))
    for (const sheet of sheets) {
      expect(sheetShapes(sheet).some((shape) => shape.kind === 'label' && shape.ink === 'faint' && shape.text === 'DRAFT P2')).toBe(true)
      expect(textOf([sheet])).toContain('Draft – not released')
    }
  })
})

describe('what nobody has filled', () => {
  it('is listed by name', () => {
    const text = textOf(drawSheets(inputFor(coupledInductor())))
    expect(text).toContain('Impregnation, encapsulation: Process')
    expect(text).toContain('Insulation system: Product standard')
  })

  it('does not stop an empty specification from being drawn', () => {
    const specification = blankSpecification()
    const sheets = drawSheets({ ...inputFor(mainsFlyback()), specification, evaluation: null, release: null, status: 'draft', revision: 'P1' })
    expect(sheets.flatMap(textOverlaps)).toEqual([])
  })
})

describe('a contradictory draft', () => {
  it('is drawn, with the contradictions printed on it', () => {
    const document = mainsFlyback()
    const { specification } = document
    specification.windings[0]!.turns = 47
    specification.windings[2]!.finishTerminal = '99'
    const text = textOf(drawSheets(inputFor(document, { release: null, revision: 'P3', status: 'draft' })))
    expect(text).toContain('Winding P has 47 turns, the winding sequence lays 46.')
    expect(text).toContain('Winding AUX: there is no terminal 99 among the pins and flying leads.')
  })

  it('names both places of each contradiction', () => {
    const document = mainsFlyback()
    const { former, windings, core, tests, insulation, sequence } = document.specification
    windings[1]!.startTerminal = windings[0]!.startTerminal
    former.pins.push({ ...former.pins[3]!, xMm: 0, yMm: 0 })
    Object.assign(core.gap.alH, { value: 310e-9, status: 'mandatory' })
    Object.assign(core.gap.lengthMm, { value: 0.3, status: 'mandatory' })
    tests[0]!.drivenTerminals = ['14']
    tests[1]!.boundaryId = 'b9'
    insulation.boundaries[0]!.between = [{ kind: 'side', side: 'secondary-3' }, { kind: 'core' }]
    former.pinPitchMm.value = 3.3
    sequence.splice(sequence.findIndex((step) => step.kind === 'winding' && step.windingId === 'w3'), 1)
    const text = textOf(drawSheets(inputFor(document, { release: null, revision: 'P3', status: 'draft' })))
    const expected = [
      'Pin 1 is used twice: by P (primary) and by S1 (secondary).',
      'Pins: 4 is there twice',
      'AL and length are both mandatory',
      'Test 1: pin 14 is marked as missing among the pins.',
      'Test 2: there is no boundary b9.',
      'ends at the secondary 3 side, where no winding lies.',
      'Pin pitch 3.3 mm is stated, but no two pins lie that far apart.',
      'Winding AUX is not in the winding sequence.',
    ]
    expect(expected.filter((each) => !text.includes(each))).toEqual([])
    expect(sheets(document).flatMap((sheet) => [...textOverlaps(sheet), ...lineOverlaps(sheet)])).toEqual([])
  })

  it('is drawn when the library lacks every row', () => {
    const library = { cores: [], formers: [], materials: [], wires: [], tapes: [], sleeves: [] }
    expect(textOf(drawSheets(inputFor(mainsFlyback(), { library })))).toContain('etd29-16-10, version 1')
  })
})
