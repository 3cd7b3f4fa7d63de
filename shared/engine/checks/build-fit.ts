import { isInsulatedWire } from '../evaluate/insulation-paths'
import { overallDiameterMm } from '../evaluate/lookup'
import { systemMembers } from '../evaluate/thermal-members'
import type { WireRow } from '../library'
import type { Winding, WindingStep } from '../specification'
import { atLeast, atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

interface Wired {
  winding: Winding
  row: WireRow
  path: string
}

/** Windings but shields, each with its wire's row; those without a row are asked about elsewhere. */
export function wired({ document, context }: CheckInput): Wired[] {
  return document.specification.windings.flatMap((winding, index) => {
    const row = context.index.find('wire', winding.wire.wire)
    return winding.role === 'shield' || !row ? [] : [{ winding, row, path: `windings.${index}.wire` }]
  })
}

/** Diameters that machines wind without care, mm. Source: common practice. */
const MACHINE_RANGE_MM = { least: 0.05, greatest: 1 } as const

const wireRange = (input: CheckInput): Outcome[] =>
  wired(input).filter(({ row }) => row.form === 'round').map(({ winding, row, path }) => {
    const values = { winding: winding.name }
    return row.conductorMm < MACHINE_RANGE_MM.least
      ? atLeast({ value: row.conductorMm, limit: MACHINE_RANGE_MM.least, unit: 'mm', path, values })
      : atMost({ value: row.conductorMm, limit: MACHINE_RANGE_MM.greatest, unit: 'mm', path, values })
  })

/** Sizes of two systems on one drawing invite the wrong reel. */
function oneWireSystem(input: CheckInput): Outcome[] {
  const standards = new Set(wired(input).filter(({ row }) => row.form === 'round').map(({ row }) => row.standard))
  return standards.size === 0 ? [] : [yesNo(standards.size === 1, 'windings', { missing: standards.size > 1 ? [...standards].join(', ') : '' })]
}

/** Kinds of wire that one part should do with. Source: common practice, cost. */
const WIRE_KINDS = 4

const wireKinds = (input: CheckInput): Outcome[] => {
  const kinds = new Set(wired(input).map(({ winding, row }) => `${row.id} ${winding.wire.insulation}`))
  return [atMost({ value: kinds.size, limit: WIRE_KINDS, unit: '', path: 'windings' })]
}

/** Foil keeps clear of the flanges by 0.2 mm at least, and leaves no more than 0.5 mm of breadth unused. */
function foilWidth(input: CheckInput): Outcome[] {
  const { sequence } = input.document.specification
  return sequence.flatMap((step, index) => {
    const foil = step.kind === 'winding' ? wired(input).find(({ winding, row }) => winding.id === step.windingId && row.form === 'foil') : undefined
    const breadthMm = input.context.former?.windingWidthMm
    if (step.kind !== 'winding' || !foil || breadthMm === undefined) return []
    const spareMm = breadthMm - step.marginLeftMm - step.marginRightMm - (foil.row.widthMm ?? 0)
    const values = { winding: foil.winding.name }
    return [spareMm < 0.2 ? atLeast({ value: spareMm, limit: 0.2, unit: 'mm', path: `sequence.${index}`, values }) : atMost({ value: spareMm, limit: 0.5, unit: 'mm', path: `sequence.${index}`, values })]
  })
}

/** Litz is thicker than its strands side by side: 1.155·√n of them at the least. */
const litzDiameter = (input: CheckInput): Outcome[] =>
  wired(input).filter(({ row }) => row.form === 'litz').map(({ winding, row, path }) =>
    atLeast({ value: overallDiameterMm(row, winding.wire.insulation), limit: 1.155 * Math.sqrt(row.strands) * row.conductorMm, unit: 'mm', path, values: { winding: winding.name } }))

/** Times its own diameter round which a wire is bent. Source: common practice. */
const bendFactor = ({ winding, row }: Wired) => (row.form === 'litz' || isInsulatedWire(winding) ? 2 : 1)

function bendRadius(input: CheckInput): Outcome[] {
  const tube = input.context.former?.tube
  if (!tube) return []
  const radiusMm = tube.shape === 'round' ? tube.diameterMm / 2 : tube.cornerRadiusMm
  return wired(input).filter(({ row }) => row.form !== 'foil').map((one) =>
    atLeast({ value: radiusMm, limit: bendFactor(one) * one.row.conductorMm, unit: 'mm', path: one.path, values: { winding: one.winding.name } }))
}

/** A film that parts windings reaches from flange to flange: no wider, and no more than 0.3 mm narrower. */
function tapeWidth(input: CheckInput): Outcome[] {
  const breadthMm = input.context.former?.windingWidthMm
  if (breadthMm === undefined) return []
  return input.document.specification.sequence.flatMap((step, index) => {
    if (step.kind !== 'tape' || step.widthMm === null) return []
    const path = `sequence.${index}.widthMm`
    return [step.widthMm > breadthMm ? atMost({ value: step.widthMm, limit: breadthMm, unit: 'mm', path }) : atLeast({ value: step.widthMm, limit: breadthMm - 0.3, unit: 'mm', path })]
  })
}

interface Lead {
  winding: Winding
  outsideMm: number | null
  path: string
}

/** What leaves the coil at each end of each step: the sleeve where there is one, else the wire. */
function leads(input: CheckInput): Lead[] {
  const { sequence } = input.document.specification
  return sequence.flatMap((step, index) => {
    const one = step.kind === 'winding' ? wired(input).find(({ winding }) => winding.id === step.windingId) : undefined
    if (step.kind !== 'winding' || !one || one.row.form === 'foil') return []
    return (['startSleeve', 'finishSleeve'] as const).map((end) => ({ winding: one.winding, outsideMm: leadOutsideMm(input, step, end, one), path: `sequence.${index}.${end}` }))
  })
}

function leadOutsideMm({ context }: CheckInput, step: WindingStep, end: 'startSleeve' | 'finishSleeve', { winding, row }: Wired): number | null {
  const sleeve = context.index.find('sleeve', step[end]?.sleeve ?? null)
  if (sleeve) return sleeve.boreMm + 2 * sleeve.wallMm
  const wireMm = overallDiameterMm(row, winding.wire.insulation)
  return wireMm === null ? null : wireMm * winding.wire.parallel
}

/** Leads pass the slot of the former's flange; parallel wires side by side. How deep the slot is the library does not hold. */
function leadSlots(input: CheckInput): Outcome[] {
  const slotMm = input.document.specification.former.leadSlotWidthMm.value
  const all = leads(input)
  if (all.length === 0) return []
  if (slotMm === null) return [notCheckable('former.leadSlotWidthMm', { missing: 'slot width' })]
  return all.map(({ winding, outsideMm, path }) => atMost({ value: outsideMm, limit: slotMm, unit: 'mm', path, values: { winding: winding.name } }))
}

/** Room that core halves need to close over the coil, mm. Source: common practice. */
const CLOSING_ROOM_MM = 0.3

/** From the tube to the outer leg, less the coil and the thickest lead that returns over it. */
function coreCloses(input: CheckInput): Outcome[] {
  const { core, former } = input.context
  const path = 'sequence'
  if (core?.shape === 'toroid') return []
  if (!core || !former || !input.coil) return [notCheckable(path)]
  const legMm = core.dimensionsMm.e
  const tubeMm = former.tube.shape === 'round' ? former.tube.diameterMm : former.tube.widthMm
  const roomMm = legMm === null ? former.windingHeightMm : (legMm - tubeMm) / 2
  const returning = leads(input).filter(({ path: place }) => place.endsWith('finishSleeve') && returnsOver(input, Number(place.split('.')[1])))
  const bumpMm = Math.max(0, ...returning.map(({ outsideMm }) => outsideMm ?? 0))
  return [atMost({ value: input.coil.layout.buildMm + bumpMm, limit: roomMm - (legMm === null ? 0 : CLOSING_ROOM_MM), unit: 'mm', path, values: { buildMm: input.coil.layout.buildMm, leadMm: bumpMm } })]
}

/** The outermost winding's lead lies on the coil where an odd number of layers brings it back to the end where it began. */
function returnsOver({ coil, document }: CheckInput, index: number): boolean {
  const placement = coil?.placements.find((one) => one.index === index)
  const step = document.specification.sequence[index]
  if (!placement || step?.kind !== 'winding') return false
  const outermost = !coil!.placements.some((other) => other.section === placement.section && other.index > index)
  return outermost && placement.turnsPerLayer.length % 2 === 1 && step.leadExitFinish === step.leadExitStart
}

/** An auxiliary winding of few turns follows the others best over the whole breadth. */
function auxiliarySpread(input: CheckInput): Outcome[] {
  const { windings, sequence } = input.document.specification
  return (input.coil?.placements ?? []).flatMap(({ windingId, turns, mostTurnsPerLayer, index }) => {
    const winding = windings.find(({ id }) => id === windingId)
    const step = sequence[index]
    if (winding?.role !== 'auxiliary' || step?.kind !== 'winding' || turns >= 0.7 * mostTurnsPerLayer) return []
    return [yesNo(step.lay === 'spread', `sequence.${index}.lay`, { winding: winding.name })]
  })
}

/** Fine wire is drawn thinner while it is wound: its resistance limit leaves 3 % for that. */
const fineWire = (input: CheckInput): Outcome[] =>
  wired(input).filter(({ row }) => row.form === 'round' && row.conductorMm < 0.1).map(({ winding, path }) =>
    atLeast({ value: winding.dcResistance ? winding.dcResistance.maximumOhm / winding.dcResistance.nominalOhm : null, limit: 1.03, unit: '1', path: path.replace('.wire', '.dcResistance'), values: { winding: winding.name } }))

/** What is baked with the coil bears the bake, and the drawing says that resin and materials go together. */
function varnish(input: CheckInput): Outcome[] {
  const { impregnation } = input.document.specification
  if (impregnation.process.value === null || impregnation.process.value === 'none') return []
  const members = systemMembers(input.context)
  const weakest = members.reduce<(typeof members)[0] | null>((least, member) => (least && least.classC <= member.classC ? least : member), null)
  const named = [impregnation.resin.value, impregnation.compatibility.value].every((text) => (text ?? '').trim() !== '')
  const bake = impregnation.bake.value
  return [
    yesNo(named, 'impregnation.compatibility', { missing: named ? '' : 'resin and what it is compatible with' }),
    atMost({ value: bake?.temperatureC ?? null, limit: weakest?.classC ?? null, unit: '°C', path: 'impregnation.bake', values: { weakest: weakest?.name ?? '' } }),
  ]
}

const isFilled = (text: string | null) => text !== null && text.trim() !== '' && !/^none\b/i.test(text.trim())

/** Something holds the halves together, and adhesive has its place off the ground faces. */
function coreHeld({ document }: CheckInput): Outcome[] {
  const { assembly } = document.specification.core
  const glued = isFilled(assembly.adhesive.value)
  const held = glued || isFilled(assembly.clip.value) || (assembly.tapeLayers.value ?? 0) > 0
  return [yesNo(held, 'core.assembly.adhesive', { missing: held ? '' : 'adhesive, clip or tape' }), ...(glued ? [yesNo(isFilled(assembly.adhesivePosition.value), 'core.assembly.adhesivePosition')] : [])]
}

/** Mass that soldered pins alone hold, g. Source: common practice. */
const PINS_HOLD_G = 25

function mass({ document, evaluation }: CheckInput): Outcome[] {
  const { fixing, massG } = document.specification.former
  const value = evaluation.mass.totalG ?? massG.value
  const strapped = isFilled(fixing.value) && !/^soldered pins$/i.test(fixing.value!.trim())
  return strapped ? [{ ...yesNo(true, 'former.fixing'), value, unit: 'g' }] : [atMost({ value, limit: PINS_HOLD_G, unit: 'g', path: 'former.fixing' })]
}

/** A gap hums at bursts of 5 to 20 kHz unless the halves are glued or the part is varnished. */
function noise({ document, evaluation }: CheckInput): Outcome[] {
  const { core, impregnation } = document.specification
  if (!(evaluation.magnetics.gapMm !== null && evaluation.magnetics.gapMm > 0)) return []
  const still = isFilled(core.assembly.adhesive.value) || (impregnation.process.value !== null && impregnation.process.value !== 'none')
  return [yesNo(still, 'core.assembly.adhesive')]
}

export const BUILD_CHECKS: Readonly<Record<string, Check>> = {
  W09: { severity: 'M', source: 'range of winding machines: common practice', run: wireRange },
  W10: { severity: 'N', source: 'IEC 60317-0-1', run: oneWireSystem },
  W11: { severity: 'N', source: 'cost of set-up: common practice', run: wireKinds },
  W12: { severity: 'M', source: 'foil between margins: common practice', run: foilWidth },
  W13: { severity: 'M', source: 'packing of round strands, 1.155·√n: handbooks', run: litzDiameter },
  W14: { severity: 'N', source: 'bending of winding wire: common practice', run: bendRadius },
  W15: { severity: 'M', source: 'width of the former, 0/−0.3 mm: common practice', run: tapeWidth },
  W17: { severity: 'S', source: 'slot of the former: geometry', run: leadSlots },
  W18: { severity: 'S', source: 'window of the core, 0.3 mm of room: common practice', run: coreCloses },
  W21: { severity: 'N', source: 'coupling: common practice', run: auxiliarySpread },
  W22: { severity: 'N', source: 'winding tension, 3 % of resistance: IEC 60851; common practice', run: fineWire },
  W23: { severity: 'M', source: 'thermal class of the members; solvents and enamel: common practice', run: varnish },
  W24: { severity: 'M', source: 'common practice', run: coreHeld },
  W26: { severity: 'N', source: '25 g on pins alone: common practice', run: mass },
  W27: { severity: 'N', source: 'audible noise of a gap: common practice', run: noise },
}
