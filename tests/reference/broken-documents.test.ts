import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { evaluate, propose, refresh } from '#shared/engine/index'
import type { CheckResult } from '#shared/engine/evaluation'
import type { Library } from '#shared/engine/library'
import type { FlybackDuty, RequirementSheet, SequenceStep, SpecificationDocument, TestRow, WindingStep } from '#shared/engine/specification'

const library = shippedLibrary()
const flyback = ({ duty }: Pick<RequirementSheet, 'duty'>) => duty as FlybackDuty
const sheets = {
  insulated: HARBOUR_SUPPLY,
  margin: { ...HARBOUR_SUPPLY, insulationMethod: 'margin-tape' } as RequirementSheet,
  buoy: BUOY_SUPPLY,
}
type Base = keyof typeof sheets
const proposed = new Map(Object.entries(sheets).map(([name, sheet]) => [name as Base, propose(sheet, library).document]))

const copyOf = (base: Base): SpecificationDocument => structuredClone(proposed.get(base)!)
const stops = ({ severity, state }: CheckResult) => severity === 'S' && state !== 'met'
const keyOf = ({ code, path }: CheckResult) => `${code} ${path}`
const stopping = (document: SpecificationDocument, from: Library = library) => evaluate(document, from).checks.filter(stops)

/** What stops a broken document and did not stop the whole one, as code and state. */
function newStops(base: Base, broken: SpecificationDocument): Map<string, CheckResult['state']> {
  const before = new Set(stopping(copyOf(base)).map(keyOf))
  return new Map(stopping(broken).filter((check) => !before.has(keyOf(check))).map((check) => [check.code, check.state]))
}

const windingStep = ({ specification }: SpecificationDocument, windingId: string, nth = 0) => specification.sequence.filter((step): step is WindingStep => step.kind === 'winding' && step.windingId === windingId)[nth]!
const winding = ({ specification }: SpecificationDocument, name: string) => specification.windings.find((one) => one.name === name)!
const boundary = ({ specification }: SpecificationDocument, name: string) => specification.insulation.boundaries.find((one) => one.name === name)!
const row = ({ specification }: SpecificationDocument, symbol: string): TestRow => specification.tests.find((one) => one.symbol === symbol)!
const wire = (document: SpecificationDocument, name: string, start: string, finish: string) => {
  const one = winding(document, name)
  Object.assign(one, { startTerminal: start, finishTerminal: finish })
  Object.assign(windingStep(document, one.id), { startTerminal: start, finishTerminal: finish })
}
const limitOf = ({ specification }: SpecificationDocument) => specification.electrical.inductance.value!
const duty = ({ requirement }: SpecificationDocument) => flyback(requirement!)

interface Break {
  name: string
  base: Base
  change: (document: SpecificationDocument) => void
  code: string
  state?: CheckResult['state']
}

/** Each once passed as a whole document. */
const SAFETY: Break[] = [
  { name: 'only functional boundaries on the mains', base: 'margin', code: 'I31', change: ({ specification }) => specification.insulation.boundaries.forEach((one) => { one.insulation = 'functional' }) },
  { name: 'basic insulation of an output from the mains', base: 'insulated', code: 'I31', change: (d) => { boundary(d, 'PRI–SEC').insulation = 'basic' } },
  { name: 'functional insulation to a core on the mains side', base: 'insulated', code: 'I31', change: (d) => { boundary(d, 'SEC–CORE').insulation = 'functional' } },
  { name: 'an output’s winding called one of the mains side', base: 'margin', code: 'I31', change: (d) => { winding(d, 'S1').side = 'primary' } },
  { name: 'no mains voltage', base: 'margin', code: 'I32', change: ({ specification }) => { specification.insulation.mainsVoltageV.value = null } },
  { name: 'a mains voltage of 12 V', base: 'margin', code: 'I32', change: ({ specification }) => { specification.insulation.mainsVoltageV.value = 12 } },
  { name: 'a core tied to a pin that does not exist', base: 'insulated', code: 'I14', change: ({ specification }) => { specification.core.potential.value = { connection: 'pin', pin: '99', side: 'primary' } } },
  { name: 'a core tied to a pin of another side', base: 'insulated', code: 'I14', change: (d) => { d.specification.core.potential.value = { connection: 'pin', pin: winding(d, 'S1').startTerminal, side: 'primary' } } },
  { name: 'margins without margin tape', base: 'margin', code: 'I08', change: ({ specification }) => { specification.sequence = specification.sequence.filter(({ kind }) => kind !== 'margin') } },
  { name: 'margin tape narrower than the margins', base: 'margin', code: 'I08', change: ({ specification }) => specification.sequence.forEach((step) => { if (step.kind === 'margin') Object.assign(step, { leftMm: 1, rightMm: 1 }) }) },
  { name: 'a withstand row of 500 V across the mains', base: 'insulated', code: 'I17', change: (d) => { row(d, 'HV PRI–SEC').levelV = 500 } },
  { name: 'a withstand row on type samples only', base: 'insulated', code: 'I17', change: (d) => { row(d, 'HV PRI–SEC').extent = 'type-test' } },
  { name: 'a withstand row that nobody has to make', base: 'insulated', code: 'I17', change: (d) => { row(d, 'HV PRI–SEC').extent = 'reference' } },
  { name: 'a withstand row for reference', base: 'insulated', code: 'I17', change: (d) => { row(d, 'HV PRI–SEC').status = 'reference' } },
  { name: 'a withstand row without terminals', base: 'insulated', code: 'I17', change: (d) => { Object.assign(row(d, 'HV PRI–SEC'), { drivenTerminals: [], shortedTerminals: [] }) } },
  { name: 'a routine test of 500 V', base: 'insulated', code: 'I17', change: (d) => { boundary(d, 'PRI–SEC').test!.routineVoltageV = 500 } },
  { name: 'a routine test that lasts no time', base: 'insulated', code: 'I17', change: (d) => { boundary(d, 'PRI–SEC').test!.routineDwellS = 0 } },
  { name: 'a test that lasts no time', base: 'insulated', code: 'I17', change: (d) => { boundary(d, 'PRI–SEC').test!.dwellS = 0 } },
  { name: 'a clearance called one of 50 Hz', base: 'margin', code: 'I33', change: ({ specification }) => { specification.insulation.overvoltageCategory.value = 'I'; specification.insulation.boundaries.forEach((one) => { one.frequencyHz = 50 }) } },
  { name: 'pollution degree 1 without a reason', base: 'margin', code: 'I33', change: ({ specification }) => { specification.insulation.pollutionDegree.value = 1 } },
  { name: 'a material group better than the former’s', base: 'margin', code: 'I28', change: ({ specification }) => { specification.insulation.materialGroup.value = 'I' } },
  { name: 'an altitude below the sea', base: 'margin', code: 'I07', change: ({ specification }) => { specification.insulation.altitudeM.value = -9999 } },
  { name: 'a working voltage below the calculated one', base: 'margin', code: 'I03', change: (d) => { Object.assign(boundary(d, 'PRI–SEC'), { workingVoltageVRms: 10, recurringPeakV: 10 }) } },
  { name: 'margins without sleeves over the leads', base: 'margin', code: 'I13', state: 'not-checkable', change: ({ specification }) => specification.sequence.forEach((step) => { if (step.kind === 'winding') Object.assign(step, { startSleeve: null, finishSleeve: null }) }) },
  { name: 'leads that no slot is known to pass', base: 'insulated', code: 'W17', change: ({ specification }) => { specification.former.leadSlotWidthMm.value = 0.1 } },
  { name: 'a coil over which the core does not close', base: 'insulated', code: 'W18', change: ({ specification }) => { specification.sequence.push({ ...specification.sequence.find((step) => step.kind === 'tape')!, id: 's99', layers: 90 }) } },
  { name: 'enamel that no bath takes off', base: 'insulated', code: 'P08', change: (d) => { winding(d, 'P').wire.thermalClassC = 220 } },
  { name: 'wire too thick for a pin', base: 'insulated', code: 'P05', change: (d) => { const thick = library.wires.find(({ form, conductorMm }) => form === 'round' && conductorMm > 1.2)!; winding(d, 'P').wire.wire = { kind: 'wire', id: thick.id, version: thick.version } } },
  { name: 'a revision without its reason', base: 'insulated', code: 'D06', change: ({ specification }) => { specification.revisions = [{ revision: 'B', date: '2026-03-01', zones: '', changes: [], reason: '', effect: '', by: '', checkedBy: '', approvedBy: '' }] } },
  { name: 'a part higher than its place', base: 'insulated', code: 'W25', change: (d) => { d.requirement!.maximumHeightMm = 20; d.specification.former.envelope.value!.heightMm = 30 } },
  { name: 'a former that burns', base: 'insulated', code: 'I27', change: ({ specification }) => { specification.former.flammability.value = 'UL 94 HB' } },
  { name: 'a secondary among the pins of the primary’s row', base: 'insulated', code: 'P11', change: (d) => wire(d, 'S1', '7', '8') },
  { name: 'a secondary on two pins of the primary’s row', base: 'insulated', code: 'P11', change: (d) => wire(d, 'S1', '6', '7') },
]

describe('release is stopped by', () => {
  it.each(SAFETY)('$name', ({ base, change, code, state = 'not-met' }) => {
    const document = copyOf(base)
    change(document)
    expect(newStops(base, document).get(code)).toBe(state)
  })

  it('functional insulation on the mains that a sheet itself asks for', () => {
    const { document } = propose({ ...HARBOUR_SUPPLY, insulationMethod: 'functional' }, library)
    expect(stopping(document).filter(({ code, state }) => code === 'I31' && state === 'not-met').length).toBeGreaterThan(0)
  })

  it('a foil shield whose ends touch', () => {
    const document = copyOf('insulated')
    const shield: SequenceStep = { id: 's90', kind: 'shield', status: 'mandatory', origin: { kind: 'entered' }, remark: '', windingId: winding(document, 'AUX').id, form: 'foil', thicknessMm: 0.05, widthMm: 30, overlapMm: 0, overlapInsulation: '', connectedTerminal: winding(document, 'P').startTerminal }
    document.specification.sequence.push(shield)
    expect(newStops('insulated', document).get('I26')).toBe('not-met')
    Object.assign(shield, { overlapMm: 4, overlapInsulation: 'two layers of tape' })
    expect(newStops('insulated', document).has('I26')).toBe(false)
  })
})

describe('insulation', () => {
  it('of a single mains voltage is rated for that voltage', () => {
    const supply = { ...flyback(HARBOUR_SUPPLY).supply, minimumV: 230, nominalV: 230, maximumV: 230 } as FlybackDuty['supply']
    const { document } = propose({ ...HARBOUR_SUPPLY, insulationMethod: 'margin-tape', duty: { ...flyback(HARBOUR_SUPPLY), supply } }, library)
    expect(document.specification.insulation.mainsVoltageV.value).toBe(230)
    expect(boundary(document, 'PRI–SEC').workingVoltageVRms!).toBeGreaterThan(280)
  })

  it('for patients follows the rows of its means of protection, which the boundary names', () => {
    const document = copyOf('margin')
    document.requirement = null
    document.specification.insulation.productStandard.value = 'IEC 60601-1'
    const asked = Object.assign(boundary(document, 'PRI–SEC'), { workingVoltageVRms: 240, recurringPeakV: 350, frequencyHz: 50 })
    const required = () => evaluate(document, library).boundaries.find(({ name }) => name === 'PRI–SEC')!.required
    expect(required().creepageMm).toMatchObject({ value: null, reason: 'means-of-protection-not-stated' })
    // IEC 60601-1:2005+A1+A2, two means up to 250 V rms: patients 8 mm, 5 mm, 4 kV; operators 5 mm, 4 mm, 3 kV.
    asked.meansOfProtection = 'MOPP'
    expect([required().creepageMm.value, required().clearanceMm.value, required().testVoltageVRms.value]).toEqual([8, 5, 4000])
    asked.meansOfProtection = 'MOOP'
    expect([required().creepageMm.value, required().clearanceMm.value, required().testVoltageVRms.value]).toEqual([5, 4, 3000])
  })

  it('says of every value of a standard that it was not read in the standard', () => {
    const values = evaluate(copyOf('margin'), library).boundaries.flatMap(({ required }) => Object.values(required)).filter(({ value, source }) => value !== null && source.includes('IEC'))
    expect(values.length).toBeGreaterThan(10)
    expect(values.filter(({ fromMemory, basis }) => !fromMemory || basis === undefined)).toEqual([])
  })

  it('is dimensioned for the duty’s mains whatever the drawing states', () => {
    const whole = evaluate(copyOf('margin'), library).boundaries[0]!.required
    for (const stated of [null, 12]) {
      const document = copyOf('margin')
      document.specification.insulation.mainsVoltageV.value = stated
      const { required } = evaluate(refresh(document, library), library).boundaries[0]!
      // 230 V and 240 V share a row of rated impulse voltage: IEC 60664-1:2020, Table F.1.
      expect(required.clearanceMm.value).toBe(3)
      expect(required.testVoltageVRms.value).toBe(whole.testVoltageVRms.value)
      expect(required.creepageMm.value!).toBeGreaterThan(whole.creepageMm.value! * 0.95)
    }
  })

  it('to a floating core bears what the core’s side may take', () => {
    const { boundaries } = evaluate(copyOf('margin'), library)
    const of = (name: string) => boundaries.find((one) => one.name === name)!
    expect(of('SEC–CORE').workingVoltageVRms).toBeGreaterThanOrEqual(of('PRI–SEC').workingVoltageVRms! * 0.99)
    expect(of('SEC–CORE').recurringPeakV).toBeGreaterThanOrEqual(of('PRI–SEC').recurringPeakV! * 0.99)
  })

  it('is asked about above 30 kHz whatever frequency a boundary states', () => {
    const document = copyOf('margin')
    for (const one of document.specification.insulation.boundaries) one.frequencyHz = 50
    const open = stopping(document).filter(({ code }) => code === 'I06')
    expect(open.length).toBe(2)
  })

  it('that is functional is tested beyond what it bears in use', () => {
    const [first] = flyback(BUOY_SUPPLY).outputs
    const outputs = [{ ...first!, voltageV: 900, fullLoadCurrentA: 0.02, lightLoadCurrentA: 0.002 }]
    const { document } = propose({ ...BUOY_SUPPLY, duty: { ...flyback(BUOY_SUPPLY), outputs } }, library)
    const result = evaluate(document, library).boundaries.find(({ name }) => name === 'PRI–SEC')!
    // 1.3 · 1.93 kV peak. Source: IEC 62368-1, factor for basic insulation.
    expect(result.required.testVoltageVRms.value).toBeCloseTo((1.3 * result.recurringPeakV!) / Math.SQRT2, 6)
    expect(boundary(document, 'PRI–SEC').test!.voltageV).toBeGreaterThan(1750)
  })

  it('to the core leaves the distance of the pins to a person', () => {
    const open = stopping(copyOf('insulated')).filter(({ code }) => code === 'I15')
    expect(open.map(({ state, values }) => [state, values.boundary])).toEqual([['not-checkable', 'SEC–CORE']])
  })
})

describe('figures of the library', () => {
  const openRows = (document: SpecificationDocument, from: Library = library) => stopping(document, from).filter(({ code }) => code === 'L01')

  it('stop release where a field in use has no source, and name only those', () => {
    const document = copyOf('insulated')
    const wires = openRows(document).filter(({ path }) => path.endsWith('.wire'))
    // Enamelled wires carry an unverified diameter with triple insulation too, which they do not use.
    expect(wires.map(({ path, values }) => [path, values.unverified])).toEqual([[`windings.${document.specification.windings.findIndex(({ name }) => name === 'S1')}.wire`, 'overallMm.triple-insulated']])
    expect(openRows(document).some(({ path }) => path === 'former.former')).toBe(true)
    expect(openRows(document).some(({ path }) => path.endsWith('Sleeve'))).toBe(true)
  })

  it('are replaced by a person’s value with its source', () => {
    const document = copyOf('insulated')
    const fields = () => String(openRows(document).find(({ path }) => path === 'former.former')!.values.unverified)
    expect(fields()).toContain('flammability')
    document.specification.former.flammability = { value: 'UL 94 V-0', status: 'mandatory', origin: { kind: 'entered', reason: 'Maker’s data sheet of 2024' } }
    expect(fields()).not.toContain('flammability')
  })

  it('are asked about where their source is not sure', () => {
    const document = copyOf('insulated')
    const unsure = { ...library, formers: library.formers.map((former) => ({ ...former, confidence: 'low' as const })) }
    const asked = evaluate(document, unsure).checks.filter(({ code, state }) => code === 'L02' && state !== 'met')
    expect(asked.map(({ path, severity }) => [path, severity])).toContainEqual(['former.former', 'M'])
  })
})

const MAGNETICS: Break[] = [
  { name: 'a current limit below full load', base: 'buoy', code: 'E35', change: (d) => { duty(d).currentLimit!.nominalA = 3 } },
  { name: 'a topology that contradicts the duty', base: 'insulated', code: 'D07', change: ({ specification }) => { specification.electrical.topology.value = 'forward' } },
  { name: 'a former of another core', base: 'insulated', code: 'D14', change: ({ specification }) => { specification.former.former.value = { kind: 'former', id: library.formers.find(({ coreId, version }) => coreId !== specification.core.core.value!.id && version === 1)!.id, version: 1 } } },
  { name: 'a bulk capacitor that runs empty', base: 'insulated', code: 'D14', change: (d) => { Object.assign(duty(d).supply, { bulkCapacitanceF: 1e-6 }) } },
  { name: 'a sequence that names no winding', base: 'insulated', code: 'D14', change: (d) => { windingStep(d, winding(d, 'AUX').id).windingId = 'w99' } },
  { name: 'two primary windings', base: 'insulated', code: 'D14', change: (d) => { winding(d, 'AUX').role = 'primary' } },
  { name: 'a duty that has no solution', base: 'insulated', code: 'D14', change: (d) => { duty(d).switchDropV = 500 } },
  { name: 'an output without a winding', base: 'buoy', code: 'D14', change: (d) => { winding(d, 'S3').outputId = null } },
  { name: 'the second half of a winding on another terminal', base: 'insulated', code: 'P22', change: (d) => { windingStep(d, 'w1', 1).startTerminal = '6' } },
  { name: 'two windings in parallel', base: 'insulated', code: 'P22', change: (d) => wire(d, 'AUX', winding(d, 'P').startTerminal, winding(d, 'P').finishTerminal) },
  { name: 'a winding closed on itself', base: 'insulated', code: 'P22', change: (d) => wire(d, 'AUX', winding(d, 'AUX').startTerminal, winding(d, 'AUX').startTerminal) },
  { name: 'A_L and length that both control', base: 'insulated', code: 'E08', change: ({ specification }) => { specification.core.gap.lengthMm.status = 'mandatory' } },
  { name: 'a controlling length that does not give A_L', base: 'insulated', code: 'E08', change: ({ specification: { core: { gap } } }) => { gap.control.value = 'length'; gap.alH.status = 'reference'; gap.lengthMm.value! *= 2 } },
  { name: 'an inductance row looser than the drawing', base: 'insulated', code: 'Q12', change: (d) => { Object.assign(row(d, 'L P'), { minimum: 1e-3, nominal: 1.5e-3, maximum: 2e-3 }) } },
  { name: 'limits the wrong way round', base: 'insulated', code: 'Q12', change: (d) => { const one = row(d, 'L P'); Object.assign(one, { minimum: one.maximum, maximum: one.minimum }) } },
  { name: 'a resistance row ten times too loose', base: 'insulated', code: 'Q12', change: (d) => { row(d, 'Rdc P').maximum! *= 10 } },
  { name: 'an inductance row at another frequency', base: 'insulated', code: 'Q12', change: (d) => { row(d, 'L P').frequencyHz = 10e6 } },
  { name: 'a ratio row that hides turns', base: 'insulated', code: 'Q03', change: (d) => { const one = row(d, 'P:S1'); Object.assign(one, { minimum: one.nominal! * 0.8, maximum: one.nominal! * 1.2 }) } },
  { name: 'inductance at bias below the worst current', base: 'insulated', code: 'E18', change: ({ specification }) => specification.electrical.saturation.forEach((limit) => { limit.currentA = 0.8 }) },
  { name: 'a resistance that no part can have', base: 'insulated', code: 'Q11', change: (d) => { winding(d, 'P').dcResistance!.maximumOhm /= 2 } },
  { name: 'an inductance without an upper limit', base: 'insulated', code: 'E01', state: 'not-checkable', change: (d) => { limitOf(d).upperTolerance = null } },
  { name: 'a certificate that names no frequency', base: 'insulated', code: 'I11', state: 'not-checkable', change: (d) => { winding(d, 'S1').wire.certificate!.maximumFrequencyHz = null } },
  { name: 'a winding of no wire', base: 'insulated', code: 'W08', change: (d) => { winding(d, 'AUX').wire.parallel = 0 } },
  { name: 'windings for reference only', base: 'insulated', code: 'D04', change: ({ specification }) => specification.windings.forEach((one) => { one.status = 'reference' }) },
]

describe('release is stopped as well by', () => {
  it.each(MAGNETICS)('$name', ({ base, change, code, state = 'not-met' }) => {
    const document = copyOf(base)
    change(document)
    expect(newStops(base, document).get(code)).toBe(state)
  })

  it('a flux that full load makes, where the current limit lies below it', () => {
    const document = copyOf('buoy')
    duty(document).currentLimit!.nominalA = 3
    const { magnetics, corners } = evaluate(document, library)
    const peakA = corners.find(({ name }) => name === 'minimum-input')!.windings[0]!.peakA
    expect(magnetics.worstCurrentA).toBeGreaterThanOrEqual(peakA)
    expect(magnetics.fluxWorstT).toBeGreaterThan(magnetics.fluxPeakT!)
  })

  it('saturation that nobody limits, though the drawing says forward', () => {
    const document = copyOf('insulated')
    document.specification.electrical.topology.value = 'forward'
    const codes = new Set(evaluate(document, library).checks.map(({ code }) => code))
    for (const code of ['E01', 'E18', 'Q16']) expect(codes).toContain(code)
  })

  it('currents stated below those calculated, which must be answered', () => {
    const document = copyOf('insulated')
    winding(document, 'S1').rmsCurrentA = 0.5
    expect(evaluate(document, library).checks.filter(({ code, state }) => code === 'E17' && state === 'not-met').length).toBe(1)
  })

  it('a trip current above 5 mA, which must be answered', () => {
    const document = copyOf('insulated')
    boundary(document, 'PRI–SEC').test!.tripA = 1
    expect(evaluate(document, library).checks.filter(({ code, state, severity }) => code === 'I18' && state === 'not-met' && severity === 'M').length).toBe(1)
  })
})
