import type { FieldStatus, LibraryReference, Origin, Stated } from '../specification'
import { ENGINE_VERSION } from '../version'

export const PROPOSED: Origin = { kind: 'proposed', engine: ENGINE_VERSION }

/** A field that the engine proposes. */
export const proposed = <T>(value: T | null, status: FieldStatus = 'mandatory'): Stated<T> => ({ value, status, origin: PROPOSED })

/** A default of the document type; the source names the standard or says common practice. */
export const byDefault = <T>(value: T | null, source = 'common practice', status: FieldStatus = 'mandatory'): Stated<T> => ({ value, status, origin: { kind: 'default', source } })

/** A field that nobody has filled. */
export const open = <T>(status: FieldStatus = 'reference'): Stated<T> => ({ value: null, status, origin: { kind: 'default', source: 'not stated' } })

/** A field that the vendor chooses and declares. */
export const vendorChoice = <T>(): Stated<T> => ({ value: null, status: 'vendor-choice', origin: { kind: 'default', source: 'vendor declares it, frozen at approval' } })

/** A value taken from a library row. */
export const fromLibrary = <T>(value: T | null, row: LibraryReference, status: FieldStatus = 'mandatory'): Stated<T> => ({ value, status, origin: { kind: 'library', row } })

export const isProposed = ({ origin }: { origin: Origin }): boolean => origin.kind === 'proposed'

/** No figure of a document is as large as this; what is calculated beyond it comes of an input that makes no sense. */
const LARGEST_FIGURE = 1e15

/** Whether a calculated figure may be specified: there, finite, above zero and of a size that means something. */
export const isStatable = (value: number | null | undefined): value is number => typeof value === 'number' && value > 0 && value < LARGEST_FIGURE

/** The next step of a size up, e.g. distances to 0.1 mm and voltages to 100 V. */
export const toStepUp = (value: number, step: number): number => Number((Math.max(value > 0 ? 1 : 0, Math.ceil(value / step - 1e-9)) * step).toPrecision(12))
