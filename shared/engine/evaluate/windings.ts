import { COPPER_DENSITY_KG_PER_M3 } from '../constants'
import type { Coil, StepPlacement } from '../build'
import type { WindingResult } from '../evaluation'
import type { FormerRow, WireRow } from '../library'
import { dowellFactor, heightInSkinDepths, roundWireLayer, litzLayers } from '../losses/dowell'
import type { EquivalentLayer } from '../losses/dowell'
import { windingLoss } from '../losses/winding-loss'
import type { Winding } from '../specification'
import { resistanceFactor } from '../wires/resistance'
import { skinDepthMm } from '../wires/skin-depth'
import { attempt, explain, positive } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'

/**
 * Harmonics that the ac loss is summed over; the rest is charged with the last one's factor. Ideal edges would have no
 * end of them: commutation through the leakage inductance takes a few percent of the period, which the fifteenth covers.
 */
const HARMONICS = 15

/** What a winding is made of, before any current. */
export interface WindingCopper {
  winding: Winding
  index: number
  wire: WireRow
  copperAreaMm2: number
  wireLengthM: number
  /** Both free ends together. */
  leadsMm: number
  meanTurnLengthMm: number
  resistance20Ohm: number
  massG: number
  layer: EquivalentLayer | null
  /** Layers from no field to the full field, for the one-dimensional model. */
  fieldLayers: number
}

/**
 * Length of both leads from the winding to the terminals, mm: half the winding width on the way to the flange, the
 * flange, the standoff and two wraps round the pin, at each end. Source: geometry of a former with pins; common practice.
 */
export function leadLengthMm(former: FormerRow): number {
  const wraps = former.pinSection.shape === 'round' ? 2 * Math.PI * former.pinSection.sizeMm : 8 * former.pinSection.sizeMm
  return 2 * (former.windingWidthMm / 2 + former.flangeThicknessMm + former.standoffMm + wraps)
}

/** Free ends of a winding on a ring, each. Source: common practice. */
const RING_LEAD_MM = 20

const leadsMm = ({ former }: Pick<Context, 'former'>, coil: Coil | null): number => (former ? leadLengthMm(former) : coil?.layout.ring ? 2 * RING_LEAD_MM : 0)

/** Copper of every winding that is laid and whose wire is known. */
export function windingCoppers(context: Context, coil: Coil | null): WindingCopper[] {
  const { specification } = context
  if (!coil) return []
  return specification.windings.flatMap((winding, index) => {
    const build = coil.windings.get(winding.id)
    const wire = context.index.find('wire', winding.wire.wire)
    if (!build || !wire || !positive(build.turnsLengthM)) return []
    const placements = coil.placements.filter(({ windingId }) => windingId === winding.id)
    const parallel = Math.max(1, winding.wire.parallel)
    const areaMm2 = wire.form === 'foil' && wire.widthMm === null ? wire.conductorMm * (placements[0]!.rightMm - placements[0]!.leftMm) : wire.copperAreaMm2
    const wireLengthM = build.turnsLengthM + leadsMm(context, coil) / 1000
    const copper: WindingCopper = {
      winding,
      index,
      wire,
      copperAreaMm2: areaMm2 * parallel,
      wireLengthM,
      leadsMm: leadsMm(context, coil),
      meanTurnLengthMm: build.meanTurnLengthMm,
      resistance20Ohm: (wire.resistance20.nominalOhmPerM * wireLengthM) / parallel,
      massG: areaMm2 * 1e-6 * parallel * wireLengthM * COPPER_DENSITY_KG_PER_M3 * 1000,
      ...fieldLayers(context, { winding, wire, placements, index }, coil),
    }
    return [copper]
  })
}

interface LaidWinding {
  winding: Winding
  wire: WireRow
  placements: readonly StepPlacement[]
  index: number
}

function fieldLayers(context: Context, { winding, wire, placements, index }: LaidWinding, coil: Coil): { layer: EquivalentLayer | null; fieldLayers: number } {
  // The part with the most layers stands for the winding: its inner layers lose most.
  const part = placements.reduce((most, placement) => (placement.turnsPerLayer.length > most.turnsPerLayer.length ? placement : most))
  const breadthMm = Math.max(part.availableMm, part.rightMm - part.leftMm)
  const sandwiched = betweenOthers(context, winding, part, coil)
  const layers = Math.max(0.5, part.turnsPerLayer.length / (sandwiched ? 2 : 1))
  const parallel = Math.max(1, winding.wire.parallel)
  const wiresPerLayer = Math.max(...part.turnsPerLayer) * parallel
  const answer = attempt(context, `windings.${index}.wire`, () => {
    if (wire.form === 'foil') return { layer: { heightMm: wire.conductorMm, porosity: Math.min(1, (part.rightMm - part.leftMm) / breadthMm) }, fieldLayers: layers }
    if (wire.form === 'litz') {
      const litz = litzLayers({ strandCount: wire.strands, strandDiameterMm: wire.conductorMm, wiresPerLayer, breadthMm, layers })
      return { layer: litz.layer, fieldLayers: litz.layers }
    }
    return { layer: roundWireLayer({ conductorDiameterMm: wire.conductorMm, wiresPerLayer, breadthMm }), fieldLayers: layers }
  })
  return answer ?? { layer: null, fieldLayers: layers }
}

/** Whether windings of the other kind (primary against the rest) lie on both sides of this part. */
function betweenOthers({ specification }: Context, winding: Winding, part: StepPlacement, coil: Coil): boolean {
  const isPrimary = winding.role === 'primary'
  const others = coil.placements.filter(({ windingId }) => {
    const other = specification.windings.find(({ id }) => id === windingId)
    return other && other.role !== 'shield' && (other.role === 'primary') !== isPrimary && other.id !== winding.id
  })
  return others.some(({ index }) => index < part.index) && others.some(({ index }) => index > part.index)
}

// ---------------------------------------------------------------------------------------------

export interface CopperLoss {
  lossW: number
  acFactor: number | null
}

/** Copper loss of one winding in one corner at a temperature; null where neither waveform nor stated current is known. */
export function copperLoss(context: Context, copper: WindingCopper, corner: CornerState | null, temperatureC: number): CopperLoss | null {
  const wave = corner?.waves.get(copper.winding.id)
  const resistanceOhm = copper.resistance20Ohm * resistanceFactor(temperatureC)
  if (wave && copper.layer) {
    const loss = windingLoss({ currentA: wave.currentA, dcResistanceOhm: resistanceOhm, layer: copper.layer, layers: copper.fieldLayers, temperatureC, harmonicsCount: HARMONICS })
    return { lossW: loss.totalLossW, acFactor: loss.acResistanceFactor }
  }
  if (corner) return { lossW: 0, acFactor: null }
  return statedLoss(context, copper, { resistanceOhm, temperatureC })
}

/** Without waveforms: all alternating current at the fundamental. Source: L. Dixon, SLUP127. */
function statedLoss(context: Context, { winding, layer, fieldLayers: layers }: WindingCopper, { resistanceOhm, temperatureC }: { resistanceOhm: number; temperatureC: number }): CopperLoss | null {
  const { rmsCurrentA, dcCurrentA } = winding
  if (rmsCurrentA === null) return null
  const dcSquare = Math.min(rmsCurrentA ** 2, (dcCurrentA ?? 0) ** 2)
  const frequencyHz = context.specification.electrical.switchingFrequencyHz.value?.minimum
  if (!layer || !positive(frequencyHz)) return { lossW: resistanceOhm * rmsCurrentA ** 2, acFactor: null }
  const acFactor = dowellFactor({ heightInSkinDepths: heightInSkinDepths(layer, skinDepthMm({ frequencyHz, temperatureC })), layers })
  return { lossW: resistanceOhm * (dcSquare + acFactor * (rmsCurrentA ** 2 - dcSquare)), acFactor }
}

export interface WindingResultInput {
  coppers: readonly WindingCopper[]
  coil: Coil | null
  corners: readonly CornerState[]
  /** The corner whose losses heat the part. */
  hottest: CornerState | null
  hotC: number | null
}

/** Each winding as the person sees it; currents are the largest over the full-load corners. */
export function windingResults(context: Context, input: WindingResultInput): WindingResult[] {
  return context.specification.windings.map((winding, index) => {
    const copper = input.coppers.find((one) => one.winding.id === winding.id) ?? null
    const build = input.coil?.windings.get(winding.id)
    const currents = largestCurrents(winding, input.corners)
    const hotC = input.hotC ?? 100
    const loss = copper && attempt(context, `windings.${index}`, () => copperLoss(context, copper, input.hottest, hotC))
    const result: WindingResult = {
      windingId: winding.id,
      copperAreaMm2: copper?.copperAreaMm2 ?? 0,
      wireLengthM: copper?.wireLengthM ?? null,
      meanTurnLengthMm: build?.meanTurnLengthMm ?? null,
      dcResistance20Ohm: copper?.resistance20Ohm ?? null,
      dcResistanceHotOhm: copper ? copper.resistance20Ohm * resistanceFactor(hotC) : null,
      acFactor: loss?.acFactor ?? null,
      ...currents,
      currentDensityAPerMm2: copper && currents.rmsA !== null && copper.copperAreaMm2 > 0 ? currents.rmsA / copper.copperAreaMm2 : null,
      layers: build?.layers ?? 0,
      turnsPerLayer: build?.turnsPerLayer ?? [],
      copperLossW: loss?.lossW ?? null,
      copperMassG: copper?.massG ?? null,
      skinDepthMm: skinDepthOf(context, hotC),
    }
    if (copper) explainWinding(context, { index, copper, result, hotC })
    return result
  })
}

function skinDepthOf(context: Context, temperatureC: number): number | null {
  const frequencyHz = context.specification.electrical.switchingFrequencyHz.value?.minimum
  return positive(frequencyHz) ? attempt(context, 'electrical.switchingFrequencyHz', () => skinDepthMm({ frequencyHz, temperatureC })) : null
}

const FULL_LOAD = new Set(['minimum-input', 'nominal-input', 'maximum-input'])

function largestCurrents(winding: Winding, corners: readonly CornerState[]): Pick<WindingResult, 'rmsA' | 'peakA' | 'dcA'> {
  const own = corners.filter(({ result }) => FULL_LOAD.has(result.name)).flatMap(({ result }) => result.windings.filter(({ windingId }) => windingId === winding.id))
  if (own.length === 0) return { rmsA: winding.rmsCurrentA, peakA: winding.peakCurrentA, dcA: winding.dcCurrentA }
  return { rmsA: Math.max(...own.map(({ rmsA }) => rmsA)), peakA: Math.max(...own.map(({ peakA }) => peakA)), dcA: Math.max(...own.map(({ dcA }) => dcA)) }
}

function explainWinding(context: Context, { index, copper, result, hotC }: { index: number; copper: WindingCopper; result: WindingResult; hotC: number }): void {
  const { winding, wire } = copper
  const path = (field: keyof WindingResult) => `windings.${index}.${field}`
  const length = { name: 'l', value: copper.wireLengthM, unit: 'm', origin: 'coil layout: N·MLT and both leads' }
  const rowOrigin = `${wire.name}: ${wire.source}${wire.edition ? `, ${wire.edition}` : ''} (${wire.confidence})`
  explain(context, path('wireLengthM'), () => ({
    symbol: 'l', value: copper.wireLengthM, unit: 'm', formula: 'N·MLT + l_leads', source: 'geometry of the coil layout',
    inputs: [{ name: 'N', value: winding.turns, unit: '', origin: `windings.${index}.turns` }, { name: 'MLT', value: copper.meanTurnLengthMm, unit: 'mm', origin: 'coil layout' }, { name: 'l_leads', value: copper.leadsMm, unit: 'mm', origin: context.former ? 'coil former' : 'free ends of a ring' }],
  }))
  explain(context, path('dcResistance20Ohm'), () => ({
    symbol: 'R_20', value: copper.resistance20Ohm, unit: 'Ω', formula: "R'·l/n", source: 'IEC 60317-0-1, nominal resistance',
    inputs: [{ name: "R'", value: wire.resistance20.nominalOhmPerM, unit: 'Ω/m', origin: rowOrigin }, length, { name: 'n', value: winding.wire.parallel, unit: '', origin: `windings.${index}.wire.parallel` }],
  }))
  explain(context, path('dcResistanceHotOhm'), () => ({
    symbol: 'R_hot', value: result.dcResistanceHotOhm, unit: 'Ω', formula: 'R_20·(1 + 0.00393·(T − 20 °C))', source: 'IEC 60028:1925',
    inputs: [{ name: 'R_20', value: copper.resistance20Ohm, unit: 'Ω', origin: path('dcResistance20Ohm') }, { name: 'T', value: hotC, unit: '°C', origin: 'thermal.windingC' }],
  }))
  explain(context, path('acFactor'), () => ({
    symbol: 'F_R', value: result.acFactor, unit: '', formula: 'Σ F(n)·I_n²/Σ I_n², F by Dowell for x = h·√η/δ and m layers, 15 harmonics', source: 'P. Dowell, Proc. IEE 113 (1966) 1387; each winding by its own ampere-turns',
    inputs: [{ name: 'h', value: copper.layer?.heightMm ?? 'not known', unit: 'mm', origin: 'wire' }, { name: 'η', value: copper.layer?.porosity ?? 'not known', unit: '', origin: 'coil layout' }, { name: 'm', value: copper.fieldLayers, unit: '', origin: 'coil layout' }, { name: 'δ', value: result.skinDepthMm ?? 'not known', unit: 'mm', origin: path('skinDepthMm') }],
  }))
  explain(context, path('currentDensityAPerMm2'), () => ({
    symbol: 'J', value: result.currentDensityAPerMm2, unit: 'A/mm²', formula: 'I_rms/A_Cu', source: 'definition',
    inputs: [{ name: 'I_rms', value: result.rmsA ?? 'not known', unit: 'A', origin: 'largest of the full-load corners' }, { name: 'A_Cu', value: copper.copperAreaMm2, unit: 'mm²', origin: rowOrigin }],
  }))
  explain(context, path('copperLossW'), () => ({
    symbol: 'P_Cu', value: result.copperLossW, unit: 'W', formula: 'R_hot·(I_dc² + F_R·I_ac²)', source: 'L. Dixon, SLUP127',
    inputs: [{ name: 'R_hot', value: result.dcResistanceHotOhm ?? 'not known', unit: 'Ω', origin: path('dcResistanceHotOhm') }, { name: 'F_R', value: result.acFactor ?? 'not known', unit: '', origin: path('acFactor') }],
  }))
}
