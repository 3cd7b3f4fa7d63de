import type { BoundaryResult, SourcedValue } from '../../engine/evaluation'
import type { InsulationBoundary } from '../../engine/specification'
import { formatEngineering, formatNumber } from '../../number-format'
import type { Column, Row, TableContent } from '../table'
import { duration, joined, plain, PREDICTED, quantity, STATUS_LETTERS } from './figures'
import type { DrawingInput } from './input'
import { boundaryEndWords, INSULATION_WORDS, STATE_WORDS } from './words'

const distance = (key: string, group: string): Column[] => [
  { key: `${key}Specified`, header: 'specified', group, align: 'middle', always: true },
  { key: `${key}Required`, header: 'required', group, align: 'middle', always: true },
  { key: `${key}Provided`, header: 'provided', group, align: 'middle', always: true },
]

const COLUMNS: readonly Column[] = [
  { key: 'number', header: 'No.', align: 'middle', font: 'sans-bold', always: true },
  { key: 'name', header: 'Boundary', font: 'sans-bold', always: true },
  { key: 'between', header: 'Between' },
  { key: 'type', header: 'Insulation', always: true },
  { key: 'rms', header: 'r.m.s.', group: 'Working voltage', align: 'end' },
  { key: 'peak', header: 'rec. peak', group: 'Working voltage', align: 'end' },
  { key: 'frequency', header: 'f', group: 'Working voltage', align: 'end' },
  ...distance('clearance', 'Clearance, mm'),
  ...distance('creepage', 'Creepage distance, mm'),
  ...distance('solid', 'Through insulation, mm'),
  ...distance('layers', 'Layers'),
  { key: 'state', header: 'Judged', align: 'middle' },
  { key: 'status', header: 'M/R/V', align: 'middle' },
]

const TEST_COLUMNS: readonly Column[] = [
  { key: 'name', header: 'Boundary', font: 'sans-bold', always: true },
  { key: 'voltage', header: 'Test voltage', group: 'Type test', align: 'end' },
  { key: 'kind', header: 'Kind', group: 'Type test' },
  { key: 'ramp', header: 'Rise', group: 'Type test', align: 'end' },
  { key: 'dwell', header: 'Dwell', group: 'Type test', align: 'end' },
  { key: 'trip', header: 'Trip current', align: 'end' },
  { key: 'routineVoltage', header: 'Test voltage', group: 'Routine test, every part', align: 'end' },
  { key: 'routineDwell', header: 'Dwell', group: 'Routine test, every part', align: 'end' },
  { key: 'required', header: 'Required by the standard', align: 'end' },
  { key: 'provided', header: 'How the build provides its distances' },
]

export interface InsulationSection {
  boundaries: TableContent
  withstand: TableContent
  /** Sources of required values by their number in the table. */
  sources: string[]
}

const MEMORY_MARK = '†'
const UNKNOWN = '–'

/** Boundaries with specified, required and provided distances, their withstand tests and the sources of the requirements. */
export function insulationSection(input: DrawingInput): InsulationSection {
  const { boundaries } = input.specification.insulation
  const sources: string[] = []
  const rows = boundaries.map((boundary, index) => boundaryRow(input, boundary, index + 1, sources))
  const tests = boundaries.map((boundary) => withstandRow(boundary, resultOf(input, boundary), sources))
  return {
    boundaries: { title: 'Insulation boundaries', columns: COLUMNS, rows },
    withstand: { title: 'Withstand tests of the boundaries', columns: TEST_COLUMNS, rows: tests },
    sources: sources.map((source, index) => `[${index + 1}] ${source}`),
  }
}

const resultOf = ({ evaluation }: DrawingInput, { id }: InsulationBoundary) => evaluation?.boundaries.find(({ boundaryId }) => boundaryId === id)

function boundaryRow(input: DrawingInput, boundary: InsulationBoundary, number: number, sources: string[]): Row {
  const result = resultOf(input, boundary)
  const required = (key: Exclude<keyof BoundaryResult['required'], 'testVoltageVRms'>) => sourced(result?.required[key], sources, predicted)
  return {
    tag: `boundary:${boundary.id}`,
    cells: {
      number: plain(number),
      name: boundary.name,
      between: boundary.between.map((end) => boundaryEndWords(input.specification, end)).join(' – '),
      type: INSULATION_WORDS[boundary.insulation],
      rms: quantity(boundary.workingVoltageVRms, 'V'),
      peak: quantity(boundary.recurringPeakV, 'V'),
      frequency: quantity(boundary.frequencyHz, 'Hz'),
      clearanceSpecified: plain(boundary.clearanceMm) || UNKNOWN,
      clearanceRequired: required('clearanceMm'),
      clearanceProvided: predicted(result?.provided.clearanceMm),
      creepageSpecified: plain(boundary.creepageMm) || UNKNOWN,
      creepageRequired: required('creepageMm'),
      creepageProvided: predicted(result?.provided.creepageMm),
      solidSpecified: plain(boundary.distanceThroughInsulationMm) || UNKNOWN,
      solidRequired: required('distanceThroughInsulationMm'),
      solidProvided: predicted(result?.provided.distanceThroughInsulationMm),
      layersSpecified: plain(boundary.insulationLayers) || UNKNOWN,
      layersRequired: required('layers'),
      layersProvided: predicted(result?.provided.layers),
      state: result ? STATE_WORDS[result.state] : '',
      status: STATUS_LETTERS[boundary.status],
    },
  }
}

const predicted = (value: number | null | undefined): string => formatNumber(value, PREDICTED)

const predictedVolts = (value: number | null | undefined): string => (value == null ? UNKNOWN : formatEngineering(value, 'V', PREDICTED))

/** A required value with the number of its source, and a mark where it comes from memory or a secondary copy. */
function sourced(value: SourcedValue | undefined, sources: string[], show: (value: number | null) => string): string {
  if (!value || value.value === null) return UNKNOWN
  const mark = value.fromMemory ? MEMORY_MARK : ''
  return `${show(value.value)}${mark} [${sourceNumber(value.source, sources)}]`
}

function sourceNumber(source: string, sources: string[]): number {
  if (!sources.includes(source)) sources.push(source)
  return sources.indexOf(source) + 1
}

function withstandRow(boundary: InsulationBoundary, result: BoundaryResult | undefined, sources: string[]): Row {
  const { test } = boundary
  return {
    tag: `boundary:${boundary.id}`,
    cells: {
      name: boundary.name,
      voltage: quantity(test?.voltageV, 'V'),
      kind: test ? (test.kind === 'dc' ? 'd.c.' : joined(['a.c. r.m.s.', quantity(test.frequencyHz, 'Hz')])) : 'not stated',
      ramp: duration(test?.rampS),
      dwell: duration(test?.dwellS),
      trip: quantity(test?.tripA, 'A'),
      routineVoltage: quantity(test?.routineVoltageV, 'V'),
      routineDwell: duration(test?.routineDwellS),
      required: sourced(result?.required.testVoltageVRms, sources, predictedVolts),
      provided: result?.provided.how ?? '',
    },
  }
}

/** True when a required value carries the mark. */
export const anyFromMemory = ({ evaluation }: DrawingInput): boolean =>
  evaluation?.boundaries.some(({ required }) => Object.values(required).some((value) => value.fromMemory)) ?? false
