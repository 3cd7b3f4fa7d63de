import { boundaries } from './boundary-input'
import { atLeast, notCheckable } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/** Share of a ring core's hole that a shuttle needs to pass, and what a hand needs, mm. Source: common practice. */
const SHUTTLE_SHARE = 0.45
const HAND_MM = 2.5

const isRing = ({ context }: CheckInput) => context.core?.shape === 'toroid'

/** What the layers on the inner circumference leave of the hole. */
function ringHole(input: CheckInput): Outcome[] {
  if (!isRing(input)) return []
  const { ring } = input.evaluation.layout
  if (!ring) return [notCheckable('sequence', { missing: 'layout' })]
  return [atLeast({ value: ring.remainingHoleMm, limit: Math.max(HAND_MM, SHUTTLE_SHARE * ring.holeMm), unit: 'mm', path: 'sequence' })]
}

/** Least distance between the windings of a ring core along its hole, mm. Source: common practice. */
const SECTOR_GAP_MM = 2

/** Windings in sectors of their own keep their distance along the hole, and that of their boundary where it is more. */
function sectorGap(input: CheckInput): Outcome[] {
  if (!isRing(input)) return []
  const { ring } = input.evaluation.layout
  if (!ring) return [notCheckable('sequence', { missing: 'layout' })]
  if (new Set(ring.sectors.map(({ section }) => section)).size < 2) return []
  const between = boundaries(input).filter(({ boundary }) => boundary.between.every(({ kind }) => kind !== 'core'))
  const requiredMm = between.reduce((most, { result }) => Math.max(most, result.required.creepageMm.value ?? 0), SECTOR_GAP_MM)
  return [atLeast({ value: ring.sectorGapMm, limit: requiredMm, unit: 'mm', path: 'sequence' })]
}

export const RING_CHECKS: Readonly<Record<string, Check>> = {
  W19: { severity: 'S', source: 'layers on the inner circumference: geometry; 45 % for the shuttle: common practice', run: ringHole },
  W20: { severity: 'S', source: 'distance between the windings of a ring: common practice; IEC 60664-1', run: sectorGap },
}
