import { coreLossFit } from '../evaluate/core-loss'
import type { Finding } from '../findings'
import type { Library, MaterialRow } from '../library'
import { coreLossTemperatureFactor, steinmetzLossWPerM3 } from '../losses/core-loss'
import type { ProposalReason } from './reasons'

/** Flux density and temperature at which grades are compared. */
const COMPARISON = { peakFluxDensityT: 0.1, temperatureC: 100 }

export interface MaterialChoice {
  material: MaterialRow | null
  reasons: ProposalReason[]
  findings: Finding[]
}

/**
 * Material for a power part: the preferred one, else the power grade with the least loss at the frequency whose fit holds
 * there and whose saturation is known when hot.
 */
export function chooseMaterial(library: Library, frequencyHz: number, preferredId: string | null, use: 'power' | 'common-mode' = 'power'): MaterialChoice {
  const preferred = library.materials.find(({ id }) => id === preferredId)
  if (preferred) return { material: preferred, reasons: [{ code: 'material-preferred', path: 'core.material', values: { material: preferred.name } }], findings: [] }
  if (use === 'common-mode') return mostPermeable(library, frequencyHz)
  const { grades, isWithin } = powerGrades(library, frequencyHz)
  const ranked = grades.map((material) => ({ material, lossWPerM3: lossAt(material, frequencyHz) })).sort((a, b) => a.lossWPerM3 - b.lossWPerM3 || (a.material.id < b.material.id ? -1 : 1))
  const best = ranked[0]
  if (!best) return { material: null, reasons: [], findings: [{ code: 'material-not-in-library', severity: 'error', path: 'core.material', values: { frequencyHz } }] }
  return {
    material: best.material,
    reasons: [{ code: 'material-least-loss', path: 'core.material', values: { material: best.material.name, lossWPerM3: best.lossWPerM3, frequencyHz, ...COMPARISON } }],
    findings: isWithin ? [] : [{ code: 'material-fit-out-of-range', severity: 'warning', path: 'core.material', values: { material: best.material.name, frequencyHz } }],
  }
}

/** Power grades whose saturation is known when hot: those whose loss is known at the frequency, for want of any the others. */
export function powerGrades({ materials }: Library, frequencyHz: number): { grades: MaterialRow[]; isWithin: boolean } {
  const usable = materials.filter(({ use, saturation, lossFits }) => use === 'power' && lossFits.length > 0 && saturation.some(({ temperatureC }) => temperatureC >= 100))
  const within = usable.filter(({ lossFits }) => lossFits.some(({ minimumHz, maximumHz }) => frequencyHz >= minimumHz && frequencyHz <= maximumHz))
  return { grades: within.length > 0 ? within : usable, isWithin: within.length > 0 }
}

/** Grades against common-mode noise whose saturation is known. */
export const commonModeGrades = ({ materials }: Library): MaterialRow[] => materials.filter(({ use, saturation }) => use === 'common-mode' && saturation.length > 0)

/** Against common-mode noise the permeability counts; the flux is small. */
function mostPermeable(library: Library, frequencyHz: number): MaterialChoice {
  const best = commonModeGrades(library).sort((a, b) => b.initialPermeability - a.initialPermeability || (a.id < b.id ? -1 : 1))[0]
  if (!best) return { material: null, reasons: [], findings: [{ code: 'material-not-in-library', severity: 'error', path: 'core.material', values: { frequencyHz } }] }
  return { material: best, reasons: [{ code: 'material-preferred', path: 'core.material', values: { material: best.name } }], findings: [] }
}

function lossAt({ lossFits }: MaterialRow, frequencyHz: number): number {
  const distance = ({ minimumHz, maximumHz }: MaterialRow['lossFits'][number]) => Math.max(Math.log(minimumHz / frequencyHz), Math.log(frequencyHz / maximumHz), 0)
  const fit = coreLossFit([...lossFits].sort((a, b) => distance(a) - distance(b))[0]!)
  return steinmetzLossWPerM3(fit, { frequencyHz, peakFluxDensityT: COMPARISON.peakFluxDensityT }) * coreLossTemperatureFactor(fit, COMPARISON.temperatureC)
}
