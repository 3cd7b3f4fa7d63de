import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { canonicalJson } from '#shared/canonical-json'
import { windingSpecificationSchema } from '#shared/contracts/specification-document'
import { drawSheets } from '#shared/drawing/sheets/index'
import { evaluate } from '#shared/engine/index'
import { libraryInUse, RELEASED_SCHEMA, type ReleasedSpecification } from '#shared/engine/released'
import { renderSpecificationPdf } from '#server/pdf/render-sheets'
import { fullSpecification } from '../support/full-specification'
import { dictionariesIn, pageContents, pdfObjects } from '../support/pdf-objects'
import { attachedFile, pdfInfo, pdfText } from '../support/pdf-tools'
import { coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'

// Rules of ISO 19005-3 (PDF/A-3, conformance level B) that are checked on the bytes, by clause. What is not checked
// here: colour fidelity, the syntax of fonts and profiles, and metadata schemas beyond those used.

const RELEASE = { revision: 'B', issuedOn: '2026-09-02', createdBy: 'E. Halloran', checkedBy: 'M. Okafor', approvedBy: 'J. Lindqvist' }
const FILE = 'winding-specification.json'
const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex')

async function release(make: typeof mainsFlyback) {
  const document = make()
  const { specification } = document
  const { library } = libraryInUse(specification, sampleLibrary)
  const evaluation = evaluate(document, library)
  const released: ReleasedSpecification = { schema: RELEASED_SCHEMA, release: RELEASE, engine: evaluation.engine, specification, library }
  const bytes = Buffer.from(canonicalJson(released), 'utf8')
  const sheets = drawSheets({ specification, evaluation, library, revision: 'B', release: RELEASE, specificationHash: sha256(bytes), status: 'released' })
  const pdf = await renderSpecificationPdf({
    sheets,
    info: { title: 'BM-T-4710-01 B', subject: 'Winding specification', author: 'Brightmoor Power Works', language: 'en', date: new Date('2026-09-02T00:00:00Z') },
    attachment: { name: FILE, bytes, description: 'The winding specification as canonical JSON (RFC 8785)' },
  })
  return { pdf, bytes, sheets }
}

describe.each(Object.entries({ mainsFlyback, coupledInductor, fullSpecification }))('PDF/A-3 rules on the sheets of %s', async (_, make) => {
  const { pdf, bytes, sheets } = await release(make)
  const { trailer, objects, follow, dictionary } = pdfObjects(pdf)
  const catalog = dictionary(trailer['/Root'])
  const dictionaries = objects.flatMap(({ value }) => dictionariesIn(value))
  const withType = (type: string) => dictionaries.filter((each) => each['/Type'] === type)

  it('6.1.2 begins with a header and four bytes above 127', () => {
    expect(pdf.subarray(0, 8).toString('latin1')).toBe('%PDF-1.7')
    const second = pdf.subarray(pdf.indexOf('\n') + 1, pdf.indexOf('\n') + 6)
    expect(second[0]).toBe('%'.charCodeAt(0))
    expect([...second.subarray(1)].every((byte) => byte > 127)).toBe(true)
  })

  it('6.1.3 has a file identifier and is not encrypted', () => {
    expect(trailer['/ID']).toHaveLength(2)
    expect(trailer).not.toHaveProperty('/Encrypt')
  })

  it('6.1.7 uses no LZW compression and no external streams', () => {
    const filters = objects.filter(({ isStream }) => isStream).map(({ value }) => JSON.stringify(dictionary(value)['/Filter'] ?? ''))
    expect(filters.filter((filter) => filter.includes('LZW') || filter.includes('Crypt'))).toEqual([])
    expect(objects.filter(({ isStream, value }) => isStream && '/F' in dictionary(value))).toEqual([])
  })

  it('6.1.8, 6.1.13 keeps names and strings within their lengths', () => {
    const strings = dictionaries.flatMap((each) => [...Object.keys(each), ...Object.values(each).filter((value) => typeof value === 'string')])
    expect(strings.filter((text) => (text.startsWith('/') ? text.length > 128 : text.length > 32_767))).toEqual([])
  })

  it('6.1.13 nests no more than 28 graphics states', () => {
    let [depth, deepest] = [0, 0]
    for (const [operator] of pageContents(pdf).matchAll(/^(q|Q)$|(?<=\s)(q|Q)(?=\s)/gm)) deepest = Math.max(deepest, (depth += operator === 'q' ? 1 : -1))
    expect(deepest).toBeGreaterThan(0)
    expect(deepest).toBeLessThanOrEqual(28)
  })

  it('6.2.3 names one output intent with an embedded RGB profile', () => {
    const intents = follow(catalog['/OutputIntents']) as unknown[]
    expect(intents).toHaveLength(1)
    const intent = dictionary((catalog['/OutputIntents'] as string[])[0])
    expect(intent['/S']).toBe('/GTS_PDFA1')
    expect(dictionary(intent['/DestOutputProfile'])['/N']).toBe(3)
  })

  it('6.2.4 paints in device RGB or grey only, which that profile covers', () => {
    const content = pageContents(pdf)
    expect(content).not.toMatch(/\s(k|K)\n/)
    const spaces = [...content.matchAll(/\/(\w+) (?:cs|CS)\b/g)].map(([, name]) => name)
    expect(spaces.length).toBeGreaterThan(0)
    expect(spaces.filter((name) => name !== 'DeviceRGB' && name !== 'DeviceGray')).toEqual([])
  })

  it('6.2.10 uses no transparency', () => {
    const states = withType('/ExtGState')
    expect(states.filter((state) => (state['/ca'] ?? 1) !== 1 || (state['/CA'] ?? 1) !== 1)).toEqual([])
    expect(dictionaries.filter((each) => '/SMask' in each || each['/S'] === '/Transparency')).toEqual([])
  })

  it('6.2.11 embeds each font, with a map to Unicode and to its glyphs', () => {
    const composite = withType('/Font').filter((font) => font['/Subtype'] === '/Type0')
    expect(composite.length).toBeGreaterThan(0)
    expect(withType('/Font').filter((font) => !['/Type0', '/CIDFontType2', '/CIDFontType0'].includes(font['/Subtype'] as string))).toEqual([])
    expect(composite.filter((font) => !('/ToUnicode' in font) || font['/Encoding'] !== '/Identity-H')).toEqual([])
    for (const descendant of withType('/Font').filter((font) => font['/Subtype'] === '/CIDFontType2')) {
      expect(descendant['/CIDToGIDMap']).toBe('/Identity')
      expect(Object.keys(dictionary(descendant['/FontDescriptor'])).filter((key) => key.startsWith('/FontFile'))).toHaveLength(1)
    }
  })

  it('6.3, 6.4, 6.5 holds no annotation, form, script or action', () => {
    expect(dictionaries.filter((each) => '/Annots' in each || '/AcroForm' in each || '/AA' in each || '/OpenAction' in each)).toEqual([])
    expect(dictionaries.filter((each) => ['/JavaScript', '/Launch', '/URI', '/GoToR', '/Movie', '/Sound', '/SubmitForm'].includes(each['/S'] as string))).toEqual([])
  })

  it('6.6.2, 6.6.4 says in plain metadata what it is, as the information dictionary does', () => {
    const text = pdf.toString('latin1')
    expect('/Filter' in dictionary(catalog['/Metadata'])).toBe(false)
    expect(text).toContain('<pdfaid:part>3</pdfaid:part>')
    expect(text).toContain('<pdfaid:conformance>B</pdfaid:conformance>')
    expect(text).toContain('<rdf:li xml:lang="x-default">BM-T-4710-01 B</rdf:li>')
    expect(text).toContain('<xmp:CreateDate>2026-09-02T00:00:00Z</xmp:CreateDate>')
    const info = dictionary(trailer['/Info'])
    expect(follow(info['/Title'])).toBe('u:BM-T-4710-01 B')
    expect(follow(info['/CreationDate'])).toBe('u:D:20260902000000Z')
    expect(Object.keys(info)).not.toContain('/ModDate')
  })

  it('6.8 relates the attached file to the document, with its kind, size, date and description', () => {
    const [associated] = follow(catalog['/AF']) as string[]
    const file = dictionary(associated)
    expect(file['/AFRelationship']).toBe('/Source')
    expect([file['/F'], file['/UF']]).toEqual([`u:${FILE}`, `u:${FILE}`])
    expect(file['/Desc']).toBe('u:The winding specification as canonical JSON (RFC 8785)')
    const embedded = dictionary(dictionary(file['/EF'])['/F'])
    expect(embedded['/Subtype']).toBe('/application/json')
    expect(dictionary(embedded['/Params'])['/Size']).toBe(bytes.length)
    expect(dictionary(embedded['/Params'])['/ModDate']).toBeDefined()
  })

  it('is tagged, in its language, with a bookmark for each sheet', () => {
    expect(dictionary(catalog['/MarkInfo'])['/Marked']).toBe(true)
    expect(catalog['/Lang']).toBe('u:en')
    const kinds = new Set(dictionaries.map((each) => each['/S']))
    for (const kind of ['/Document', '/Sect', '/H1', '/Table', '/TR', '/TH', '/TD', '/Figure', '/P']) expect(kinds).toContain(kind)
    expect(dictionaries.filter((each) => each['/S'] === '/Figure' && !('/Alt' in each))).toEqual([])
    const titles = dictionaries.flatMap((each) => ('/Dest' in each && typeof each['/Title'] === 'string' ? [each['/Title']] : []))
    expect(titles).toEqual(sheets.map(({ number, title }) => `u:${number}  ${title}`))
  })

  it('tags every text: nothing is painted outside marked content', () => {
    const content = pageContents(pdf)
    let depth = 0
    for (const [operator] of content.matchAll(/\b(BDC|BMC|EMC|TJ|Tj)\b/g)) {
      if (operator === 'EMC') depth--
      else if (operator === 'TJ' || operator === 'Tj') expect(depth).toBeGreaterThan(0)
      else depth++
    }
    expect(depth).toBe(0)
  })

  it('gives back a specification that has the hash of the title block when it is read and written again', () => {
    const attached = attachedFile(pdf, FILE)
    const read = JSON.parse(attached.toString('utf8')) as ReleasedSpecification
    const again = Buffer.from(canonicalJson({ ...read, specification: windingSpecificationSchema.parse(read.specification) }), 'utf8')
    expect(sha256(again)).toBe(sha256(bytes))
    expect(pdfText(pdf, 1)).toContain(sha256(again))
  })

  it('is A3 landscape on every page', () => {
    expect(pdfInfo(pdf)).toMatch(/Page size:\s+1190\.55 x 841\.89 pts \(A3\)/)
    expect(withType('/Page').map((page) => page['/MediaBox'])).toEqual(sheets.map(() => [0, 0, expect.closeTo(1190.55, 1), expect.closeTo(841.89, 1)]))
  })
})
