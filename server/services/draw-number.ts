import { savepoint, type Transaction } from '#server/db/as-actor'
import { violates } from '#server/errors'
import { randomInt } from 'node:crypto'

/** Letters and figures that cannot be taken for one another. */
const LETTERS = '23456789ABCDEFGHJKLMNPRTUVWXY'

/** Random, so that no vendor can count other vendors' documents by it. */
function draw(prefix: string, now: Date): string {
  const tail = Array.from({ length: 5 }, () => LETTERS[randomInt(LETTERS.length)]).join('')
  return `${prefix}-${String(now.getUTCFullYear()).slice(2)}-${tail}`
}

/** Writes a row under a number drawn for it, and draws again when the number is taken. */
export async function withDrawnNumber<T>(tx: Transaction, prefix: string, now: Date, constraint: string, write: (number: string) => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await savepoint(tx, () => write(draw(prefix, now)))
    } catch (error) {
      if (attempt >= 5 || !violates(error, constraint)) throw error
    }
  }
}

/** For a number that has to stand in a document before its row is written. */
export const drawNumber = draw
