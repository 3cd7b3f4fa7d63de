import type { Evaluation } from '#shared/engine/evaluation'
import type { WindingSpecification } from '#shared/engine/specification'
import { formatEngineering, formatNumber, formatQuantity } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'
import type { Verdict } from '@/components/base/VerdictTag.vue'

export interface LiveFigure {
  label: string
  text: string
  note?: string
  verdict?: Verdict
  /** Path in the evaluation under which its working is kept. */
  why?: string
}

export interface FigureGroup {
  title: string
  figures: LiveFigure[]
}

const si = (value: number | null | undefined, base: string) => formatEngineering(value, base, { significant: 3 })
const mm = (value: number | null | undefined) => formatQuantity(value, shownUnit('mm'), { significant: 3 })
const percent = (value: number | null | undefined) => formatQuantity(value, shownUnit('%'), { significant: 3 })
const celsius = (value: number | null | undefined) => formatQuantity(value, shownUnit('°C'), { significant: 3 })
const kelvin = (value: number | null | undefined) => formatQuantity(value, shownUnit('K'), { significant: 3 })
const grams = (value: number | null) => formatQuantity(value, shownUnit('g'), { significant: 3 })
const plain = (value: number | null | undefined) => formatNumber(value, { significant: 3 })

export const figureOf = { si, mm, percent, celsius, kelvin, grams, plain }

/** Below the limit is met, above it is not, and without a figure nobody can tell. */
export const below = (value: number | null, limit: number | null): Verdict => (value === null || limit === null ? 'not-checkable' : value <= limit ? 'met' : 'not-met')

export const CORNER_WORDS: Readonly<Record<Evaluation['corners'][number]['name'], string>> = {
  'minimum-input': 'minimum input',
  'nominal-input': 'nominal input',
  'maximum-input': 'maximum input',
  'current-limit': 'current limit',
  'light-load-minimum-input': 'light load, minimum input',
  'light-load': 'light load, nominal input',
  'light-load-maximum-input': 'light load, maximum input',
}

function magnetics({ magnetics: m }: Evaluation): FigureGroup {
  return {
    title: 'Inductance, gap and flux',
    figures: [
      { label: 'Inductance', text: si(m.inductanceH, 'H'), note: `${si(m.inductanceMinimumH, 'H')} to ${si(m.inductanceMaximumH, 'H')}`, why: 'magnetics.inductanceH' },
      { label: 'AL', text: si(m.alH, 'H') },
      { label: 'Gap', text: mm(m.gapMm), note: m.fringingFactor === null ? m.gapModel : `fringing factor ${plain(m.fringingFactor)}`, why: 'magnetics.gapMm' },
      ...(m.gapFieldMm === null ? [] : [{ label: 'Gap by the field of the window', text: mm(m.gapFieldMm), why: 'magnetics.gapFieldMm' }]),
      { label: 'Boundary of continuous conduction', text: si(m.boundaryInductanceH, 'H') },
      { label: 'Peak flux density, full load', text: si(m.fluxPeakT, 'T'), why: 'magnetics.fluxPeakT' },
      { label: 'Worst flux density', text: si(m.fluxWorstT, 'T'), note: m.worstCurrentA === null ? undefined : `at ${si(m.worstCurrentA, 'A')}, on the least area`, why: 'magnetics.fluxWorstT' },
      { label: 'Flux swing, greatest', text: si(m.fluxSwingT, 'T'), note: `${si(m.voltSecondsVs, 'Vs')} at the primary, on the least area`, why: 'magnetics.fluxSwingT' },
      ...(m.fluxTransientT == null ? [] : [{ label: 'First pulse from zero flux', text: si(m.fluxTransientT, 'T'), note: 'longest pulse at the greatest input', why: 'magnetics.fluxWorstT' }]),
      { label: 'Saturation', text: si(m.saturationT, 'T'), note: m.saturationTemperatureC === null ? undefined : `at ${celsius(m.saturationTemperatureC)}`, why: 'magnetics.saturationT' },
      { label: 'Share of saturation used', text: percent(m.fluxUtilisation), verdict: below(m.fluxUtilisation, 0.8), note: 'limit 80 %' },
    ],
  }
}

function heat({ losses, thermal }: Evaluation): FigureGroup {
  return {
    title: `Loss and temperature, at ${CORNER_WORDS[losses.corner]}`,
    figures: [
      { label: 'Copper loss', text: si(losses.copperW, 'W') },
      { label: 'Core loss', text: si(losses.coreW, 'W'), note: losses.coreDensityWPerM3 === null ? losses.model : formatQuantity(losses.coreDensityWPerM3, shownUnit('kW/m³'), { significant: 3 }), why: 'losses.coreW' },
      { label: 'Total loss', text: si(losses.totalW, 'W') },
      { label: 'Temperature rise', text: kelvin(thermal.riseK), note: thermal.model, why: 'thermal.riseK' },
      { label: 'Winding temperature', text: celsius(thermal.windingC), note: thermal.limitC === null ? undefined : `limit ${celsius(thermal.limitC)}`, verdict: below(thermal.windingC, thermal.limitC) },
      { label: 'Hot spot', text: celsius(thermal.hotSpotC), why: 'thermal.hotSpotC' },
      { label: 'Rise by the volume law', text: kelvin(thermal.riseByVolumeK), note: 'for comparison', why: 'thermal.riseByVolumeK' },
      { label: 'Margin', text: kelvin(thermal.marginK) },
    ],
  }
}

/** Temperatures under fault; nothing is said of a part without a duty. */
function faults({ faults: cases }: Evaluation): FigureGroup {
  return {
    title: 'Under fault, the current limit holding',
    figures: cases.map(({ kind, output, windingC, lossW, limitC, runaway, state }, index) => ({
      label: kind === 'overload' ? 'All outputs overloaded' : `${output ?? 'Output'} shorted`,
      text: runaway ? 'does not settle' : celsius(windingC),
      note: lossW === null ? 'no current limit reached' : `${si(lossW, 'W')}${limitC === null ? '' : `, overload limit ${celsius(limitC)}`}`,
      verdict: state,
      why: `faults.${index}.windingC`,
    })),
  }
}

function build({ layout, mass }: Evaluation): FigureGroup {
  const exists = layout.windowHeightMm > 0
  return {
    title: 'Build',
    figures: [
      { label: 'Build, bulge included', text: exists ? mm(layout.buildMm) : '–', note: exists ? `of ${mm(layout.windowHeightMm)}` : undefined, verdict: exists ? below(layout.buildRatio, 1) : 'not-checkable' },
      { label: 'Height used', text: exists ? percent(layout.buildRatio) : '–' },
      { label: 'Copper fill', text: exists ? percent(layout.copperFill) : '–' },
      { label: 'Window fill, squares of overall diameters', text: exists ? percent(layout.windowFill) : '–' },
      { label: 'Mass', text: grams(mass.totalG), note: `copper ${grams(mass.copperG)}, core ${grams(mass.coreG)}` },
    ],
  }
}

function leakage({ leakages, magnetics: { inductanceH } }: Evaluation, { windings }: WindingSpecification): FigureGroup {
  const name = (id: string) => windings.find((winding) => winding.id === id)?.name ?? id
  return {
    title: 'Leakage inductance',
    figures: leakages.map(({ windingId, shortedWindingIds, inductanceH: leakageH, oneDimensionalH, model }, index) => ({
      label: `${name(windingId)}, ${shortedWindingIds.map(name).join(', ')} shorted`,
      text: si(leakageH, 'H'),
      note: leakageNote({ leakageH, oneDimensionalH, inductanceH }) ?? model,
      why: `leakages.${index}.inductanceH`,
    })),
  }
}

function leakageNote({ leakageH, oneDimensionalH, inductanceH }: { leakageH: number | null; oneDimensionalH: number | null; inductanceH: number | null }): string | null {
  if (leakageH === null || !inductanceH) return null
  const share = `${percent(leakageH / inductanceH)} of the inductance`
  return oneDimensionalH ? `${share}; one-dimensional ${si(oneDimensionalH, 'H')}` : share
}

/** Of and between the windings, and where the first of them resonates. Evaluations made before this was calculated have none. */
function capacitance({ capacitances, selfResonance }: Partial<Evaluation>, { windings }: WindingSpecification): FigureGroup {
  const name = (id: string) => windings.find((winding) => winding.id === id)?.name ?? id
  const resonance = selfResonance?.[0]
  return {
    title: 'Capacitance',
    figures: [
      ...(capacitances ?? []).map(({ windingIds, capacitanceF }, index) => ({
        label: windingIds.length === 1 ? `${name(windingIds[0]!)}, across its terminals` : windingIds.map(name).join(' to '),
        text: si(capacitanceF, 'F'),
        why: `capacitances.${index}.capacitanceF`,
      })),
      ...(resonance ? [{ label: 'Self-resonance, other windings open', text: si(resonance.frequencyHz, 'Hz'), why: 'selfResonance.0.frequencyHz' }] : []),
    ],
  }
}

/** The figures beside the form, in groups; `–` where nothing can be told. */
export function liveFigures(evaluation: Evaluation, specification: WindingSpecification): FigureGroup[] {
  return [magnetics(evaluation), heat(evaluation), faults(evaluation), build(evaluation), leakage(evaluation, specification), capacitance(evaluation, specification)].filter(({ figures }) => figures.length > 0)
}
