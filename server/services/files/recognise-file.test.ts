import type { FileKind } from '#shared/contracts/endpoint'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { FILE_KINDS } from '#shared/contracts/endpoint'
import { cleanFileName, recogniseFile } from './recognise-file'

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'dotside-kinds-'))
})
afterAll(() => rm(folder, { recursive: true, force: true }))

async function recognise(name: string, content: Buffer | string, kinds: readonly FileKind[] = FILE_KINDS) {
  const file = path.join(folder, 'content')
  await writeFile(file, content)
  return recogniseFile(file, name, Buffer.byteLength(content), { field: 'file', kinds, required: true })
}

/** An archive of empty stored entries (ISO/IEC 21320-1); the first one may have content. */
function archive(names: string[], firstContent = ''): Buffer {
  const heads: Buffer[] = []
  const entries: Buffer[] = []
  let offset = 0
  for (const [index, name] of names.entries()) {
    const content = Buffer.from(index === 0 ? firstContent : '')
    const local = Buffer.alloc(30)
    local.writeUInt32LE(0x04034b50)
    local.writeUInt32LE(content.length, 18)
    local.writeUInt32LE(content.length, 22)
    local.writeUInt16LE(name.length, 26)
    const central = Buffer.alloc(46)
    central.writeUInt32LE(0x02014b50)
    central.writeUInt16LE(name.length, 28)
    central.writeUInt32LE(offset, 42)
    entries.push(local, Buffer.from(name), content)
    heads.push(central, Buffer.from(name))
    offset += 30 + name.length + content.length
  }
  const directory = Buffer.concat(heads)
  const end = Buffer.alloc(22)
  end.writeUInt32LE(0x06054b50)
  end.writeUInt16LE(names.length, 8)
  end.writeUInt16LE(names.length, 10)
  end.writeUInt32LE(directory.length, 12)
  end.writeUInt32LE(offset, 16)
  return Buffer.concat([...entries, directory, end])
}

describe('recogniseFile', () => {
  it.each<[FileKind, string, Buffer | string]>([
    ['pdf', 'a.pdf', '%PDF-1.4\n%%EOF'],
    ['docx', 'a.docx', archive(['[Content_Types].xml', 'word/document.xml'])],
    ['xlsx', 'a.XLSX', archive(['[Content_Types].xml', 'xl/workbook.xml'])],
    ['pptx', 'a.pptx', archive(['[Content_Types].xml', 'ppt/presentation.xml'])],
    ['ods', 'a.ods', archive(['mimetype', 'META-INF/manifest.xml'], 'application/vnd.oasis.opendocument.spreadsheet')],
    ['odt', 'a.odt', archive(['mimetype', 'META-INF/manifest.xml'], 'application/vnd.oasis.opendocument.text')],
    ['zip', 'a.zip', archive(['readings.csv'])],
    ['doc-xls-ppt', 'a.xls', Buffer.from([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1, 0])],
    ['jpeg', 'a.jpeg', Buffer.from([0xff, 0xd8, 0xff, 0xe0])],
    ['csv', 'a.csv', 'Serial;L [µH]\n1;612,3\n'],
    ['csv', 'a.csv', Buffer.from('\ufeffSerial\tL\r\n1\t2\r\n', 'utf16le')],
    ['txt', 'a.txt', 'measured on Tuesday'],
    ['step', 'a.stp', 'ISO-10303-21;\nHEADER;\n'],
  ])('finds %s in %s', async (kind, name, content) => {
    expect(await recognise(name, content)).toBe(kind)
  })

  it.each<[string, string, Buffer | string, readonly FileKind[], string]>([
    ['nothing', 'a.pdf', '', FILE_KINDS, 'file-empty'],
    ['an archive called a table document', 'a.xlsx', archive(['evil.exe']), FILE_KINDS, 'file-name-mismatch'],
    ['a table document where a PDF is asked for', 'a.xlsx', archive(['xl/workbook.xml']), ['pdf'], 'file-type-not-accepted'],
    ['a table called text document', 'a.doc', 'a;b\n1;2\n', FILE_KINDS, 'file-name-mismatch'],
    ['an archive without its end', 'a.docx', archive(['word/document.xml']).subarray(0, 60), FILE_KINDS, 'file-unreadable'],
    ['a program', 'a.csv', Buffer.from([0x7f, 0x45, 0x4c, 0x46, 0, 0]), FILE_KINDS, 'file-type-not-accepted'],
  ])('refuses %s', async (_, name, content, kinds, code) => {
    await expect(recognise(name, content, kinds)).rejects.toMatchObject({ code, fields: { file: expect.stringContaining(name) } })
  })
})

describe('cleanFileName', () => {
  it.each([
    ['../../etc/passwd', 'passwd'],
    ['C:\\Users\\x\\offer.pdf', 'offer.pdf'],
    ['invoice\u202Efdp.exe', 'invoicefdp.exe'],
    ['a\r\nset-cookie: x.pdf', 'aset-cookie x.pdf'],
    ['Zell­märk – Übersicht.pdf', 'Zell­märk – Übersicht.pdf'],
    ['', 'file'],
  ])('makes %j into %j', (sent, kept) => {
    expect(cleanFileName(sent)).toBe(kept)
  })

  it('keeps the extension of a name that is too long', () => {
    expect(cleanFileName(`${'x'.repeat(300)}.pdf`)).toBe(`${'x'.repeat(190)}.pdf`)
  })
})
