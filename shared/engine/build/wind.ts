import type { Winding, WindingStep } from '../specification'
import { foilWidthMm } from '../wires/foil'
import { mostTurnsPerLayer, planLayers } from './layers'
import type { LayerPlan } from './layers'
import { finding } from './progress'
import type { Progress, Section } from './progress'
import { turnLengthMm } from './tube'
import type { BuildWire, LayerPlacement, StepPlacement } from './types'

/** Beyond this the single turns are not listed: a part of this kind has a few thousand at most. */
const MOST_ITEMS = 40_000

/**
 * Lays winding steps that are wound together, or a single one, in wire or in foil; what cannot be laid leaves a finding. Steps that
 * cannot be wound together (foil, another section, other turns) are laid one after the other.
 */
export function layWindings(progress: Progress, steps: readonly WindingStep[], firstIndex: number): void {
  const lays = steps.flatMap((step, offset) => lookUp(progress, step, firstIndex + offset) ?? [])
  const [first, ...others] = lays
  if (!first) return
  const fits = (lay: WindingLay) => lay.wire.form !== 'foil' && first.wire.form !== 'foil' && lay.section === first.section && lay.step.turns === first.step.turns && lay.winding.id !== first.winding.id
  const together = [first, ...others.filter(fits)]
  if (first.wire.form === 'foil') layFoil(progress, first)
  else layWires(progress, together)
  for (const lay of others.filter((other) => !fits(other))) {
    progress.findings.push(finding('cannot-be-wound-together', 'error', `sequence.${lay.index}`, { step: lay.index + 1, winding: lay.winding.name, other: first.winding.name, turns: lay.step.turns, otherTurns: first.step.turns }))
    if (lay.wire.form === 'foil') layFoil(progress, lay)
    else layWires(progress, [lay])
  }
}

function lookUp(progress: Progress, step: WindingStep, index: number): WindingLay | null {
  const winding = progress.input.windings.find(({ id }) => id === step.windingId)
  const section = progress.sections[step.section - 1]
  if (!winding) {
    progress.findings.push(finding('sequence-names-unknown-winding', 'error', `sequence.${index}.windingId`, { step: index + 1, winding: step.windingId }))
    return null
  }
  if (!section) {
    progress.findings.push(finding('section-not-on-former', 'error', `sequence.${index}.section`, { step: index + 1, section: step.section, sections: progress.sections.length }))
    return null
  }
  const wire = progress.input.wireOf(winding)
  return wire && step.turns > 0 ? { step, index, winding, section, wire } : null
}

interface WindingLay {
  step: WindingStep
  index: number
  winding: Winding
  section: Section
  wire: BuildWire
}

const parallelOf = ({ winding }: WindingLay) => Math.max(1, Math.floor(winding.wire.parallel))

/** The layers that one or more windings share; the first step says how they lie. */
interface Bed {
  plan: readonly LayerPlan[]
  bundleWidthMm: number
  availableMm: number
  most: number
  bottomMm: number
  /** The thickest wire. */
  heightMm: number
  tapeMm: number
}

function layWires(progress: Progress, lays: readonly WindingLay[]): void {
  const { step, section } = lays[0]!
  const availableMm = section.widthMm - step.marginLeftMm - step.marginRightMm
  const bundleWidthMm = lays.reduce((sum, lay) => sum + lay.wire.overallMm * parallelOf(lay), 0)
  const most = availableMm > 0 ? mostTurnsPerLayer(availableMm, bundleWidthMm) : 0
  const tape = step.interlayerTape && progress.input.tapeOf(step.interlayerTape)
  const plan = planLayers({ turns: Math.min(step.turns, MOST_ITEMS), bundleWidthMm, availableMm: Math.max(availableMm, 2 * bundleWidthMm), lay: step.lay, layers: step.layers })
  const bed: Bed = { plan, bundleWidthMm, availableMm, most, bottomMm: section.yMm, heightMm: Math.max(...lays.map(({ wire }) => wire.overallMm)), tapeMm: tape?.thicknessMm ?? 0 }
  let offsetMm = -bundleWidthMm / 2
  for (const lay of lays) {
    reportWidth(progress, lay, bed)
    listTurns(progress, lay, bed, offsetMm)
    placeWire(progress, lay, { bed, together: lays.filter((other) => other !== lay).map((other) => other.step.id), offsetMm })
    offsetMm += lay.wire.overallMm * parallelOf(lay)
  }
  if (tape) interlayerTapes(progress, lays[0]!, bed)
}

/** Every wire as a circle, each on the floor of its layer. */
function listTurns(progress: Progress, lay: WindingLay, { plan, bottomMm, heightMm, tapeMm }: Bed, offsetMm: number): void {
  const { step, index, winding, section, wire } = lay
  const parallel = parallelOf(lay)
  if (progress.items.length + step.turns * parallel > MOST_ITEMS) {
    progress.findings.push(finding('too-many-turns-to-draw', 'note', `sequence.${index}.turns`, { step: index + 1, turns: step.turns }))
    return
  }
  const leftEdgeMm = section.xMm + step.marginLeftMm
  let turn = progress.laidTurns.get(winding.id) ?? 0
  plan.forEach(({ centresMm }, layer) => {
    const yMm = bottomMm + layer * (heightMm + tapeMm) + wire.overallMm / 2
    for (const centreMm of centresMm) {
      turn += 1
      for (let strand = 0; strand < parallel; strand++) {
        const xMm = leftEdgeMm + centreMm + offsetMm + (strand + 0.5) * wire.overallMm
        progress.items.push({ kind: 'turn', stepId: step.id, windingId: winding.id, turn, strand: strand + 1, layer: layer + 1, xMm, yMm, overallMm: wire.overallMm, conductorMm: wire.conductorMm })
      }
    }
  })
}

function interlayerTapes(progress: Progress, { step, section }: WindingLay, { plan, bottomMm, heightMm, tapeMm, availableMm }: Bed): void {
  for (let layer = 1; layer < plan.length; layer++) {
    progress.items.push({ kind: 'tape', stepId: step.id, layer, xMm: section.xMm + step.marginLeftMm, yMm: bottomMm + layer * (heightMm + tapeMm) - tapeMm, widthMm: Math.max(0, availableMm), thicknessMm: tapeMm })
  }
}

function placeWire(progress: Progress, lay: WindingLay, { bed, together, offsetMm }: { bed: Bed; together: string[]; offsetMm: number }): void {
  const { step, winding, wire } = lay
  const { plan, bottomMm, heightMm, tapeMm, most, bundleWidthMm, availableMm } = bed
  const parallel = parallelOf(lay)
  const ownMm = wire.overallMm * parallel
  const before = progress.laidTurns.get(winding.id) ?? 0
  const layers = step.turns > MOST_ITEMS ? Math.ceil(step.turns / Math.max(1, most)) : plan.length
  const centres = plan.flatMap(({ centresMm }) => centresMm)
  const turnLengthsMm = plan.map((_, layer) => turnLengthMm(progress.input.former.tube, bottomMm + layer * (heightMm + tapeMm) + wire.overallMm / 2))
  place(progress, lay, {
    bottomMm,
    topMm: bottomMm + layers * heightMm + (layers - 1) * tapeMm,
    leftMm: step.marginLeftMm + extreme(centres, Math.min) + offsetMm,
    rightMm: step.marginLeftMm + extreme(centres, Math.max) + offsetMm + ownMm,
    turnsPerLayer: plan.map(({ turns }) => turns),
    turnLengthsMm,
    mostTurnsPerLayer: most,
    bundleWidthMm,
    availableMm,
    togetherWith: together,
    layerHeightMm: heightMm,
    layers: wireLayers(plan, { bottomMm, heightMm: wire.overallMm, stepMm: heightMm + tapeMm, leftMm: step.marginLeftMm + offsetMm, widthMm: ownMm, turnLengthsMm, laidBefore: before }),
  })
  progress.laidTurns.set(winding.id, before + plan.reduce((sum, { turns }) => sum + turns, 0))
  progress.copperAreaMm2 += step.turns * parallel * wire.copperAreaMm2
  progress.squaresAreaMm2 += step.turns * parallel * wire.overallMm ** 2
}

interface LayersFrame {
  bottomMm: number
  heightMm: number
  /** From the bottom of one layer to that of the next. */
  stepMm: number
  /** Left end of the wires of a turn whose centre lies at 0. */
  leftMm: number
  /** All wires of one turn. */
  widthMm: number
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
      leftMm: frame.leftMm + Math.min(first, last),
      rightMm: frame.leftMm + Math.max(first, last) + frame.widthMm,
      pitchMm: turns > 1 ? Math.abs(last - first) / (turns - 1) : frame.widthMm,
      // A single turn has no sense of its own: odd layers run to the right.
      rightward: turns > 1 ? last > first : layer % 2 === 0,
      turnLengthMm: frame.turnLengthsMm[layer]!,
    }
    turnsBefore += turns
    return laid
  })
}

const extreme = (values: readonly number[], pick: (a: number, b: number) => number): number => values.reduce((a, b) => pick(a, b), values[0] ?? 0)

function reportWidth(progress: Progress, lay: WindingLay, { availableMm, bundleWidthMm, most }: Pick<Bed, 'availableMm' | 'bundleWidthMm' | 'most'>): void {
  const { step, index, winding, wire } = lay
  const values = { step: index + 1, winding: winding.name, availableMm, bundleWidthMm }
  if (most < 1) {
    // Two bundles must fit, for the helix of a single turn.
    const fittingParallel = Math.max(0, Math.floor(availableMm / 2 / wire.overallMm))
    const fittingOverallMm = Math.max(0, availableMm / 2 / parallelOf(lay))
    progress.findings.push(finding('turn-wider-than-layer', 'error', `sequence.${index}`, { ...values, overMm: 2 * bundleWidthMm - availableMm, parallel: parallelOf(lay), fittingParallel, fittingOverallMm }))
  } else if (step.layers !== null && Math.ceil(step.turns / most) > step.layers) {
    const inLayer = Math.ceil(step.turns / step.layers)
    const fittingOverallMm = (availableMm / (inLayer + 1) / bundleWidthMm) * wire.overallMm
    progress.findings.push(
      finding('layers-too-few', 'error', `sequence.${index}.layers`, { ...values, layers: step.layers, neededLayers: Math.ceil(step.turns / most), mostTurnsPerLayer: most, turnsInLayer: inLayer, turns: step.turns, fittingTurns: step.layers * most, overallMm: wire.overallMm, fittingOverallMm }),
    )
  }
}

function layFoil(progress: Progress, lay: WindingLay): void {
  const { step, index, winding, section, wire } = lay
  const tape = step.interlayerTape && progress.input.tapeOf(step.interlayerTape)
  const tapeMm = tape?.thicknessMm ?? 0
  const parallel = Math.max(1, Math.floor(winding.wire.parallel))
  const turns = Math.min(Math.ceil(step.turns), 2_000)
  const availableMm = section.widthMm - step.marginLeftMm - step.marginRightMm
  const widthMm = Math.max(0, Math.min(wire.widthMm ?? foilWidthMm({ availableMm: Math.max(0, availableMm) }), availableMm))
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
    togetherWith: [],
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
