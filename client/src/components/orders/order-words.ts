import type { ORDER_ANSWERS } from '#shared/contracts/orders'

type OrderAnswer = (typeof ORDER_ANSWERS)[number]

export const ORDER_ANSWER_WORDS: Record<OrderAnswer, string> = {
  accepted: 'Accepted',
  'accepted-with-changes': 'Accepted with changes',
  refused: 'Refused',
}

export const answerText = (answer: OrderAnswer | null): string => (answer === null ? 'Not acknowledged yet' : ORDER_ANSWER_WORDS[answer])
