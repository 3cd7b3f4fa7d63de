import type { Coil, LayerPlacement, StepPlacement } from '../build'
import { tubeClearanceMm } from '../build'
import { CORE_BODY } from '../parasitics/electrodes'
import type { Dielectric, Electrode, Flank, WireElectrode } from '../parasitics/electrodes'
import { permittivityOf, wirePermittivity } from '../parasitics/permittivity'
import type { CoreRow, WireRow } from '../library'
import type { LibraryReference, WireInsulation } from '../specification'
import type { Context } from './context'
import { buildWire } from './lookup'

/** Everything of one coil that the capacitances are made of. */
export interface CoilElectrodes {
  electrodes: Electrode[]
  flanks: Flank[]
  dielectrics: Dielectric[]
}

/**
 * The laid coil as electrodes and insulation, from the centre leg to the outer legs. The core counts as one conductor
 * (manganese-zinc ferrite conducts well enough at these frequencies); its backs over the ends of the layers are left out.
 */
export function coilElectrodes(context: Context, coil: Coil): CoilElectrodes {
  const sections = coil.placements.map((placement) => ({ section: placement.section, layers: layerElectrodes(context, coil, placement) }))
  const electrodes = [...sections.flatMap(({ layers }) => layers), ...shieldElectrodes(coil)]
  return { electrodes: [...electrodes, ...coreElectrodes(context, coil)], flanks: flanksOf(context, coil, sections), dielectrics: dielectricsOf(context, coil) }
}

/** Ends of layers on both sides of a wall between sections. */
function flanksOf({ former }: Context, coil: Coil, sections: readonly { section: number; layers: readonly Electrode[] }[]): Flank[] {
  if (!former || coil.sectionLeftsMm.length < 2) return []
  const wallPermittivity = permittivityOf(former.material).value
  const wires = (section: number) => sections.filter((one) => one.section === section).flatMap(({ layers }) => layers.filter((layer): layer is WireElectrode => layer.kind === 'wire'))
  return coil.sectionLeftsMm.slice(1).flatMap((_, index) =>
    wires(index + 1).flatMap((left) =>
      wires(index + 2).flatMap((right): Flank[] => {
        const commonMm = Math.min(left.topMm, right.topMm) - Math.max(left.bottomMm, right.bottomMm)
        if (!(commonMm > 1e-6)) return []
        const airMm = Math.max(0, right.leftMm - left.rightMm - former.flangeThicknessMm)
        return [{ left, right, commonMm, wallMm: former.flangeThicknessMm, wallPermittivity, airMm }]
      }),
    ),
  )
}

function layerElectrodes(context: Context, coil: Coil, placement: StepPlacement): Electrode[] {
  const winding = context.specification.windings.find(({ id }) => id === placement.windingId)
  const wire = winding && buildWire(context.index, winding)
  const row = winding && context.index.find('wire', winding.wire.wire)
  if (!winding || !wire || !row) return []
  const parallel = Math.max(1, Math.floor(winding.wire.parallel))
  const sectionMm = coil.sectionLeftsMm[placement.section - 1] ?? 0
  const conductorMm = wire.overallMm - insulationMm(context, { row, insulation: winding.wire.insulation, overallMm: wire.overallMm })
  return placement.layers.map((layer): Electrode => {
    const shared = {
      body: winding.id,
      bottomMm: layer.bottomMm,
      topMm: layer.topMm,
      leftMm: sectionMm + layer.leftMm,
      rightMm: sectionMm + layer.rightMm,
      turnLengthMm: layer.turnLengthMm,
    }
    if (wire.form === 'foil') {
      const turns = layer.turnsBefore + 0.5
      return { ...shared, kind: 'plane', turnsAtLeft: turns, turnsAtRight: turns, cover: 1 }
    }
    return {
      ...shared,
      ...turnsAcross(layer),
      kind: 'wire',
      conductorMm,
      overallMm: wire.overallMm,
      pitchMm: wirePitchMm(layer, parallel),
      turns: layer.turns,
      turnPitchMm: layer.pitchMm,
      parallel,
      permittivity: wirePermittivity(winding.wire.insulation).value,
    }
  })
}

const turnsAcross = ({ turns, turnsBefore, rightward }: LayerPlacement) =>
  rightward ? { turnsAtLeft: turnsBefore, turnsAtRight: turnsBefore + turns } : { turnsAtLeft: turnsBefore + turns, turnsAtRight: turnsBefore }

/** All wires spread evenly over the width that the layer takes. */
const wirePitchMm = ({ turns, leftMm, rightMm }: LayerPlacement, parallel: number) => (rightMm - leftMm) / (turns * parallel)

/** Insulation on both sides of a wire, mm; of litz that of one strand, by the round wire of its diameter. */
function insulationMm({ index }: Context, { row, insulation, overallMm }: { row: WireRow; insulation: WireInsulation; overallMm: number }): number {
  if (row.form !== 'litz') return Math.min(overallMm * 0.99, overallMm - row.conductorMm)
  const strand = index.library.wires.find(({ form, conductorMm, overallMm: overall }) => form === 'round' && Math.abs(conductorMm - row.conductorMm) < 1e-3 && overall[insulation] !== null)
  const strandOverallMm = strand?.overallMm[insulation] ?? 1.15 * row.conductorMm
  return Math.min(overallMm * 0.5, strandOverallMm - row.conductorMm)
}

const shieldElectrodes = (coil: Coil): Electrode[] =>
  coil.shields.map((shield) => ({
    kind: 'plane',
    body: shield.windingId,
    bottomMm: shield.bottomMm,
    topMm: shield.topMm,
    leftMm: (coil.sectionLeftsMm[shield.section - 1] ?? 0) + shield.leftMm,
    rightMm: (coil.sectionLeftsMm[shield.section - 1] ?? 0) + shield.rightMm,
    turnsAtLeft: 0.5,
    turnsAtRight: 0.5,
    turnLengthMm: shield.turnLengthMm,
    cover: 1,
  }))

/** The centre leg below the tube and the outer legs over the coil. */
function coreElectrodes(context: Context, coil: Coil): Electrode[] {
  return coil.layout.ring ? ringElectrodes(context, coil) : legElectrodes(context, coil)
}

/** The ring under its coating, all along the inner circumference. */
function ringElectrodes({ core }: Context, coil: Coil): Electrode[] {
  const lengths = coil.placements.flatMap(({ turnLengthsMm }) => turnLengthsMm)
  if (lengths.length === 0) return []
  const topMm = -coatingMm(core)
  return [{ kind: 'plane', body: CORE_BODY, bottomMm: topMm - 1, topMm, leftMm: 0, rightMm: coil.layout.windowWidthMm, turnsAtLeft: 0, turnsAtRight: 0, turnLengthMm: Math.min(...lengths), cover: 1 }]
}

const coatingMm = (core: CoreRow | null) => (core?.coatedMm && core.dimensionsMm.b !== null ? Math.max(0, (core.dimensionsMm.b - core.coatedMm.inside) / 2) : 0)

function legElectrodes({ core, former }: Context, coil: Coil): Electrode[] {
  const { c, d, e, f } = core?.dimensionsMm ?? { c: null, d: null, e: null, f: null }
  if (!core?.centreLeg || !former || d === null || e === null || f === null) return []
  const middleMm = coil.layout.windowWidthMm / 2
  const legMm = -(former.tubeWallMm + tubeClearanceMm(former, core.centreLeg))
  const outerMm = legMm + (e - f) / 2
  const shared = { kind: 'plane' as const, body: CORE_BODY, leftMm: Math.min(0, middleMm - d), rightMm: Math.max(coil.layout.windowWidthMm, middleMm + d), turnsAtLeft: 0, turnsAtRight: 0 }
  const lengths = coil.placements.flatMap(({ turnLengthsMm }) => turnLengthsMm)
  const [inner, outer] = [Math.min(...lengths, Infinity), Math.max(...lengths, 0)]
  if (!(outer > 0) || outerMm <= coil.plainBuildMm) return [{ ...shared, bottomMm: legMm - 1, topMm: legMm, turnLengthMm: inner, cover: 1 }]
  return [
    { ...shared, bottomMm: legMm - 1, topMm: legMm, turnLengthMm: inner, cover: 1 },
    { ...shared, bottomMm: outerMm, topMm: outerMm + 1, turnLengthMm: outer, cover: Math.min(1, (2 * (c ?? f)) / outer) },
  ]
}

// ---------------------------------------------------------------------------------------------

function dielectricsOf(context: Context, coil: Coil): Dielectric[] {
  const { former } = context
  const everywhere = { leftMm: -Infinity, rightMm: Infinity }
  const wall: Dielectric = former
    ? { ...everywhere, bottomMm: -former.tubeWallMm, topMm: 0, permittivity: permittivityOf(former.material).value }
    : { ...everywhere, bottomMm: -coatingMm(context.core), topMm: 0, permittivity: permittivityOf('epoxy').value }
  const materials = new Map<string, number>()
  const permittivity = (stepId: string): number => {
    const known = materials.get(stepId)
    if (known !== undefined) return known
    const value = permittivityOf(tapeMaterial(context, stepId)).value
    materials.set(stepId, value)
    return value
  }
  const ring = coil.layout.ring
  const ringTapes = (ring?.tapes ?? []).map((tape): Dielectric => {
    const topMm = (ring!.holeMm - tape.holeMm) / 2
    return { ...everywhere, bottomMm: topMm - tape.thicknessMm, topMm, permittivity: permittivity(tape.stepId) }
  })
  return [
    wall,
    ...ringTapes,
    ...coil.layout.items.flatMap((item): Dielectric[] => {
      if (item.kind !== 'tape' && item.kind !== 'margin') return []
      const heightMm = item.kind === 'tape' ? item.thicknessMm : item.heightMm
      return [{ bottomMm: item.yMm, topMm: item.yMm + heightMm, leftMm: item.xMm, rightMm: item.xMm + item.widthMm, permittivity: permittivity(item.stepId) }]
    }),
  ]
}

function tapeMaterial({ specification, index }: Context, stepId: string): string {
  const step = specification.sequence.find(({ id }) => id === stepId)
  const reference: LibraryReference | null = step?.kind === 'tape' || step?.kind === 'core-tape' || step?.kind === 'margin' ? step.tape : step?.kind === 'winding' ? step.interlayerTape : null
  return index.find('tape', reference)?.material ?? ''
}
