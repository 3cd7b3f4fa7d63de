import type { MaterialRow } from '../library'
import type { Candidate } from '../propose/candidate'
import type { Rejection } from '../propose/reasons'
import type { Size } from '../propose/search'
import { goodCandidate, tryCore } from '../propose/try-core'
import type { Tried } from '../propose/try-core'
import { rejectingCheck } from './candidates'
import type { RejectedCore } from './candidates'
import { dominates } from './front'
import { DEFAULT_FINALISTS } from './preferences'
import type { SearchOutcome, SearchProgress } from './progress'
import { outcome } from './ranking'
import { rejectedCore } from './scope'
import type { Scope } from './scope'
import type { Ranked, Screening } from './screening'

/** A design that broke nothing. */
export interface Made {
  candidate: Candidate
  size: Size
  material: MaterialRow
  id: string
}

export interface Counted {
  made: Made[]
  rejected: RejectedCore[]
  screened: number
  evaluated: number
  stopped: boolean
}

/** Sizes in the order in which they are laid out: those that no other size dominates first, then by loss times volume. */
function inOrder(bySize: Screening['bySize']): Screening['bySize'] {
  const aims = bySize.map(({ kept }) => kept[0]!.estimate).map(({ lossW, volumeMm3, heightMm, copperMm3 }) => [lossW, volumeMm3, heightMm, copperMm3])
  const beaten = aims.map((aim) => aims.filter((other) => dominates(other, aim)).length)
  const product = ({ kept: [first] }: Screening['bySize'][number]) => first!.estimate.lossW * first!.estimate.volumeMm3
  return bySize.map((entry, index) => ({ entry, index })).sort((one, other) => beaten[one.index]! - beaten[other.index]! || product(one.entry) - product(other.entry) || one.index - other.index).map(({ entry }) => entry)
}

/** The most promising sizes laid out and evaluated in full. */
export function* evaluateFinalists(scope: Scope, { bySize, rejected, screened }: Screening): Generator<SearchProgress, SearchOutcome, boolean | undefined> {
  const most = scope.wishes.finalists ?? DEFAULT_FINALISTS
  const chosen = chooseSizes(inOrder(bySize), most)
  const counted: Counted = { made: [], rejected: [...rejected], screened, evaluated: 0, stopped: false }
  for (const [index, { size, kept }] of chosen.entries()) {
    const { made, evaluated, failure } = onSize(scope, size, kept)
    counted.evaluated += evaluated
    counted.made.push(...made)
    if (made.length === 0 && failure) counted.rejected.push(rejectedCore(size, checkOf(failure)))
    if (yield { stage: 'evaluating', done: index + 1, total: chosen.length, found: counted.made.length }) return outcome(scope, { ...counted, stopped: true })
  }
  return outcome(scope, counted)
}

/** Layouts tried on one size, and how much less copper the next one has after one that did not fit or whose thick wire lost too much. */
const MOST_TRIES = 5
const LESS_COPPER = 0.8
const TOO_MUCH_COPPER: ReadonlySet<Rejection> = new Set<Rejection>(['window', 'build', 'layer-width', 'resistance'])

/** On one size: the variant of least loss that fits, and beside it one of little more loss with a quarter less copper. */
function onSize(scope: Scope, size: Size, kept: readonly Ranked[]): { made: Made[]; evaluated: number; failure: Tried | null } {
  const made: Made[] = []
  let failure: Tried | null = null
  let evaluated = 0
  let open = [...kept]
  for (let tries = 0; tries < MOST_TRIES && open.length > 0 && made.length < 2; tries++) {
    const ranked = open[0]!
    const tried = laidOut(scope, size, ranked)
    evaluated += Number(tried.state === 'built')
    const candidate = goodCandidate(tried)
    failure ??= candidate ? null : tried
    if (candidate) made.push({ candidate, size, material: ranked.variant.material, id: ranked.id })
    else if (!TOO_MUCH_COPPER.has(reasonOf(tried))) break
    const { copperMm3, lossW } = ranked.estimate
    open = open.filter(({ estimate }) => estimate.copperMm3 <= LESS_COPPER * copperMm3 && (!candidate || estimate.lossW <= 1.3 * lossW))
  }
  return { made, evaluated, failure }
}

const reasonOf = (tried: Tried): Rejection => (tried.state === 'built' ? tried.candidate.rejection! : tried.rejection)

/** At least one size of each family, then the most promising ones. */
function chooseSizes(ordered: Screening['bySize'], most: number): Screening['bySize'] {
  const firsts = ordered.filter(({ size }, index) => ordered.findIndex((other) => other.size.core.shape === size.core.shape) === index)
  return [...firsts, ...ordered.filter((entry) => !firsts.includes(entry))].slice(0, most)
}

function laidOut(scope: Scope, { core, former }: Size, { variant }: Ranked): Tried {
  const { material, method, densityShare, turnShare } = variant
  return tryCore(scope.inputOf(material, { method, densityShare, turnShares: [turnShare, turnShare * 1.2] }), core, former)
}

const checkOf = (tried: Tried): string => (tried.state === 'built' ? rejectingCheck(tried.candidate.rejection!, tried.candidate.evaluation) : rejectingCheck(tried.rejection, null))
