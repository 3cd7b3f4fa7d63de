import type { AnyLibraryRow, Library, LibraryKind } from '#shared/engine/library'
import { importColumns, type ImportColumn } from '#shared/parts/import-columns'
import { partCell } from '#shared/parts/part-cells'
import type { SheetColumn } from '@/components/base/sheet-columns'

/** The table of a kind as the import reads it. */
export const templateColumns = (kind: LibraryKind): SheetColumn<AnyLibraryRow>[] => importColumns(kind).map(({ path }) => ({ key: path, header: path, value: (row) => partCell(row, path) }))

export function rowsOfKind(library: Library, kind: LibraryKind): readonly AnyLibraryRow[] {
  const { cores, formers, materials, wires, tapes, sleeves } = library
  return { core: cores, former: formers, material: materials, wire: wires, tape: tapes, sleeve: sleeves }[kind]
}

/** The units that the endings of the headings name; the longest ending counts. */
const ENDINGS: readonly (readonly [string, string])[] = [
  ['KgPerM3', 'kg/m³'],
  ['OhmPerM', 'Ω/m'],
  ['Mm2', 'mm²'],
  ['Mm3', 'mm³'],
  ['VRms', 'V rms'],
  ['Tolerance', 'share, 0.25 for 25 %'],
]
const SHORT_ENDINGS: readonly (readonly [string, string])[] = [
  ['Mm', 'mm'],
  ['C', '°C'],
  ['T', 'T'],
  ['G', 'g'],
]
/** Groups whose ending holds for each of their members. */
const GROUPS: readonly (readonly [string, string])[] = [
  ['Mm.', 'mm'],
  ['Hz.', 'Hz'],
]

/** Unit of the figures of a column, or empty. */
export function unitOfColumn({ path, holds }: ImportColumn): string {
  if (holds !== 'figure' && holds !== 'list') return ''
  const ending = [...ENDINGS, ...SHORT_ENDINGS].find(([end]) => path.endsWith(end)) ?? GROUPS.find(([part]) => path.includes(part))
  return ending?.[1] ?? ''
}

/** What a cell of the column takes, in words. */
export function takes(column: ImportColumn): string {
  switch (column.holds) {
    case 'text':
      return 'Text'
    case 'choice':
      return `One of: ${column.choices.join(', ')}`
    case 'figure':
      return 'Number'
    case 'list':
      return column.path === 'unverified' ? 'Headings of the fields that nobody vouches for, with blanks between them' : 'Numbers with blanks between them'
    case 'lines':
      return `JSON: [{${column.keys.map((key) => `"${key}": …`).join(', ')}}]`
  }
}
