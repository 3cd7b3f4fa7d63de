import { COPPER_ALPHA_20C_PER_K } from '../constants'
import { gapDistance } from '../evaluate/gap-field'
import { protective } from './boundary-input'
import { atLeast, atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/** Windings that carry current, each with its wire's row. */
function wires({ document, context }: CheckInput) {
  return document.specification.windings.flatMap((winding, index) => {
    const row = context.index.find('wire', winding.wire.wire)
    return winding.role === 'shield' || !row ? [] : [{ winding, row, index }]
  })
}

/** Foil of h_opt = δ·(15/(5p² − 1))^¼ loses least with p layers; 20 % either way cost little. */
function foilThickness(input: CheckInput): Outcome[] {
  return wires(input).flatMap(({ winding, row, index }) => {
    const result = input.evaluation.windings[index]
    if (row.form !== 'foil' || !result) return []
    const layers = Math.max(1, winding.turns)
    const best = result.skinDepthMm === null ? null : result.skinDepthMm * (15 / (5 * layers ** 2 - 1)) ** 0.25
    const off = best === null ? null : Math.abs(row.conductorMm / best - 1)
    return [atMost({ value: off, limit: 0.2, unit: '1', path: `windings.${index}.wire`, values: { winding: winding.name, ...(best === null ? {} : { bestMm: best }) } })]
  })
}

/** Wires in parallel share the current only where they lie side by side in one layer. */
function parallelInLayer(input: CheckInput): Outcome[] {
  const { windings } = input.document.specification
  return (input.coil?.placements ?? []).flatMap(({ windingId, bundleWidthMm, availableMm, index }) => {
    const winding = windings.find(({ id }) => id === windingId)
    if (!winding || winding.wire.parallel < 2) return []
    return [atMost({ value: bundleWidthMm, limit: availableMm, unit: 'mm', path: `sequence.${index}`, values: { winding: winding.name } })]
  })
}

/** The loss is that of hot copper. */
function hotResistance({ document, evaluation }: CheckInput): Outcome[] {
  const hotC = evaluation.thermal.windingC
  return evaluation.windings.flatMap(({ dcResistance20Ohm, dcResistanceHotOhm }, index) => {
    const winding = document.specification.windings[index]!
    if (winding.role === 'shield') return []
    const path = `windings.${index}.dcResistance`
    const values = { winding: winding.name }
    if (hotC === null || dcResistance20Ohm === null || dcResistanceHotOhm === null || dcResistance20Ohm <= 0) return [notCheckable(path, values)]
    return [atLeast({ value: dcResistanceHotOhm / dcResistance20Ohm, limit: 1 + COPPER_ALPHA_20C_PER_K * (hotC - 20), unit: '1', path, values })]
  })
}

/** A rise of the winding is predicted, and the model that it comes from is named. */
function riseEstimated({ evaluation }: CheckInput): Outcome[] {
  const { riseK, model } = evaluation.thermal
  return [riseK === null ? notCheckable('insulation.maximumAmbientC', { missing: 'temperature rise' }) : { ...yesNo(model !== '', 'insulation.maximumAmbientC', { model }), value: riseK, unit: 'K' }]
}

/** Class of insulation systems above which the combination itself is recognised, °C. Source: UL 1446, IEC 61857. */
const UNRECOGNISED_CLASS_C = 120

function systemFile({ document }: CheckInput): Outcome[] {
  const { insulation } = document.specification
  const classC = insulation.systemThermalClassC.value
  if (classC === null || classC <= UNRECOGNISED_CLASS_C || !insulation.boundaries.some((boundary) => protective({ boundary }))) return []
  const file = insulation.systemFileNumber
  // The vendor names the file of the system that he builds with.
  const named = (file.value ?? '').trim() !== ''
  return [named || file.status !== 'vendor-choice' ? yesNo(named, 'insulation.systemFileNumber') : notCheckable('insulation.systemFileNumber', { missing: 'file number' })]
}

function lossSplit({ evaluation }: CheckInput): Outcome[] {
  const { copperW, totalW } = evaluation.losses
  if (copperW === null || totalW === null || totalW <= 0) return [notCheckable('core.core', { missing: 'losses' })]
  const value = copperW / totalW
  const path = 'core.core'
  return [value < 0.3 ? atLeast({ value, limit: 0.3, unit: '1', path }) : atMost({ value, limit: 0.8, unit: '1', path })]
}

/** Current from which on the drop in pins and leads counts, A rms. */
const LEAD_CURRENT_A = 5

/** Nothing in the document says how long and how thick the way from the coil to the pin is. */
const leadHeat = (input: CheckInput): Outcome[] =>
  wires(input).flatMap(({ winding, index }) => {
    const rmsA = input.evaluation.windings[index]?.rmsA ?? winding.rmsCurrentA
    return rmsA !== null && rmsA > LEAD_CURRENT_A ? [notCheckable(`windings.${index}.startTerminal`, { winding: winding.name, currentA: rmsA })] : []
  })

/** Gap lengths that wire keeps away from the gap. Source: handbooks, two to three. */
const KEEP_AWAY_GAPS = 2

/** Wire beside the gap is heated by its field. */
function wireOverGap({ evaluation, context, coil }: CheckInput): Outcome[] {
  const { gapMm } = evaluation.magnetics
  if (gapMm === null || !(gapMm > 0) || !coil) return []
  const nearest = gapDistance({ ...context, findings: [] }, coil, gapMm)
  if (!nearest) return []
  const winding = context.specification.windings.find(({ id }) => id === nearest.windingId)
  return [atLeast({ value: nearest.distanceMm, limit: KEEP_AWAY_GAPS * nearest.gapMm, unit: 'mm', path: 'core.gap.lengthMm', values: { winding: winding?.name ?? '', gapMm: nearest.gapMm } })]
}

export const HEAT_CHECKS: Readonly<Record<string, Check>> = {
  T05: { severity: 'N', source: 'W. Hurley, W. Wölfle: optimum thickness of foil', run: foilThickness },
  T06: { severity: 'M', source: 'equal linkage of parallel wires: textbook', run: parallelInLayer },
  T09: { severity: 'M', source: 'IEC 60028: copper, 0.393 % per kelvin', run: hotResistance },
  T10: { severity: 'M', source: 'model named in the working', run: riseEstimated },
  T13: { severity: 'M', source: 'UL 1446, IEC 61857: a system is recognised as a combination', run: systemFile },
  T14: { severity: 'N', source: 'balance of losses: textbook', run: lossSplit },
  T15: { severity: 'M', source: 'drop of leads and pins: common practice', decidedBy: 'person', run: leadHeat },
  T17: { severity: 'N', source: 'fringing field, two to three gap lengths: handbooks', run: wireOverGap },
}
