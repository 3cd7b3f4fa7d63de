import { bulgeFactor } from '../build/tube'
import { evaluate } from '../evaluate'
import { overallDiameterMm } from '../evaluate/lookup'
import type { LibraryIndex } from '../evaluate/lookup'
import type { Evaluation } from '../evaluation'
import type { FormerRow, Library, MaterialRow, TapeRow } from '../library'
import type { RequirementSheet, SpecificationDocument } from '../specification'
import { compose } from './compose'
import type { Design } from './design'
import { compromisesOf, judge } from './judge'
import { layersOf } from './layer-fit'
import { planPins } from './pins'
import type { Plan } from './plan'
import type { ProposalPreferences } from './preferences'
import type { Rejection } from './reasons'
import { planSequence } from './sequence'

export interface SearchInput {
  requirement: RequirementSheet
  plan: Plan
  material: MaterialRow
  library: Library
  index: LibraryIndex
  preferences: ProposalPreferences
  /** Turns to try, as shares of the least that flux asks for; a usual set unless said. */
  turnShares?: readonly number[]
}

export interface Candidate {
  document: SpecificationDocument
  evaluation: Evaluation
  design: Design
  /** Null when it meets everything. */
  rejection: Rejection | null
  /** Questions that it leaves open although it is no failure. */
  compromises: number
}

interface Tapes {
  tape: TapeRow
  marginTape: TapeRow | null
}

/** A design written out and evaluated. Margins are widened until the creepage holds that the first layout showed to be required. */
export function buildCandidate(input: SearchInput, first: Design): Candidate {
  const tapes = chooseTapes(input.library, first.former)
  let candidate = build(input, first, tapes)
  for (let round = 0; round < 3 && first.method === 'margin-tape'; round++) {
    const marginMm = neededMarginMm(candidate, tapes.marginTape)
    if (marginMm === null || marginMm <= candidate.design.marginMm + 1e-9) break
    candidate = build(input, { ...candidate.design, marginMm }, tapes)
  }
  return candidate
}

function build(input: SearchInput, design: Design, tapes: Tapes): Candidate {
  const { document, pins } = compose({ requirement: input.requirement, design, library: input.library, index: input.index, preferences: input.preferences, ...tapes })
  const evaluation = evaluate(document, input.library)
  const rejection = pins.missing > 0 ? 'pins' : judge(evaluation, input.preferences)
  return { document, evaluation, design, rejection, compromises: compromisesOf(evaluation) + doubtsOf(design) }
}

/** Figures that nobody vouches for leave a question too: flux rests on the core's least area, the build on the former's window. */
const doubtsOf = ({ core, former }: Design) => Number(core.unverified.includes('minimumAreaMm2') || former.confidence === 'low')

/** Radial build over window height by the sequence alone: what the layout will show, without laying a turn. */
export function buildRatioOf({ library, index }: SearchInput, design: Design): number {
  const tapes = chooseTapes(library, design.former)
  const pins = planPins(design.former, design.windings, { split: null, protective: design.protective })
  const heightMm = planSequence({ design, pins: pins.of, index, ...tapes }).reduce((sum, step) => {
    if (step.kind === 'tape') return sum + step.layers * tapes.tape.thicknessMm
    if (step.kind !== 'winding') return sum
    const { wire } = design.windings.find(({ id }) => id === step.windingId)!
    const overallMm = overallDiameterMm(index.find('wire', wire.wire)!, wire.insulation)!
    const { layers } = layersOf(step.turns, design.former.windingWidthMm - step.marginLeftMm - step.marginRightMm, overallMm * wire.parallel)
    return sum + layers * overallMm + (step.interlayerTape ? (layers - 1) * tapes.tape.thicknessMm : 0)
  }, 0)
  return (heightMm * bulgeFactor(design.former.tube)) / design.former.windingHeightMm
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
