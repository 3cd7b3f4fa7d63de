import type { Winding, WindingStep } from '../specification'
import { mostTurnsPerLayer, planLayers } from './layers'
import type { LayerPlan } from './layers'
import { finding } from './progress'
import type { Progress, Section } from './progress'
import { turnLengthMm } from './tube'
import type { BuildWire, LayerPlacement, StepPlacement } from './types'

/** Beyond this the single turns are not listed: a part of this kind has a few thousand at most. */
const MOST_ITEMS = 40_000

/** Lays one winding step, in wire or in foil; what cannot be laid leaves a finding. */
export function layWinding(progress: Progress, step: WindingStep, index: number): void {
  const winding = progress.input.windings.find(({ id }) => id === step.windingId)
  const section = progress.sections[step.section - 1]
  if (!winding) {
    progress.findings.push(finding('sequence-names-unknown-winding', 'error', `sequence.${index}.windingId`, { step: index + 1, winding: step.windingId }))
    return
  }
  if (!section) {
    progress.findings.push(finding('section-not-on-former', 'error', `sequence.${index}.section`, { step: index + 1, section: step.section, sections: progress.sections.length }))
    return
  }
  const wire = progress.input.wireOf(winding)
  if (!wire || !(step.turns > 0)) return
  if (wire.form === 'foil') return layFoil(progress, { step, index, winding, section, wire })
  return layWire(progress, { step, index, winding, section, wire })
}

interface WindingLay {
  step: WindingStep
  index: number
  winding: Winding
  section: Section
  wire: BuildWire
}

function layWire(progress: Progress, lay: WindingLay): void {
  const { step, index, winding, section, wire } = lay
  const parallel = Math.max(1, Math.floor(winding.wire.parallel))
  const availableMm = section.widthMm - step.marginLeftMm - step.marginRightMm
  const bundleWidthMm = wire.overallMm * parallel
  const most = availableMm > 0 ? mostTurnsPerLayer(availableMm, bundleWidthMm) : 0
  const tape = step.interlayerTape && progress.input.tapeOf(step.interlayerTape)
  const tapeMm = tape?.thicknessMm ?? 0
  reportWidth(progress, lay, { availableMm, bundleWidthMm, most })

  const plan = planLayers({ turns: Math.min(step.turns, MOST_ITEMS), bundleWidthMm, availableMm: Math.max(availableMm, 2 * bundleWidthMm), lay: step.lay, layers: step.layers })
  const listed = progress.items.length + step.turns * parallel <= MOST_ITEMS
  const bottomMm = section.yMm
  const leftEdgeMm = section.xMm + step.marginLeftMm
  const laidBefore = progress.laidTurns.get(winding.id) ?? 0
  let turn = laidBefore
  plan.forEach(({ centresMm }, layer) => {
    const yMm = bottomMm + layer * (wire.overallMm + tapeMm) + wire.overallMm / 2
    for (const centreMm of centresMm) {
      turn += 1
      for (let strand = 0; listed && strand < parallel; strand++) {
        const xMm = leftEdgeMm + centreMm + (strand - (parallel - 1) / 2) * wire.overallMm
        progress.items.push({ kind: 'turn', stepId: step.id, windingId: winding.id, turn, strand: strand + 1, layer: layer + 1, xMm, yMm, overallMm: wire.overallMm, conductorMm: wire.conductorMm })
      }
    }
    if (layer > 0 && tape) {
      progress.items.push({ kind: 'tape', stepId: step.id, layer, xMm: leftEdgeMm, yMm: yMm - wire.overallMm / 2 - tapeMm, widthMm: Math.max(0, availableMm), thicknessMm: tapeMm })
    }
  })
  if (!listed) progress.findings.push(finding('too-many-turns-to-draw', 'note', `sequence.${index}.turns`, { step: index + 1, turns: step.turns }))
  progress.laidTurns.set(winding.id, turn)

  const layers = step.turns > MOST_ITEMS ? Math.ceil(step.turns / Math.max(1, most)) : plan.length
  const topMm = bottomMm + layers * wire.overallMm + (layers - 1) * tapeMm
  const centres = plan.flatMap(({ centresMm }) => centresMm)
  const turnLengthsMm = plan.map((_, layer) => turnLengthMm(progress.input.former.tube, bottomMm + layer * (wire.overallMm + tapeMm) + wire.overallMm / 2))
  place(progress, lay, {
    bottomMm,
    topMm,
    leftMm: step.marginLeftMm + extreme(centres, Math.min) - bundleWidthMm / 2,
    rightMm: step.marginLeftMm + extreme(centres, Math.max) + bundleWidthMm / 2,
    turnsPerLayer: plan.map(({ turns }) => turns),
    turnLengthsMm,
    mostTurnsPerLayer: most,
    bundleWidthMm,
    availableMm,
    layerHeightMm: wire.overallMm,
    layers: wireLayers(plan, { bottomMm, heightMm: wire.overallMm, stepMm: wire.overallMm + tapeMm, marginLeftMm: step.marginLeftMm, bundleWidthMm, turnLengthsMm, laidBefore }),
  })
  progress.copperAreaMm2 += step.turns * parallel * wire.copperAreaMm2
  progress.squaresAreaMm2 += step.turns * parallel * wire.overallMm ** 2
}

interface LayersFrame {
  bottomMm: number
  heightMm: number
  /** From the bottom of one layer to that of the next. */
  stepMm: number
  marginLeftMm: number
  bundleWidthMm: number
  turnLengthsMm: readonly number[]
  laidBefore: number
}

function wireLayers(plan: readonly LayerPlan[], frame: LayersFrame): LayerPlacement[] {
  let turnsBefore = frame.laidBefore
  return plan.map(({ turns, centresMm }, layer) => {
    const [first, last] = [centresMm[0]!, centresMm[centresMm.length - 1]!]
    const bottomMm = frame.bottomMm + layer * frame.stepMm
    const laid: LayerPlacement = {
      turns,
      turnsBefore,
      bottomMm,
      topMm: bottomMm + frame.heightMm,
      leftMm: frame.marginLeftMm + Math.min(first, last) - frame.bundleWidthMm / 2,
      rightMm: frame.marginLeftMm + Math.max(first, last) + frame.bundleWidthMm / 2,
      pitchMm: turns > 1 ? Math.abs(last - first) / (turns - 1) : frame.bundleWidthMm,
      // A single turn has no sense of its own: odd layers run to the right.
      rightward: turns > 1 ? last > first : layer % 2 === 0,
      turnLengthMm: frame.turnLengthsMm[layer]!,
    }
    turnsBefore += turns
    return laid
  })
}

const extreme = (values: readonly number[], pick: (a: number, b: number) => number): number => values.reduce((a, b) => pick(a, b), values[0] ?? 0)

function reportWidth(progress: Progress, { step, index, winding }: WindingLay, { availableMm, bundleWidthMm, most }: { availableMm: number; bundleWidthMm: number; most: number }): void {
  const values = { step: index + 1, winding: winding.name, availableMm, bundleWidthMm }
  if (most < 1) {
    progress.findings.push(finding('turn-wider-than-layer', 'error', `sequence.${index}`, { ...values, overMm: 2 * bundleWidthMm - availableMm }))
  } else if (step.layers !== null && Math.ceil(step.turns / most) > step.layers) {
    progress.findings.push(finding('layers-too-few', 'error', `sequence.${index}.layers`, { ...values, layers: step.layers, neededLayers: Math.ceil(step.turns / most), mostTurnsPerLayer: most }))
  }
}

function layFoil(progress: Progress, lay: WindingLay): void {
  const { step, index, winding, section, wire } = lay
  const tape = step.interlayerTape && progress.input.tapeOf(step.interlayerTape)
  const tapeMm = tape?.thicknessMm ?? 0
  const parallel = Math.max(1, Math.floor(winding.wire.parallel))
  const turns = Math.min(Math.ceil(step.turns), 2_000)
  const availableMm = section.widthMm - step.marginLeftMm - step.marginRightMm
  const widthMm = Math.max(0, Math.min(wire.widthMm ?? availableMm, availableMm))
  const xMm = step.marginLeftMm + (availableMm - widthMm) / 2
  const heightMm = wire.overallMm * parallel
  const bottomMm = section.yMm
  const before = progress.laidTurns.get(winding.id) ?? 0
  for (let turn = 0; turn < turns; turn++) {
    const yMm = bottomMm + turn * (heightMm + tapeMm)
    progress.items.push({ kind: 'foil', stepId: step.id, windingId: winding.id, turn: before + turn + 1, xMm: section.xMm + xMm, yMm, widthMm, thicknessMm: heightMm })
    if (turn > 0 && tape) progress.items.push({ kind: 'tape', stepId: step.id, layer: turn, xMm: section.xMm + step.marginLeftMm, yMm: yMm - tapeMm, widthMm: Math.max(0, availableMm), thicknessMm: tapeMm })
  }
  if ((wire.widthMm ?? 0) > availableMm + 1e-9) {
    progress.findings.push(finding('foil-wider-than-former', 'error', `sequence.${index}`, { step: index + 1, overMm: (wire.widthMm ?? 0) - availableMm }))
  }
  progress.laidTurns.set(winding.id, before + turns)
  const turnLengthsMm = Array.from({ length: turns }, (_, turn) => turnLengthMm(progress.input.former.tube, bottomMm + turn * (heightMm + tapeMm) + heightMm / 2))
  place(progress, lay, {
    bottomMm,
    topMm: bottomMm + turns * heightMm + (turns - 1) * tapeMm,
    leftMm: xMm,
    rightMm: xMm + widthMm,
    turnsPerLayer: new Array<number>(turns).fill(1),
    turnLengthsMm,
    mostTurnsPerLayer: 1,
    bundleWidthMm: widthMm,
    availableMm,
    layerHeightMm: heightMm,
    layers: turnLengthsMm.map((turnLength, turn) => ({
      turns: 1,
      turnsBefore: before + turn,
      bottomMm: bottomMm + turn * (heightMm + tapeMm),
      topMm: bottomMm + turn * (heightMm + tapeMm) + heightMm,
      leftMm: xMm,
      rightMm: xMm + widthMm,
      pitchMm: widthMm,
      rightward: true,
      turnLengthMm: turnLength,
    })),
  })
  progress.copperAreaMm2 += turns * parallel * (wire.widthMm === null ? wire.conductorMm * widthMm : wire.copperAreaMm2)
  progress.squaresAreaMm2 += turns * heightMm * widthMm
}

type Placed = Omit<StepPlacement, 'stepId' | 'index' | 'windingId' | 'section' | 'marginLeftMm' | 'marginRightMm' | 'turns'>

function place(progress: Progress, { step, index, winding, section }: WindingLay, placed: Placed): void {
  section.yMm = placed.topMm
  progress.placements.push({
    stepId: step.id,
    index,
    windingId: winding.id,
    section: step.section,
    marginLeftMm: step.marginLeftMm,
    marginRightMm: step.marginRightMm,
    turns: step.turns,
    ...placed,
  })
}
