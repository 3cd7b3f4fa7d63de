import type { WireRow } from '#shared/engine/library'
import { foilResistanceOhmPerM } from '#shared/engine/index'
import { rounded } from './table'

const THICKNESSES_MM = [0.025, 0.05, 0.1, 0.15, 0.2, 0.3] as const
const WIDTHS_MM = [6, 8, 10, 12, 14, 16, 18, 20, 22, 25, 28, 32] as const

/** Copper foil as strip of whole widths; other widths are slit to order and entered as a row of the company's own. */
export const shippedFoils = (): WireRow[] => THICKNESSES_MM.flatMap((thicknessMm) => WIDTHS_MM.map((widthMm) => foilRow(thicknessMm, widthMm)))

function foilRow(thicknessMm: number, widthMm: number): WireRow {
  const size = `${thicknessMm.toFixed(3)} × ${widthMm} mm`
  return {
    kind: 'wire',
    id: `foil-${thicknessMm.toFixed(3)}x${widthMm}`,
    version: 1,
    name: `Copper foil ${size}`,
    source: 'Geometry; resistance 1/58 Ω·mm²/m over the section (IEC 60028)',
    edition: 'IEC 60028:1925',
    confidence: 'generic',
    unverified: ['conductorMm', 'widthMm', 'resistance20.nominalOhmPerM'],
    note: 'Generic, unverified, replace before release. Bare, edges without burr; the tape between the turns is its insulation.',
    form: 'foil',
    standard: '',
    size,
    conductorMm: thicknessMm,
    conductorToleranceMm: null,
    strands: 1,
    copperAreaMm2: rounded(thicknessMm * widthMm, 6),
    resistance20: { nominalOhmPerM: rounded(foilResistanceOhmPerM({ thicknessMm, widthMm }), 7), minimumOhmPerM: null, maximumOhmPerM: null },
    overallMm: { 'enamel-grade-1': null, 'enamel-grade-2': null, 'enamel-grade-3': null, 'triple-insulated': null, 'fully-insulated': null, bare: thicknessMm },
    widthMm,
  }
}
