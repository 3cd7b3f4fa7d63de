import type { Evaluation } from '../evaluation'
import type { SpecificationDocument, TestRow, Winding } from '../specification'
import { resistanceFactor } from '../wires/resistance'
import { SHORTED_TURN_ID } from './faults'
import { terminalsOf } from './terminals'

/** A part as it was really wound: a document with faults perhaps, and what the engine says of it. */
export interface BuiltPart {
  document: SpecificationDocument
  evaluation: Evaluation
}

/** What a test row would read or find on a part; null where the engine cannot tell. */
export type RowValue = { kind: 'reading'; value: number } | { kind: 'verdict'; pass: boolean } | null

const reading = (value: number | null | undefined): RowValue => (typeof value === 'number' && Number.isFinite(value) ? { kind: 'reading', value } : null)

/** The winding whose ends lie at these terminals: a meter knows pins, not names. */
function windingAt({ document }: BuiltPart, terminals: readonly string[]): Winding | null {
  return document.specification.windings.find(({ startTerminal, finishTerminal }) => terminals.includes(startTerminal) && terminals.includes(finishTerminal)) ?? null
}

const primaryOf = ({ document: { specification } }: BuiltPart): Winding | null =>
  specification.windings.find(({ id }) => id === specification.electrical.inductance.value?.windingId) ?? specification.windings.find(({ role }) => role === 'primary') ?? null

/** An inductance seen at the primary, seen at another winding. Source: ideal ratio of turns, L ∝ N². */
function referred(part: BuiltPart, winding: Winding | null, atPrimaryH: number | null | undefined): number | null {
  const primary = primaryOf(part)
  if (!winding || !primary || atPrimaryH == null || !(primary.turns > 0)) return null
  return atPrimaryH * (winding.turns / primary.turns) ** 2
}

function inductanceH(part: BuiltPart, row: TestRow): number | null {
  const winding = windingAt(part, row.drivenTerminals)
  const { leakages, magnetics } = part.evaluation
  const shorted = leakages.find(({ shortedWindingIds }) => shortedWindingIds.length === 1 && shortedWindingIds[0] === SHORTED_TURN_ID)
  return referred(part, winding, shorted ? shorted.inductanceH : magnetics.inductanceH)
}

/**
 * Inductance under a direct current: flux linkage over current, where the flux cannot exceed saturation on the least area:
 * min(L, N·A_min·B_sat/I).
 *
 * Source: Faraday's law, saturation of the material as the evaluation takes it; the gradual bend before it is not in it.
 */
function biasedInductanceH(part: BuiltPart, row: TestRow): number | null {
  const plainH = inductanceH(part, row)
  const winding = windingAt(part, row.drivenTerminals)
  const { fluxWorstT, worstCurrentA, inductanceMaximumH, saturationT } = part.evaluation.magnetics
  if (plainH === null || !winding || row.biasA === null || saturationT === null || fluxWorstT === null || !worstCurrentA || !inductanceMaximumH) return null
  const primary = primaryOf(part)!
  // Flux linkage at saturation, from the evaluation's own worst flux: L_max·Î_max/B̂_max·B_sat is N·A_min·B_sat.
  const linkageWb = ((inductanceMaximumH * worstCurrentA) / fluxWorstT) * saturationT * (winding.turns / primary.turns)
  return row.biasA > 0 ? Math.min(plainH, linkageWb / row.biasA) : plainH
}

function leakageH(part: BuiltPart, row: TestRow): number | null {
  const winding = windingAt(part, row.drivenTerminals)
  const shorted = row.shortedTerminals.map((terminals) => windingAt(part, terminals)?.id)
  const primary = primaryOf(part)
  if (!winding || !primary || winding.id !== primary.id) return null
  const found = part.evaluation.leakages.find(({ windingId, shortedWindingIds }) => windingId === primary.id && shortedWindingIds.length === shorted.length && shortedWindingIds.every((id) => shorted.includes(id)))
  return found?.inductanceH ?? null
}

function resistanceOhm(part: BuiltPart, row: TestRow): number | null {
  const winding = windingAt(part, row.drivenTerminals)
  const at20 = part.evaluation.windings.find(({ windingId }) => windingId === winding?.id)?.dcResistance20Ohm
  return at20 == null ? null : at20 * resistanceFactor(row.temperatureC ?? 20)
}

/** Ratio of turns, the way round that the row's own nominal value is given. */
function ratio(part: BuiltPart, row: TestRow): number | null {
  const driven = windingAt(part, row.drivenTerminals)
  const read = windingAt(part, row.openTerminals)
  if (!driven || !read || row.nominal === null || !(driven.turns > 0) || !(read.turns > 0)) return null
  const [straight, inverse] = [driven.turns / read.turns, read.turns / driven.turns]
  return row.nominal >= 1 === straight >= 1 ? straight : inverse
}

/** Every winding's dotted end where the drawing has it. */
function dotsInPhase(part: BuiltPart, nominal: SpecificationDocument): boolean {
  return nominal.specification.windings.every((drawn) => {
    const built = windingAt(part, terminalsOf(drawn))
    return built === null || built.startTerminal === drawn.startTerminal
  })
}

function withstands(part: BuiltPart, row: TestRow): RowValue {
  const boundary = part.evaluation.boundaries.find(({ boundaryId }) => boundaryId === row.boundaryId)
  const providedV = boundary?.provided.testVoltageVRms ?? null
  return providedV === null || row.levelV === null ? null : { kind: 'verdict', pass: providedV >= row.levelV }
}

/** Between two windings, each shorted on itself. */
function capacitanceF(part: BuiltPart, row: TestRow): number | null {
  const ids = new Set(row.shortedTerminals.flatMap((terminals) => windingAt(part, terminals)?.id ?? []))
  return part.evaluation.capacitances.find(({ windingIds }) => windingIds.length === 2 && ids.size === 2 && windingIds.every((id) => ids.has(id)))?.capacitanceF ?? null
}

/** With the inductance that the part really shows, so that a shorted turn raises it. */
function resonanceHz(part: BuiltPart, row: TestRow): number | null {
  const winding = windingAt(part, row.drivenTerminals)
  const soundHz = part.evaluation.selfResonance.find(({ windingId }) => windingId === winding?.id)?.frequencyHz ?? null
  const [soundH, shownH] = [referred(part, winding, part.evaluation.magnetics.inductanceH), inductanceH(part, row)]
  return soundHz !== null && soundH && shownH ? soundHz * Math.sqrt(soundH / shownH) : soundHz
}

/**
 * What one row of the test table reads on a part, in the row's unit. `nominal` is the drawing that the row belongs to.
 */
export function rowValue(part: BuiltPart, nominal: SpecificationDocument, row: TestRow): RowValue {
  switch (row.characteristic) {
    case 'inductance':
      return reading(inductanceH(part, row))
    case 'inductance-at-bias':
      return reading(biasedInductanceH(part, row))
    case 'leakage':
      return reading(leakageH(part, row))
    case 'dc-resistance':
      return reading(resistanceOhm(part, row))
    case 'turns-ratio':
      return reading(ratio(part, row))
    case 'polarity':
      return { kind: 'verdict', pass: dotsInPhase(part, nominal) }
    case 'hipot':
      return withstands(part, row)
    case 'self-resonance':
      return reading(resonanceHz(part, row))
    case 'interwinding-capacitance':
      return reading(capacitanceF(part, row))
    case 'insulation-resistance':
    case 'surge':
    case 'impulse':
    case 'partial-discharge':
    case 'dimension':
    case 'visual':
      return null
  }
}
