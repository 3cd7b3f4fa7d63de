import { overallDiameterMm } from '../evaluate/lookup'
import type { LibraryIndex } from '../evaluate/lookup'
import type { CoreRow, FormerRow } from '../library'
import { saturationFluxDensityT, turnsForFlux } from '../magnetics/flux'
import { inductanceFactorOfPathH } from '../magnetics/inductance'
import type { RequirementSheet } from '../specification'
import { topologyOf } from '../topologies'
import { buildCandidate, buildRatioOf } from './candidate'
import type { Candidate, SearchInput } from './candidate'
import type { Design, PlannedWinding } from './design'
import { brokenChecks } from './judge'
import { fitToLayers } from './layer-fit'
import type { WindingNeed } from './plan'
import type { Rejection } from './reasons'
import { firstHalf } from './sequence'
import { chooseWire, roundStock } from './wire'
import type { WireNeed } from './wire'

/** More turns than flux asks for lower the core loss; these shares are tried in turn. */
const TURN_SHARES = [1, 1.15, 1.35, 1.6]
/** A transformer's turns are mostly decided by its core loss. */
const TRANSFORMER_SHARES = [1, 1.25, 1.6, 2, 2.6]

/** Temperature for the first flux limit and the first skin depth, °C. */
const FIRST_TEMPERATURE_C = 100

/** No core of the library takes more turns of the thinnest wire. */
const MOST_TURNS = 100_000

/** Share of the window beyond which no layout is tried, squares of the diameters counted. */
const HOPELESS_FILL = 0.85

/** Layouts tried on one core: round wire, litz where that loses too much, thinner wire for the temperature found. */
const MOST_ROUNDS = 4

/** The design is not worth an evaluation; `show` makes one all the same, for want of a better. */
interface Hopeless {
  state: 'hopeless'
  rejection: Rejection
  design: Design | null
  show: (() => Candidate) | null
}

export type Tried = { state: 'built'; candidate: Candidate } | Hopeless

const hopeless = (rejection: Rejection, of: Pick<Hopeless, 'design' | 'show'> = { design: null, show: null }): Hopeless => ({ state: 'hopeless', rejection, ...of })

/** The candidate of a try that is no failure; null for one that is. */
export const goodCandidate = (tried: Tried): Candidate | null => (tried.state === 'built' && tried.candidate.rejection === null ? tried.candidate : null)

/** What earlier layouts on this core taught about its wires. */
interface WireWishes {
  litz: ReadonlySet<string>
  temperatureC: number
}

/** The best design on one core: without failure, with the fewest questions. */
export function tryCore(input: SearchInput, core: CoreRow, former: FormerRow): Tried {
  const byFlux = turnsByFlux(input, core)
  if (byFlux === null) return hopeless('flux')
  const leastTurns = Math.max(byFlux, turnsByPermeability(input, core))
  if (!(leastTurns < MOST_TURNS)) return hopeless('window')
  let wishes: WireWishes | null = { litz: new Set(), temperatureC: FIRST_TEMPERATURE_C }
  const rounds: Tried[] = []
  while (wishes && rounds.length < MOST_ROUNDS) {
    const tried: Tried = overTurns(input, { core, former, leastTurns, wishes })
    rounds.push(tried)
    wishes = tried.state === 'built' ? betterWishes(tried.candidate, wishes) : tried.rejection === 'build' ? slimmerWishes(tried, wishes) : null
  }
  const good = rounds.flatMap((tried) => goodCandidate(tried) ?? []).sort((a, b) => a.compromises - b.compromises)
  return good[0] ? { state: 'built', candidate: good[0] } : rounds[0]!
}

/** Litz for the windings that lose too much; wire for the skin depth at the temperature that the part settles at. */
function betterWishes({ evaluation, design }: Candidate, { litz, temperatureC }: WireWishes): WireWishes | null {
  const windingOf = ({ path }: { path: string }) => design.windings[Number(path.split('.')[1])]!
  const losing = brokenChecks(evaluation, 'T03').map(windingOf).filter(({ id, wire }) => !litz.has(id) && wire.insulation.startsWith('enamel'))
  // Windings of one wire and as many turns stay alike, as the two of a 1:1 part must.
  const alike = design.windings.filter(({ turns, wire }) => losing.some((one) => one.turns === turns && one.wire.wire.id === wire.wire.id))
  if (losing.length > 0) return { litz: new Set([...litz, ...alike.map(({ id }) => id)]), temperatureC }
  const settledC = evaluation.thermal.windingC
  const thick = brokenChecks(evaluation, 'T02').map(windingOf).some(({ makeshift }) => !makeshift)
  return thick && settledC !== null && settledC < temperatureC - 1 ? { litz, temperatureC: Math.floor(settledC) - 1 } : null
}

/** Several round wires side by side take the width of one litz, and often a layer more. */
function slimmerWishes({ design }: Hopeless, { litz, temperatureC }: WireWishes): WireWishes | null {
  const wide = (design?.windings ?? []).filter(({ id, wire }) => wire.parallel > 2 && wire.insulation.startsWith('enamel') && !litz.has(id))
  return wide.length > 0 ? { litz: new Set([...litz, ...wide.map(({ id }) => id)]), temperatureC } : null
}

interface CoreInput {
  core: CoreRow
  former: FormerRow
  wishes: WireWishes
}

function overTurns(input: SearchInput, { leastTurns, ...on }: CoreInput & { leastTurns: number }): Tried {
  let last: Tried = hopeless('window')
  for (const share of input.turnShares ?? (input.plan.transformer ? TRANSFORMER_SHARES : TURN_SHARES)) {
    const tried = tryDesign(input, { ...on, needs: input.plan.windings(leastTurns * share) })
    // More turns help against a hot core and nothing else.
    const hot = tried.state === 'built' && (tried.candidate.rejection === 'temperature' || tried.candidate.rejection === 'flux')
    if (last.state === 'hopeless' || !hot || goodCandidate(tried)) last = tried
    if (!hot) return last
  }
  return last
}

/** Least primary turns that flux allows on a core; null where the saturation of the material is not known. */
export function turnsByFlux({ plan, material, requirement, preferences }: SearchInput, core: CoreRow): number | null {
  const saturation = saturationFluxDensityT(material.saturation, FIRST_TEMPERATURE_C)
  // A choke against common mode is wound for its permeability; the evaluation says where saturation is not known.
  if (saturation.state !== 'known') return plan.materialUse === 'common-mode' ? 0 : null
  const inductanceH = plan.inductanceH * (1 + preferences.inductanceTolerance)
  // The rounding of the inductance to three digits may raise it by half a percent.
  const fluxDensityT = saturation.value * Math.min(0.8, requirement.fluxUtilisation) * 0.99
  const worst = turnsForFlux({ inductanceH, currentA: plan.worstCurrentA(inductanceH), fluxDensityT, areaMm2: core.minimumAreaMm2 })
  if (!plan.transformer) return worst
  return Math.max(worst, plan.transformer.steadyVs / (plan.transformer.steadySwingT * core.minimumAreaMm2 * 1e-6))
}

/** Least primary turns that give the inductance without any gap, the permeability at its lowest. */
export function turnsByPermeability({ plan, material }: Pick<SearchInput, 'plan' | 'material'>, core: CoreRow): number {
  if (!plan.transformer?.leastInductance) return 0
  const permeability = material.initialPermeability * (1 - material.permeabilityTolerance)
  const perTurnH = inductanceFactorOfPathH({ areaMm2: core.effectiveAreaMm2, lengthMm: core.effectiveLengthMm, permeability })
  return Math.sqrt(plan.inductanceH / perTurnH)
}

function tryDesign(input: SearchInput, { core, former, needs, wishes }: CoreInput & { needs: WindingNeed[] }): Tried {
  const { requirement, plan, preferences, material } = input
  const method = requirement.insulationMethod
  const blank: Omit<Design, 'windings'> = {
    core, former, material, method,
    inductanceH: plan.transformer?.gapped === false ? ungappedH({ core, material, turns: needs[0]!.turns }) : plan.inductanceH,
    ungapped: plan.transformer?.gapped === false,
    protective: method !== 'functional',
    onMains: plan.onMains,
    interleaved: method !== 'margin-tape' && isInterleavable(requirement.duty, needs) && plan.powerW >= preferences.interleaveFromW && needs[0]!.turns >= 8,
    marginMm: method === 'margin-tape' ? (plan.onMains ? 3 : 1.5) : 0,
  }
  const windings = needs.map((need) => plannedWinding(input, { need, wishes, design: blank }))
  if (windings.some((winding) => winding === null)) return hopeless('wire')
  const design: Design = { ...blank, windings: windings as PlannedWinding[] }
  if (squaresFill(input.index, former, design.windings) > HOPELESS_FILL) return hopeless('window')
  if (buildRatioOf(input, design) > preferences.buildLimit) return hopeless('build', { design, show: () => buildCandidate(input, design) })
  return { state: 'built', candidate: buildCandidate(input, design) }
}

/** A primary of one winding that others face may lie on both sides of them. */
const isInterleavable = (duty: RequirementSheet['duty'], needs: readonly WindingNeed[]): boolean => topologyOf(duty).traits(duty).outputs.length > 0 && needs.filter(({ role }) => role === 'primary').length === 1

/** Inductance of a core without gap. Source: IEC 60205. */
const ungappedH = ({ core, material, turns }: { core: CoreRow; material: SearchInput['material']; turns: number }): number =>
  inductanceFactorOfPathH({ areaMm2: core.effectiveAreaMm2, lengthMm: core.effectiveLengthMm, permeability: material.initialPermeability }) * turns ** 2

interface WindingInput {
  need: WindingNeed
  wishes: WireWishes
  design: Omit<Design, 'windings'>
}

function plannedWinding({ requirement, plan, library, preferences }: SearchInput, { need: { rmsA, acShare, ...need }, wishes, design }: WindingInput): PlannedWinding | null {
  const triple = requirement.insulationMethod === 'triple-insulated-wire' && need.side !== 'primary'
  const enamel = plan.onMains && preferences.enamel === 'enamel-grade-1' ? 'enamel-grade-2' : preferences.enamel
  const wireNeed: WireNeed = {
    rmsA,
    acShare,
    style: wishes.litz.has(need.id) ? 'litz' : 'round',
    currentDensityAPerMm2: requirement.targetCurrentDensityAPerMm2,
    frequencyHz: plan.frequencyHz,
    temperatureC: wishes.temperatureC,
    insulation: triple ? 'triple-insulated' : enamel,
    thermalClassC: triple ? 130 : 155,
  }
  const chosen = chooseWire(library, wireNeed, preferences)
  if (!chosen) return null
  const parts = design.interleaved && need.role === 'primary' ? [firstHalf(need.turns), need.turns - firstHalf(need.turns)] : [need.turns]
  const availableMm = design.former.windingWidthMm - 2 * design.marginMm
  const { row, use, makeshift } = fitToLayers(chosen, wireNeed, { room: { availableMm, parts }, stock: roundStock(library, preferences, wireNeed.insulation) })
  return { ...need, wire: use, strands: row.strands, makeshift }
}

function squaresFill(index: LibraryIndex, { windingWidthMm, windingHeightMm }: FormerRow, windings: readonly PlannedWinding[]): number {
  const squaresMm2 = windings.reduce((sum, { turns, wire }) => {
    const row = index.find('wire', wire.wire)
    const diameterMm = row ? (overallDiameterMm(row, wire.insulation) ?? 0) : 0
    return sum + turns * wire.parallel * diameterMm ** 2
  }, 0)
  return squaresMm2 / (windingWidthMm * windingHeightMm)
}
