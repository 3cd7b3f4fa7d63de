import type { FormerRow } from '#shared/engine/library'
import type { LibraryReference, Origin, Pin } from '#shared/engine/specification'

/** What a coil former's row says about the part, as changes of the document; pins keep their state by number. */
export function changesFromFormer(row: FormerRow, before: readonly Pin[]): Record<string, unknown> {
  const reference: LibraryReference = { kind: 'former', id: row.id, version: row.version }
  const origin: Origin = { kind: 'library', row: reference }
  const values: Record<string, unknown> = {
    material: row.material,
    plastic: row.plastic,
    flammability: row.flammability,
    materialGroup: row.materialGroup,
    mounting: row.mounting,
    pinPitchMm: row.pinPitchMm,
    rowSpacingMm: row.pinRowSpacingMm,
    pinSection: { ...row.pinSection },
    pinLengthMm: row.pinLengthMm,
    standoffMm: row.standoffMm,
  }
  const stateOf = (number: string): Pin['state'] => before.find((pin) => pin.number === number)?.state ?? 'fitted'
  return {
    'former.pins': row.pins.map((pin): Pin => ({ ...pin, state: stateOf(pin.number) })),
    ...Object.fromEntries(Object.entries(values).flatMap(([field, value]) => [[`former.${field}.value`, value], [`former.${field}.origin`, origin]])),
  }
}
