/** P(X ≤ k) of a binomial distribution, summed in logarithms so that large n does not underflow. */
function atMost(k: number, n: number, p: number): number {
  let logTerm = n * Math.log1p(-p)
  let sum = Math.exp(logTerm)
  for (let i = 1; i <= k; i++) {
    logTerm += Math.log((n - i + 1) / i) + Math.log(p) - Math.log1p(-p)
    sum += Math.exp(logTerm)
  }
  return sum
}

/**
 * Exact one-sided upper 95 % bound of the share of failing parts after `failures` of `n`, a fraction.
 * Zero failures of n leave 1 − 0.05^(1/n).
 *
 * Source: C. J. Clopper, E. S. Pearson, Biometrika 26 (1934) 404–413.
 *
 * @throws RangeError when the counts do not belong together
 */
export function failureShareBound(failures: number, n: number): number {
  if (!Number.isInteger(n) || !Number.isInteger(failures) || n < 1 || failures < 0 || failures > n) throw new RangeError(`not ${failures} failures of ${n}`)
  if (failures === n) return 1
  if (failures === 0) return 1 - 0.05 ** (1 / n)
  let low = failures / n
  let high = 1
  while (high - low > 1e-12) {
    const middle = (low + high) / 2
    if (atMost(failures, n, middle) > 0.05) low = middle
    else high = middle
  }
  return (low + high) / 2
}
