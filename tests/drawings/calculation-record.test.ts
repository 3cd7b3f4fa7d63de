import { renderCalculationRecordPdf } from '#server/pdf/render-calculation-record'
import { canonicalJson } from '#shared/canonical-json'
import { evaluate } from '#shared/engine/index'
import { beforeAll, describe, expect, it } from 'vitest'
import { attachedFile, pdfFonts, pdfText, plainBlanks, qpdfCheck } from '../support/pdf-tools'
import { mainsFlyback, sampleLibrary } from '../support/sample-specification'

const document = mainsFlyback()
const evaluation = evaluate(document, sampleLibrary, { working: true })
const bytes = Buffer.from(canonicalJson(evaluation))
const make = (sealedEngine: string | null) => renderCalculationRecordPdf({ partNumber: 'BM-T4710', title: 'Transformer', revision: 'P1', company: 'Owner', date: '2026-01-02', document, evaluation, sealedEngine, bytes })

describe('the calculation record', () => {
  let pdf: Buffer
  let text: string
  beforeAll(async () => {
    pdf = await make(null)
    // A long formula breaks into lines.
    text = pdfText(pdf).replaceAll(' ', '')
  }, 120_000)

  it('holds every figure that has a working, with formula and source', () => {
    const squeezed = (words: string) => plainBlanks(words).replaceAll(' ', '')
    // What stands in two columns beside each other is read line by line, so a text that is broken is looked for by its beginning.
    const missing = Object.values(evaluation.working).flatMap(({ formula, source }) => [formula, source]).filter((words) => !text.includes(squeezed(words).slice(0, 10)))
    expect(missing).toEqual([])
    expect(Object.keys(evaluation.working).length).toBeGreaterThan(20)
  })

  it('holds every check by its code, and the requirement sheet', () => {
    for (const { code } of evaluation.checks) expect(text).toContain(code)
    expect(text).toContain('switchingFrequencyHz')
  })

  it('is a sound file with its fonts and the evaluation in it, byte for byte the same each time', async () => {
    expect(qpdfCheck(pdf)).toContain('No syntax or stream encoding errors')
    expect(pdfFonts(pdf).every(({ embedded }) => embedded)).toBe(true)
    expect(attachedFile(pdf, 'evaluation.json').equals(bytes)).toBe(true)
    expect((await make(null)).equals(pdf)).toBe(true)
  }, 120_000)

  it('says when another engine sealed the release', async () => {
    expect(pdfText(await make('0.0.1'), 1)).toContain('sealed with engine 0.0.1')
  }, 120_000)
})
