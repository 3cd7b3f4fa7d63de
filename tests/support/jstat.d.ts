/** The parts of jstat that the tests compare with; the package ships no types. */
declare module 'jstat' {
  const jstat: {
    normal: { cdf(x: number, mean: number, deviation: number): number }
    /** Integral of a function between two limits, by Simpson's rule. */
    simpson(of: (x: number) => number, from: number, to: number, pieces: number): number
  }
  export default jstat
}
