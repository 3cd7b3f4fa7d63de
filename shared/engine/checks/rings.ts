import { atLeast, notCheckable } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'
import { wired } from './build-fit'
import { overallDiameterMm } from '../evaluate/lookup'
import { isTopology } from './flux'

/** Share of a ring core's hole that a shuttle needs to pass, and what a hand needs, mm. Source: common practice. */
const SHUTTLE_SHARE = 0.45
const HAND_MM = 2.5

/** The hole that is left when every layer lies on the inner circumference: N ≤ π·(D − (2k − 1)·d)/d turns in layer k. */
export function remainingHoleMm(holeMm: number, windings: readonly { turns: number; overallMm: number }[]): number {
  return windings.reduce((left, { turns, overallMm }) => {
    let hole = left
    for (let laid = 0; laid < turns && hole > 0; ) {
      const inLayer = Math.max(0, Math.floor((Math.PI * (hole - overallMm)) / overallMm))
      if (inLayer === 0) return 0
      laid += inLayer
      hole -= 2 * overallMm
    }
    return Math.max(0, hole)
  }, holeMm)
}

function ringHole(input: CheckInput): Outcome[] {
  const { core } = input.context
  if (core?.shape !== 'toroid') return []
  const path = 'windings'
  const holeMm = core.dimensionsMm.b
  const laid = wired(input).map(({ winding, row }) => ({ turns: winding.turns * winding.wire.parallel, overallMm: overallDiameterMm(row, winding.wire.insulation) }))
  const complete = laid.every(({ overallMm, turns }) => overallMm !== null && overallMm > 0 && Number.isFinite(turns) && turns < 1e5)
  if (holeMm === null || laid.length === 0 || !complete) return [notCheckable(path, { missing: holeMm === null ? 'inside diameter' : 'overall diameter' })]
  // Each winding of a choke keeps to its own sector, and the layers of both lie beside each other.
  const sectors = isTopology(input, 'common-mode-choke') ? laid.map(({ turns, overallMm }) => remainingHoleMm(holeMm, [{ turns: turns * laid.length, overallMm: overallMm! }])) : [remainingHoleMm(holeMm, laid.map(({ turns, overallMm }) => ({ turns, overallMm: overallMm! })))]
  return [atLeast({ value: Math.min(...sectors), limit: Math.max(HAND_MM, SHUTTLE_SHARE * holeMm), unit: 'mm', path })]
}

/** Least distance between the windings of a ring core along its circumference, mm. Source: common practice. */
const SECTOR_GAP_MM = 2

/** Windings side by side on a ring: what the inner circumference leaves free, shared by the gaps. */
function sectorGap(input: CheckInput): Outcome[] {
  const { core } = input.context
  const own = wired(input)
  if (core?.shape !== 'toroid' || own.length < 2 || !isTopology(input, 'common-mode-choke')) return []
  const holeMm = core.dimensionsMm.b
  const breadths = own.map(({ winding, row }) => {
    const overallMm = overallDiameterMm(row, winding.wire.insulation)
    return overallMm === null ? null : winding.turns * winding.wire.parallel * overallMm
  })
  if (holeMm === null || breadths.some((breadth) => breadth === null)) return [notCheckable('windings', { missing: 'inside diameter' })]
  const creepageMm = input.evaluation.boundaries.reduce((most, { required }) => Math.max(most, required.creepageMm.value ?? 0), SECTOR_GAP_MM)
  const freeMm = Math.PI * holeMm - breadths.reduce<number>((sum, breadth) => sum + breadth!, 0)
  // More than one layer is wound back over itself within its sector, which the single layer's breadth does not show.
  return freeMm < 0 ? [notCheckable('windings', { missing: 'sector of each winding' })] : [atLeast({ value: freeMm / own.length, limit: creepageMm, unit: 'mm', path: 'windings' })]
}

export const RING_CHECKS: Readonly<Record<string, Check>> = {
  W19: { severity: 'S', source: 'layers on the inner circumference: geometry; 45 % for the shuttle: common practice', run: ringHole },
  W20: { severity: 'S', source: 'distance between the windings of a ring: common practice; IEC 60664-1', run: sectorGap },
}
