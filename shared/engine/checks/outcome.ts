import type { Coil } from '../build'
import type { CheckResult, CheckState, Evaluation } from '../evaluation'
import type { Context } from '../evaluate/context'
import type { SpecificationDocument } from '../specification'

/** What a check looks at. */
export interface CheckInput {
  document: SpecificationDocument
  evaluation: Omit<Evaluation, 'checks'>
  coil: Coil | null
  context: Context
  /** Derivative of the temperature rise by temperature; null when it did not settle. */
  loopGain: number | null
}

/** A check's answer about one place of the document. */
export interface Outcome {
  state: CheckState
  value: number | null
  limit: number | null
  unit: string
  path: string
  values?: Readonly<Record<string, number | string>>
  /** Where the rule has steps, that of the step in question; else the table's. */
  severity?: CheckResult['severity']
}

/** One release check. No outcome: the check does not apply to this kind of part. */
export interface Check {
  severity: CheckResult['severity']
  source: string
  /** A person looks where no data of the document or the library can tell: such a check never says more than what to look at. */
  decidedBy?: 'person'
  run: (input: CheckInput) => readonly Outcome[]
}

type Values = Readonly<Record<string, number | string>>

interface Compared {
  value: number | null | undefined
  limit: number | null | undefined
  unit: string
  path: string
  values?: Values
  severity?: CheckResult['severity']
}

// A limit met to the last digit but one is met.
const SLACK = 1e-9

function compare({ value, limit, unit, path, values, severity }: Compared, within: (value: number, limit: number) => boolean): Outcome {
  if (value == null || limit == null || !Number.isFinite(value) || !Number.isFinite(limit)) {
    return { state: 'not-checkable', value: value ?? null, limit: limit ?? null, unit, path, values, severity }
  }
  return { state: within(value, limit) ? 'met' : 'not-met', value, limit, unit, path, values, severity }
}

export const atMost = (compared: Compared): Outcome => compare(compared, (value, limit) => value <= limit + SLACK * Math.abs(limit))
export const atLeast = (compared: Compared): Outcome => compare(compared, (value, limit) => value >= limit - SLACK * Math.abs(limit))

export const yesNo = (met: boolean, path: string, values?: Values): Outcome => ({ state: met ? 'met' : 'not-met', value: null, limit: null, unit: '', path, values })

export const notCheckable = (path: string, values?: Values): Outcome => ({ state: 'not-checkable', value: null, limit: null, unit: '', path, values })

/** Margin relative to the limit, positive when met. */
export function marginOf({ state, value, limit }: Outcome): number | null {
  if (state === 'not-checkable' || value === null || limit === null || limit === 0) return null
  const distance = Math.abs(limit - value) / Math.abs(limit)
  return state === 'met' ? distance : -distance
}

/** Parts that keep energy in their gap, by the drawing or by the duty: saturation is their first limit. */
export function storesEnergy({ document }: Pick<CheckInput, 'document'>): boolean {
  const topologies = [document.specification.electrical.topology.value, document.requirement?.duty.topology]
  return topologies.some((topology) => topology === 'flyback' || topology === 'coupled-inductor' || topology === 'inductor')
}
