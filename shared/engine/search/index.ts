import { indexLibrary } from '../evaluate/lookup'
import type { Finding } from '../findings'
import type { CoreRow, FormerRow, Library, MaterialRow } from '../library'
import { DEFAULT_PREFERENCES } from '../propose/preferences'
import { planOf } from '../propose/plan'
import type { Plan, WindingNeed } from '../propose/plan'
import type { Candidate, SearchInput } from '../propose/candidate'
import type { Rejection } from '../propose/reasons'
import { isHollow } from '../propose/search'
import { goodCandidate, tryCore, turnsByFlux } from '../propose/try-core'
import type { Tried } from '../propose/try-core'
import type { InsulationMethod, RequirementSheet } from '../specification'
import { rejectingCheck, shownCandidate } from './candidates'
import type { RejectedCore, SearchCandidate } from './candidates'
import { dominates, paretoFront } from './front'
import { DEFAULT_FINALISTS, SEARCHED_SHAPES } from './preferences'
import type { SearchPreferences } from './preferences'
import { screen } from './screen'
import type { Estimate, Variant } from './screen'

export type { CandidateFigures, RejectedCore, SearchCandidate } from './candidates'
export type { SearchPreferences } from './preferences'

export interface SearchProgress {
  stage: 'screening' | 'evaluating'
  done: number
  total: number
  /** Candidates found so far. */
  found: number
}

export interface SearchOutcome {
  /** The best first: those on the front before the others, then by loss, volume and copper together; ties by id. */
  candidates: SearchCandidate[]
  rejected: RejectedCore[]
  findings: Finding[]
  /** Variants looked at by closed forms, and designs evaluated in full. */
  screened: number
  evaluated: number
  stopped: boolean
}

/** Turns above the least, and densities about the target, that are looked at. */
const TURN_SHARES = [1, 1.12, 1.25, 1.4, 1.6, 1.85]
const DENSITY_SHARES = [0.7, 0.85, 1, 1.2]

/** Variants between two reports of progress. */
const STRIDE = 2000
/** Rise allowed where the requirement names none, K: class 130 above 40 °C. */
const USUAL_RISE_K = 75

interface Size {
  core: CoreRow
  former: FormerRow
}

interface Ranked {
  variant: Variant
  estimate: Estimate
  id: string
}

/**
 * Candidates from a duty over the whole library, one step at a time, so that whoever drives it can show progress and stop:
 * variants of core, material, turns, density and insulation are ordered by closed forms, the best of each core are laid out and
 * evaluated in full, and what fails names the check that rejected it.
 *
 * Deterministic: equal input gives the same candidates in the same order.
 */
export function* searchSteps(requirement: RequirementSheet, library: Library, wishes: SearchPreferences = {}): Generator<SearchProgress, SearchOutcome, boolean | undefined> {
  const plan = planned(requirement)
  if ('findings' in plan && !('windings' in plan)) return { candidates: [], rejected: [], findings: plan.findings, screened: 0, evaluated: 0, stopped: false }
  const scope = scopeOf(requirement, library, { plan: plan as Plan, wishes })
  const screening = yield* screenAll(scope)
  if (screening.stopped) return outcome(scope, { made: [], rejected: screening.rejected, screened: screening.screened, evaluated: 0, stopped: true })
  return yield* evaluateFinalists(scope, screening)
}

/** The whole search at once. `onProgress` answering false stops it with what was found. */
export function search(requirement: RequirementSheet, library: Library, wishes: SearchPreferences = {}, onProgress: (progress: SearchProgress) => boolean | void = () => undefined): SearchOutcome {
  const steps = searchSteps(requirement, library, wishes)
  let step = steps.next()
  while (!step.done) step = steps.next(onProgress(step.value) === false)
  return step.value
}

/** The duty solved, or why it cannot be. */
function planned(requirement: RequirementSheet): Plan | { findings: Finding[] } {
  try {
    return planOf(requirement) ?? { findings: [{ code: 'duty-without-proposal', severity: 'warning', path: 'requirement.duty', values: { topology: requirement.duty.topology } }] }
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    return { findings: [{ code: 'duty-not-solvable', severity: 'error', path: 'requirement.duty', values: { reason: error.message } }] }
  }
}

// ---------------------------------------------------------------------------------------------

interface Scope {
  requirement: RequirementSheet
  library: Library
  plan: Plan
  wishes: SearchPreferences
  sizes: Size[]
  tooHigh: RejectedCore[]
  materials: MaterialRow[]
  methods: readonly InsulationMethod[]
  inputOf: (material: MaterialRow, of?: { method?: InsulationMethod; densityShare?: number; turnShares?: readonly number[] }) => SearchInput
  mostRiseK: number
}

function scopeOf(requirement: RequirementSheet, library: Library, { plan, wishes }: { plan: Plan; wishes: SearchPreferences }): Scope {
  const index = indexLibrary(library)
  const preferences = { ...DEFAULT_PREFERENCES, shapes: SEARCHED_SHAPES, ...wishes }
  const stocked = new Set(wishes.stockedRows)
  const all = library.formers
    .flatMap((former): Size[] => {
      const core = library.cores.find(({ id }) => id === former.coreId)
      if (!core || isHollow(core) || !preferences.shapes.includes(core.shape) || (preferences.coreId !== null && core.id !== preferences.coreId)) return []
      return wishes.onlyStocked && !(stocked.has(`core/${core.id}`) && stocked.has(`former/${former.id}`)) ? [] : [{ core, former }]
    })
    .sort((one, other) => one.core.effectiveVolumeMm3 - other.core.effectiveVolumeMm3 || (one.former.id < other.former.id ? -1 : 1))
  const limitMm = requirement.maximumHeightMm
  const isTooHigh = ({ former }: Size) => limitMm !== null && former.envelopeMm.height + 0.5 > limitMm
  return {
    requirement,
    library,
    plan,
    wishes,
    sizes: all.filter((size) => !isTooHigh(size)),
    tooHigh: all.filter(isTooHigh).map((size) => rejectedCore(size, rejectingCheck('height', null))),
    materials: materialsFor(library, plan.frequencyHz, wishes),
    methods: wishes.insulationMethods ?? [requirement.insulationMethod],
    mostRiseK: requirement.permittedRiseK ?? USUAL_RISE_K,
    inputOf: (material, { method = requirement.insulationMethod, densityShare = 1, turnShares } = {}) => ({
      requirement: { ...requirement, insulationMethod: method, targetCurrentDensityAPerMm2: requirement.targetCurrentDensityAPerMm2 * densityShare },
      plan,
      material,
      library,
      index,
      preferences,
      ...(turnShares ? { turnShares } : {}),
    }),
  }
}

function materialsFor({ materials }: Library, frequencyHz: number, { materialIds, materialId }: SearchPreferences): MaterialRow[] {
  const asked = materialIds ?? (materialId ? [materialId] : null)
  if (asked) return materials.filter(({ id }) => asked.includes(id))
  const power = materials.filter(({ use, saturation, lossFits }) => use === 'power' && lossFits.length > 0 && saturation.some(({ temperatureC }) => temperatureC >= 100))
  const within = power.filter(({ lossFits }) => lossFits.some(({ minimumHz, maximumHz }) => frequencyHz >= minimumHz && frequencyHz <= maximumHz))
  return within.length > 0 ? within : power
}

const rejectedCore = ({ core, former }: Size, check: string): RejectedCore => ({ core: core.name, former: former.name, shape: core.shape, check })

// ---------------------------------------------------------------------------------------------
// Screening

interface Screening {
  /** The variants of each core that are worth a layout, the least loss first. */
  bySize: { size: Size; kept: Ranked[] }[]
  rejected: RejectedCore[]
  screened: number
  stopped: boolean
}

function* screenAll(scope: Scope): Generator<SearchProgress, Screening, boolean | undefined> {
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
    else result.rejected.push(rejectedCore(size, rejectingCheck(reasons[0] ?? 'flux', null)))
  }
  return result
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

// ---------------------------------------------------------------------------------------------
// Finalists

interface Made {
  candidate: Candidate
  size: Size
  material: MaterialRow
  id: string
}

interface Counted {
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

function* evaluateFinalists(scope: Scope, { bySize, rejected, screened }: Screening): Generator<SearchProgress, SearchOutcome, boolean | undefined> {
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

/** Layouts tried on one size, and how much less copper the next one has after one that did not fit. */
const MOST_TRIES = 5
const LESS_COPPER = 0.8
const NO_ROOM: ReadonlySet<Rejection> = new Set<Rejection>(['window', 'build', 'layer-width'])

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
    else if (!NO_ROOM.has(reasonOf(tried))) break
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

// ---------------------------------------------------------------------------------------------
// Ranking

function outcome({ wishes }: Scope, { made, rejected, screened, evaluated, stopped }: Counted): SearchOutcome {
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
