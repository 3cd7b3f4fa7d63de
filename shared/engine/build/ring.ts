import type { RingLayout, RingPass } from '../evaluation'
import type { Finding } from '../findings'
import type { CoreRow, TapeRow } from '../library'
import type { LibraryReference, SequenceStep, Winding, WindingStep } from '../specification'
import { requirePositive } from '../require'
import { finding } from './progress'
import { windingBuild } from './summary'
import { turnLengthMm } from './tube'
import type { BuildWire, Coil, LayerPlacement, StepPlacement } from './types'

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

interface Sector {
  fromRad: number
  angleRad: number
  /** Thickness wound in the hole and outside. */
  innerMm: number
  outerMm: number
}

interface RingProgress {
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

/**
 * The winding sequence laid on a ring core, seen along its axis: layers on the inner circumference, what is left of the
 * hole, the build outside. Sections of the steps are sectors of the ring, as many as the highest number used, and margins
 * are the free arc at both ends of a sector. Null when the core's dimensions are not known.
 */
export function layOutRing(input: RingInput): Coil | null {
  const size = ringSize(input.core)
  if (!size) return null
  const count = Math.max(1, ...input.sequence.map((step) => (step.kind === 'winding' && step.section >= 1 && step.section <= 24 ? Math.floor(step.section) : 1)))
  const progress: RingProgress = {
    input,
    ...size,
    sectors: Array.from({ length: count }, (_, index) => ({ fromRad: (2 * Math.PI * index) / count, angleRad: (2 * Math.PI) / count, innerMm: 0, outerMm: 0 })),
    ring: { passes: [], sectors: [], tapes: [] },
    placements: [],
    findings: [],
    laidTurns: new Map(),
    copperAreaMm2: 0,
    squaresAreaMm2: 0,
  }
  input.sequence.forEach((step, index) => {
    if (step.kind === 'winding') layOnRing(progress, step, index)
    else if (step.kind === 'tape' || step.kind === 'core-tape') tapeRing(progress, step, index)
    else if (step.kind === 'shield' || step.kind === 'margin') progress.findings.push(finding('step-not-for-a-ring', 'warning', `sequence.${index}`, { step: index + 1 }))
  })
  return ringCoil(progress)
}

/** Over the coating where it is known, else the bare core. */
function ringSize({ dimensionsMm: { a, b, c }, coatedMm }: CoreRow): Pick<RingProgress, 'holeRadiusMm' | 'outsideRadiusMm' | 'heightMm'> | null {
  const size = coatedMm ? { outside: coatedMm.outside, inside: coatedMm.inside, height: coatedMm.height } : { outside: a ?? 0, inside: b ?? 0, height: c ?? 0 }
  if (!(size.inside > 0 && size.outside > size.inside && size.height > 0)) return null
  return { holeRadiusMm: size.inside / 2, outsideRadiusMm: size.outside / 2, heightMm: size.height }
}

function layOnRing(progress: RingProgress, step: WindingStep, index: number): void {
  const winding = progress.input.windings.find(({ id }) => id === step.windingId)
  const sector = progress.sectors[step.section - 1]
  if (!winding) {
    progress.findings.push(finding('sequence-names-unknown-winding', 'error', `sequence.${index}.windingId`, { step: index + 1, winding: step.windingId }))
    return
  }
  if (!sector) {
    progress.findings.push(finding('section-not-on-former', 'error', `sequence.${index}.section`, { step: index + 1, section: step.section, sections: progress.sectors.length }))
    return
  }
  const wire = progress.input.wireOf(winding)
  if (!wire || !(step.turns > 0)) return
  if (wire.form === 'foil') {
    progress.findings.push(finding('step-not-for-a-ring', 'warning', `sequence.${index}`, { step: index + 1 }))
    return
  }
  windOnRing(progress, { step, index, winding, sector, wire })
}

interface RingLay {
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

function windOnRing(progress: RingProgress, lay: RingLay): void {
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

function tapeRing(progress: RingProgress, step: Extract<SequenceStep, { kind: 'tape' | 'core-tape' }>, index: number): void {
  const tape = progress.input.tapeOf(step.tape)
  if (!tape) {
    progress.findings.push(finding('tape-not-in-library', 'error', `sequence.${index}.tape`, { step: index + 1 }))
    return
  }
  const thicknessMm = Math.max(0, Math.floor(step.layers)) * tape.thicknessMm
  const inner = Math.max(...progress.sectors.map(({ innerMm }) => innerMm))
  const outer = Math.max(...progress.sectors.map(({ outerMm }) => outerMm))
  progress.ring.tapes.push({ stepId: step.id, holeMm: 2 * (progress.holeRadiusMm - inner - thicknessMm), outsideMm: 2 * (progress.outsideRadiusMm + outer + thicknessMm), thicknessMm })
  for (const sector of progress.sectors) {
    sector.innerMm = inner + thicknessMm
    sector.outerMm = outer + thicknessMm
  }
}

// ---------------------------------------------------------------------------------------------

function ringCoil(progress: RingProgress): Coil {
  const { holeRadiusMm, outsideRadiusMm, heightMm, sectors, ring, input } = progress
  const buildMm = Math.max(...sectors.map(({ innerMm }) => innerMm))
  const outerMm = Math.max(...sectors.map(({ outerMm: thickness }) => thickness))
  const holeMm2 = Math.PI * holeRadiusMm ** 2
  return {
    sectionLeftsMm: sectors.map(({ fromRad }) => fromRad * holeRadiusMm),
    layout: {
      form: 'ring',
      ring: {
        ...ring,
        outsideMm: 2 * outsideRadiusMm,
        holeMm: 2 * holeRadiusMm,
        heightMm,
        remainingHoleMm: Math.max(0, 2 * (holeRadiusMm - buildMm)),
        overallOutsideMm: 2 * (outsideRadiusMm + outerMm),
        overallHeightMm: heightMm + 2 * buildMm,
        sectorGapMm: sectorGapMm(progress),
      },
      windowWidthMm: 2 * Math.PI * holeRadiusMm,
      windowHeightMm: holeRadiusMm,
      items: [],
      buildMm,
      buildRatio: buildMm / holeRadiusMm,
      copperFill: progress.copperAreaMm2 / holeMm2,
      windowFill: progress.squaresAreaMm2 / holeMm2,
    },
    placements: progress.placements,
    tapes: [],
    margins: [],
    shields: [],
    windings: new Map(input.windings.flatMap(({ id }) => windingBuild(id, progress.placements))),
    plainBuildMm: buildMm,
    bulge: 1,
    findings: progress.findings,
  }
}

/** From the end of each wound sector to the beginning of the next in another section, along the hole. */
function sectorGapMm({ ring, holeRadiusMm, sectors }: RingProgress): number | null {
  if (sectors.length < 2) return null
  const wound = sectors.flatMap((_, index) => {
    const own = ring.sectors.filter(({ section }) => section === index + 1)
    return own.length > 0 ? [{ fromRad: Math.min(...own.map(({ fromRad }) => fromRad)), toRad: Math.max(...own.map(({ toRad }) => toRad)) }] : []
  })
  if (wound.length < 2) return null
  const gaps = wound.map(({ toRad }, index) => (index + 1 < wound.length ? wound[index + 1]!.fromRad : wound[0]!.fromRad + 2 * Math.PI) - toRad)
  return Math.min(...gaps) * holeRadiusMm
}
