import type { Plan, WindingNeed } from '../propose/plan'
import type { Rejection } from '../propose/reasons'
import type { Size } from '../propose/search'
import { tryCore, turnsByFlux } from '../propose/try-core'
import { rejectingCheck } from './candidates'
import type { RejectedCore } from './candidates'
import type { SearchProgress } from './progress'
import { rejectedCore } from './scope'
import type { Scope } from './scope'
import { screen } from './screen'
import type { Estimate, Variant } from './screen'

/** Turns above the least, and densities about the target, that are looked at. */
const TURN_SHARES = [1, 1.12, 1.25, 1.4, 1.6, 1.85]
const DENSITY_SHARES = [0.7, 0.85, 1, 1.2]

/** Variants between two reports of progress. */
const STRIDE = 2000

export interface Ranked {
  variant: Variant
  estimate: Estimate
  id: string
}

export interface Screening {
  /** The variants of each core that are worth a layout, the least loss first. */
  bySize: { size: Size; kept: Ranked[] }[]
  rejected: RejectedCore[]
  screened: number
  stopped: boolean
}

/** Every variant by closed forms, size after size. */
export function* screenAll(scope: Scope): Generator<SearchProgress, Screening, boolean | undefined> {
  const { sizes, materials, methods, plan } = scope
  const needsOf = memoised(plan)
  const voltSecondsVs = trialVoltSeconds(scope)
  const total = sizes.length * materials.length * methods.length * TURN_SHARES.length * DENSITY_SHARES.length
  const result: Screening = { bySize: [], rejected: [...scope.tooHigh], screened: 0, stopped: false }
  for (const size of sizes) {
    const kept: Ranked[] = []
    const reasons: Rejection[] = []
    for (const variant of variantsOf(scope, size)) {
      result.screened += 1
      const ranked = looked(scope, variant, { needsOf, voltSecondsVs })
      if (typeof ranked === 'string') reasons.push(ranked)
      else kept.push(ranked)
      if (result.screened % STRIDE === 0 && (yield { stage: 'screening', done: result.screened, total, found: result.bySize.length })) return { ...result, stopped: true }
    }
    if (kept.length > 0) result.bySize.push({ size, kept: kept.sort(byLoss) })
    else result.rejected.push(rejectedCore(size, rejectingCheck(mostOften(reasons) ?? 'flux', null)))
  }
  return result
}

/** The reason that most variants fall out by; null without any. */
function mostOften(reasons: readonly Rejection[]): Rejection | null {
  const counts = new Map<Rejection, number>()
  for (const reason of reasons) counts.set(reason, (counts.get(reason) ?? 0) + 1)
  return [...counts].reduce<[Rejection, number] | null>((most, one) => (most && most[1] >= one[1] ? most : one), null)?.[0] ?? null
}

function* variantsOf({ materials, methods }: Scope, size: Size): Generator<Variant> {
  for (const material of materials)
    for (const method of methods)
      for (const turnShare of TURN_SHARES)
        for (const densityShare of DENSITY_SHARES) yield { ...size, material, method, turnShare, densityShare }
}

function looked(scope: Scope, variant: Variant, { needsOf, voltSecondsVs }: { needsOf: (least: number) => readonly WindingNeed[]; voltSecondsVs: number }): Ranked | Rejection {
  const least = leastTurns(scope, variant)
  if (least === null) return 'flux'
  const needs = needsOf(least * variant.turnShare)
  const { requirement, plan, mostRiseK } = scope
  const answer = screen({ variant, needs, currentDensityAPerMm2: requirement.targetCurrentDensityAPerMm2, frequencyHz: plan.frequencyHz, voltSecondsVs, mostRiseK })
  if (answer.state === 'rejected') return answer.rejection
  const { core: _, former, material, method, turnShare, densityShare } = variant
  return { variant, estimate: answer.estimate, id: `${former.id}/${material.id}/${method}/${turnShare}/${densityShare}` }
}

const MOST_TURNS = 5000

function leastTurns(scope: Scope, { core, material }: Variant): number | null {
  const least = turnsByFlux(scope.inputOf(material), core)
  return least !== null && least < MOST_TURNS ? least : null
}

/** Needs change with whole turns only; each is reckoned once. */
function memoised(plan: Plan): (least: number) => readonly WindingNeed[] {
  const known = new Map<number, readonly WindingNeed[]>()
  return (least) => {
    const whole = Math.ceil(least - 1e-9)
    const needs = known.get(whole) ?? plan.windings(whole)
    known.set(whole, needs)
    return needs
  }
}

/** Volt-seconds at the primary hardly depend on the core: one trial on a middle size gives them. */
function trialVoltSeconds(scope: Scope): number {
  const middle = scope.sizes[Math.floor(scope.sizes.length / 2)]
  const material = scope.materials[0]
  if (!middle || !material) return 0
  const tried = tryCore(scope.inputOf(material, { turnShares: [1] }), middle.core, middle.former)
  const candidate = tried.state === 'built' ? tried.candidate : (tried.show?.() ?? null)
  return candidate?.evaluation.magnetics.voltSecondsVs ?? 0
}

const byLoss = (one: Ranked, other: Ranked) => one.estimate.lossW - other.estimate.lossW || (one.id < other.id ? -1 : 1)
