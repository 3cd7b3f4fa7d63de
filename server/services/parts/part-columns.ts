import type { AnyLibraryRow, Confidence, CoreShape, LibraryKind } from '#shared/engine/library'

export interface PartColumns {
  kind: LibraryKind
  partId: string
  version: number
  name: string
  sortKey: string
  family: string
  confidence: Confidence
  row: AnyLibraryRow
}

/** What is stored beside a row, so that lists can search and sort without opening it. */
export function partColumns(row: AnyLibraryRow, shapeOfCore: (coreId: string) => CoreShape): PartColumns {
  const { kind, id, version, name, confidence } = row
  return { kind, partId: id, version, name, sortKey: sortKey(name), family: familyOf(row, shapeOfCore), confidence, row }
}

function familyOf(row: AnyLibraryRow, shapeOfCore: (coreId: string) => CoreShape): string {
  switch (row.kind) {
    case 'core':
      return row.shape
    case 'former':
      return shapeOfCore(row.coreId)
    case 'wire':
      return row.form
    case 'material':
    case 'tape':
      return row.use
    case 'sleeve':
      return row.material
  }
}

/** Pads the whole part of every figure, so that plain text order is the order of size: E8.8 before E13. */
const sortKey = (name: string) => name.toLowerCase().replace(/(?<![.\d])\d+/g, (digits) => digits.padStart(6, '0'))
