import type { Answer, Question } from './model'

/** Questions of one file with the answers given so far. Asking again with an answer known asks nothing. */
export class Dialogue {
  readonly open: Question[] = []
  readonly #answers: ReadonlyMap<string, Answer>
  readonly #asked = new Map<string, Question>()

  constructor(answers: readonly Answer[]) {
    this.#answers = new Map(answers.map((answer) => [answer.questionId, answer]))
  }

  /** The answer when there is a fitting one; otherwise null, and the question stays open. */
  ask(question: Omit<Question, 'id'>): Answer | null {
    const id = `${question.code}:${question.address}`
    const whole = { ...question, id }
    this.#asked.set(id, whole)
    const answer = this.#answers.get(id)
    if (answer && fits(answer, whole)) return answer
    this.open.push(whole)
    return null
  }

  /** Puts a question back whose typed answer could not be used. */
  reopen(id: string): void {
    const question = this.#asked.get(id)
    if (question && !this.open.includes(question)) this.open.push(question)
  }

  /** Answers to questions that this file does not ask, or with options it does not offer. */
  strangers(): Answer[] {
    return [...this.#answers.values()].filter((answer) => {
      const question = this.#asked.get(answer.questionId)
      return !question || !fits(answer, question)
    })
  }
}

function fits(answer: Answer, question: Question): boolean {
  if (answer.option === 'typed') return question.typed && (answer.text ?? '').trim() !== ''
  return question.options.some(({ id }) => id === answer.option)
}
