import type { RingLayout, RingPass } from '../evaluation'
import type { Finding } from '../findings'
import type { CoreRow, TapeRow } from '../library'
import type { LibraryReference, SequenceStep, Winding, WindingStep } from '../specification'
import { requirePositive } from '../require'
import { finding } from './progress'
import { turnLengthMm } from './tube'
import type { BuildWire, LayerPlacement, StepPlacement } from './types'

export interface RingInput {
  core: CoreRow
  windings: readonly Winding[]
  sequence: readonly SequenceStep[]
  wireOf: (winding: Winding) => BuildWire | null
  tapeOf: (reference: LibraryReference) => TapeRow | null
}

/**
 * Wires of one layer in the hole: circles of diameter d whose centres lie on a circle of radius r and whose chords are at least d,
 * φ/(2·arcsin(d/2r)); none where the wires would not leave the middle free.
 *
 * Source: geometry; with the chord for the arc it is the usual N ≤ π·(ID − (2k − 1)·d)/d.
 *
 * @throws RangeError unless diameter and angle are positive
 */
export function ringLayerCapacity(input: { radiusMm: number; overallMm: number; angleRad: number }): number {
  const { radiusMm, overallMm, angleRad } = input
  requirePositive('overallMm', overallMm)
  requirePositive('angleRad', angleRad)
  if (radiusMm < overallMm) return 0
  return Math.floor(angleRad / wireAngleRad(radiusMm, overallMm) + 1e-9)
}

const wireAngleRad = (radiusMm: number, overallMm: number) => 2 * Math.asin(Math.min(1, overallMm / (2 * radiusMm)))

export interface Sector {
  fromRad: number
  angleRad: number
  /** Thickness wound in the hole and outside. */
  innerMm: number
  outerMm: number
}

export interface RingProgress {
  input: RingInput
  /** Of the coated core, mm. */
  holeRadiusMm: number
  outsideRadiusMm: number
  heightMm: number
  sectors: Sector[]
  ring: Pick<RingLayout, 'passes' | 'sectors' | 'tapes'>
  placements: StepPlacement[]
  findings: Finding[]
  laidTurns: Map<string, number>
  copperAreaMm2: number
  squaresAreaMm2: number
}

/** Beyond this the single wires are not listed. */
const MOST_PASSES = 20_000

export interface RingLay {
  step: WindingStep
  index: number
  winding: Winding
  sector: Sector
  wire: BuildWire
}

interface RingLayer {
  /** Whole turns; their parallel wires lie side by side. */
  turns: number
  radiusMm: number
  pitchRad: number
}

/** Lays one winding step into its sector, layer by layer towards the middle; turns that find no place leave a finding. */
export function windOnRing(progress: RingProgress, lay: RingLay): void {
  const { step, index, winding, sector, wire } = lay
  const parallel = Math.max(1, Math.floor(winding.wire.parallel))
  const angleRad = sector.angleRad - (Math.max(0, step.marginLeftMm) + Math.max(0, step.marginRightMm)) / progress.holeRadiusMm
  const wanted = Math.min(Math.ceil(step.turns), MOST_PASSES)
  const layers = angleRad > 0 ? ringLayers(progress, lay, { parallel, angleRad, wanted }) : []
  const laid = layers.reduce((sum, { turns }) => sum + turns, 0)
  if (laid < wanted) progress.findings.push(finding('ring-hole-full', 'error', `sequence.${index}.turns`, { step: index + 1, winding: winding.name, turns: wanted, laidTurns: laid, overTurns: wanted - laid }))
  if (laid === 0) return
  const fromRad = sector.fromRad + Math.max(0, step.marginLeftMm) / progress.holeRadiusMm
  const bottomMm = sector.innerMm
  place(progress, lay, { layers, parallel, angleRad, bottomMm })
  listPasses(progress, lay, { layers, parallel, angleRad, fromRad })
  const widestRad = Math.max(...layers.map(({ turns, pitchRad }) => turns * pitchRad))
  progress.ring.sectors.push({ stepId: step.id, windingId: winding.id, section: step.section, fromRad, toRad: fromRad + widestRad })
  sector.innerMm = bottomMm + layers.length * wire.overallMm
  progress.laidTurns.set(winding.id, (progress.laidTurns.get(winding.id) ?? 0) + laid)
  progress.copperAreaMm2 += laid * parallel * wire.copperAreaMm2
  progress.squaresAreaMm2 += laid * parallel * wire.overallMm ** 2
}

function ringLayers({ holeRadiusMm }: RingProgress, { step, sector, wire }: RingLay, { parallel, angleRad, wanted }: { parallel: number; angleRad: number; wanted: number }): RingLayer[] {
  const layers: RingLayer[] = []
  let left = wanted
  while (left > 0) {
    const radiusMm = holeRadiusMm - sector.innerMm - (layers.length + 0.5) * wire.overallMm
    const capacity = Math.floor(ringLayerCapacity({ radiusMm, overallMm: wire.overallMm, angleRad }) / parallel)
    if (capacity < 1) return layers
    const even = step.layers !== null && step.layers > 0 ? Math.ceil(wanted / step.layers) : capacity
    const turns = Math.min(left, capacity, Math.max(1, even))
    const tightRad = parallel * wireAngleRad(radiusMm, wire.overallMm)
    layers.push({ turns, radiusMm, pitchRad: step.lay === 'spread' ? Math.max(tightRad, angleRad / turns) : tightRad })
    left -= turns
  }
  return layers
}

/** Every wire in the hole, and where it runs outside: there the circle is longer, and layers fill up one after the other. */
function listPasses(progress: RingProgress, { step, winding, sector, wire }: RingLay, { layers, parallel, angleRad, fromRad }: { layers: readonly RingLayer[]; parallel: number; angleRad: number; fromRad: number }): void {
  let turn = progress.laidTurns.get(winding.id) ?? 0
  const total = layers.reduce((sum, { turns }) => sum + turns, 0) * parallel
  const outside = outerLayers(progress, { sector, overallMm: wire.overallMm, angleRad, total })
  const listed = progress.ring.passes.length + total <= MOST_PASSES
  let wireNumber = 0
  layers.forEach(({ turns, radiusMm, pitchRad }, layer) => {
    const startRad = fromRad + (step.lay === 'centred' ? Math.max(0, angleRad - turns * pitchRad) / 2 : 0)
    for (let place = 0; place < turns; place++) {
      turn += 1
      for (let strand = 0; strand < parallel; strand++) {
        const within = (strand - (parallel - 1) / 2) * wireAngleRad(radiusMm, wire.overallMm)
        const innerRad = startRad + (place + 0.5) * pitchRad + within
        const outer = outerPlace(outside, wireNumber, fromRad, angleRad)
        wireNumber += 1
        if (!listed) continue
        const pass: RingPass = {
          stepId: step.id, windingId: winding.id, turn, strand: strand + 1, layer: layer + 1, overallMm: wire.overallMm, conductorMm: wire.conductorMm,
          innerXMm: radiusMm * Math.cos(innerRad), innerYMm: radiusMm * Math.sin(innerRad),
          outerXMm: outer.radiusMm * Math.cos(outer.rad), outerYMm: outer.radiusMm * Math.sin(outer.rad),
        }
        progress.ring.passes.push(pass)
      }
    }
  })
  sector.outerMm += outside.length * wire.overallMm
}

interface OuterLayer {
  first: number
  count: number
  radiusMm: number
}

function outerLayers({ outsideRadiusMm }: RingProgress, { sector, overallMm, angleRad, total }: { sector: Sector; overallMm: number; angleRad: number; total: number }): OuterLayer[] {
  const layers: OuterLayer[] = []
  for (let first = 0; first < total; ) {
    const radiusMm = outsideRadiusMm + sector.outerMm + (layers.length + 0.5) * overallMm
    const count = Math.min(total - first, Math.max(1, ringLayerCapacity({ radiusMm, overallMm, angleRad })))
    layers.push({ first, count, radiusMm })
    first += count
  }
  return layers
}

function outerPlace(layers: readonly OuterLayer[], wire: number, fromRad: number, angleRad: number): { rad: number; radiusMm: number } {
  const layer = layers.find(({ first, count }) => wire < first + count)!
  return { rad: fromRad + ((wire - layer.first + 0.5) * angleRad) / layer.count, radiusMm: layer.radiusMm }
}

function place(progress: RingProgress, { step, index, winding, wire }: RingLay, { layers, parallel, angleRad, bottomMm }: { layers: readonly RingLayer[]; parallel: number; angleRad: number; bottomMm: number }): void {
  const { holeRadiusMm, outsideRadiusMm, heightMm } = progress
  const section = { shape: 'rectangular' as const, widthMm: outsideRadiusMm - holeRadiusMm, depthMm: heightMm, cornerRadiusMm: 0 }
  let turnsBefore = progress.laidTurns.get(winding.id) ?? 0
  const laid = layers.map(({ turns, pitchRad }, layer): LayerPlacement => {
    const bottom = bottomMm + layer * wire.overallMm
    const placement: LayerPlacement = {
      turns,
      turnsBefore,
      bottomMm: bottom,
      topMm: bottom + wire.overallMm,
      leftMm: Math.max(0, step.marginLeftMm),
      rightMm: Math.max(0, step.marginLeftMm) + turns * pitchRad * holeRadiusMm,
      pitchMm: pitchRad * holeRadiusMm,
      rightward: layer % 2 === 0,
      turnLengthMm: turnLengthMm(section, bottom + wire.overallMm / 2),
    }
    turnsBefore += turns
    return placement
  })
  progress.placements.push({
    stepId: step.id, index, windingId: winding.id, section: step.section,
    bottomMm, topMm: bottomMm + layers.length * wire.overallMm,
    leftMm: laid[0]!.leftMm, rightMm: Math.max(...laid.map(({ rightMm }) => rightMm)),
    marginLeftMm: step.marginLeftMm, marginRightMm: step.marginRightMm,
    turns: laid.reduce((sum, { turns }) => sum + turns, 0),
    turnsPerLayer: laid.map(({ turns }) => turns),
    turnLengthsMm: laid.map((layer) => layer.turnLengthMm),
    mostTurnsPerLayer: Math.floor(ringLayerCapacity({ radiusMm: layers[0]!.radiusMm, overallMm: wire.overallMm, angleRad }) / parallel),
    bundleWidthMm: wire.overallMm * parallel,
    availableMm: angleRad * holeRadiusMm,
    togetherWith: [],
    layerHeightMm: wire.overallMm,
    layers: laid,
  })
}
