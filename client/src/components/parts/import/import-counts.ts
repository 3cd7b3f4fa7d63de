import type { PartImportPreview, PartImportRow } from '#shared/contracts/parts'

export const STATE_WORDS: Record<PartImportRow['state'], string> = { new: 'New', changed: 'New version', unchanged: 'Unchanged', unfit: 'Does not fit' }

export const countOf = ({ rows }: PartImportPreview, state: PartImportRow['state']) => rows.filter((row) => row.state === state).length

export const fits = (preview: PartImportPreview) => preview.problems.length === 0 && countOf(preview, 'unfit') === 0

/** Rows that would be stored. */
export const toStore = (preview: PartImportPreview) => countOf(preview, 'new') + countOf(preview, 'changed')

export const rowsWord = (count: number) => (count === 1 ? '1 row' : `${count} rows`)
