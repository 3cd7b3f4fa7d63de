import type { Origin, StatedRow } from '#shared/engine/specification'

export const ENTERED: Origin = { kind: 'entered' }

/** What a row that a person adds begins with. */
export const enteredRow = (id: string): StatedRow => ({ id, status: 'mandatory', origin: ENTERED })
