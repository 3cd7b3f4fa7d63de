/** @throws RangeError naming the value, unless it is a finite number above zero */
export function requirePositive(name: string, value: number): void {
  if (!(value > 0 && Number.isFinite(value))) throw new RangeError(`${name} must be positive: ${value}`)
}

/** @throws RangeError naming the value, unless it is a finite number of zero or more */
export function requireNotNegative(name: string, value: number): void {
  if (!(value >= 0 && Number.isFinite(value))) throw new RangeError(`${name} must not be negative: ${value}`)
}

/** @throws RangeError naming the value, unless it lies between the two limits, both allowed */
export function requireBetween(name: string, value: number, lowest: number, highest: number): void {
  if (!(value >= lowest && value <= highest)) throw new RangeError(`${name} must lie between ${lowest} and ${highest}: ${value}`)
}

/** @throws RangeError naming the value, unless it is a whole number above zero */
export function requireCount(name: string, value: number): void {
  if (!(Number.isInteger(value) && value > 0)) throw new RangeError(`${name} must be a whole number above zero: ${value}`)
}
