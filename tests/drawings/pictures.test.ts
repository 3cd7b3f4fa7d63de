import { mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import jsQR from 'jsqr'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Sheet } from '#shared/drawing/model'
import { codeText } from '#shared/drawing/sheets/foot'
import { drawSheets } from '#shared/drawing/sheets/index'
import { line } from '#shared/drawing/shapes'
import { sheetToSvg } from '#shared/drawing/to-svg'
import { renderSpecificationPdf } from '#server/pdf/render-sheets'
import { launchChromium } from '../support/chromium'
import { pdfPictures } from '../support/pdf-tools'
import { evaluate } from '#shared/engine/index'
import { buoySupply, coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'
import { stressPart } from '../support/stress-specification'

const DOTS_PER_INCH = 96
const PIXELS_PER_MM = DOTS_PER_INCH / 25.4
/** Kept to be looked at; git ignores the folder. */
const FOLDER = '.pictures/drawings'

/** The renderers smooth edges and snap fine lines to pixels in their own ways; ink further from ink than this is out of place. */
const REACH_PIXELS = 2
const LARGEST_SHARE = 0.001

const resolve = createRequire(import.meta.url).resolve
const face = (family: string, weight: number, file: string) =>
  `@font-face{font-family:'${family}';font-weight:${weight};src:url(data:font/woff;base64,${readFileSync(resolve(file)).toString('base64')})}`

const STYLE = [
  face('Sheet Sans', 400, '@ibm/plex-sans/fonts/complete/woff/IBMPlexSans-Regular.woff'),
  face('Sheet Sans', 600, '@ibm/plex-sans/fonts/complete/woff/IBMPlexSans-SemiBold.woff'),
  face('Sheet Mono', 400, '@ibm/plex-mono/fonts/complete/woff/IBMPlexMono-Regular.woff'),
  'body{margin:0}svg{display:block}',
].join('')

let browser: Browser
let page: Page

beforeAll(async () => {
  mkdirSync(FOLDER, { recursive: true })
  browser = await launchChromium()
  page = await browser.newPage({ viewport: { width: Math.ceil(420 * PIXELS_PER_MM), height: Math.ceil(297 * PIXELS_PER_MM) } })
})

afterAll(() => browser?.close())

async function svgPicture(sheet: Sheet): Promise<Buffer> {
  await page.setContent(`<!doctype html><meta charset="utf-8"><style>${STYLE}</style>${sheetToSvg(sheet)}`)
  await page.evaluate(() => document.fonts.ready.then(() => undefined))
  return page.screenshot()
}

interface Agreement {
  /** Ink of either picture without ink of the other within reach, as a share of all ink. */
  lost: number
  /** Ink over all pixels, so that nothing agrees by being empty. */
  ink: number
}

async function compare(first: Buffer, second: Buffer): Promise<Agreement> {
  return page.evaluate(
    async ({ sources, reach }) => {
      const read = async (source: string) => {
        const image = new Image()
        image.src = `data:image/png;base64,${source}`
        await image.decode()
        const canvas = document.createElement('canvas')
        const [width, height] = [image.width, image.height]
        Object.assign(canvas, { width, height })
        const context = canvas.getContext('2d')!
        context.drawImage(image, 0, 0)
        const { data } = context.getImageData(0, 0, width, height)
        return { width, height, grey: Uint8Array.from({ length: width * height }, (_, index) => data[index * 4]!) }
      }
      type Grey = Awaited<ReturnType<typeof read>>
      const hasInkNear = ({ width, height, grey }: Grey, x: number, y: number) => {
        for (let row = Math.max(0, y - reach); row <= Math.min(height - 1, y + reach); row++)
          for (let column = Math.max(0, x - reach); column <= Math.min(width - 1, x + reach); column++) if (grey[row * width + column]! < 215) return true
        return false
      }
      const lostIn = (one: Grey, other: Grey) => {
        let [ink, lost] = [0, 0]
        one.grey.forEach((value, index) => {
          if (value >= 120) return
          ink++
          if (!hasInkNear(other, index % one.width, Math.floor(index / one.width))) lost++
        })
        return { ink, lost }
      }
      const [a, b] = [await read(sources[0]!), await read(sources[1]!)]
      const [there, back] = [lostIn(a, b), lostIn(b, a)]
      return { lost: (there.lost + back.lost) / (there.ink + back.ink), ink: there.ink / a.grey.length }
    },
    { sources: [first.toString('base64'), second.toString('base64')], reach: REACH_PIXELS },
  )
}

describe.each(Object.entries({ mainsFlyback, buoySupply, coupledInductor, stressPart }))('the pictures of %s', (name, make) => {
  it('agree between SVG in the browser and PDF', { timeout: 120_000 }, async () => {
    const document = make()
    const released = name !== 'coupledInductor'
    const sheets = drawSheets({
      specification: document.specification,
      evaluation: evaluate(document, sampleLibrary),
      library: sampleLibrary,
      revision: released ? 'B' : 'P2',
      release: released ? { revision: 'B', issuedOn: '2026-09-02', createdBy: 'E. Halloran', checkedBy: 'M. Okafor', approvedBy: 'J. Lindqvist' } : null,
      specificationHash: released ? 'c0ffee'.padEnd(64, '0') : null,
      status: released ? 'released' : 'draft',
    })
    const pdf = await renderSpecificationPdf({
      sheets,
      info: { title: name, subject: 'Winding specification', author: 'Brightmoor Power Works', language: 'en', date: new Date('2026-09-02T00:00:00Z') },
      attachment: { name: 'specification.json', bytes: Buffer.from('{}'), description: 'specification' },
    })
    const printed = pdfPictures(pdf, DOTS_PER_INCH)
    expect(printed).toHaveLength(sheets.length)
    for (const [index, sheet] of sheets.entries()) {
      const shown = await svgPicture(sheet)
      writeFileSync(`${FOLDER}/${name}-${index + 1}-svg.png`, shown)
      writeFileSync(`${FOLDER}/${name}-${index + 1}-pdf.png`, printed[index]!)
      const { lost, ink } = await compare(shown, printed[index]!)
      expect(ink, `ink on sheet ${index + 1}`).toBeGreaterThan(0.003)
      expect(lost, `ink out of place on sheet ${index + 1}`).toBeLessThan(LARGEST_SHARE)
    }
  })
})

it('shows a code that a reader finds on the printed sheet, at half the resolution of a fax', async () => {
  const document = mainsFlyback()
  const input = { specification: document.specification, evaluation: null, library: sampleLibrary, revision: 'B', release: { revision: 'B', issuedOn: '2026-09-02', createdBy: 'A', checkedBy: 'B', approvedBy: 'B' }, specificationHash: 'c0ffee'.padEnd(64, '0'), status: 'released' as const }
  const [sheet] = drawSheets(input)
  const pdf = await renderSpecificationPdf({ sheets: [sheet!], info: { title: 'code', subject: '', author: '', language: 'en', date: new Date('2026-09-02T00:00:00Z') }, attachment: { name: 'specification.json', bytes: Buffer.from('{}'), description: '' } })
  const [printed] = pdfPictures(pdf, 100)
  const { data, width, height } = await pixelsOf(printed!)
  expect(jsQR(Uint8ClampedArray.from(data), width, height)?.data).toBe(codeText(input))
})

/** Colours of the lower middle of a sheet, where the code stands, as the browser decodes the picture. */
const pixelsOf = (picture: Buffer) =>
  page.evaluate(async (source) => {
    const image = new Image()
    image.src = `data:image/png;base64,${source}`
    await image.decode()
    const [x, y, width, height] = [0.44, 0.8, 0.12, 0.2].map((share, index) => Math.round(share * (index % 2 === 0 ? image.width : image.height)))
    const canvas = Object.assign(document.createElement('canvas'), { width, height })
    const context = canvas.getContext('2d')!
    context.drawImage(image, -x!, -y!)
    return { data: [...context.getImageData(0, 0, width!, height!).data], width: width!, height: height! }
  }, picture.toString('base64'))

it('tells a shape that lies a millimetre off', async () => {
  const blank: Sheet = { number: 1, count: 1, title: 'Test', widthMm: 420, heightMm: 297, blocks: [] }
  const sheet = (xMm: number): Sheet => ({ ...blank, blocks: [{ kind: 'artifact', shapes: [line([xMm, 20], [xMm, 250], 'thin'), line([100, 20], [100, 250], 'outline')] }] })
  const { lost } = await compare(await svgPicture(sheet(200)), await svgPicture(sheet(201)))
  expect(lost).toBeGreaterThan(LARGEST_SHARE)
})
