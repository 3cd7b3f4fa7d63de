import { namedTerminals } from '../evaluate/document-findings'
import { isInsulatedWire, windingsAt } from '../evaluate/insulation-paths'
import type { LeadSleeve, ShieldStep, Winding, WindingStep } from '../specification'
import { protective, reinforced } from './boundary-input'
import { notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/** Least wall of a sleeve over a lead that crosses a margin, mm: basic insulation, and one that is reinforced alone. */
const WALL_MM = { basic: 0.2, reinforced: 0.4 } as const

/** The protective boundaries at which a winding's bare leads would shorten the margin. */
const boundariesOf = ({ document: { specification } }: CheckInput, winding: Winding) =>
  specification.insulation.boundaries.filter((boundary) => protective({ boundary }) && boundary.between.some((end) => windingsAt(specification, end).includes(winding)))

/** A lead that leaves a coil with margins crosses the margin: its sleeve reaches from the winding past it. */
function leadSleeves(input: CheckInput): Outcome[] {
  const { specification } = input.document
  return specification.sequence.flatMap((step, index) => {
    const winding = step.kind === 'winding' ? specification.windings.find(({ id }) => id === step.windingId) : undefined
    if (step.kind !== 'winding' || !winding || isInsulatedWire(winding) || (step.marginLeftMm <= 0 && step.marginRightMm <= 0)) return []
    const protecting = boundariesOf(input, winding)
    if (protecting.length === 0) return []
    const wallMm = protecting.some((boundary) => reinforced({ boundary })) ? WALL_MM.reinforced : WALL_MM.basic
    return (['startSleeve', 'finishSleeve'] as const).map((end) => leadOutcome(input, { step, winding, wallMm, sleeve: step[end], path: `sequence.${index}.${end}` }))
  })
}

interface Lead {
  step: WindingStep
  winding: Winding
  wallMm: number
  sleeve: LeadSleeve | null
  path: string
}

/** Without a sleeve nothing in the document says how the lead crosses the margin. */
function leadOutcome({ context }: CheckInput, { step, winding, wallMm, sleeve, path }: Lead): Outcome {
  const row = context.index.find('sleeve', sleeve?.sleeve ?? null)
  if (!sleeve || !row) return notCheckable(path, { winding: winding.name, missing: 'sleeve' })
  const crossesMm = Math.max(step.marginLeftMm, step.marginRightMm) + sleeve.intoWindingMm
  const met = row.wallMm >= wallMm - 1e-9 && sleeve.intoWindingMm > 0 && sleeve.lengthMm >= crossesMm
  return { ...yesNo(met, path, { winding: winding.name }), value: row.wallMm, limit: wallMm, unit: 'mm' }
}

/** Least overlap of a foil shield's ends with insulation between them, mm. */
const OVERLAP_MM = 3

/** A shield is tied to a terminal, covers its neighbour, and its ends overlap without touching: else it is a shorted turn. */
function shields(input: CheckInput): Outcome[] {
  const { specification } = input.document
  return specification.sequence.flatMap((step, index) => {
    if (step.kind !== 'shield') return []
    const faults = [
      ...(namedTerminals(specification).has(step.connectedTerminal) ? [] : ['terminal']),
      ...(step.form === 'foil' && !(step.overlapMm >= OVERLAP_MM) ? ['overlap'] : []),
      ...(step.form === 'foil' && step.overlapInsulation.trim() === '' ? ['overlap insulation'] : []),
      ...(covers(input, step, index) ? [] : ['width']),
    ]
    const winding = specification.windings.find(({ id }) => id === step.windingId)
    return [{ ...yesNo(faults.length === 0, `sequence.${index}`, { winding: winding?.name ?? '', missing: faults.join(', ') }), value: step.overlapMm, limit: step.form === 'foil' ? OVERLAP_MM : null, unit: 'mm' }]
  })
}

/** Whether a shield is as wide as the wires that lie directly under it. */
function covers({ coil }: CheckInput, { widthMm }: ShieldStep, index: number): boolean {
  const under = (coil?.placements ?? []).filter((placement) => placement.index < index).sort((a, b) => b.index - a.index)[0]
  return under === undefined || widthMm >= under.rightMm - under.leftMm - 1e-9
}

export const LEAD_CHECKS: Readonly<Record<string, Check>> = {
  I13: { severity: 'S', source: 'IEC 62368-1, G.5.3; 0.4 mm of a reinforced wall: IEC 62368-1, 5.4.4', run: leadSleeves },
  I26: { severity: 'S', source: 'IEC 62368-1, G.5.3; IEC 61558-1: protective screens; a closed foil is a shorted turn', run: shields },
}
