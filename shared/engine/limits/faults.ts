import type { Evaluation } from '../evaluation'
import type { Library, MaterialRow } from '../library'
import type { SequenceStep, SpecificationDocument, Winding, WindingStep } from '../specification'

/** Names the turn that a shorted-turn fault closes on itself. */
export const SHORTED_TURN_ID = 'shorted-turn'

/** Permanent codes of what can go wrong at the winder's. */
export type FaultKind =
  | 'one-turn-more'
  | 'one-turn-less'
  | 'reversed-dot'
  | 'swapped-windings'
  | 'missing-gap'
  | 'wrong-core-grade'
  | 'core-not-seated'
  | 'missing-tape-layer'
  | 'open-strand'
  | 'shorted-turn'

/** A part with one fault: the drawing edited as the part was made. */
export interface Fault {
  kind: FaultKind
  /** Names and numbers for the sentence, unit in the key. */
  values: Readonly<Record<string, string | number>>
  document: SpecificationDocument
  library: Library
}

/** A document is plain data, without anything that JSON cannot hold. */
const copyOf = <T>(value: T): T => JSON.parse(JSON.stringify(value)) as T

type Edit = (document: SpecificationDocument) => void

/** Distance that a core seated badly stands open in all its legs. Source: common practice, a grain of ferrite or dried glue. */
const OPEN_JOINT_MM = 0.03

/**
 * The drawing as the part's physics sees it: the inductance is not what is written but what core and turns give, so that an edit
 * moves it.
 */
export function asBuilt(document: SpecificationDocument, evaluation: Evaluation): SpecificationDocument {
  const copy = copyOf(document)
  const { gap } = copy.specification.core
  copy.specification.electrical.inductance.value = null
  gap.alH.value ??= evaluation.magnetics.alH
  return copy
}

/** As built, with the gap's length in place of the core's factor: what an edit of gap or material asks for. */
function byGapLength(document: SpecificationDocument, evaluation: Evaluation): void {
  const { gap } = document.specification.core
  gap.lengthMm.value = evaluation.magnetics.gapMm ?? 0
  gap.alH.value = null
  gap.alTolerance.value = null
  gap.control.value = 'length'
}

const lastStepOf = (sequence: readonly SequenceStep[], windingId: string): WindingStep | undefined =>
  sequence.findLast((step): step is WindingStep => step.kind === 'winding' && step.windingId === windingId)

const changeTurns = (windingId: string, by: number): Edit => ({ specification: { windings, sequence } }) => {
  windings.find(({ id }) => id === windingId)!.turns += by
  const step = lastStepOf(sequence, windingId)
  if (step) step.turns += by
}

const swapEnds = (part: { startTerminal: string; finishTerminal: string }) => {
  const { startTerminal, finishTerminal } = part
  Object.assign(part, { startTerminal: finishTerminal, finishTerminal: startTerminal })
}

const reverse = (windingId: string): Edit => ({ specification: { windings } }) => swapEnds(windings.find(({ id }) => id === windingId)!)

const exchangePins = (one: string, other: string): Edit => ({ specification: { windings } }) => {
  const [first, second] = [one, other].map((id) => windings.find((winding) => winding.id === id)!)
  const { startTerminal, finishTerminal } = first!
  Object.assign(first!, { startTerminal: second!.startTerminal, finishTerminal: second!.finishTerminal })
  Object.assign(second!, { startTerminal, finishTerminal })
}

const lessTape = (stepId: string): Edit => ({ specification }) => {
  const step = specification.sequence.find(({ id }) => id === stepId)
  if (step?.kind !== 'tape') return
  step.layers -= 1
  if (step.layers === 0) specification.sequence = specification.sequence.filter(({ id }) => id !== stepId)
}

const fewerWires = (windingId: string): Edit => ({ specification }) => {
  specification.windings.find(({ id }) => id === windingId)!.wire.parallel -= 1
}

/** A turn of the winding that touches itself is a winding of its own, closed by its pins. */
const shortTurn = (winding: Winding): Edit => ({ specification: { windings, sequence } }) => {
  const step = lastStepOf(sequence, winding.id)
  if (!step) return
  windings.push({ ...copyOf(winding), id: SHORTED_TURN_ID, name: SHORTED_TURN_ID, role: 'secondary', turns: 1, outputId: null, startTerminal: '', finishTerminal: '' })
  const turn: WindingStep = { ...copyOf(step), id: SHORTED_TURN_ID, windingId: SHORTED_TURN_ID, turns: 1, layers: null, startTerminal: '', finishTerminal: '' }
  sequence.splice(sequence.indexOf(step) + 1, 0, turn)
}

/** The material of the same use whose permeability is furthest from the drawing's. */
function wrongGrade({ materials }: Library, right: MaterialRow | undefined): MaterialRow | null {
  if (!right) return null
  const others = materials.filter(({ id, use }) => id !== right.id && use === right.use)
  const distance = ({ initialPermeability }: MaterialRow) => Math.abs(Math.log(initialPermeability / right.initialPermeability))
  return others.reduce<MaterialRow | null>((furthest, one) => (furthest && distance(furthest) >= distance(one) ? furthest : one), null)
}

/** Every fault that can be made of a document, each as an edited document; windings without place in the sequence are left out. */
export function injectFaults(document: SpecificationDocument, library: Library, evaluation: Evaluation): Fault[] {
  const built = asBuilt(document, evaluation)
  const fault = (kind: FaultKind, values: Fault['values'], edit: Edit, ofLibrary = library): Fault => {
    const copy = copyOf(built)
    edit(copy)
    return { kind, values, document: copy, library: ofLibrary }
  }
  const { windings, sequence, core } = document.specification
  const wound = windings.filter(({ role, id }) => role !== 'shield' && lastStepOf(sequence, id))
  const perWinding = wound.flatMap((winding) => {
    const { id, name, turns } = winding
    const litz = library.wires.find((wire) => wire.id === winding.wire.wire.id && wire.version === winding.wire.wire.version && wire.form === 'litz')
    return [
      fault('one-turn-more', { winding: name, turns: turns + 1 }, changeTurns(id, 1)),
      ...(turns > 1 ? [fault('one-turn-less', { winding: name, turns: turns - 1 }, changeTurns(id, -1))] : []),
      ...(wound.length > 1 ? [fault('reversed-dot', { winding: name }, reverse(id))] : []),
      ...(winding.wire.parallel > 1 ? [fault('open-strand', { winding: name, wires: winding.wire.parallel - 1 }, fewerWires(id))] : []),
      ...(litz && winding.wire.parallel === 1 && litz.strands > 1 ? [fault('open-strand', { winding: name, wires: litz.strands - 1 }, () => undefined, withoutStrand(library, litz.id))] : []),
      ...(turns > 1 ? [fault('shorted-turn', { winding: name }, shortTurn(winding))] : []),
    ]
  })
  const pairs = wound.flatMap((one, index) => wound.slice(index + 1).map((other) => [one, other] as const))
  const swapped = pairs.map(([one, other]) => fault('swapped-windings', { winding: one.name, other: other.name }, exchangePins(one.id, other.id)))
  const tapes = sequence.flatMap((step, index) => (step.kind === 'tape' && step.layers > 0 && step.purpose === 'interwinding' ? [fault('missing-tape-layer', { step: index + 1, layers: step.layers - 1 }, lessTape(step.id))] : []))
  return [...perWinding, ...swapped, ...coreFaults(), ...tapes]

  function coreFaults(): Fault[] {
    const material = library.materials.find(({ id, version }) => id === core.material.value?.id && version === core.material.value.version)
    const wrong = wrongGrade(library, material)
    const gapped = (evaluation.magnetics.gapMm ?? 0) > 0 && core.gap.position.value !== 'distributed'
    return [
      ...(gapped ? [fault('missing-gap', { gapMm: evaluation.magnetics.gapMm! }, (copy) => { byGapLength(copy, evaluation); copy.specification.core.gap.lengthMm.value = 0 })] : []),
      ...(wrong ? [fault('wrong-core-grade', { material: wrong.name }, (copy) => { byGapLength(copy, evaluation); copy.specification.core.material.value = { kind: 'material', id: wrong.id, version: wrong.version } })] : []),
      fault('core-not-seated', { openMm: OPEN_JOINT_MM }, (copy) => { byGapLength(copy, evaluation); copy.specification.core.gap.lengthMm.value! += 2 * OPEN_JOINT_MM }),
    ]
  }
}

/** A library in which one litz wire has lost a strand. */
function withoutStrand(library: Library, id: string): Library {
  const thinner = (wire: Library['wires'][number]) => {
    const share = (wire.strands - 1) / wire.strands
    const { nominalOhmPerM, minimumOhmPerM, maximumOhmPerM } = wire.resistance20
    const raised = (value: number | null) => (value === null ? null : value / share)
    return { ...wire, strands: wire.strands - 1, copperAreaMm2: wire.copperAreaMm2 * share, resistance20: { nominalOhmPerM: nominalOhmPerM / share, minimumOhmPerM: raised(minimumOhmPerM), maximumOhmPerM: raised(maximumOhmPerM) } }
  }
  return { ...library, wires: library.wires.map((wire) => (wire.id === id ? thinner(wire) : wire)) }
}
