import type { CircuitFinding } from './topology'

/** An operating point that the circuit cannot reach: the finding says why, in numbers. */
export class UnreachablePoint extends RangeError {
  readonly finding: CircuitFinding

  constructor(finding: CircuitFinding) {
    super(`${finding.code}: ${JSON.stringify(finding.values)}`)
    this.finding = finding
  }
}
