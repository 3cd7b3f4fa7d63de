import { evaluate } from '../evaluate'
import { overallDiameterMm } from '../evaluate/lookup'
import type { LibraryIndex } from '../evaluate/lookup'
import type { Evaluation } from '../evaluation'
import type { CoreRow, FormerRow, Library, MaterialRow, TapeRow } from '../library'
import { saturationFluxDensityT, turnsForFlux } from '../magnetics/flux'
import type { RequirementSheet, SpecificationDocument } from '../specification'
import { compose } from './compose'
import type { Design, PlannedWinding } from './design'
import type { Plan, WindingNeed } from './plan'
import type { ProposalPreferences } from './preferences'
import type { Rejection } from './reasons'
import { chooseWire } from './wire'
import type { WireStyle } from './wire'

/** More turns than flux asks for lower the core loss; these shares are tried in turn. */
const TURN_SHARES = [1, 1.15, 1.35, 1.6]

/** Temperature for the first flux limit, °C. */
const SATURATION_TEMPERATURE_C = 100

/** No core of the library takes more turns of the thinnest wire. */
const MOST_TURNS = 100_000

/** Share of the window beyond which no layout is tried, squares of the diameters counted. */
const HOPELESS_FILL = 0.85

export interface SearchInput {
  requirement: RequirementSheet
  plan: Plan
  material: MaterialRow
  library: Library
  index: LibraryIndex
  preferences: ProposalPreferences
}

export interface Candidate {
  document: SpecificationDocument
  evaluation: Evaluation
  design: Design
  /** Null when it meets everything. */
  rejection: Rejection | null
}

export interface SearchResult {
  chosen: Candidate | null
  /** Why each smaller core fell out. */
  rejected: { core: string; rejection: Rejection }[]
}

/**
 * The smallest core, in the order of volume, whose first good design meets flux, build, temperature and insulation. Coil
 * formers that somebody sells are tried before those that are only derived from geometry.
 */
export function searchCore(input: SearchInput): SearchResult {
  const all = candidateCores(input)
  const sold = trySizes(input, all.filter(({ former }) => former.confidence !== 'generic'))
  if (sold.chosen?.rejection === null) return sold
  const derived = trySizes(input, all.filter(({ former }) => former.confidence === 'generic'))
  return { chosen: derived.chosen?.rejection === null ? derived.chosen : (sold.chosen ?? derived.chosen), rejected: [...sold.rejected, ...derived.rejected] }
}

function trySizes(input: SearchInput, sizes: ReturnType<typeof candidateCores>): SearchResult {
  const rejected: SearchResult['rejected'] = []
  let fallback: Candidate | null = null
  for (const { core, former } of sizes) {
    const candidate = bestOn(input, core, former)
    if (candidate.state === 'built') {
      if (candidate.candidate.rejection === null) return { chosen: candidate.candidate, rejected }
      fallback = candidate.candidate
      rejected.push({ core: former.name, rejection: candidate.candidate.rejection })
    } else rejected.push({ core: former.name, rejection: candidate.rejection })
  }
  return { chosen: fallback, rejected }
}

function candidateCores({ library, preferences, requirement }: SearchInput): { core: CoreRow; former: FormerRow }[] {
  const { shapes, coreId } = preferences
  const height = requirement.maximumHeightMm
  return library.formers
    .flatMap((former) => {
      const core = library.cores.find(({ id }) => id === former.coreId)
      if (!core || (coreId !== null ? core.id !== coreId : !shapes.includes(core.shape))) return []
      return height !== null && former.envelopeMm.height + 0.5 > height ? [] : [{ core, former }]
    })
    .sort((a, b) => a.core.effectiveVolumeMm3 - b.core.effectiveVolumeMm3 || shapes.indexOf(a.core.shape) - shapes.indexOf(b.core.shape) || (a.former.id < b.former.id ? -1 : 1))
}

type Tried = { state: 'built'; candidate: Candidate } | { state: 'hopeless'; rejection: Rejection }

function bestOn(input: SearchInput, core: CoreRow, former: FormerRow): Tried {
  const leastTurns = turnsByFlux(input, core)
  if (leastTurns === null) return { state: 'hopeless', rejection: 'flux' }
  if (!(leastTurns < MOST_TURNS)) return { state: 'hopeless', rejection: 'window' }
  const round = bestOfStyle(input, { core, former, leastTurns, style: 'round' })
  if (isGood(round) || !(round.state === 'built' && round.candidate.rejection === 'resistance')) return round
  const litz = bestOfStyle(input, { core, former, leastTurns, style: 'litz' })
  return isGood(litz) ? litz : round
}

const isGood = (tried: Tried) => tried.state === 'built' && tried.candidate.rejection === null

function bestOfStyle(input: SearchInput, { core, former, leastTurns, style }: { core: CoreRow; former: FormerRow; leastTurns: number; style: WireStyle }): Tried {
  let last: Tried = { state: 'hopeless', rejection: 'window' }
  for (const share of TURN_SHARES) {
    const tried = tryDesign(input, { core, former, style, needs: input.plan.windings(leastTurns * share) })
    // More turns help against a hot core and nothing else.
    const hot = tried.state === 'built' && (tried.candidate.rejection === 'temperature' || tried.candidate.rejection === 'flux')
    if (last.state === 'hopeless' || !hot || isGood(tried)) last = tried
    if (!hot) return last
  }
  return last
}

function turnsByFlux({ plan, material, requirement, preferences }: SearchInput, core: CoreRow): number | null {
  const saturation = saturationFluxDensityT(material.saturation, SATURATION_TEMPERATURE_C)
  if (saturation.state !== 'known') return null
  const inductanceH = plan.inductanceH * (1 + preferences.inductanceTolerance)
  // The rounding of A_L to three digits may raise the inductance by half a percent.
  const fluxDensityT = saturation.value * Math.min(0.8, requirement.fluxUtilisation) * 0.99
  return turnsForFlux({ inductanceH, currentA: plan.worstCurrentA(inductanceH), fluxDensityT, areaMm2: core.minimumAreaMm2 })
}

interface DesignInput {
  style: WireStyle
  core: CoreRow
  former: FormerRow
  needs: WindingNeed[]
}

function tryDesign(input: SearchInput, { core, former, needs, style }: DesignInput): Tried {
  const windings = needs.map((need) => plannedWinding(input, need, style))
  if (windings.some((winding) => winding === null)) return { state: 'hopeless', rejection: 'wire' }
  const planned = windings as PlannedWinding[]
  if (squaresFill(input.index, former, planned) > HOPELESS_FILL) return { state: 'hopeless', rejection: 'window' }
  const { requirement, plan, preferences, material } = input
  const method = requirement.insulationMethod
  const design: Design = {
    core, former, material, windings: planned, method,
    inductanceH: plan.inductanceH,
    protective: method !== 'functional',
    onMains: plan.onMains,
    interleaved: method !== 'margin-tape' && requirement.duty.topology === 'flyback' && plan.powerW >= preferences.interleaveFromW && planned[0]!.turns >= 8,
    marginMm: method === 'margin-tape' ? (plan.onMains ? 3 : 1.5) : 0,
  }
  return { state: 'built', candidate: withMargins(input, design) }
}

function plannedWinding({ requirement, plan, library, preferences }: SearchInput, { rmsA, acShare, ...need }: WindingNeed, style: WireStyle): PlannedWinding | null {
  const triple = requirement.insulationMethod === 'triple-insulated-wire' && need.side !== 'primary'
  const enamel = plan.onMains && preferences.enamel === 'enamel-grade-1' ? 'enamel-grade-2' : preferences.enamel
  const wire = chooseWire(library, {
    rmsA,
    acShare,
    style,
    currentDensityAPerMm2: requirement.targetCurrentDensityAPerMm2,
    frequencyHz: plan.frequencyHz,
    insulation: triple ? 'triple-insulated' : enamel,
    thermalClassC: triple ? 130 : 155,
  }, preferences)
  return wire && { ...need, wire }
}

function squaresFill(index: LibraryIndex, { windingWidthMm, windingHeightMm }: FormerRow, windings: readonly PlannedWinding[]): number {
  const squaresMm2 = windings.reduce((sum, { turns, wire }) => {
    const row = index.find('wire', wire.wire)
    const diameterMm = row ? (overallDiameterMm(row, wire.insulation) ?? 0) : 0
    return sum + turns * wire.parallel * diameterMm ** 2
  }, 0)
  return squaresMm2 / (windingWidthMm * windingHeightMm)
}

/** Margins are widened until the creepage holds that the first layout showed to be required. */
function withMargins(input: SearchInput, first: Design): Candidate {
  const tapes = chooseTapes(input.library, first.former)
  let candidate = build(input, first, tapes)
  for (let round = 0; round < 3 && first.method === 'margin-tape'; round++) {
    const marginMm = neededMarginMm(candidate, tapes.marginTape)
    if (marginMm === null || marginMm <= candidate.design.marginMm + 1e-9) break
    candidate = build(input, { ...candidate.design, marginMm }, tapes)
  }
  return candidate
}

interface Tapes {
  tape: TapeRow
  marginTape: TapeRow | null
}

function chooseTapes(library: Library, former: FormerRow): Tapes {
  const rank = (use: TapeRow['use']) =>
    library.tapes
      .filter((tape) => tape.use === use)
      .sort((a, b) => Number(a.thermalClassC < former.thermalClassC) - Number(b.thermalClassC < former.thermalClassC) || a.thicknessMm - b.thicknessMm || (a.id < b.id ? -1 : 1))[0] ?? null
  const tape = rank('insulation')
  if (!tape) throw new RangeError('library.tapes must hold an insulation tape')
  return { tape, marginTape: rank('margin') }
}

function neededMarginMm({ evaluation, document, design }: Candidate, marginTape: TapeRow | null): number | null {
  const { boundaries } = document.specification.insulation
  const needs = evaluation.boundaries.flatMap(({ required, provided }, index) => {
    const boundary = boundaries[index]!
    const requiredMm = Math.max(required.creepageMm.value ?? 0, required.clearanceMm.value ?? 0)
    if (boundary.insulation === 'functional' || requiredMm === 0) return []
    if (!boundary.between.some(({ kind }) => kind === 'core')) return [requiredMm / 2]
    // Up the flange to the core the rest of the window's height helps.
    const climbMm = (provided.creepageMm ?? design.marginMm) - design.marginMm
    return [requiredMm - climbMm]
  })
  if (needs.length === 0) return null
  const needMm = Math.max(...needs)
  return marginTape?.widthsMm.find((widthMm) => widthMm >= needMm - 1e-9) ?? Math.ceil(needMm * 10) / 10
}

function build(input: SearchInput, design: Design, tapes: Tapes): Candidate {
  const { document, pins } = compose({ requirement: input.requirement, design, library: input.library, index: input.index, preferences: input.preferences, ...tapes })
  const evaluation = evaluate(document, input.library)
  return { document, evaluation, design, rejection: pins.missing > 0 ? 'pins' : judge(evaluation, input.preferences) }
}

/** The first reason why a layout is no proposal. */
function judge({ layout, checks, findings }: Evaluation, { buildLimit }: ProposalPreferences): Rejection | null {
  const broken = (codes: readonly string[]) => checks.some(({ code, state, severity }) => codes.includes(code) && state === 'not-met' && severity !== 'N')
  if (findings.some(({ code }) => code === 'turn-wider-than-layer')) return 'layer-width'
  if (layout.buildRatio > buildLimit || broken(['W03'])) return 'build'
  if (broken(['W01'])) return 'layer-width'
  if (broken(['E01'])) return 'flux'
  if (broken(['T03'])) return 'resistance'
  if (broken(['T07', 'T08', 'T11'])) return 'temperature'
  if (broken(['I04', 'I05', 'I08', 'I09', 'I10'])) return 'insulation'
  return null
}
