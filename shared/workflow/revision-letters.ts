/** Letters that drawings leave out because they read like other letters or figures. Source: ASME Y14.35, 6.1. */
const LETTERS = 'ABCDEFGHJKLMNPRTUVWY'

/**
 * The letter of the release after `last`; `A` for the first one. After `Y` follows `AA`.
 * I, O, Q, S, X and Z are skipped. Source: ASME Y14.35.
 *
 * @throws RangeError when `last` is not such a letter
 */
export function nextReleaseLetter(last: string | null): string {
  if (last === null) return 'A'
  const digits = [...last].map((letter) => LETTERS.indexOf(letter))
  if (digits.length === 0 || digits.includes(-1)) throw new RangeError(`not a release letter: ${last}`)

  for (let place = digits.length - 1; place >= 0; place--) {
    digits[place] = (digits[place]! + 1) % LETTERS.length
    if (digits[place] !== 0) return digits.map((digit) => LETTERS[digit]).join('')
  }
  return 'A'.repeat(digits.length + 1)
}

/**
 * The number of the draft after `last`: P1, P2 … (provisional issues).
 *
 * @throws RangeError when `last` is not a draft number
 */
export function nextDraftNumber(last: string | null): string {
  if (last === null) return 'P1'
  const match = /^P([1-9]\d*)$/.exec(last)
  if (!match) throw new RangeError(`not a draft number: ${last}`)
  return `P${Number(match[1]) + 1}`
}

/** Whether revision `a` was released before `b`: shorter first, then by letter. */
export const isEarlierRelease = (a: string, b: string): boolean => a.length < b.length || (a.length === b.length && a < b)
