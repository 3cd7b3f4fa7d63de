import type { Origin, Stated, TestCondition, WindingSpecification } from '../../engine/specification'
import type { Column, Row, TableContent } from '../table'
import { celsius, joined, limitFrom, percent, plain, quantity, STATUS_LETTERS, toleranceText } from './figures'
import { windingName, windingWithTerminals } from './input'
import { TOPOLOGY_WORDS } from './words'

const COLUMNS: readonly Column[] = [
  { key: 'what', header: 'Characteristic', always: true },
  { key: 'where', header: 'Measured at', always: true },
  { key: 'shorted', header: 'Shorted at the pins' },
  { key: 'condition', header: 'Conditions' },
  { key: 'minimum', header: 'Minimum', align: 'end' },
  { key: 'nominal', header: 'Nominal', align: 'end' },
  { key: 'maximum', header: 'Maximum', align: 'end' },
  { key: 'status', header: 'M/R/V', align: 'middle' },
]

type Stateful = { status: Stated<unknown>['status']; origin: Origin }

/** Electrical data beside the windings: inductance, leakage, saturation, ratios and what the kind of part asks for. */
export function electricalTable(specification: WindingSpecification): TableContent {
  const rows = [
    ...generalRows(specification),
    ...inductanceRows(specification),
    ...leakageRows(specification),
    ...saturationRows(specification),
    ...ratioRows(specification),
    ...parasiticRows(specification),
    ...specialRows(specification),
  ]
  return { title: 'Electrical data', columns: COLUMNS, rows }
}

const row = (field: Stateful, cells: Row['cells']): Row => ({ cells: { ...cells, status: STATUS_LETTERS[field.status] } })

function stated<T>(field: Stated<T>, cells: (value: T) => Row['cells']): Row[] {
  return field.value === null ? [] : [row(field, cells(field.value))]
}

const condition = ({ frequencyHz, levelV, temperatureC, model }: TestCondition) =>
  joined([quantity(frequencyHz, 'Hz'), `${quantity(levelV, 'V')} r.m.s.`, celsius(temperatureC), `${model} model`, 'others open'])

function generalRows({ electrical }: WindingSpecification): Row[] {
  return [
    ...stated(electrical.topology, (value) => ({ what: 'Function', where: TOPOLOGY_WORDS[value] })),
    ...stated(electrical.switchingFrequencyHz, ({ minimum, maximum }) => ({ what: 'Switching frequency', minimum: quantity(minimum, 'Hz'), maximum: quantity(maximum, 'Hz') })),
    ...stated(electrical.dutyRatio, ({ minimum, maximum }) => ({ what: 'Duty ratio', minimum: plain(minimum), maximum: plain(maximum) })),
    ...stated(electrical.polarity, () => ({ what: 'Polarity', where: 'dotted ends in phase' })),
  ]
}

function inductanceRows(specification: WindingSpecification): Row[] {
  return stated(specification.electrical.inductance, (limit) => ({
    what: 'Inductance',
    where: windingWithTerminals(specification, limit.windingId),
    condition: condition(limit),
    minimum: quantity(limitFrom(limit.nominalH, limit.lowerTolerance), 'H'),
    nominal: `${quantity(limit.nominalH, 'H')} ${toleranceText(limit.lowerTolerance, limit.upperTolerance)}`,
    maximum: quantity(limitFrom(limit.nominalH, limit.upperTolerance), 'H'),
  }))
}

function leakageRows(specification: WindingSpecification): Row[] {
  return specification.electrical.leakage.map((limit) =>
    row(limit, {
      what: 'Leakage inductance',
      where: windingWithTerminals(specification, limit.windingId),
      shorted: limit.shortedWindingIds.map((id) => windingWithTerminals(specification, id)).join(', '),
      condition: condition(limit).replace(', others open', ''),
      minimum: quantity(limit.minimumH, 'H'),
      maximum: quantity(limit.maximumH, 'H'),
    }),
  )
}

function saturationRows(specification: WindingSpecification): Row[] {
  return specification.electrical.saturation.map((limit) =>
    row(limit, {
      what: 'Inductance left at bias',
      where: windingWithTerminals(specification, limit.windingId),
      condition: joined([`${quantity(limit.currentA, 'A')} d.c.`, celsius(limit.temperatureC), limit.method === 'pulse' ? 'pulse method' : 'd.c. superposition']),
      minimum: `${percent(limit.remainingShare)} of the least value without bias`,
    }),
  )
}

function ratioRows(specification: WindingSpecification): Row[] {
  const { electrical, windings } = specification
  return electrical.turnsRatios.map((ratio) => {
    const turns = (id: string) => windings.find((winding) => winding.id === id)?.turns
    const [upper, lower] = [turns(ratio.numeratorWindingId), turns(ratio.denominatorWindingId)]
    const nominal = upper !== undefined && lower ? `${plain(upper)}:${plain(lower)} ` : ''
    return row(ratio, {
      what: 'Turns ratio',
      where: `${windingName(specification, ratio.numeratorWindingId)} : ${windingName(specification, ratio.denominatorWindingId)}`,
      condition: joined([quantity(ratio.frequencyHz, 'Hz'), quantity(ratio.levelV, 'V')]),
      nominal: `${nominal}±${percent(ratio.tolerance)}`,
    })
  })
}

function parasiticRows(specification: WindingSpecification): Row[] {
  const { electrical } = specification
  const capacitance = (what: string) => (limit: (typeof electrical.interwindingCapacitance)[number]) =>
    row(limit, {
      what,
      where: limit.windingIds.map((id) => windingName(specification, id)).join(' – '),
      condition: joined([quantity(limit.frequencyHz, 'Hz'), limit.terminalsTied]),
      maximum: quantity(limit.maximumF, 'F'),
    })
  return [
    ...stated(electrical.selfResonance, (value) => ({
      what: 'Self-resonant frequency',
      where: windingWithTerminals(specification, value.windingId),
      condition: value.terminalsTied,
      minimum: quantity(value.minimumHz, 'Hz'),
    })),
    ...electrical.interwindingCapacitance.map(capacitance('Interwinding capacitance')),
    ...electrical.windingCapacitance.map(capacitance('Winding capacitance')),
  ]
}

function specialRows(specification: WindingSpecification): Row[] {
  const { voltSecondProduct, currentSense, commonMode, gateDrive } = specification.electrical
  return [
    ...stated(voltSecondProduct, (value) => ({
      what: 'Voltage–time product',
      where: windingWithTerminals(specification, value.windingId),
      condition: joined([value.waveform.replace('-', ' '), celsius(value.temperatureC)]),
      minimum: quantity(value.minimumVs, 'Vs'),
    })),
    ...stated(currentSense, (value) => ({
      what: 'Current sensing',
      condition: joined([
        `burden ${quantity(value.burdenOhm, 'Ω')}`,
        `ratio error ${percent(value.ratioError)}`,
        `droop ${percent(value.droop)}`,
        `bandwidth ${quantity(value.bandwidthHz.minimum, 'Hz')} to ${quantity(value.bandwidthHz.maximum, 'Hz')}`,
        `primary current up to ${quantity(value.maximumPrimaryCurrentA, 'A')}`,
        `d.c. up to ${quantity(value.maximumDcA, 'A')}`,
      ]),
    })),
    ...(commonMode.value?.impedance ?? []).map((point) => row(commonMode, { what: 'Common-mode impedance', condition: quantity(point.frequencyHz, 'Hz'), minimum: quantity(point.minimumOhm, 'Ω') })),
    ...stated(commonMode, (value) => ({
      what: 'Common-mode choke',
      condition: joined([
        `rated ${quantity(value.ratedCurrentA, 'A')}, ${quantity(value.ratedVoltageV, 'V')} at ${celsius(value.ratedTemperatureC)}`,
        value.differentialLeakageH === null ? '' : `differential-mode leakage ${quantity(value.differentialLeakageH, 'H')}`,
      ]),
    })),
    ...stated(gateDrive, (value) => ({
      what: 'Gate drive',
      condition: joined([
        `dv/dt immunity ${quantity(value.dvDtImmunityVPerS, 'V/s')}`,
        value.propagationDelayS === null ? '' : `propagation delay ${quantity(value.propagationDelayS, 's')}`,
        `isolation capacitance ${quantity(value.isolationCapacitanceF, 'F')}`,
      ]),
    })),
  ]
}
