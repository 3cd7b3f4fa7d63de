import type { FormerRow } from '#shared/engine/library'
import type { LibraryReference, Origin, Pin } from '#shared/engine/specification'
import { choice, figure, text } from '../field-types'

/** What a pin says. */
export const PIN_FIELDS = [
  text('number', 'Number', { maximum: 12 }),
  figure('xMm', 'x', 'mm'),
  figure('yMm', 'y', 'mm'),
  choice('state', 'State', [{ value: 'fitted', label: 'fitted' }, { value: 'no-connection', label: 'no connection' }, { value: 'missing', label: 'missing (keying)' }]),
]

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
