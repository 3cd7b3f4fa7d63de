import type { FormerRow } from '../library'
import type { CoreTapeStep, MarginStep, SequenceStep, ShieldStep, SleeveStep, TapeStep, VarnishStep } from '../specification'
import { finding } from './progress'
import type { Progress, Section } from './progress'
import { summary } from './summary'
import { turnLengthMm } from './tube'
import type { Coil, CoilInput } from './types'
import { layWindings } from './wind'

/**
 * The winding sequence laid into the coil former to scale, from the tube outward: the place of every
 * turn, tape and margin in one half of the winding window, what is left, and what does not fit.
 *
 * Layers lie straight upon each other (no turn sinks into the gap below), which is the thicker case.
 * A sequence that does not fit is laid all the same, so that it can be seen, and a finding says by how much.
 */
export function layOutCoil(input: CoilInput): Coil {
  const progress: Progress = {
    input,
    sections: sectionsOf(input.former),
    items: [],
    placements: [],
    tapes: [],
    margins: [],
    shields: [],
    findings: [],
    laidTurns: new Map(),
    copperAreaMm2: 0,
    squaresAreaMm2: 0,
  }
  for (let index = 0; index < input.sequence.length; ) index += layStep(progress, input.sequence, index)
  for (const section of progress.sections) closeMargin(progress, section)
  return summary(progress)
}

function sectionsOf({ sections, windingWidthMm, flangeThicknessMm }: FormerRow): Section[] {
  return Array.from({ length: Math.max(1, Math.floor(sections)) }, (_, index) => ({
    number: index + 1,
    xMm: index * (windingWidthMm + flangeThicknessMm),
    widthMm: windingWidthMm,
    yMm: 0,
    margin: null,
  }))
}

/** Lays one step, or the winding steps that are wound together; says how many it took. */
function layStep(progress: Progress, sequence: readonly SequenceStep[], index: number): number {
  const step = sequence[index]!
  if (step.kind !== 'winding') {
    layFlat(progress, step, index)
    return 1
  }
  const together = [step]
  for (let next = sequence[index + 1]; next?.kind === 'winding' && next.withPrevious; next = sequence[index + together.length]) together.push(next)
  layWindings(progress, together, index)
  return together.length
}

type FlatStep = TapeStep | MarginStep | ShieldStep | SleeveStep | CoreTapeStep | VarnishStep

function layFlat(progress: Progress, step: FlatStep, index: number): void {
  switch (step.kind) {
    case 'tape':
      return layTape(progress, step, index)
    case 'shield':
      return layShield(progress, step, index)
    case 'margin':
      for (const section of progress.sections) {
        closeMargin(progress, section)
        section.margin = { step, index, bottomMm: section.yMm }
      }
      return
    case 'sleeve':
    case 'core-tape':
    case 'varnish':
      // Sleeves lie at the ends, core tape and varnish outside the window.
      return
  }
}

function closeMargin(progress: Progress, section: Section): void {
  if (!section.margin) return
  const { step, index, bottomMm } = section.margin
  section.margin = null
  const windingTopMm = section.yMm
  const topMm = step.heightMm === null ? windingTopMm : bottomMm + step.heightMm
  const { leftMm, rightMm } = step
  progress.margins.push({ stepId: step.id, index, section: section.number, bottomMm, topMm, leftMm, rightMm, windingTopMm })
  if (topMm > bottomMm) {
    const shared = { kind: 'margin' as const, stepId: step.id, yMm: bottomMm, heightMm: topMm - bottomMm }
    if (leftMm > 0) progress.items.push({ ...shared, xMm: section.xMm, widthMm: leftMm })
    if (rightMm > 0) progress.items.push({ ...shared, xMm: section.xMm + section.widthMm - rightMm, widthMm: rightMm })
  }
  if (topMm < windingTopMm - 1e-9) {
    progress.findings.push(finding('margin-lower-than-winding', 'warning', `sequence.${index}.heightMm`, { step: index + 1, shortMm: windingTopMm - topMm }))
  }
  section.yMm = Math.max(section.yMm, topMm)
}

// ---------------------------------------------------------------------------------------------

function layTape(progress: Progress, step: TapeStep, index: number): void {
  const tape = progress.input.tapeOf(step.tape)
  if (!tape) {
    progress.findings.push(finding('tape-not-in-library', 'error', `sequence.${index}.tape`, { step: index + 1 }))
    return
  }
  const layers = Math.max(0, Math.floor(step.layers))
  for (const section of progress.sections) {
    closeMargin(progress, section)
    const fullWidth = step.widthMm === null || step.widthMm >= section.widthMm - 0.3
    const widthMm = Math.min(step.widthMm ?? section.widthMm, section.widthMm)
    const inMm = (section.widthMm - widthMm) / 2
    const bottomMm = section.yMm
    for (let layer = 0; layer < Math.min(layers, 200); layer++) {
      progress.items.push({ kind: 'tape', stepId: step.id, layer: layer + 1, xMm: section.xMm + inMm, yMm: bottomMm + layer * tape.thicknessMm, widthMm, thicknessMm: tape.thicknessMm })
    }
    section.yMm += layers * tape.thicknessMm
    progress.tapes.push({ stepId: step.id, index, section: section.number, bottomMm, topMm: section.yMm, layers, leftMm: inMm, rightMm: inMm + widthMm, fullWidth })
    if (step.widthMm !== null && step.widthMm > section.widthMm + 1e-9) {
      progress.findings.push(finding('tape-wider-than-former', 'error', `sequence.${index}.widthMm`, { step: index + 1, overMm: step.widthMm - section.widthMm }))
    }
  }
}

function layShield(progress: Progress, step: ShieldStep, index: number): void {
  const winding = progress.input.windings.find(({ id }) => id === step.windingId)
  for (const section of progress.sections) {
    const widthMm = Math.min(step.widthMm, section.widthMm)
    // Where the insulated ends overlap the foil lies double; the build takes the thick place.
    progress.items.push({ kind: 'foil', stepId: step.id, windingId: winding?.id ?? step.windingId, turn: 1, xMm: section.xMm + (section.widthMm - widthMm) / 2, yMm: section.yMm, widthMm, thicknessMm: step.thicknessMm })
    const leftMm = (section.widthMm - widthMm) / 2
    progress.shields.push({
      stepId: step.id,
      index,
      windingId: winding?.id ?? step.windingId,
      section: section.number,
      bottomMm: section.yMm,
      topMm: section.yMm + step.thicknessMm,
      leftMm,
      rightMm: leftMm + widthMm,
      turnLengthMm: turnLengthMm(progress.input.former.tube, section.yMm + step.thicknessMm / 2),
    })
    section.yMm += step.thicknessMm * (step.overlapMm > 0 ? 2 : 1)
    if (step.widthMm > section.widthMm + 1e-9) {
      progress.findings.push(finding('foil-wider-than-former', 'error', `sequence.${index}.widthMm`, { step: index + 1, overMm: step.widthMm - section.widthMm }))
    }
  }
}
