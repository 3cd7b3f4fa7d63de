import { execFileSync } from 'node:child_process'
import { withPdf } from './pdf-tools'

/** A value of a PDF as qpdf's JSON (version 2) has it: names begin with `/`, references end with ` R`. */
export type PdfValue = null | boolean | number | string | PdfValue[] | { [key: string]: PdfValue }
export type PdfDictionary = { [key: string]: PdfValue }

export interface PdfObjects {
  trailer: PdfDictionary
  /** Every indirect object: its value, or the dictionary of its stream. */
  objects: { key: string; value: PdfValue; isStream: boolean }[]
  /** Follows a reference; anything else is answered as it is. */
  follow(value: PdfValue | undefined): PdfValue
  dictionary(value: PdfValue | undefined): PdfDictionary
}

type Json = { qpdf: [unknown, Record<string, { value?: PdfValue; stream?: { dict: PdfValue } }>] }

export function pdfObjects(pdf: Uint8Array): PdfObjects {
  const text = withPdf(pdf, (file) => execFileSync('qpdf', ['--json=2', '--json-key=qpdf', file], { encoding: 'utf8', maxBuffer: 256e6 }))
  const all = (JSON.parse(text) as Json).qpdf[1]
  const objects = Object.entries(all).map(([key, { value, stream }]) => ({ key: key.replace(/^obj:/, ''), value: stream ? stream.dict : (value ?? null), isStream: stream !== undefined }))
  const byKey = new Map(objects.map((object) => [object.key, object.value]))
  const follow = (value: PdfValue | undefined): PdfValue => (typeof value === 'string' && byKey.has(value) ? byKey.get(value)! : (value ?? null))
  const dictionary = (value: PdfValue | undefined) => {
    const found = follow(value)
    if (found === null || typeof found !== 'object' || Array.isArray(found)) throw new Error(`${JSON.stringify(value)} is no dictionary`)
    return found
  }
  return { trailer: dictionary(byKey.get('trailer')), objects: objects.filter(({ key }) => key !== 'trailer'), follow, dictionary }
}

/** Every dictionary within a value, itself included; references are not followed. */
export function dictionariesIn(value: PdfValue): PdfDictionary[] {
  if (value === null || typeof value !== 'object') return []
  if (Array.isArray(value)) return value.flatMap(dictionariesIn)
  return [value, ...Object.values(value).flatMap(dictionariesIn)]
}

/** The decoded content streams of all pages, as text. */
export const pageContents = (pdf: Uint8Array): string =>
  withPdf(pdf, (file) => execFileSync('qpdf', ['--qdf', '--object-streams=disable', '--normalize-content=n', file, '-'], { maxBuffer: 256e6 })).toString('latin1')
