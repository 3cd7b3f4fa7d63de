import type { Evaluation } from '../../engine/evaluation'
import type { AnyLibraryRow, Library, LibraryKind } from '../../engine/library'
import type { DocumentStatus, LibraryReference, ReleaseRecord, Winding, WindingSpecification } from '../../engine/specification'

export type SheetStatus = 'draft' | 'in-check' | DocumentStatus

/** Everything that the sheets of one revision say. */
export interface DrawingInput {
  specification: WindingSpecification
  /** Predicted values and the coil to scale; null while there are none. */
  evaluation: Evaluation | null
  /** The rows that the specification refers to; those of a released revision come from the revision itself. */
  library: Library
  /** `P1`, `P2` … or `A`, `B` …. */
  revision: string
  /** Null before release: the sheets then carry the draft mark. */
  release: ReleaseRecord | null
  /** SHA-256 of the canonical bytes of the specification, 64 hexadecimal digits; null before release. */
  specificationHash: string | null
  status: SheetStatus
}

const TABLES: Record<LibraryKind, keyof Library> = {
  core: 'cores',
  former: 'formers',
  material: 'materials',
  wire: 'wires',
  tape: 'tapes',
  sleeve: 'sleeves',
}

type RowOf<K extends LibraryKind> = Extract<AnyLibraryRow, { kind: K }>

/** The library row that a reference names, of exactly that version; null when it is not there. */
export function findRow<K extends LibraryKind>(library: Library, kind: K, reference: LibraryReference | null): RowOf<K> | null {
  if (!reference || reference.kind !== kind) return null
  const rows: readonly AnyLibraryRow[] = library[TABLES[kind]]
  return (rows.find(({ id, version }) => id === reference.id && version === reference.version) as RowOf<K> | undefined) ?? null
}

/** Name of a library row, or what is known of it when the row is not there. */
export function rowName(library: Library, reference: LibraryReference | null): string {
  if (!reference) return ''
  return findRow(library, reference.kind, reference)?.name ?? `${reference.id}, version ${reference.version}`
}

export const windingById = (specification: WindingSpecification, id: string | null): Winding | null =>
  specification.windings.find((winding) => winding.id === id) ?? null

/** Name of a winding; the id where the row is missing, so that a contradiction can be seen. */
export const windingName = (specification: WindingSpecification, id: string | null): string =>
  id === null ? '' : (windingById(specification, id)?.name ?? `${id}?`)

/** `P (1–2)`: name and terminals. */
export function windingWithTerminals(specification: WindingSpecification, id: string): string {
  const winding = windingById(specification, id)
  return winding ? `${winding.name} (${winding.startTerminal}–${winding.finishTerminal})` : `${id}?`
}
