/**
 * Error function erf(x), within 1.5e-7.
 *
 * Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, 7.1.26.
 */
export function erf(x: number): number {
  const t = 1 / (1 + 0.3275911 * Math.abs(x))
  const series = t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))))
  return Math.sign(x) * (1 - series * Math.exp(-x * x))
}
