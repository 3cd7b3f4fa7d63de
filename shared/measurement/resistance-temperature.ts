/** Temperature coefficient of the resistance of annealed copper at 20 °C, 1/K. Source: IEC 60028:1925. */
const COPPER_ALPHA_20C_PER_K = 0.00393

/**
 * A copper winding's resistance brought from one temperature to another, in the unit it came in.
 *
 *     R2 = R1 · (1 + α20 (T2 − 20 °C)) / (1 + α20 (T1 − 20 °C))
 *
 * Source: IEC 60028:1925. Used from −50 °C to 200 °C.
 *
 * @throws RangeError outside that range
 */
export function resistanceAt(resistance: number, fromC: number, toC: number): number {
  for (const temperatureC of [fromC, toC]) if (!(temperatureC >= -50 && temperatureC <= 200)) throw new RangeError(`temperature outside −50 °C to 200 °C: ${temperatureC}`)
  const factor = (temperatureC: number) => 1 + COPPER_ALPHA_20C_PER_K * (temperatureC - 20)
  return (resistance * factor(toC)) / factor(fromC)
}
