import type { AnyLibraryRow, CoreRow, FormerRow, Library, LibraryKind, MaterialRow, SleeveRow, TapeRow, WireRow } from '../library'
import type { LibraryReference, Winding, WireUse } from '../specification'
import type { BuildWire, ThinnerWire } from '../build'

interface RowOfKind {
  core: CoreRow
  former: FormerRow
  material: MaterialRow
  wire: WireRow
  tape: TapeRow
  sleeve: SleeveRow
}

export interface LibraryIndex {
  library: Library
  /** The very version that is named, or null. */
  find: <K extends LibraryKind>(kind: K, reference: LibraryReference | null) => RowOfKind[K] | null
}

const indexes = new WeakMap<Library, LibraryIndex>()

const keyOf = (kind: string, id: string, version: number) => `${kind} ${version} ${id}`

/** Index of a library by kind, id and version; made once for each library object. */
export function indexLibrary(library: Library): LibraryIndex {
  const held = indexes.get(library)
  if (held) return held
  const rows = new Map<string, AnyLibraryRow>()
  for (const row of [library.cores, library.formers, library.materials, library.wires, library.tapes, library.sleeves].flat()) {
    rows.set(keyOf(row.kind, row.id, row.version), row)
  }
  const index: LibraryIndex = {
    library,
    find: <K extends LibraryKind>(kind: K, reference: LibraryReference | null) => {
      if (!reference || reference.kind !== kind) return null
      return (rows.get(keyOf(kind, reference.id, reference.version)) as RowOfKind[K] | undefined) ?? null
    },
  }
  indexes.set(library, index)
  return index
}

export const referenceTo = ({ kind, id, version }: AnyLibraryRow): LibraryReference => ({ kind, id, version })

/** Largest overall diameter of a wire with the insulation in use, mm; a bare one is as thick as its conductor. */
export function overallDiameterMm(wire: WireRow, insulation: WireUse['insulation']): number | null {
  const tabulated = wire.overallMm[insulation]
  if (tabulated !== null && tabulated > 0) return tabulated
  return insulation === 'bare' && wire.form !== 'litz' ? wire.conductorMm : null
}

/** What the layout needs of a winding's wire; null when the library does not say it. */
export function buildWire(index: LibraryIndex, winding: Winding): BuildWire | null {
  const wire = index.find('wire', winding.wire.wire)
  if (!wire) return null
  const overallMm = wire.form === 'foil' ? wire.conductorMm : overallDiameterMm(wire, winding.wire.insulation)
  if (overallMm === null || !(overallMm > 0)) return null
  return { form: wire.form, overallMm, conductorMm: wire.form === 'litz' ? overallMm : wire.conductorMm, copperAreaMm2: wire.copperAreaMm2, widthMm: wire.widthMm }
}

/** Wires of the same form and standard with less copper, the next size first; litz of the same strand. */
export function thinnerWires(index: LibraryIndex, winding: Winding): ThinnerWire[] {
  const present = index.find('wire', winding.wire.wire)
  if (!present || present.form === 'foil') return []
  return index.library.wires
    .filter((row) => row.form === present.form && row.standard === present.standard && row.copperAreaMm2 < present.copperAreaMm2 && (row.form === 'round' || row.conductorMm === present.conductorMm))
    .sort((a, b) => b.copperAreaMm2 - a.copperAreaMm2)
    .slice(0, 6)
    .flatMap((row) => {
      const wire = buildWire(index, { ...winding, wire: { ...winding.wire, wire: referenceTo(row) } })
      return wire ? [{ name: row.name, wire }] : []
    })
}
