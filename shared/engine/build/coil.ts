import type { Finding } from '../findings'
import type { LayoutItem } from '../evaluation'
import type { FormerRow } from '../library'
import type { CoreTapeStep, MarginStep, SequenceStep, ShieldStep, SleeveStep, TapeStep, VarnishStep, Winding, WindingStep } from '../specification'
import { planLayers, mostTurnsPerLayer } from './layers'
import { bulgeFactor, turnLengthMm } from './tube'
import type { BuildWire, Coil, CoilInput, MarginPlacement, StepPlacement, TapePlacement, WindingBuild } from './types'

/** Beyond this the single turns are not listed: a part of this kind has a few thousand at most. */
const MOST_ITEMS = 40_000

interface Section {
  number: number
  xMm: number
  widthMm: number
  yMm: number
  margin: { step: MarginStep; index: number; bottomMm: number } | null
}

interface Progress {
  input: CoilInput
  sections: Section[]
  items: LayoutItem[]
  placements: StepPlacement[]
  tapes: TapePlacement[]
  margins: MarginPlacement[]
  findings: Finding[]
  laidTurns: Map<string, number>
  copperAreaMm2: number
  squaresAreaMm2: number
}

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
    findings: [],
    laidTurns: new Map(),
    copperAreaMm2: 0,
    squaresAreaMm2: 0,
  }
  input.sequence.forEach((step, index) => layStep(progress, step, index))
  for (const section of progress.sections) closeMargin(progress, section)
  return finish(progress)
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

type FlatStep = TapeStep | MarginStep | ShieldStep | SleeveStep | CoreTapeStep | VarnishStep

function layStep(progress: Progress, step: WindingStep | FlatStep, index: number): void {
  switch (step.kind) {
    case 'winding':
      return layWinding(progress, step, index)
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

const finding = (code: Finding['code'], severity: Finding['severity'], path: string, values: Finding['values']): Finding => ({ code, severity, path, values })

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
    section.yMm += step.thicknessMm * (step.overlapMm > 0 ? 2 : 1)
    if (step.widthMm > section.widthMm + 1e-9) {
      progress.findings.push(finding('foil-wider-than-former', 'error', `sequence.${index}.widthMm`, { step: index + 1, overMm: step.widthMm - section.widthMm }))
    }
  }
}

// ---------------------------------------------------------------------------------------------

function layWinding(progress: Progress, step: WindingStep, index: number): void {
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
  let turn = progress.laidTurns.get(winding.id) ?? 0
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
  place(progress, lay, {
    bottomMm,
    topMm,
    leftMm: step.marginLeftMm + extreme(centres, Math.min) - bundleWidthMm / 2,
    rightMm: step.marginLeftMm + extreme(centres, Math.max) + bundleWidthMm / 2,
    turnsPerLayer: plan.map(({ turns }) => turns),
    turnLengthsMm: plan.map((_, layer) => turnLengthMm(progress.input.former.tube, bottomMm + layer * (wire.overallMm + tapeMm) + wire.overallMm / 2)),
    mostTurnsPerLayer: most,
    bundleWidthMm,
    availableMm,
    layerHeightMm: wire.overallMm,
  })
  progress.copperAreaMm2 += step.turns * parallel * wire.copperAreaMm2
  progress.squaresAreaMm2 += step.turns * parallel * wire.overallMm ** 2
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
  place(progress, lay, {
    bottomMm,
    topMm: bottomMm + turns * heightMm + (turns - 1) * tapeMm,
    leftMm: xMm,
    rightMm: xMm + widthMm,
    turnsPerLayer: new Array<number>(turns).fill(1),
    turnLengthsMm: Array.from({ length: turns }, (_, turn) => turnLengthMm(progress.input.former.tube, bottomMm + turn * (heightMm + tapeMm) + heightMm / 2)),
    mostTurnsPerLayer: 1,
    bundleWidthMm: widthMm,
    availableMm,
    layerHeightMm: heightMm,
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

// ---------------------------------------------------------------------------------------------

function finish(progress: Progress): Coil {
  const { former, windings } = progress.input
  const { sections } = progress
  const plainBuildMm = Math.max(...sections.map(({ yMm }) => yMm))
  const bulge = bulgeFactor(former.tube)
  const buildMm = plainBuildMm * bulge
  const areaMm2 = former.windingWidthMm * former.windingHeightMm * sections.length
  if (buildMm > former.windingHeightMm) {
    progress.findings.push(finding('window-overfilled', 'error', 'sequence', { buildMm, windowHeightMm: former.windingHeightMm, overMm: buildMm - former.windingHeightMm, fillRatio: buildMm / former.windingHeightMm }))
  }
  return {
    layout: {
      windowWidthMm: sections.length * former.windingWidthMm + (sections.length - 1) * former.flangeThicknessMm,
      windowHeightMm: former.windingHeightMm,
      items: progress.items,
      buildMm,
      buildRatio: former.windingHeightMm > 0 ? buildMm / former.windingHeightMm : 0,
      copperFill: areaMm2 > 0 ? progress.copperAreaMm2 / areaMm2 : 0,
      windowFill: areaMm2 > 0 ? progress.squaresAreaMm2 / areaMm2 : 0,
    },
    placements: progress.placements,
    tapes: progress.tapes,
    margins: progress.margins,
    windings: new Map(windings.flatMap(({ id }) => windingBuild(id, progress.placements))),
    plainBuildMm,
    bulge,
    findings: progress.findings,
  }
}

function windingBuild(windingId: string, all: readonly StepPlacement[]): [string, WindingBuild][] {
  const placements = all.filter((placement) => placement.windingId === windingId)
  if (placements.length === 0) return []
  const turnsPerLayer = placements.flatMap((placement) => placement.turnsPerLayer)
  const lengths = placements.flatMap((placement) => placement.turnLengthsMm)
  const laid = turnsPerLayer.reduce((sum, turns) => sum + turns, 0)
  const meanTurnLengthMm = turnsPerLayer.reduce((sum, turns, layer) => sum + turns * lengths[layer]!, 0) / laid
  const turns = placements.reduce((sum, placement) => sum + placement.turns, 0)
  return [[windingId, { windingId, turns, layers: turnsPerLayer.length, turnsPerLayer, meanTurnLengthMm, turnsLengthM: (turns * meanTurnLengthMm) / 1000 }]]
}
