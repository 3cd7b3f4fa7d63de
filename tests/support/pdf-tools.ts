import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** Runs something on a PDF that lies in a folder of its own and is gone afterwards. */
export function withPdf<T>(pdf: Uint8Array, use: (file: string, folder: string) => T): T {
  const folder = mkdtempSync(join(tmpdir(), 'dotside-pdf-'))
  try {
    const file = join(folder, 'document.pdf')
    writeFileSync(file, pdf)
    return use(file, folder)
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

const run = (tool: string, args: string[]) => execFileSync(tool, args, { encoding: 'utf8', maxBuffer: 64e6 })

/** What qpdf says of the file. @throws Error when it finds an error or a warning */
export const qpdfCheck = (pdf: Uint8Array): string => withPdf(pdf, (file) => run('qpdf', ['--check', file]))

export interface EmbeddedFont {
  name: string
  embedded: boolean
  subset: boolean
  unicode: boolean
}

export function pdfFonts(pdf: Uint8Array): EmbeddedFont[] {
  const lines = withPdf(pdf, (file) => run('pdffonts', [file])).trim().split('\n').slice(2)
  return lines.map((line) => {
    const [, name, , embedded, subset, unicode] = /^(\S+)\s+(.+?)\s+(yes|no)\s+(yes|no)\s+(yes|no)\s/.exec(line) ?? []
    return { name: name ?? line, embedded: embedded === 'yes', subset: subset === 'yes', unicode: unicode === 'yes' }
  })
}

/** Text of one page with every kind of blank as one space. */
export const pdfText = (pdf: Uint8Array, page?: number): string =>
  plainBlanks(withPdf(pdf, (file) => run('pdftotext', ['-raw', ...(page ? ['-f', String(page), '-l', String(page)] : []), file, '-'])))

export const plainBlanks = (text: string): string => text.normalize('NFC').replace(/[\s\u00a0\u202f\f]+/g, ' ').trim()

/** The file attached under a name, byte for byte. */
export const attachedFile = (pdf: Uint8Array, name: string): Buffer =>
  withPdf(pdf, (file) => execFileSync('qpdf', [`--show-attachment=${name}`, file], { maxBuffer: 64e6 }))

/** Dictionary entries of the document: `pdfinfo` as it prints them. */
export const pdfInfo = (pdf: Uint8Array): string => withPdf(pdf, (file) => run('pdfinfo', ['-isodates', file]))

/** One PNG per page. */
export function pdfPictures(pdf: Uint8Array, dotsPerInch: number): Buffer[] {
  return withPdf(pdf, (file, folder) => {
    run('pdftoppm', ['-r', String(dotsPerInch), '-png', file, join(folder, 'page')])
    const pages = readdirSync(folder).filter((name) => name.endsWith('.png')).sort()
    return pages.map((name) => readFileSync(join(folder, name)))
  })
}
