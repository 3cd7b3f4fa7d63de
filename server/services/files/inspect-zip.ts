import type { FileKind } from '#shared/contracts/endpoint'
import type { FileHandle } from 'node:fs/promises'
import { read } from './recognise-file'

const END_RECORD = Buffer.from([0x50, 0x4b, 0x05, 0x06])
const END_RECORD_BYTES = 22
const MAX_DIRECTORY_BYTES = 4 * 1024 * 1024

/** What an archive holds, by the names in its central directory (ISO/IEC 21320-1); nothing is unpacked. */
export async function inspectZip(file: FileHandle, sizeBytes: number): Promise<FileKind | 'damaged'> {
  const names = await entryNames(file, sizeBytes)
  if (!names) return 'damaged'
  // Office Open XML (ISO/IEC 29500-2) and OpenDocument (ISO/IEC 26300-3) name their main part.
  if (names.includes('word/document.xml')) return 'docx'
  if (names.includes('xl/workbook.xml') || names.includes('xl/workbook.bin')) return 'xlsx'
  if (names.includes('ppt/presentation.xml')) return 'pptx'
  if (names[0] === 'mimetype' && names.includes('META-INF/manifest.xml')) return openDocumentKind(file)
  return 'zip'
}

async function entryNames(file: FileHandle, sizeBytes: number): Promise<string[] | null> {
  const tailLength = Math.min(sizeBytes, 65_535 + END_RECORD_BYTES)
  const tail = await read(file, sizeBytes - tailLength, tailLength)
  const at = tail.lastIndexOf(END_RECORD)
  if (at < 0 || at + END_RECORD_BYTES > tail.length) return null
  const [length, offset] = [tail.readUInt32LE(at + 12), tail.readUInt32LE(at + 16)]
  if (length > MAX_DIRECTORY_BYTES || offset + length > sizeBytes) return null
  return namesIn(await read(file, offset, length))
}

function namesIn(directory: Buffer): string[] | null {
  const names: string[] = []
  let at = 0
  while (at + 46 <= directory.length) {
    if (directory.readUInt32LE(at) !== 0x02014b50) return null
    const [name, extra, comment] = [directory.readUInt16LE(at + 28), directory.readUInt16LE(at + 30), directory.readUInt16LE(at + 32)]
    names.push(directory.toString('utf8', at + 46, at + 46 + name))
    at += 46 + name + extra + comment
  }
  return names.length > 0 ? names : null
}

/** The first entry is the media type, stored without compression. */
async function openDocumentKind(file: FileHandle): Promise<FileKind> {
  const head = (await read(file, 0, 200)).toString('latin1')
  if (head.includes('application/vnd.oasis.opendocument.text')) return 'odt'
  if (head.includes('application/vnd.oasis.opendocument.spreadsheet')) return 'ods'
  return 'zip'
}
