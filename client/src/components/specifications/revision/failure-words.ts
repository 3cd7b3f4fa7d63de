import { CHECK_TEXTS } from '../check-sentences'
import { placeWords } from '../place-words'

interface Failure {
  message: string
  code?: string
  fields?: Readonly<Record<string, string>>
  requestId?: string
}

/** A refusal whose fields say what they are about: the check by code and sentence, the place in the words of the form. */
export function inWords(failure: Failure | null): Failure | null {
  if (!failure?.fields) return failure
  const say = (key: string, sentence: string) => (key in CHECK_TEXTS ? `${key}: ${CHECK_TEXTS[key]} ${sentence}` : key === 'reason' ? sentence : `${placeWords(key)}: ${sentence}`)
  return { message: failure.message, code: failure.code, requestId: failure.requestId, fields: Object.fromEntries(Object.entries(failure.fields).map(([key, sentence]) => [key, say(key, sentence)])) }
}
