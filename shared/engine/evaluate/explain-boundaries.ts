import type { BoundaryResult, Working } from '../evaluation'
import type { Citation } from '../insulation/citation'
import type { DistanceRule } from '../insulation/distances'
import type { BoundaryRequirements } from '../insulation/product-standards'
import type { TestVoltageRule } from '../insulation/test-voltages'
import type { InsulationBoundary } from '../specification'
import type { CreepageGroup, Stress } from './boundaries'
import { explain } from './context'
import type { Context } from './context'
import type { ProvidedInsulation } from './insulation-paths'

export interface ExplainedBoundary {
  index: number
  boundary: InsulationBoundary
  stress: Stress
  group: CreepageGroup
  needs: BoundaryRequirements | null
  required: BoundaryResult['required']
  provided: ProvidedInsulation | null
  onMains: boolean
}

/** How the figures of one boundary came about: its stress, every rule of the standard that was looked at, and the way through the build. */
export function explainBoundary(context: Context, input: ExplainedBoundary): void {
  if (!context.working) return
  explainStress(context, input)
  explainRequired(context, input)
  explainProvided(context, input)
}

const place = (index: number, field: string) => `boundaries.${index}.${field}`

function explainStress(context: Context, { index, boundary, stress, onMains }: ExplainedBoundary): void {
  const inputs = [
    { name: 'nodes', value: onMains ? 'switched ends and supplies, mains on either rail in turn' : 'switched ends and supplies', unit: '', origin: 'waveforms of the corners' },
    { name: 'stated', value: boundary.workingVoltageVRms ?? 'nothing', unit: 'V', origin: `insulation.${place(index, 'workingVoltageVRms')}` },
  ]
  const source = 'IEC 60664-1:2020, 3.1'
  explain(context, place(index, 'workingVoltageVRms'), () => ({ symbol: 'U_rms', value: stress.rmsV, unit: 'V', formula: 'greatest rms of all pairs of nodes', inputs, source }))
  explain(context, place(index, 'recurringPeakV'), () => ({ symbol: 'Û', value: stress.peakV, unit: 'V', formula: 'greatest peak of all pairs of nodes, with the turn-off spike', inputs, source }))
}

const RULES: Readonly<Record<DistanceRule | TestVoltageRule, string>> = {
  impulse: 'row of the rated impulse voltage × factor of altitude',
  'recurring-peak': 'row of the recurring peak × factor of altitude',
  'high-frequency-peak': 'row of the peak above 30 kHz × factor of altitude',
  tracking: 'creepage of the rms voltage, between rows, twice for reinforced',
  'not-below-clearance': 'no shorter than the clearance',
  'means-of-protection': 'row of the means of protection',
  'required-withstand': 'row of the required withstand voltage',
  'working-peak': 'factor × recurring peak',
  'temporary-overvoltage': 'row of the mains voltage',
  'working-voltage': 'row of the working voltage, between rows',
  'rated-voltage': 'row of the rated voltage',
}

type Input = Working['inputs'][number]

const cited = ({ standard, edition, place: where, basis }: Citation) => `${standard}:${edition}, ${where}, ${basis === 'memory' ? 'from memory' : 'secondary copy'}`

const looked = (contributions: readonly { rule: DistanceRule | TestVoltageRule; citation: Citation; distanceMm?: number; valueV?: number }[]): Input[] =>
  contributions.map(({ rule, citation, distanceMm, valueV }) => ({ name: RULES[rule], value: distanceMm ?? valueV ?? 'not known', unit: distanceMm === undefined ? 'V' : 'mm', origin: cited(citation) }))

function explainRequired(context: Context, { index, boundary, stress, group, needs, required }: ExplainedBoundary): void {
  const { insulation } = context.specification
  const shared: Input[] = [
    { name: 'U_rms', value: stress.rmsV ?? 'not known', unit: 'V', origin: place(index, 'workingVoltageVRms') },
    { name: 'Û', value: stress.peakV ?? 'not known', unit: 'V', origin: place(index, 'recurringPeakV') },
    { name: 'insulation', value: boundary.insulation, unit: '', origin: `insulation.${place(index, 'insulation')}` },
    { name: 'pollution degree', value: insulation.pollutionDegree.value ?? 2, unit: '', origin: 'insulation.pollutionDegree' },
    { name: 'material group', value: group.value, unit: '', origin: group.origin },
    { name: 'altitude', value: insulation.altitudeM.value ?? 2000, unit: 'm', origin: 'insulation.altitudeM' },
  ]
  const rows = [
    ['clearanceMm', 'd_cl', 'mm', needs?.clearance.state === 'known' ? looked(needs.clearance.value.contributions) : []],
    ['creepageMm', 'd_cr', 'mm', needs?.creepage.state === 'known' ? looked(needs.creepage.value.contributions) : []],
    ['distanceThroughInsulationMm', 'd_ti', 'mm', []],
    ['testVoltageVRms', 'U_test', 'V', needs?.testVoltage.state === 'known' ? looked(needs.testVoltage.value.contributions) : []],
  ] as const
  for (const [field, symbol, unit, rules] of rows) {
    const { value, source, reason } = required[field]
    const formula = rules.length > 0 ? `greatest of: ${rules.map(({ name }) => name).join('; ')}` : (reason ?? 'row of the table')
    explain(context, place(index, `required.${field}`), () => ({ symbol, value, unit, formula, inputs: [...shared, ...rules], source }))
  }
}

function explainProvided(context: Context, { index, provided }: ExplainedBoundary): void {
  provided?.paths.forEach((path, position) => {
    const points = path.points.map(([x, y]) => `${x.toFixed(2)}, ${y.toFixed(2)}`).join(' → ')
    const inputs = [
      { name: 'way', value: path.how, unit: '', origin: 'layout' },
      { name: 'points', value: points, unit: 'mm', origin: ORIGINS[path.plane] },
    ]
    const working = () => ({ symbol: SYMBOLS[path.kind], value: path.lengthMm, unit: 'mm', formula: 'shortest way through the coil as laid out', inputs, source: 'geometry of the build' })
    explain(context, place(index, `provided.paths.${position}.lengthMm`), working)
  })
}

const ORIGINS = { window: 'layout, from the left flange and the tube', pins: 'pins, from the middle of the former', ring: 'layout, from the middle of the ring' } as const
const SYMBOLS = { clearance: 'd_cl', creepage: 'd_cr', 'through-insulation': 'd_ti' } as const
