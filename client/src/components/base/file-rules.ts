import type { FileKind } from '#shared/contracts/endpoint'

const ENDINGS: Readonly<Record<FileKind, readonly string[]>> = {
  pdf: ['.pdf'],
  docx: ['.docx'],
  xlsx: ['.xlsx'],
  pptx: ['.pptx'],
  odt: ['.odt'],
  ods: ['.ods'],
  'doc-xls-ppt': ['.doc', '.xls', '.ppt'],
  csv: ['.csv'],
  txt: ['.txt'],
  png: ['.png'],
  jpeg: ['.jpg', '.jpeg'],
  step: ['.step', '.stp'],
  zip: ['.zip'],
}

export const endingsOf = (kinds: readonly FileKind[]): string[] => kinds.flatMap((kind) => ENDINGS[kind])

/** File sizes count in powers of ten (IEC 80000-13). */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`
  return bytes < 1_000_000 ? `${Math.round(bytes / 1000)} kB` : `${(bytes / 1_000_000).toFixed(1)} MB`
}

/** Says why a file need not be sent at all, or null. The server looks into it again. */
export function fileProblem(file: { name: string; size: number }, kinds: readonly FileKind[], maxBytes: number): string | null {
  const endings = endingsOf(kinds)
  const known = endings.some((ending) => file.name.toLowerCase().endsWith(ending))
  if (!known) return `“${file.name}” is of a kind that is not taken here. Choose a file ending in ${endings.join(', ')}.`
  if (file.size === 0) return `“${file.name}” is empty (0 bytes). Save it again and choose it anew.`
  if (file.size > maxBytes) return `“${file.name}” has ${formatBytes(file.size)}; at most ${formatBytes(maxBytes)} are taken.`
  return null
}
