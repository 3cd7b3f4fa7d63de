import type { Library, WireRow } from '../library'
import type { WireInsulation, WireUse } from '../specification'
import { referenceTo } from '../evaluate/lookup'
import { wireCandidates } from '../wires/choice'
import { skinDepthMm } from '../wires/skin-depth'
import type { ProposalPreferences } from './preferences'

/** Temperature at which skin depth is taken for the choice, °C. */
const CHOICE_TEMPERATURE_C = 100

/** Parallel wires that a machine lays side by side. */
const MOST_PARALLEL = 4

/** Round wires first, or litz first for windings of several layers that lose too much by proximity. */
export type WireStyle = 'round' | 'litz'

/** Below this alternating share of the rms current the wire's loss is nearly that of direct current. */
const SMALL_AC_SHARE = 0.3

/** Thinner wire breaks at the pins and in machines. Source: common practice. */
const LEAST_DIAMETER_MM = 0.2

export interface WireNeed {
  rmsA: number
  acShare: number
  style: WireStyle
  currentDensityAPerMm2: number
  frequencyHz: number
  insulation: WireInsulation
  thermalClassC: number
}

/**
 * Wire for one winding: the least number of parallel round wires within two skin depths (six where the current is nearly
 * direct); else, or first where asked for, a litz of fine strands; else round wire up to four skin depths, and last whatever
 * carries the current, which the checks then question. Null when the library has none.
 *
 * Source: `wireCandidates`; strands of a third of the skin depth: C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283.
 */
export function chooseWire(library: Library, need: WireNeed, preferences: ProposalPreferences): WireUse | null {
  const rounds = stock(library, preferences, need.insulation)
  const nearlyDirect = need.acShare < SMALL_AC_SHARE
  const depthMm = skinDepthMm({ frequencyHz: need.frequencyHz, temperatureC: CHOICE_TEMPERATURE_C })
  const round = roundWire(rounds, need, { skinDepths: nearlyDirect ? 6 : 2 })
  const litz = need.insulation.startsWith('enamel') ? (litzWire(library, need, depthMm / 3) ?? litzWire(library, need, (2 * depthMm) / 3)) : null
  // A wire thinner than the skin depth gains nothing from strands.
  const stranded = need.style === 'litz' && !nearlyDirect && !(round && round.row.conductorMm <= depthMm)
  const wire = (stranded ? (litz ?? round) : (round ?? litz)) ?? roundWire(rounds, need, { skinDepths: 4 }) ?? roundWire(rounds, need, { skinDepths: 8, parallel: 12 })
  if (!wire) return null
  return {
    wire: referenceTo(wire.row),
    parallel: wire.parallel,
    thermalClassC: need.thermalClassC,
    insulation: need.insulation,
    certificate: null,
    lay: null,
  }
}

const usable = (row: WireRow, insulation: WireInsulation) => (row.overallMm[insulation] ?? 0) > 0

function stock(library: Library, { wireSystem }: ProposalPreferences, insulation: WireInsulation): WireRow[] {
  const round = library.wires.filter((row) => row.form === 'round' && usable(row, insulation) && row.conductorMm >= LEAST_DIAMETER_MM && row.conductorMm <= 1.2)
  const ofSystem = round.filter(({ standard }) => standard.includes('ASTM') === (wireSystem === 'AWG'))
  return ofSystem.length > 0 ? ofSystem : round
}

function roundWire(rows: readonly WireRow[], need: WireNeed, { skinDepths, parallel = MOST_PARALLEL }: { skinDepths: number; parallel?: number }): { row: WireRow; parallel: number } | null {
  if (rows.length === 0) return null
  const candidates = wireCandidates({
    rmsCurrentA: need.rmsA,
    currentDensityLimitAPerMm2: need.currentDensityAPerMm2,
    frequencyHz: need.frequencyHz,
    temperatureC: CHOICE_TEMPERATURE_C,
    diameterLimitSkinDepths: skinDepths,
    parallelLimit: parallel,
    stock: rows.map((row) => ({ designation: row.id, conductorDiameterMm: row.conductorMm, outerDiameterMm: row.overallMm[need.insulation]! })),
  })
  const best = candidates[0]
  if (!best || best.rejections.length > 0) return null
  return { row: rows.find(({ id }) => id === best.wire.designation)!, parallel: best.parallelCount }
}

function litzWire(library: Library, need: WireNeed, thickestMm: number): { row: WireRow; parallel: number } | null {
  const areaMm2 = need.rmsA / need.currentDensityAPerMm2
  const fitting = library.wires
    .filter((row) => row.form === 'litz' && usable(row, need.insulation) && row.conductorMm <= thickestMm)
    .map((row) => ({ row, parallel: Math.max(1, Math.ceil(areaMm2 / row.copperAreaMm2 - 1e-9)) }))
    .filter(({ parallel }) => parallel <= MOST_PARALLEL)
    .sort((a, b) => a.parallel - b.parallel || a.row.copperAreaMm2 - b.row.copperAreaMm2 || (a.row.id < b.row.id ? -1 : 1))
  return fitting[0] ?? null
}
