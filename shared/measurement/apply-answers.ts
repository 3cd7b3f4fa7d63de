import { Dialogue } from './answers'
import type { Answer, ExpectedRow, MeasurementReading, RefusedFile } from './model'
import { readWith } from './read-measurements'

export type Answered =
  | { kind: 'answered'; reading: MeasurementReading; answers: Answer[] }
  /** Answers that no question of this file asks for, or that do not fit their question: nothing is taken. */
  | { kind: 'unfitting'; answers: Answer[] }
  | RefusedFile

/**
 * Reads a file again with more answers; a later answer to the same question replaces the earlier one.
 * All or nothing: one answer that does not fit, and none is taken.
 */
export function applyAnswers(bytes: Uint8Array, expected: readonly ExpectedRow[], given: readonly Answer[], more: readonly Answer[]): Answered {
  const answers = [...new Map([...given, ...more].map((answer) => [answer.questionId, answer])).values()]
  const dialogue = new Dialogue(answers)
  const reading = readWith(bytes, expected, dialogue)
  if (reading.kind === 'refused') return reading

  const added = new Set(more.map(({ questionId }) => questionId))
  const reopened = new Set(reading.questions.map(({ id }) => id))
  const strangers = dialogue.strangers()
  const unfitting = answers.filter((answer) => added.has(answer.questionId) && (strangers.includes(answer) || reopened.has(answer.questionId)))
  if (unfitting.length > 0) return { kind: 'unfitting', answers: unfitting }
  // An earlier answer may have lost its question by a later one, e.g. about a column that is now ignored.
  return { kind: 'answered', reading, answers: answers.filter((answer) => !strangers.includes(answer)) }
}
