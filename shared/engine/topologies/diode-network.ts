/** Coupled inductances, each in series with a source and, but for a closed switch, a rectifier: stepped exactly from event to event. */
export interface DiodeNetwork {
  /** Symmetric and positive definite, H. */
  inductanceH: readonly (readonly number[])[]
}

/** What drives each branch during one phase. */
export interface NetworkPhase {
  durationS: number
  /** Voltage at the branch while it conducts; its current falls where that is below what the flux induces. */
  sourceV: readonly number[]
  /** A closed switch conducts either way; the others only forwards. */
  closed: readonly boolean[]
}

/** A span of constant voltages: currents change in straight lines. */
export interface NetworkSegment {
  durationS: number
  fromA: readonly number[]
  toA: readonly number[]
  voltageV: readonly number[]
}

/** Events in one phase before the network counts as not settling. */
const MOST_EVENTS = 60

/**
 * The currents through one phase, beginning with those given. Rectifiers block at zero current and conduct again where the
 * induced voltage asks for it; which of them do is the linear complementarity problem of v = L·di/dt.
 *
 * Source: inductance matrix with ideal rectifiers; R. Cottle, J.-S. Pang and R. Stone, The Linear Complementarity Problem, ch. 4 (principal pivoting).
 *
 * @throws RangeError when the matrix cannot be solved or the phase does not settle
 */
export function stepNetwork({ inductanceH }: DiodeNetwork, phase: NetworkPhase, startA: readonly number[]): NetworkSegment[] {
  const segments: NetworkSegment[] = []
  let currentsA = [...startA]
  let leftS = phase.durationS
  for (let event = 0; leftS > 0; event++) {
    if (event > MOST_EVENTS) throw new RangeError(`the rectifiers do not settle within ${phase.durationS} s`)
    const { slopes, voltageV } = conduction(inductanceH, phase, currentsA)
    const untilZeroS = slopes.map((slope, index) => (!phase.closed[index] && currentsA[index]! > 0 && slope < 0 ? currentsA[index]! / -slope : Infinity))
    const firstS = Math.min(...untilZeroS)
    const durationS = Math.min(leftS, firstS)
    const toA = currentsA.map((current, index) => (durationS === firstS && untilZeroS[index]! <= firstS * (1 + 1e-12) ? 0 : current + slopes[index]! * durationS))
    if (durationS > 0) segments.push({ durationS, fromA: currentsA, toA, voltageV })
    currentsA = toA
    leftS = durationS === leftS ? 0 : leftS - durationS
    // What rounding leaves of the phase is no span of its own.
    if (leftS < 1e-15 * phase.durationS) leftS = 0
  }
  return segments
}

/** Which branches conduct at this instant, and with which rates of current. */
function conduction(inductanceH: readonly (readonly number[])[], { sourceV, closed }: NetworkPhase, currentsA: readonly number[]): { slopes: number[]; voltageV: number[] } {
  const held = currentsA.map((current, index) => closed[index]! || current > 0)
  const isOn = [...held]
  const scaleV = Math.max(...sourceV.map(Math.abs))
  for (let round = 0; round <= 4 * 2 ** Math.min(10, sourceV.length); round++) {
    const slopes = slopesOf(inductanceH, sourceV, isOn)
    const falling = slopes.findIndex((slope, index) => isOn[index]! && !held[index]! && slope < 0)
    if (falling >= 0) {
      isOn[falling] = false
      continue
    }
    const voltageV = inductanceH.map((row, index) => (isOn[index] ? sourceV[index]! : row.reduce((sum, value, other) => sum + value * slopes[other]!, 0)))
    const opening = voltageV.findIndex((value, index) => !isOn[index]! && value < sourceV[index]! - 1e-9 * scaleV)
    if (opening < 0) return { slopes, voltageV }
    isOn[opening] = true
  }
  throw new RangeError('the rectifiers that conduct cannot be told')
}

/** di/dt of the conducting branches from v = L·di/dt with the others at rest. */
function slopesOf(inductanceH: readonly (readonly number[])[], sourceV: readonly number[], isOn: readonly boolean[]): number[] {
  const active = isOn.flatMap((on, index) => (on ? [index] : []))
  const solution = solveSymmetric(active.map((row) => active.map((column) => inductanceH[row]![column]!)), active.map((row) => sourceV[row]!))
  const slopes = sourceV.map(() => 0)
  active.forEach((branch, index) => (slopes[branch] = solution[index]!))
  return slopes
}

/** Two branches, the commonest case by far. */
function solvePair(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const [a, b, d] = [matrix[0]![0]!, matrix[0]![1]!, matrix[1]![1]!]
  const [first, second] = [right[0]!, right[1]!]
  const determinant = a * d - b * b
  if (!(determinant > 1e-14 * a * d)) throw new RangeError(COUPLED_TOO_WELL)
  return [(d * first - b * second) / determinant, (a * second - b * first) / determinant]
}

const COUPLED_TOO_WELL = 'inductanceH must be positive definite: the windings are coupled without leakage'

/**
 * Solution of a symmetric positive definite system by Cholesky's factors.
 *
 * @throws RangeError when the matrix is not positive definite
 */
export function solveSymmetric(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const size = right.length
  if (size === 1 && matrix[0]![0]! > 0) return [right[0]! / matrix[0]![0]!]
  if (size === 2) return solvePair(matrix, right)
  const factor = matrix.map(() => new Array<number>(size).fill(0))
  for (let row = 0; row < size; row++) {
    for (let column = 0; column <= row; column++) {
      let sum = matrix[row]![column]!
      for (let k = 0; k < column; k++) sum -= factor[row]![k]! * factor[column]![k]!
      if (row !== column) factor[row]![column] = sum / factor[column]![column]!
      else if (sum > 1e-14 * Math.abs(matrix[row]![row]!)) factor[row]![row] = Math.sqrt(sum)
      else throw new RangeError(COUPLED_TOO_WELL)
    }
  }
  const middle = [...right]
  for (let row = 0; row < size; row++) {
    for (let k = 0; k < row; k++) middle[row]! -= factor[row]![k]! * middle[k]!
    middle[row]! /= factor[row]![row]!
  }
  for (let row = size - 1; row >= 0; row--) {
    for (let k = row + 1; k < size; k++) middle[row]! -= factor[k]![row]! * middle[k]!
    middle[row]! /= factor[row]![row]!
  }
  return middle
}
