import type { Working } from '../evaluation'
import type { Finding, FindingCode, Severity } from '../findings'
import type { CoreRow, FormerRow, Library, MaterialRow } from '../library'
import type { RequirementSheet, SpecificationDocument, Winding, WindingSpecification } from '../specification'
import { indexLibrary } from './lookup'
import type { LibraryIndex } from './lookup'

/** Everything that the stages of one evaluation share. */
export interface Context {
  specification: WindingSpecification
  requirement: RequirementSheet | null
  index: LibraryIndex
  core: CoreRow | null
  former: FormerRow | null
  material: MaterialRow | null
  /** Sets of core halves stacked on each other. */
  sets: number
  primary: Winding | null
  findings: Finding[]
  /** Null when nobody asked for it; the fast path collects nothing. */
  working: Record<string, Working> | null
}

export function createContext(document: SpecificationDocument, library: Library, withWorking: boolean): Context {
  const { specification, requirement } = document
  const index = indexLibrary(library)
  const context: Context = {
    specification,
    requirement,
    index,
    core: index.find('core', specification.core.core.value),
    former: index.find('former', specification.former.former.value),
    material: index.find('material', specification.core.material.value),
    sets: Math.max(1, specification.core.numberOfSets.value ?? 1),
    primary: primaryWinding(specification),
    findings: [],
    working: withWorking ? {} : null,
  }
  return context
}

/** The winding at which the inductance is stated, else the first primary one. */
export function primaryWinding({ electrical, windings }: WindingSpecification): Winding | null {
  const stated = windings.find(({ id }) => id === electrical.inductance.value?.windingId)
  return stated ?? windings.find(({ role }) => role === 'primary') ?? null
}

export function report(context: Context, code: FindingCode, severity: Severity, path: string, values: Finding['values'] = {}): void {
  context.findings.push({ code, severity, path, values })
}

/**
 * A stage's answer, or null with a finding when it refuses a value: the stages throw on misuse, but what a
 * document's author typed is no misuse of the evaluation.
 */
export function attempt<T>(context: Context, path: string, stage: () => T): T | null {
  try {
    return stage()
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    report(context, 'value-out-of-range', 'warning', path, { reason: error.message })
    return null
  }
}

/** Notes how a figure came about; costs nothing when nobody asked. */
export function explain(context: Context, path: string, working: () => Working): void {
  if (context.working) context.working[path] = working()
}

export const positive = (value: number | null | undefined): value is number => typeof value === 'number' && value > 0 && Number.isFinite(value)
