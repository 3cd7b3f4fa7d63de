import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import type { OrderContent } from '#shared/contracts/orders'
import { drawSheets } from '#shared/drawing/sheets/index'
import { sheetShapes, type Sheet } from '#shared/drawing/model'
import { layOutDocument } from '#server/pdf/document'
import { renderPurchaseOrderPdf } from '#server/pdf/render-purchase-order'
import { renderSpecificationPdf } from '#server/pdf/render-sheets'
import { attachedFile, pdfFonts, pdfInfo, pdfText, plainBlanks, qpdfCheck } from '../support/pdf-tools'
import { evaluate } from '#shared/engine/index'
import { buoySupply, coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'
import { stressPart } from '../support/stress-specification'

const ISSUED = '2026-09-02'
const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex')

function prepare(make: typeof mainsFlyback) {
  const document = make()
  const bytes = Buffer.from(JSON.stringify(document.specification), 'utf8')
  const sheets = drawSheets({
    specification: document.specification,
    evaluation: evaluate(document, sampleLibrary),
    library: sampleLibrary,
    revision: 'B',
    release: { revision: 'B', issuedOn: ISSUED, createdBy: 'E. Halloran', checkedBy: 'M. Okafor', approvedBy: 'J. Lindqvist' },
    specificationHash: sha256(bytes),
    status: 'released',
  })
  const pdf = (recipient?: string) =>
    renderSpecificationPdf({
      sheets,
      info: { title: 'BM-T-4710-01 rev B', subject: 'Winding specification', author: 'Brightmoor Power Works', language: 'en', date: new Date(`${ISSUED}T00:00:00Z`) },
      attachment: { name: 'specification.json', bytes, description: 'The winding specification as canonical JSON' },
      ...(recipient !== undefined && { watermark: { recipient } }),
    })
  return { sheets, bytes, pdf }
}

const labelTexts = (sheet: Sheet) => sheetShapes(sheet).flatMap((shape) => (shape.kind === 'label' && shape.ink === 'ink' ? [plainBlanks(shape.text)] : []))

describe.each(Object.entries({ mainsFlyback, buoySupply, coupledInductor, stressPart }))('the PDF of %s', async (_, make) => {
  const { sheets, bytes, pdf } = prepare(make)
  const file = await pdf()

  it('is clean to qpdf', () => {
    expect(qpdfCheck(file)).toContain('No syntax or stream encoding errors found')
  })

  it('embeds every font as a subset with its characters', () => {
    const fonts = pdfFonts(file)
    expect(fonts.length).toBeGreaterThan(0)
    expect(fonts.filter(({ embedded, subset, unicode }) => !embedded || !subset || !unicode)).toEqual([])
  })

  it('gives back every text of each sheet', () => {
    sheets.forEach((sheet, index) => {
      const text = pdfText(file, index + 1).replaceAll(' ', '')
      expect(labelTexts(sheet).filter((each) => !text.includes(each.replaceAll(' ', '')))).toEqual([])
    })
  })

  it('carries the specification whose hash stands in the title block', () => {
    const attached = attachedFile(file, 'specification.json')
    expect(attached.equals(bytes)).toBe(true)
    expect(pdfText(file, 1)).toContain(sha256(attached))
  })
})

describe('a specification PDF', () => {
  it('has equal bytes when made again', async () => {
    const { pdf } = prepare(mainsFlyback)
    expect(sha256(await pdf())).toBe(sha256(await pdf()))
  })

  it('says that it is PDF/A-3b and tagged, and nothing of when or on what it was made', async () => {
    const { pdf } = prepare(coupledInductor)
    const file = await pdf()
    const info = pdfInfo(file)
    expect(info).toMatch(/Tagged:\s+yes/)
    expect(info).toMatch(/CreationDate:\s+2026-09-02T00:00:00/)
    expect(info).toMatch(/Producer:\s+Dotside/)
    expect(info).toMatch(/Page size:\s+1190\.55 x 841\.89 pts \(A3\)/)
    expect(file.toString('latin1')).toContain('<pdfaid:part>3</pdfaid:part>')
    expect(file.toString('latin1')).toContain('/AFRelationship /Source')
  })

  it('is another file for a vendor, with the same specification and the name of the recipient', async () => {
    const { pdf, bytes } = prepare(buoySupply)
    const [plain, copy] = [await pdf(), await pdf('V-1042 Tamsen Coilwork')]
    expect(sha256(copy)).not.toBe(sha256(plain))
    expect(pdfText(copy, 1)).toContain('Copy for V-1042 Tamsen Coilwork')
    expect(pdfText(plain, 1)).not.toContain('Copy for')
    expect(attachedFile(copy, 'specification.json').equals(bytes)).toBe(true)
    expect(pdfText(copy, 1)).toContain(sha256(bytes))
  })
})

const ORDER: OrderContent = {
  schema: 'dotside/purchase-order/1',
  number: 'PO-7Q4M-2K',
  revision: 0,
  date: '2026-11-30',
  buyer: { legalEntity: 'Brightmoor Power Works Ltd', vatNumber: 'GB 000 0000 00', billTo: 'Harbour Road 4\nPort Ellis', shipTo: 'Dock 2, Harbour Road 9\nPort Ellis', contactName: 'R. Adeyemi', contactEmail: 'r.adeyemi@brightmoor.example' },
  vendor: { name: 'Tamsen Coilwork', number: 'V-1042', address: 'Spulenweg 11\n0815 Wehrstadt' },
  rfqNumber: 'RFQ-K3XW',
  quotation: { reference: 'TC-2291', revision: 2, sha256: 'd'.repeat(64), validUntil: '2027-01-31' },
  currency: 'EUR',
  lines: Array.from({ length: 12 }, (_, index) => ({
    position: index + 1, partNumber: `BM-T-22${index + 10}-03`, description: 'Transformer, flyback, 18 W', drawingRevision: 'C', specificationSha256: String(index % 10).repeat(64), quantity: 12500, unit: 'pcs', price: '1.234567', priceUnit: 1, lineTotal: '15432.087500', countryOfOrigin: 'PT',
  })),
  oneTimeCosts: [{ position: 1, text: 'Winding tool and test fixture', amount: '1850.000000' }],
  total: '187035.050000',
  deliveryRule: 'DAP',
  deliveryPlace: 'Port Ellis',
  deliveryOn: '2027-02-15',
  carrier: '',
  overUnderPercent: 0,
  paymentTerms: '30 days net',
  packing: 'Trays of 60',
  documents: 'Certificate of conformity, test data file',
  quality: 'AQL 0.65',
  tooling: '',
  termsVersion: 'Purchase terms 2026-01',
  remarks: '',
  acknowledgeBy: '2026-12-07',
}

describe('the purchase order', async () => {
  const bytes = Buffer.from(JSON.stringify(ORDER), 'utf8')
  const file = await renderPurchaseOrderPdf({ content: ORDER, sha256: sha256(bytes), bytes })

  it('is clean to qpdf with all fonts embedded', () => {
    expect(qpdfCheck(file)).toContain('No syntax or stream encoding errors found')
    expect(pdfFonts(file).filter(({ embedded }) => !embedded)).toEqual([])
  })

  it('names parties, drawing and quotation revision, prices to the last decimal, total, dates and terms', () => {
    // The narrow blank between groups of digits is too thin for pdftotext to report.
    const text = pdfText(file).replaceAll(' ', '')
    const expected = ['PO-7Q4M-2K', 'Tamsen Coilwork', 'V-1042', 'Brightmoor Power Works Ltd', 'GB 000 0000 00', 'TC-2291, revision 2', 'BM-T-2210-03', 'BM-T-2221-03', '1.234567 EUR', '15 432.0875 EUR', '1850.00 EUR', '187 035.05 EUR', 'DAP Port Ellis', '2027-02-15', '30 days net', 'AQL 0.65', '2026-12-07', sha256(bytes)]
    expect(expected.filter((each) => !text.includes(each.replaceAll(' ', '')))).toEqual([])
  })

  it('leaves out what nobody filled', () => {
    expect(pdfText(file)).not.toContain('Carrier')
  })

  it('attaches its record', () => {
    expect(attachedFile(file, 'purchase-order.json').equals(bytes)).toBe(true)
  })
})

describe('a letter document', () => {
  it('breaks a long text over pages without losing a line', () => {
    const text = Array.from({ length: 160 }, (_, index) => `Line ${index} of the terms.`).join('\n')
    const pages = layOutDocument({ title: 'Terms', reference: '1', sender: 'S', footer: 'F', parts: [{ kind: 'paragraph', text }] })
    const texts = pages.flatMap(labelTexts)
    expect(pages.length).toBeGreaterThan(1)
    expect(Array.from({ length: 160 }, (_, index) => `Line ${index} of the terms.`).filter((each) => !texts.includes(each))).toEqual([])
  })
})
