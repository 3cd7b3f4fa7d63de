import type { CoreRow } from '../library'
import type { SequenceStep, WindingStep } from '../specification'
import { finding } from './progress'
import { windOnRing } from './ring-winding'
import type { RingInput, RingProgress } from './ring-winding'
import { windingBuild } from './summary'
import type { Coil } from './types'

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
  if (step.withPrevious) progress.findings.push(finding('step-not-for-a-ring', 'warning', `sequence.${index}.withPrevious`, { step: index + 1 }))
  const wire = progress.input.wireOf(winding)
  if (!wire || !(step.turns > 0)) return
  if (wire.form === 'foil') {
    progress.findings.push(finding('step-not-for-a-ring', 'warning', `sequence.${index}`, { step: index + 1 }))
    return
  }
  windOnRing(progress, { step, index, winding, sector, wire })
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
