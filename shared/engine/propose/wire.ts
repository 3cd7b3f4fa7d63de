import type { Library, WireRow } from '../library'
import type { WireInsulation, WireUse } from '../specification'
import { referenceTo } from '../evaluate/lookup'
import { wireCandidates } from '../wires/choice'
import { STRAND_SKIN_DEPTHS } from '../wires/litz'
import { skinDepthMm } from '../wires/skin-depth'
import type { ProposalPreferences } from './preferences'

/** Parallel wires that a machine lays side by side. */
export const MOST_PARALLEL = 4

/** Bundles of litz that one pin takes. */
const MOST_BUNDLES = 3

/** Strands that one pin takes well; more are a matter of tinning. Source: common practice. */
const STRANDS_PER_PIN = 100

/** Round wire first, or litz first for a winding that loses too much by proximity. */
export type WireStyle = 'round' | 'litz'

/** Below this alternating share of the rms current the wire's loss is nearly that of direct current. */
const SMALL_AC_SHARE = 0.3

/** Diameters that machines wind without breaking wire. Source: common practice, 0.05 to 1.0 mm; thicker by hand. */
const LEAST_DIAMETER_MM = 0.1
const GREATEST_DIAMETER_MM = 1.2

/** A target is aimed at, not kept to the last digit. */
const DENSITY_SLACK = 1.02

/** How far the target may be exceeded by where this saves a layer or a wire thicker than the rule. */
export const GREATEST_DENSITY_SHARE = 1.15

export interface WireNeed {
  rmsA: number
  acShare: number
  style: WireStyle
  currentDensityAPerMm2: number
  frequencyHz: number
  /** Temperature at which skin depth is taken, °C. */
  temperatureC: number
  insulation: WireInsulation
  thermalClassC: number
}

export interface ChosenWire {
  row: WireRow
  use: WireUse
  /** Only a wire thicker than the rule or too many in parallel carry the current. */
  makeshift: boolean
}

interface Bundle {
  row: WireRow
  parallel: number
}

/**
 * Wire for one winding: the least number of parallel round wires within two skin depths (six where the current is nearly
 * direct); else, or first where asked for, a litz of strands up to a third of the skin depth; else round wire of a little more
 * current density; else, as a makeshift, round wire up to four skin depths, and last whatever carries the current. Null when the library has none.
 *
 * Source: `wireCandidates`; strands of a third of the skin depth: C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283.
 */
export function chooseWire(library: Library, need: WireNeed, preferences: ProposalPreferences): ChosenWire | null {
  const rounds = roundStock(library, preferences, need.insulation)
  const round = roundWire(rounds, need, { skinDepths: skinDepthsOf(need) })
  const depthMm = skinDepthMm(need)
  const litz = need.insulation.startsWith('enamel') ? litzWire(library, need, depthMm) : null
  // A wire thinner than the skin depth gains nothing from strands.
  const stranded = need.style === 'litz' && !(round && round.row.conductorMm <= depthMm)
  const good = stranded ? (litz ?? round) : (round ?? litz)
  const wire = good ?? roundWire(rounds, denser(need), { skinDepths: skinDepthsOf(need) }) ?? roundWire(rounds, need, { skinDepths: 4 }) ?? roundWire(rounds, need, { skinDepths: 8, parallel: 12 })
  return wire && { row: wire.row, use: useOf(wire, need), makeshift: wire.row.conductorMm > greatestDiameterMm(need) || wire.parallel > MOST_PARALLEL }
}

export const useOf = ({ row, parallel }: Bundle, { thermalClassC, insulation }: Pick<WireNeed, 'thermalClassC' | 'insulation'>): WireUse => ({
  wire: referenceTo(row),
  parallel,
  thermalClassC,
  insulation,
  certificate: null,
  lay: null,
})

const skinDepthsOf = ({ acShare }: WireNeed) => (acShare < SMALL_AC_SHARE ? 6 : 2)

/** The same winding with what the target may be exceeded by where this saves a layer or a thicker wire. */
const denser = (need: WireNeed): WireNeed => ({ ...need, currentDensityAPerMm2: need.currentDensityAPerMm2 * GREATEST_DENSITY_SHARE })

/** Greatest conductor diameter of a round wire for this current, mm. */
export const greatestDiameterMm = (need: WireNeed): number => skinDepthsOf(need) * skinDepthMm(need)

const usable = (row: WireRow, insulation: WireInsulation) => (row.overallMm[insulation] ?? 0) > 0

/** Round wires of the preferred system that have this insulation and can be wound. */
export function roundStock(library: Library, { wireSystem }: ProposalPreferences, insulation: WireInsulation): WireRow[] {
  const round = library.wires.filter((row) => row.form === 'round' && usable(row, insulation) && row.conductorMm >= LEAST_DIAMETER_MM && row.conductorMm <= GREATEST_DIAMETER_MM)
  const ofSystem = round.filter(({ standard }) => standard.includes('ASTM') === (wireSystem === 'AWG'))
  return ofSystem.length > 0 ? ofSystem : round
}

function roundWire(rows: readonly WireRow[], need: WireNeed, { skinDepths, parallel = MOST_PARALLEL }: { skinDepths: number; parallel?: number }): Bundle | null {
  if (rows.length === 0) return null
  const candidates = wireCandidates({
    rmsCurrentA: need.rmsA,
    currentDensityLimitAPerMm2: need.currentDensityAPerMm2 * DENSITY_SLACK,
    frequencyHz: need.frequencyHz,
    temperatureC: need.temperatureC,
    diameterLimitSkinDepths: skinDepths,
    parallelLimit: parallel,
    stock: rows.map((row) => ({ designation: row.id, conductorDiameterMm: row.conductorMm, outerDiameterMm: row.overallMm[need.insulation]! })),
  })
  const best = candidates[0]
  if (!best || best.rejections.length > 0) return null
  return { row: rows.find(({ id }) => id === best.wire.designation)!, parallel: best.parallelCount }
}

/** What counts against a litz besides its copper: each further bundle, and strands beyond what a pin takes well. */
const BUNDLE_COST = 0.1
const STRANDS_COST = 0.1

/**
 * Litz with the thickest strand up to a third of the skin depth, which is the cheapest; where no strand is as fine as that,
 * with the finest up to two thirds. Of one strand the bundles with the least copper too much, few bundles and few strands.
 */
function litzWire(library: Library, need: WireNeed, depthMm: number): Bundle | null {
  const areaMm2 = need.rmsA / (need.currentDensityAPerMm2 * DENSITY_SLACK)
  const fitting = library.wires
    .filter((row) => row.form === 'litz' && usable(row, need.insulation) && row.conductorMm <= 2 * STRAND_SKIN_DEPTHS * depthMm)
    .map((row) => ({ row, parallel: Math.max(1, Math.ceil(areaMm2 / row.copperAreaMm2 - 1e-9)) }))
    .filter(({ parallel }) => parallel <= MOST_BUNDLES)
  const fine = fitting.filter(({ row }) => row.conductorMm <= STRAND_SKIN_DEPTHS * depthMm)
  const strandMm = fine.length > 0 ? Math.max(...fine.map(({ row }) => row.conductorMm)) : Math.min(...fitting.map(({ row }) => row.conductorMm))
  const cost = ({ row, parallel }: Bundle) =>
    (parallel * row.copperAreaMm2) / areaMm2 + BUNDLE_COST * (parallel - 1) + STRANDS_COST * Math.max(0, (parallel * row.strands) / STRANDS_PER_PIN - 1)
  const ranked = fitting.filter(({ row }) => row.conductorMm === strandMm).sort((a, b) => cost(a) - cost(b) || (a.row.id < b.row.id ? -1 : 1))
  return ranked[0] ?? null
}
