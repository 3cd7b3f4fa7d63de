import { limitsAround, toDigits } from '../digits'
import type { BoundaryEnd, SpecificationDocument, TestRow, Winding, WindingSpecification } from '../specification'
import { interwindingRows, resonanceRows } from './capacitance-rows'
import { testRow } from './rows'
import { terminalsAt, terminalsBut, terminalsOf } from './terminals'

const LCR = 'Impedance bridge, 0.5 % or better'
const BRIDGE_METHOD = 'IEC 62044-2, low level'

/**
 * The test table that the limits of a document ask for: inductance, leakage, resistance, ratio, polarity, inductance at bias,
 * interwinding capacitance, self-resonance, withstand and insulation resistance, and the height. Rows of `kept` that a person entered stay as they are, and no row
 * with their symbol is proposed. Limits come from the document, so that a figure stands in one place.
 */
export function proposeTests(document: SpecificationDocument, kept: readonly TestRow[] = []): TestRow[] {
  const { specification } = document
  const entered = kept.filter(({ origin }) => origin.kind !== 'proposed')
  const symbols = new Set(entered.map(({ symbol }) => symbol))
  const rows = [
    ...inductanceRows(specification),
    ...leakageRows(specification),
    ...resistanceRows(specification),
    ...ratioRows(specification),
    ...polarityRows(specification),
    ...biasRows(specification),
    ...interwindingRows(specification),
    ...resonanceRows(specification),
    ...withstandRows(specification),
    ...insulationRows(specification),
    ...dimensionRows(specification),
  ].filter(({ symbol }) => !symbols.has(symbol))
  const ids = new Set(entered.map(({ id }) => id))
  let next = 1
  const freshId = () => {
    while (ids.has(`t${next}`)) next += 1
    return `t${next++}`
  }
  return [...rows.map((row) => ({ ...row, ...limitsInRange(row), id: freshId() })), ...entered].map((row, index) => ({ ...row, number: index + 1 }))
}

/** A limit beyond what a document holds comes of an input that makes no sense, and is none. */
const limitsInRange = ({ minimum, nominal, maximum }: TestRow) => {
  const inRange = (value: number | null) => (value !== null && Math.abs(value) < 1e15 ? value : null)
  return { minimum: inRange(minimum), nominal: inRange(nominal), maximum: inRange(maximum) }
}

const named = ({ windings }: WindingSpecification, id: string): Winding | undefined => windings.find((winding) => winding.id === id)

function inductanceRows(specification: WindingSpecification): TestRow[] {
  const limit = specification.electrical.inductance.value
  const winding = limit && named(specification, limit.windingId)
  if (!limit || !winding) return []
  const { nominalH, lowerTolerance, upperTolerance } = limit
  return [
    testRow('inductance', `L ${winding.name}`, 'H', {
      windingId: winding.id,
      drivenTerminals: terminalsOf(winding),
      openTerminals: terminalsBut(specification, [winding.id]),
      method: `${BRIDGE_METHOD}, ${limit.model} model`,
      instrumentClass: LCR,
      frequencyHz: limit.frequencyHz,
      levelV: limit.levelV,
      temperatureC: limit.temperatureC,
      ...limitsAround(nominalH, { lower: lowerTolerance, upper: upperTolerance }),
      nominal: nominalH,
      criticalToQuality: true,
    }),
  ]
}

function leakageRows(specification: WindingSpecification): TestRow[] {
  return specification.electrical.leakage.flatMap((limit, index) => {
    const winding = named(specification, limit.windingId)
    const shorted = limit.shortedWindingIds.flatMap((id) => named(specification, id) ?? [])
    if (!winding) return []
    return [
      testRow('leakage', specification.electrical.leakage.length > 1 ? `Lk ${winding.name} ${index + 1}` : `Lk ${winding.name}`, 'H', {
        windingId: winding.id,
        drivenTerminals: terminalsOf(winding),
        shortedTerminals: shorted.map(terminalsOf),
        openTerminals: terminalsBut(specification, [winding.id, ...limit.shortedWindingIds]),
        method: `Impedance bridge, ${shorted.map(({ name }) => name).join(', ')} shorted at the pins`,
        instrumentClass: LCR,
        frequencyHz: limit.frequencyHz,
        levelV: limit.levelV,
        temperatureC: limit.temperatureC,
        minimum: limit.minimumH,
        maximum: limit.maximumH,
        criticalToQuality: true,
      }),
    ]
  })
}

function resistanceRows({ windings }: WindingSpecification): TestRow[] {
  return windings.flatMap((winding) => {
    const limit = winding.dcResistance
    if (!limit) return []
    return [
      testRow('dc-resistance', `Rdc ${winding.name}`, 'Ω', {
        windingId: winding.id,
        drivenTerminals: terminalsOf(winding),
        method: limit.fourTerminal ? 'Four-terminal, corrected to the stated temperature' : 'Two-terminal, corrected to the stated temperature',
        instrumentClass: 'Ohmmeter, 0.5 % or better',
        temperatureC: limit.temperatureC,
        minimum: limit.minimumOhm,
        nominal: limit.nominalOhm,
        maximum: limit.maximumOhm,
      }),
    ]
  })
}

/** A ratio is read to four digits. */
const RATIO_DIGITS = 4

function ratioRows(specification: WindingSpecification): TestRow[] {
  return specification.electrical.turnsRatios.flatMap((ratio) => {
    const numerator = named(specification, ratio.numeratorWindingId)
    const denominator = named(specification, ratio.denominatorWindingId)
    if (!numerator || !denominator || !(denominator.turns > 0)) return []
    const nominal = numerator.turns / denominator.turns
    const [driven, read] = nominal >= 1 ? [numerator, denominator] : [denominator, numerator]
    return [
      testRow('turns-ratio', `${numerator.name}:${denominator.name}`, '1', {
        windingId: denominator.id,
        drivenTerminals: terminalsOf(driven),
        openTerminals: terminalsOf(read),
        method: 'Voltage ratio, driven at the winding with more turns',
        instrumentClass: 'Ratio bridge, 0.1 % or better',
        frequencyHz: ratio.frequencyHz,
        levelV: ratio.levelV,
        ...limitsAround(nominal, { lower: -ratio.tolerance, upper: ratio.tolerance }),
        nominal: toDigits(nominal, RATIO_DIGITS),
        criticalToQuality: true,
      }),
    ]
  })
}

function polarityRows(specification: WindingSpecification): TestRow[] {
  const wound = specification.windings.filter(({ role }) => role !== 'shield')
  const first = named(specification, specification.electrical.inductance.value?.windingId ?? '') ?? wound[0]
  if (wound.length < 2 || !first) return []
  return [
    testRow('polarity', 'Pol', '1', {
      windingId: first.id,
      drivenTerminals: terminalsOf(first),
      openTerminals: terminalsBut(specification, [first.id]),
      method: 'All dotted terminals in phase with the driven winding’s start',
      frequencyHz: 100e3,
      levelV: 0.25,
      record: 'pass-fail',
    }),
  ]
}

function biasRows(specification: WindingSpecification): TestRow[] {
  const inductance = specification.electrical.inductance.value
  return specification.electrical.saturation.flatMap((limit) => {
    const winding = named(specification, limit.windingId)
    if (!winding) return []
    // Of a winding without a stated least inductance the share of its own reading is the limit.
    const leastH = inductance?.windingId === winding.id && inductance.lowerTolerance !== null ? inductance.nominalH * (1 + inductance.lowerTolerance) : null
    const share = `${toDigits(limit.remainingShare * 100, 3)} %`
    const hot = limit.temperatureC > 40
    return [
      testRow('inductance-at-bias', `L ${winding.name} ${limit.temperatureC} °C bias`, 'H', {
        windingId: winding.id,
        drivenTerminals: terminalsOf(winding),
        openTerminals: terminalsBut(specification, [winding.id]),
        method: `${limit.method === 'pulse' ? 'Current pulse' : 'Direct current superposed'}, ${leastH === null ? `at least ${share} of its own value without bias` : `limit ${share} of the least inductance without bias`}`,
        instrumentClass: 'Pulse inductance meter, 3 % or better',
        frequencyHz: inductance?.frequencyHz ?? null,
        levelV: inductance?.levelV ?? null,
        biasA: limit.currentA,
        temperatureC: limit.temperatureC,
        minimum: leastH === null ? null : toDigits(leastH * limit.remainingShare, 3, 'up'),
        extent: hot ? 'type-test' : 'sample',
        acceptableQualityLimit: hot ? null : 0.65,
        criticalToQuality: true,
      }),
    ]
  })
}

/** Both ends of a boundary by the windings' names: one name where a side holds one winding. */
function withstandRows(specification: WindingSpecification): TestRow[] {
  return specification.insulation.boundaries.flatMap((boundary) => {
    const { test } = boundary
    if (!test) return []
    const [one, other] = boundary.between.map((end) => terminalsAt(specification, end))
    const kind = test.kind === 'dc' ? 'd.c.' : `a.c. ${test.frequencyHz} Hz`
    return [
      testRow('hipot', `HV ${boundary.name}`, 'V', {
        boundaryId: boundary.id,
        drivenTerminals: one!,
        shortedTerminals: [one!, other!],
        openTerminals: [],
        method: `Electric strength ${kind}, ${test.routineDwellS} s on every part (type test ${test.voltageV} V, ${test.dwellS} s), ramp ${test.rampS} s, trip ${test.tripA * 1000} mA; against ${other!.join(', ')}`,
        frequencyHz: test.kind === 'dc' ? null : test.frequencyHz,
        levelV: test.routineVoltageV,
        criticalToQuality: boundary.insulation !== 'functional',
        reaction: 'Reject the part; no repetition',
        record: 'pass-fail',
      }),
    ]
  })
}

const isSide = ({ kind }: BoundaryEnd) => kind === 'side'

/** Least insulation resistance between the sides, and from a protected side to the core. Source: common practice. */
const INSULATION_RESISTANCE_OHM = 100e6

function insulationRows(specification: WindingSpecification): TestRow[] {
  const tested = specification.insulation.boundaries.filter(({ between, insulation }) => between.every(isSide) || insulation !== 'functional')
  return tested.map((boundary) => {
    const [one, other] = boundary.between.map((end) => terminalsAt(specification, end))
    return testRow('insulation-resistance', `IR ${boundary.name}`, 'Ω', {
      boundaryId: boundary.id,
      drivenTerminals: one!,
      shortedTerminals: [one!, other!],
      method: `500 V d.c., 2 s; against ${other!.join(', ')}`,
      levelV: 500,
      minimum: INSULATION_RESISTANCE_OHM,
      extent: boundary.insulation === 'functional' ? 'sample' : 'every-part',
      acceptableQualityLimit: boundary.insulation === 'functional' ? 0.65 : null,
    })
  })
}

function dimensionRows({ former }: WindingSpecification): TestRow[] {
  const envelope = former.envelope.value
  if (!envelope) return []
  return [testRow('dimension', 'Height', 'mm', { method: 'Height gauge, over all', temperatureC: null, maximum: envelope.heightMm, extent: 'sample', acceptableQualityLimit: 1, reaction: 'Hold the lot and ask' })]
}
