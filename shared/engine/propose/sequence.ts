import { overallDiameterMm, referenceTo } from '../evaluate/lookup'
import type { LibraryIndex } from '../evaluate/lookup'
import type { SleeveRow, TapeRow } from '../library'
import type { LeadSleeve, MarginStep, SequenceStep, TapeStep, WindingStep } from '../specification'
import type { Design, PlannedWinding } from './design'
import { evenLayers, layersOf } from './layer-fit'
import type { WindingPins } from './pins'
import { PROPOSED } from './stated'

const row = { status: 'mandatory' as const, origin: PROPOSED, remark: '' }

export interface SequenceInput {
  design: Design
  pins: ReadonlyMap<string, WindingPins>
  index: LibraryIndex
  tape: TapeRow
  marginTape: TapeRow | null
}

/** A group of windings of one side that lie on each other, and how many tapes part them from the next group. */
interface Group {
  windings: { planned: PlannedWinding; part: 'whole' | 'first-half' | 'second-half' }[]
  side: 'primary' | 'other'
}

/** The winding sequence from the former outward: groups of one side with tape between them, outer tape last. */
export function planSequence(input: SequenceInput): SequenceStep[] {
  const { design } = input
  const between = design.method === 'margin-tape' ? 3 : design.onMains ? 2 : 1
  const outer = design.method === 'margin-tape' || design.onMains ? 3 : 2
  const steps: SequenceStep[] = []
  const all = groups(design)
  const add = (step: SequenceStep) => steps.push({ ...step, id: `s${steps.length + 1}` })
  all.forEach((group, position) => {
    group.windings.forEach(({ planned, part }, inner) => {
      if (design.method === 'margin-tape' && input.marginTape) add(marginStep(input.marginTape, design.marginMm))
      add(windingStep(input, planned, part))
      if (inner < group.windings.length - 1) add(tapeStep(input.tape, 1, 'interwinding'))
    })
    const last = position === all.length - 1
    add(tapeStep(input.tape, last ? outer : between, last ? 'outer' : 'interwinding'))
  })
  return steps
}

function groups({ windings, interleaved }: Design): Group[] {
  const primary = windings.find(({ role }) => role === 'primary')!
  const own = windings.filter(({ side, id }) => side === 'primary' && id !== primary.id)
  const others = besidePartners(windings.filter(({ side, id }) => side !== 'primary' && id !== primary.id).sort((a, b) => b.powerW - a.powerW))
  const whole = (planned: PlannedWinding) => ({ planned, part: 'whole' as const })
  const secondary: Group[] = others.length > 0 ? [{ side: 'other', windings: others.map(whole) }] : []
  // The primary side's other windings lie beside the strongest secondary, whose voltage they follow.
  const inner: Group = { side: 'primary', windings: [{ planned: primary, part: interleaved ? 'first-half' : 'whole' }, ...own.map(whole)] }
  return [inner, ...secondary, ...(interleaved ? [{ side: 'primary' as const, windings: [{ planned: primary, part: 'second-half' as const }] }] : [])]
}

/** Each winding followed by that of the equal and opposite output: in neighbouring layers the two track each other best. */
const besidePartners = (windings: readonly PlannedWinding[]): PlannedWinding[] =>
  windings.reduce<PlannedWinding[]>((placed, winding) => (placed.includes(winding) ? placed : [...placed, winding, ...windings.filter((other) => other.id === winding.partnerId && !placed.includes(other))]), [])

const tapeStep = (tape: TapeRow, layers: number, purpose: TapeStep['purpose']): TapeStep => ({ ...row, id: '', kind: 'tape', tape: referenceTo(tape), layers, widthMm: null, purpose })

const marginStep = (tape: TapeRow, marginMm: number): MarginStep => ({ ...row, id: '', kind: 'margin', tape: referenceTo(tape), leftMm: marginMm, rightMm: marginMm, heightMm: null })

/** Turns of the first half of a split winding: the greater one when they are odd. */
export const firstHalf = (turns: number): number => Math.ceil(turns / 2)

function windingStep({ design, pins, index, tape }: SequenceInput, planned: PlannedWinding, part: Group['windings'][number]['part']): WindingStep {
  const { start, middle, finish } = pins.get(planned.id)!
  const turns = part === 'whole' ? planned.turns : part === 'first-half' ? firstHalf(planned.turns) : planned.turns - firstHalf(planned.turns)
  const wire = index.find('wire', planned.wire.wire)!
  const overallMm = overallDiameterMm(wire, planned.wire.insulation)!
  const marginMm = design.method === 'margin-tape' ? design.marginMm : 0
  const availableMm = design.former.windingWidthMm - 2 * marginMm
  const bundleMm = overallMm * planned.wire.parallel
  const { layers, most } = layersOf(turns, availableMm, bundleMm)
  const own = planned.side === 'primary' ? 'left' : 'right'
  const far = own === 'left' ? 'right' : 'left'
  // An odd number of layers ends at the far flange, from where the lead returns to its row of pins.
  const odd = layers % 2 === 1
  return {
    ...row,
    id: '',
    kind: 'winding',
    windingId: planned.id,
    startTerminal: part === 'second-half' ? middle! : start,
    finishTerminal: part === 'first-half' ? middle! : finish,
    turns,
    section: 1,
    direction: 'clockwise',
    lay: turns % most === 0 ? 'close-wound' : 'spread',
    layers: evenLayers(turns, availableMm, bundleMm),
    marginLeftMm: marginMm,
    marginRightMm: marginMm,
    // Between the ends of two layers the mains side has more voltage than enamel should bear for good.
    interlayerTape: design.onMains && layers > 1 ? referenceTo(tape) : null,
    leadExitStart: own,
    leadExitFinish: odd ? far : own,
    startSleeve: null,
    finishSleeve: odd ? returnSleeve(index, design, overallMm * (planned.wire.parallel > 1 ? 1.6 : 1)) : null,
  }
}

/** Sleeve over a lead that returns across the winding: the least bore that the wires pass. */
function returnSleeve(index: LibraryIndex, { former }: Design, leadMm: number): LeadSleeve | null {
  const fitting = index.library.sleeves
    .filter(({ boreMm, material, thermalClassC }) => boreMm >= leadMm * 1.05 && thermalClassC >= former.thermalClassC && !material.includes('PTFE'))
    .sort((a: SleeveRow, b: SleeveRow) => a.boreMm - b.boreMm || (a.id < b.id ? -1 : 1))
  const sleeve = fitting[0]
  return sleeve ? { sleeve: referenceTo(sleeve), lengthMm: Math.ceil(former.windingWidthMm + 5), intoWindingMm: 2 } : null
}
