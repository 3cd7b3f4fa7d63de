import { LITZ_LENGTH_FACTOR, litzFigures } from '#shared/engine/index'
import type { WireRow } from '#shared/engine/library'
import { rounded } from './table'

interface Litz {
  strandMm: string
  /** Bundles of each stage from the strands outward. */
  constructs: readonly (readonly number[])[]
}

/** Constructs that can be twisted in stages of three to seven or as one bunch of up to thirty or so. */
const LITZ: readonly Litz[] = [
  { strandMm: '0.200', constructs: [[7], [12], [20], [5, 8], [5, 12], [5, 5, 4], [7, 5, 5], [5, 5, 10]] },
  { strandMm: '0.100', constructs: [[7], [10], [15], [20], [30], [5, 12], [5, 5, 4], [5, 5, 6], [5, 5, 8], [5, 9, 9], [5, 5, 24]] },
  { strandMm: '0.071', constructs: [[15], [30], [5, 8], [5, 12], [5, 5, 4], [5, 6, 6], [5, 9, 9], [5, 5, 24]] },
  { strandMm: '0.050', constructs: [[20], [5, 8], [5, 12], [5, 5, 4], [5, 9, 5], [5, 9, 8], [5, 5, 24], [7, 5, 5, 6]] },
]

/** One layer of polyester or silk over the bundle; bundles of a few strands are left bare. */
const SERVING_MM = 0.035
const SERVED_FROM = 40

/** Litz of enamelled strands by geometry, bare and served ones alike without a maker's figure. */
export const shippedLitz = (metric: readonly WireRow[]): WireRow[] =>
  LITZ.flatMap(({ strandMm, constructs }) => {
    const strand = metric.find((row) => row.id === `iec-${strandMm}`)!
    return constructs.map((stages) => litzRow(strand, strandMm, stages))
  })

const GRADES = ['enamel-grade-1', 'enamel-grade-2', 'enamel-grade-3'] as const

function litzRow(strand: WireRow, strandMm: string, stages: readonly number[]): WireRow {
  const strands = stages.reduce((product, count) => product * count, 1)
  const servingMm = strands >= SERVED_FROM ? SERVING_MM : 0
  const figures = (strandOverallMm: number) => litzFigures({ stages, strandConductorMm: strand.conductorMm, strandOverallMm, servingMm, layLengthMm: null })
  const size = `${strands} × ${strandMm} mm`
  const share = (ohmPerM: number | null) => (ohmPerM === null ? null : rounded((LITZ_LENGTH_FACTOR * ohmPerM) / strands, 7))
  const overall = Object.fromEntries(GRADES.map((grade) => [grade, strand.overallMm[grade] === null ? null : rounded(figures(strand.overallMm[grade]).overallMm)]))
  return {
    ...strand,
    id: `litz-${strands}x${strandMm}`,
    name: `Litz ${size}${servingMm > 0 ? ', served' : ''}`,
    source: 'Geometry: overall diameter p · √n · strand overall diameter and serving (IEC 60317-11, p recalled); resistance of the strand (IEC 60317-0-1) over n, times 1.02 for the lay',
    edition: 'Edition not stated; check against the one in force',
    confidence: 'generic',
    unverified: ['overallMm.enamel-grade-1', 'overallMm.enamel-grade-2', 'overallMm.enamel-grade-3', 'resistance20.nominalOhmPerM', 'resistance20.minimumOhmPerM', 'resistance20.maximumOhmPerM'],
    note: `Generic, unverified, replace before release. ${constructWords(stages)}${servingMm > 0 ? `, one layer of serving, ${servingMm} mm on the radius` : ', without serving'}. Grade is that of the strand.`,
    form: 'litz',
    standard: 'IEC 60317-11',
    size,
    strands,
    copperAreaMm2: rounded(strands * strand.copperAreaMm2, 6),
    resistance20: { nominalOhmPerM: share(strand.resistance20.nominalOhmPerM)!, minimumOhmPerM: share(strand.resistance20.minimumOhmPerM), maximumOhmPerM: share(strand.resistance20.maximumOhmPerM) },
    overallMm: { ...strand.overallMm, ...overall, 'triple-insulated': null, 'fully-insulated': null, bare: null },
  }
}

/** `5 × 5 × 8 strands, twisted in stages`, the outermost bundle first. */
function constructWords(stages: readonly number[]): string {
  const words = [...stages].reverse().join(' × ')
  return stages.length > 1 ? `${words} strands, twisted in ${stages.length} stages` : `${words} strands in one bunch`
}
