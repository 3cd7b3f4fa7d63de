/** Why a stage has no answer. Codes are permanent: they are stored with revisions and translated by the client. */
export type NotCheckableReason =
  | 'past-last-row'
  | 'before-first-row'
  | 'no-row-for-input'
  | 'no-data'
  | 'table-not-held'
  | 'pollution-degree-not-in-table'
  | 'material-group-not-permitted'
  | 'means-of-protection-not-stated'
  | 'high-frequency-table-not-held'

export interface NotCheckable {
  state: 'not-checkable'
  reason: NotCheckableReason
  /** Numbers for the message, unit in the key. */
  values: Readonly<Record<string, number>>
}

/** Either a known value or the reason why there is none; a table past its last row is never extended. */
export type Answer<T> = { state: 'known'; value: T } | NotCheckable

export const known = <T>(value: T): Answer<T> => ({ state: 'known', value })

export const notCheckable = (reason: NotCheckableReason, values: Readonly<Record<string, number>> = {}): NotCheckable => ({
  state: 'not-checkable',
  reason,
  values,
})

/** Applies a function to a known value and hands a missing one through. */
export const mapAnswer = <T, U>(answer: Answer<T>, map: (value: T) => U): Answer<U> =>
  answer.state === 'known' ? known(map(answer.value)) : answer
