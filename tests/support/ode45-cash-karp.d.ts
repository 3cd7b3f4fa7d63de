/** What the tests use of the solver, which ships no types. */
declare module 'ode45-cash-karp' {
  interface Solver {
    y: ArrayLike<number>
    steps(count: number, endTime: number): boolean
  }
  type Derivative = (change: number[], state: ArrayLike<number>, time: number) => void
  export default function integrate(start: number[], derivative: Derivative, startTime: number, step: number, options?: { tol?: number; maxIncreaseFactor?: number }): Solver
}
