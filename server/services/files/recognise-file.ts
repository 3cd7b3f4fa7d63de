import { wellFormed } from '#server/well-formed'
import { AppError } from '#server/errors'
import type { FileKind, Upload } from '#shared/contracts/endpoint'
import { open, type FileHandle } from 'node:fs/promises'
import { inspectZip } from './inspect-zip'

/** File name extensions of each kind; the first is the usual one. */
export const EXTENSIONS: Record<FileKind, readonly string[]> = {
  pdf: ['pdf'],
  docx: ['docx'],
  xlsx: ['xlsx'],
  pptx: ['pptx'],
  odt: ['odt'],
  ods: ['ods'],
  'doc-xls-ppt': ['doc', 'xls', 'ppt'],
  csv: ['csv', 'tsv'],
  txt: ['txt', 'log'],
  png: ['png'],
  jpeg: ['jpg', 'jpeg'],
  step: ['step', 'stp'],
  zip: ['zip'],
}

const HEAD_BYTES = 8192

/** The last part of the name a browser sent, without control and direction characters, at most 200 characters long. */
export function cleanFileName(sent: string): string {
  const last = wellFormed(sent).split(/[/\\]/).at(-1) ?? ''
  const visible = last.replace(/[\u0000-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069"<>|:*?]/g, '').trim()
  if (visible.length <= 200) return visible || 'file'
  const extension = extensionOf(visible)
  return `${visible.slice(0, 190)}${extension && extension.length < 9 ? `.${extension}` : ''}`
}

const extensionOf = (name: string): string => (/\.([A-Za-z0-9]+)$/.exec(name)?.[1] ?? '').toLowerCase()

/** Says of what kind the bytes are and refuses what is empty, not accepted here, or named as something else. */
export async function recogniseFile(path: string, name: string, sizeBytes: number, { kinds, field }: Upload): Promise<FileKind> {
  const refuse = (code: 'file-empty' | 'file-type-not-accepted' | 'file-name-mismatch' | 'file-unreadable', message: string) =>
    new AppError(code, message, { [field]: message })
  if (sizeBytes === 0) throw refuse('file-empty', `“${name}” is empty (0 bytes); choose the file again.`)

  const found = await kindOfContent(path, sizeBytes, extensionOf(name))
  const accepted = kinds.map((kind) => EXTENSIONS[kind][0]!.toUpperCase()).join(', ')
  if (found === null) throw refuse('file-type-not-accepted', `“${name}” is of a kind that is not known here. Accepted: ${accepted}.`)
  if (found === 'damaged') throw refuse('file-unreadable', `“${name}” is damaged or was cut off; save it again and upload that.`)
  if (!kinds.includes(found)) throw refuse('file-type-not-accepted', `“${name}” is a ${EXTENSIONS[found][0]!.toUpperCase()} file. Accepted: ${accepted}.`)
  if (!EXTENSIONS[found].includes(extensionOf(name))) {
    throw refuse('file-name-mismatch', `“${name}” holds ${EXTENSIONS[found][0]!.toUpperCase()} content; its name should end in .${EXTENSIONS[found][0]}.`)
  }
  return found
}

const startsWith = (head: Buffer, ...bytes: number[]) => bytes.every((byte, index) => head[index] === byte)

async function kindOfContent(path: string, sizeBytes: number, extension: string): Promise<FileKind | 'damaged' | null> {
  const file = await open(path, 'r')
  try {
    const head = await read(file, 0, Math.min(HEAD_BYTES, sizeBytes))
    // ISO 32000-2 asks for the header in the first line; the trailer shows that the end is there.
    if (head.subarray(0, 1024).includes('%PDF-')) return (await tail(file, sizeBytes)).includes('%%EOF') ? 'pdf' : 'damaged'
    if (startsWith(head, 0x50, 0x4b, 0x03, 0x04)) return await inspectZip(file, sizeBytes)
    if (startsWith(head, 0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1)) return 'doc-xls-ppt'
    if (startsWith(head, 0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a)) return 'png'
    if (startsWith(head, 0xff, 0xd8, 0xff)) return 'jpeg'
    if (!isText(head)) return null
    if (head.subarray(0, 64).toString('latin1').includes('ISO-10303-21')) return 'step'
    // A table and a text are both plain text: here alone the name decides.
    return textKind(head, extension)
  } finally {
    await file.close()
  }
}

function textKind(head: Buffer, extension: string): 'csv' | 'txt' {
  if (EXTENSIONS.csv.includes(extension)) return 'csv'
  if (EXTENSIONS.txt.includes(extension)) return 'txt'
  return looksTabular(head) ? 'csv' : 'txt'
}

const looksTabular = (head: Buffer) => /^[^\n]*[,;\t][^\n]*\n/.test(head.toString('latin1'))

/** UTF-16 begins with its mark; other text has no control characters but tab, line ends and form feed. */
function isText(head: Buffer): boolean {
  if (startsWith(head, 0xff, 0xfe) || startsWith(head, 0xfe, 0xff)) return true
  return head.every((byte) => byte >= 0x20 || byte === 0x09 || byte === 0x0a || byte === 0x0d || byte === 0x0c)
}

export async function read(file: FileHandle, position: number, length: number): Promise<Buffer> {
  const buffer = Buffer.alloc(length)
  const { bytesRead } = await file.read(buffer, 0, length, position)
  return buffer.subarray(0, bytesRead)
}

const tail = (file: FileHandle, sizeBytes: number) => read(file, Math.max(0, sizeBytes - 2048), Math.min(2048, sizeBytes))
