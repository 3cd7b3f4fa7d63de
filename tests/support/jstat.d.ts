/** The parts of jstat that the tests compare with; the package ships no types. */
declare module 'jstat' {
  const jstat: { normal: { cdf(x: number, mean: number, deviation: number): number } }
  export default jstat
}
