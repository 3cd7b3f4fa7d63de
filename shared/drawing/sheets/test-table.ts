import type { TestRow, WindingSpecification } from '../../engine/specification'
import type { Column, TableContent } from '../table'
import { celsius, joined, plain, quantity, STATUS_LETTERS } from './figures'
import { CHARACTERISTIC_WORDS, EXTENT_WORDS } from './words'

const COLUMNS: readonly Column[] = [
  { key: 'number', header: 'No.', align: 'middle', font: 'sans-bold', always: true },
  { key: 'what', header: 'Characteristic', always: true },
  { key: 'symbol', header: 'Symbol', always: true },
  { key: 'driven', header: 'driven', group: 'Pins', align: 'middle' },
  { key: 'shorted', header: 'shorted', group: 'Pins', align: 'middle' },
  { key: 'open', header: 'open', group: 'Pins', align: 'middle' },
  { key: 'method', header: 'Method' },
  { key: 'instrument', header: 'Instrument' },
  { key: 'frequency', header: 'Frequency', align: 'end' },
  { key: 'level', header: 'Level', align: 'end' },
  { key: 'bias', header: 'Bias d.c.', align: 'end' },
  { key: 'temperature', header: 'At', align: 'end' },
  { key: 'minimum', header: 'min.', group: 'Limits', align: 'end' },
  { key: 'nominal', header: 'nom.', group: 'Limits', align: 'end' },
  { key: 'maximum', header: 'max.', group: 'Limits', align: 'end' },
  { key: 'extent', header: 'Extent' },
  { key: 'critical', header: 'CTQ', align: 'middle' },
  { key: 'record', header: 'Record' },
  { key: 'reaction', header: 'On failure' },
  { key: 'status', header: 'M/R/V', align: 'middle' },
]

/** The test table: what is measured where, how, to which limits, on how many parts. */
export function testTable(specification: WindingSpecification): TableContent {
  const rows = specification.tests.map((test) => ({ tag: `test:${test.id}`, cells: cells(test, specification) }))
  return { title: 'Tests', columns: COLUMNS, rows }
}

function cells(test: TestRow, specification: WindingSpecification): Record<string, string> {
  const limit = (value: number | null) => (value === null ? '' : test.unit === '1' ? plain(value) : test.unit === 'mm' ? `${plain(value)}\u00a0mm` : quantity(value, test.unit))
  const isPassFail = test.minimum === null && test.nominal === null && test.maximum === null
  return {
    number: plain(test.number),
    what: CHARACTERISTIC_WORDS[test.characteristic],
    symbol: test.symbol,
    driven: test.drivenTerminals.join(', '),
    shorted: test.shortedTerminals.map((group) => group.join('+')).join(', '),
    open: test.openTerminals.join(', '),
    method: joined([test.method, hipotTimes(test, specification)]),
    instrument: test.instrumentClass,
    frequency: quantity(test.frequencyHz, 'Hz'),
    level: quantity(test.levelV, 'V'),
    bias: quantity(test.biasA, 'A'),
    temperature: celsius(test.temperatureC),
    minimum: limit(test.minimum),
    nominal: isPassFail ? 'pass / fail' : limit(test.nominal),
    maximum: limit(test.maximum),
    extent: joined([EXTENT_WORDS[test.extent], test.acceptableQualityLimit === null ? '' : `AQL ${plain(test.acceptableQualityLimit)}`]),
    critical: test.criticalToQuality ? 'yes' : '',
    record: test.record === 'reading' ? 'reading' : 'pass / fail',
    reaction: test.reaction,
    status: STATUS_LETTERS[test.status],
  }
}

function hipotTimes(test: TestRow, { insulation }: WindingSpecification): string {
  const boundary = insulation.boundaries.find(({ id }) => id === test.boundaryId)
  return boundary ? `boundary ${boundary.name}` : ''
}
