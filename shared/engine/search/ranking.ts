import { shownCandidate } from './candidates'
import type { SearchCandidate } from './candidates'
import type { Counted, Made } from './finalists'
import { paretoFront } from './front'
import type { SearchOutcome } from './progress'
import type { Scope } from './scope'

/** Candidates in their order, with those marked that none dominates. */
export function outcome({ wishes }: Scope, { made, rejected, screened, evaluated, stopped }: Counted): SearchOutcome {
  const flags = { preferred: new Set(wishes.preferredRows), stocked: new Set(wishes.stockedRows) }
  const shown = distinct(made).map(({ candidate, size, material, id }) => shownCandidate({ candidate, former: size.former, material, id }, flags))
  const front = new Set(paretoFront(shown.map(({ figures: { lossW, volumeMm3, copperG, heightMm, leakageH } }) => [lossW, volumeMm3, copperG, heightMm, leakageH])))
  const candidates = shown.map((candidate, index) => ({ ...candidate, onFront: front.has(index) })).sort(byMerit)
  return { candidates, rejected, findings: [], screened, evaluated, stopped }
}

/** Two variants of one core may end in the same design. */
const distinct = (made: readonly Made[]): Made[] => {
  const seen = new Set<string>()
  return made.filter(({ candidate: { design }, size, material }) => {
    const key = JSON.stringify([size.former.id, material.id, design.method, design.windings.map(({ turns, wire }) => [turns, wire.wire.id, wire.parallel])])
    if (seen.has(key)) return false
    seen.add(key)
    return true
  })
}

const PREFERENCE_SHARE = 0.85

function meritOf({ figures: { lossW, volumeMm3, copperG }, isPreferred, isStocked }: SearchCandidate): number {
  const product = Math.cbrt((lossW ?? Infinity) * volumeMm3 * (copperG ?? Infinity))
  return product * (isPreferred ? PREFERENCE_SHARE : 1) * (isStocked ? PREFERENCE_SHARE : 1)
}

const byMerit = (one: SearchCandidate, other: SearchCandidate) =>
  Number(other.onFront) - Number(one.onFront) || meritOf(one) - meritOf(other) || (one.id < other.id ? -1 : 1)
