/**
 * How long a drawing takes to become a PDF, as a multiple of a plain document of the same package that draws as many
 * paths and glyphs on as many pages, without tags, archive rules or attachment. Prints a table and writes it as JSON.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import PDFDocument from 'pdfkit'
import { fontBytes } from '#server/pdf/fonts'
import { documentBytes } from '#server/pdf/open-document'
import { renderSpecificationPdf } from '#server/pdf/render-sheets'
import { sheetShapes, type Sheet } from '#shared/drawing/model'
import { drawSheets } from '#shared/drawing/sheets/index'
import { sheetToSvg } from '#shared/drawing/to-svg'
import { evaluate } from '#shared/engine/index'
import { buoySupply, mainsFlyback, sampleLibrary } from '../support/sample-specification'
import { stressPart } from '../support/stress-specification'

const FOLDER = fileURLToPath(new URL('../../node_modules/.cache/bench/', import.meta.url))
const RUNS = 5

/** Least time of several runs, ms: what the work costs when nothing disturbs it. */
async function leastMs(work: () => unknown): Promise<number> {
  await work()
  let least = Infinity
  for (let run = 0; run < RUNS; run++) {
    const start = performance.now()
    await work()
    least = Math.min(least, performance.now() - start)
  }
  return least
}

/** As many paths with as many points, and as many texts with as many letters. */
function plainPdf(sheets: readonly Sheet[]): Promise<Buffer> {
  const doc = new PDFDocument({ autoFirstPage: false, margin: 0 })
  doc.registerFont('sans', fontBytes('sans'))
  for (const sheet of sheets) {
    doc.addPage({ size: 'A3', layout: 'landscape', margin: 0 }).font('sans').fontSize(7)
    for (const shape of sheetShapes(sheet)) {
      if (shape.kind === 'label') doc.text(shape.text, shape.anchor[0], shape.anchor[1], { lineBreak: false })
      else if (shape.kind === 'circle') doc.circle(shape.center[0], shape.center[1], shape.radiusMm).stroke()
      else if (shape.kind === 'path') {
        doc.moveTo(...shape.from)
        for (const { to } of shape.steps) doc.lineTo(...to)
        doc.stroke()
      }
    }
  }
  return documentBytes(doc)
}

async function measure(name: string, make: typeof mainsFlyback) {
  const document = make()
  const evaluation = evaluate(document, sampleLibrary)
  const draw = () =>
    drawSheets({ specification: document.specification, evaluation, library: sampleLibrary, revision: 'B', release: { revision: 'B', issuedOn: '2026-09-02', createdBy: 'A', checkedBy: 'B', approvedBy: 'B' }, specificationHash: 'c0ffee'.padEnd(64, '0'), status: 'released' })
  const sheets = draw()
  const print = () =>
    renderSpecificationPdf({ sheets, info: { title: name, subject: '', author: '', language: 'en', date: new Date(0) }, attachment: { name: 'specification.json', bytes: Buffer.from(JSON.stringify(document.specification)), description: '' } })
  const shapes = sheets.flatMap(sheetShapes)
  const letters = shapes.reduce((sum, shape) => sum + (shape.kind === 'label' ? shape.text.length : 0), 0)
  const [plainMs, pdfMs, drawMs, svgMs] = [await leastMs(() => plainPdf(sheets)), await leastMs(print), await leastMs(draw), await leastMs(() => sheets.map(sheetToSvg))]
  return { name, sheets: sheets.length, paths: shapes.filter(({ kind }) => kind !== 'label').length, letters, plainMs, pdfMs, drawMs, svgMs, ratio: pdfMs / plainMs }
}

const rows = []
for (const [name, make] of Object.entries({ buoySupply, mainsFlyback, stressPart })) rows.push(await measure(name, make))
console.log('sheets to PDF: multiples of a plain pdfkit document with as many paths and glyphs')
console.log(`${'part'.padEnd(16)} sheets  paths  letters  multiple   plain ms  PDF ms  drawing ms  SVG ms`)
for (const row of rows) {
  const cells = [row.sheets, row.paths, row.letters].map((value, index) => String(value).padStart([6, 7, 9][index]!)).join('')
  console.log(`${row.name.padEnd(16)} ${cells} ${row.ratio.toFixed(2).padStart(9)} ${row.plainMs.toFixed(0).padStart(10)} ${row.pdfMs.toFixed(0).padStart(7)} ${row.drawMs.toFixed(0).padStart(11)} ${row.svgMs.toFixed(0).padStart(7)}`)
}
mkdirSync(FOLDER, { recursive: true })
writeFileSync(`${FOLDER}sheets.json`, `${JSON.stringify(rows, null, 2)}\n`)
