import type { AnyLibraryRow, Library, LibraryKind } from './library'
import type { LibraryReference, ReleaseRecord, WindingSpecification } from './specification'

/** Written into every released document; a change of shape is a new number with a reader for the old one. */
export const RELEASED_SCHEMA = 'dotside/released-specification/1'

/**
 * What a release seals: the specification, the library rows it used, who released it and with which
 * engine. SHA-256 over its canonical bytes stands in the title block.
 */
export interface ReleasedSpecification {
  schema: typeof RELEASED_SCHEMA
  release: ReleaseRecord
  engine: string
  specification: WindingSpecification
  library: Library
}

/** Every library row that a document refers to, each once. */
export function referencesOf(specification: WindingSpecification): LibraryReference[] {
  const found = new Map<string, LibraryReference>()
  collect(specification, found)
  return [...found.values()]
}

function collect(value: unknown, found: Map<string, LibraryReference>): void {
  if (typeof value !== 'object' || value === null) return
  if (isReference(value)) {
    found.set(`${value.kind}/${value.id}/${value.version}`, value)
    return
  }
  for (const member of Object.values(value)) collect(member, found)
}

const KINDS: readonly LibraryKind[] = ['core', 'former', 'material', 'wire', 'tape', 'sleeve']

function isReference(value: object): value is LibraryReference {
  const { kind, id, version } = value as Partial<LibraryReference>
  return KINDS.includes(kind as LibraryKind) && typeof id === 'string' && typeof version === 'number'
}

/** All rows of a library in one list. */
export const allRows = (library: Library): AnyLibraryRow[] => [
  ...library.cores,
  ...library.formers,
  ...library.materials,
  ...library.wires,
  ...library.tapes,
  ...library.sleeves,
]

/**
 * The part of a library that a document uses, in exactly the versions it names. `missing` lists the
 * references that the library does not hold.
 */
export function libraryInUse(specification: WindingSpecification, library: Library): { library: Library; missing: LibraryReference[] } {
  const references = referencesOf(specification)
  const wanted = new Set(references.map(keyOf))
  const used = (rows: readonly AnyLibraryRow[]) => rows.filter((row) => wanted.has(keyOf(row)))
  const held = new Set(allRows(library).map(keyOf))
  return {
    library: {
      cores: used(library.cores) as Library['cores'],
      formers: used(library.formers) as Library['formers'],
      materials: used(library.materials) as Library['materials'],
      wires: used(library.wires) as Library['wires'],
      tapes: used(library.tapes) as Library['tapes'],
      sleeves: used(library.sleeves) as Library['sleeves'],
    },
    missing: references.filter((reference) => !held.has(keyOf(reference))),
  }
}

const keyOf = (row: { kind: LibraryKind; id: string; version: number }) => `${row.kind}/${row.id}/${row.version}`
