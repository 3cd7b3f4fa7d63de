import type { LayoutOutline } from '../evaluation'
import type { LeadSleeve, WindingStep } from '../specification'
import { finding } from './progress'
import type { Progress } from './progress'
import type { LayerPlacement, StepPlacement } from './types'

/** A lead on its way from a winding's end to the flange where it leaves. */
interface Crossing {
  placement: StepPlacement
  step: WindingStep
  /** Lies under the first layer or over the last one. */
  yMm: number
  fromMm: number
  toMm: number
  exit: 'left' | 'right'
  /** Side of the layer at which the winding ends. */
  end: 'left' | 'right'
  sleeve: LeadSleeve | null
  thicknessMm: number
}

/** What the section shows besides turns, tapes and margins. */
export function outlines(progress: Progress): LayoutOutline[] {
  return [...sectionWalls(progress), ...shieldOverlaps(progress), ...crossings(progress).flatMap((crossing) => crossingOutlines(progress, crossing))]
}

function sectionWalls({ sections, input: { former } }: Progress): LayoutOutline[] {
  return sections.slice(1).map(({ xMm }) => ({ kind: 'section-wall', stepId: null, xMm: xMm - former.flangeThicknessMm, yMm: 0, widthMm: former.flangeThicknessMm, heightMm: former.windingHeightMm }))
}

/** The second thickness where the insulated ends of a shield lie over each other. */
function shieldOverlaps({ shields, sections, input }: Progress): LayoutOutline[] {
  return shields.flatMap((shield): LayoutOutline[] => {
    const step = input.sequence[shield.index]
    if (step?.kind !== 'shield' || !(step.overlapMm > 0)) return []
    return [{ kind: 'shield-overlap', stepId: shield.stepId, xMm: (sections[shield.section - 1]?.xMm ?? 0) + shield.leftMm, yMm: shield.topMm, widthMm: shield.rightMm - shield.leftMm, heightMm: step.thicknessMm }]
  })
}

/** Leads that leave at the other flange than their end lies at, and sleeved ones. */
function crossings({ placements, input, sections }: Progress): Crossing[] {
  return placements.flatMap((placement) => {
    const step = input.sequence[placement.index]
    const winding = input.windings.find(({ id }) => id === placement.windingId)
    const wire = winding && input.wireOf(winding)
    if (step?.kind !== 'winding' || !wire || wire.form === 'foil') return []
    const section = sections[placement.section - 1]
    const width = section?.widthMm ?? 0
    const [first, last] = [placement.layers[0], placement.layers[placement.layers.length - 1]]
    if (!first || !last) return []
    const thickness = (sleeve: LeadSleeve | null) => {
      const row = sleeve && input.sleeveOf?.(sleeve.sleeve)
      return row ? row.boreMm + 2 * row.wallMm : wire.overallMm
    }
    const lead = (layer: LayerPlacement, { exit, end, yMm, sleeve }: Pick<Crossing, 'exit' | 'end' | 'yMm' | 'sleeve'>): Crossing => ({
      placement, step, yMm, exit, end, sleeve, fromMm: end === 'left' ? layer.leftMm : layer.rightMm, toMm: exit === 'left' ? 0 : width, thicknessMm: thickness(sleeve),
    })
    return [
      lead(first, { exit: step.leadExitStart, end: first.rightward ? 'left' : 'right', yMm: placement.bottomMm, sleeve: step.startSleeve }),
      lead(last, { exit: step.leadExitFinish, end: last.rightward ? 'right' : 'left', yMm: placement.topMm, sleeve: step.finishSleeve }),
    ]
  })
}

function crossingOutlines({ sections }: Progress, crossing: Crossing): LayoutOutline[] {
  const { placement, yMm, fromMm, toMm, exit, sleeve, thicknessMm } = crossing
  const { xMm: leftMm, widthMm } = sections[placement.section - 1] ?? { xMm: 0, widthMm: 0 }
  const shared = { stepId: placement.stepId, yMm, heightMm: thicknessMm }
  const over = isOver(crossing) ? [{ ...shared, kind: 'lead-crossing' as const, xMm: leftMm + Math.min(fromMm, toMm), widthMm: Math.abs(toMm - fromMm) }] : []
  if (!sleeve) return over
  // Into the winding means along the turn: beyond the other flange it cannot reach.
  const reachMm = Math.min(Math.abs(toMm - fromMm) + sleeve.intoWindingMm, Math.max(sleeve.lengthMm, sleeve.intoWindingMm), widthMm)
  const sleeved = { ...shared, kind: 'lead-sleeve' as const, xMm: leftMm + (exit === 'left' ? 0 : toMm - reachMm), widthMm: reachMm }
  return [...over, sleeved]
}

/** Away from the flange where its winding ends: the lead runs along under or over the turns. */
const isOver = ({ exit, end }: Crossing) => exit !== end

/** A sleeved lead that crosses is thicker than what the bulge allows for at crossings of bare ones. */
export function reportCrossings(progress: Progress, plainBuildMm: number): void {
  const { former } = progress.input
  for (const crossing of crossings(progress)) {
    if (!crossing.sleeve || !isOver(crossing)) continue
    const overMm = plainBuildMm + crossing.thicknessMm - former.windingHeightMm
    if (overMm <= 0 || plainBuildMm > former.windingHeightMm) continue
    const winding = progress.input.windings.find(({ id }) => id === crossing.placement.windingId)?.name ?? ''
    progress.findings.push(finding('lead-crossing-too-high', 'warning', `sequence.${crossing.placement.index}`, { step: crossing.placement.index + 1, winding, overMm, sleeveMm: crossing.thicknessMm }))
  }
}
