import { shippedLibrary } from '#server/db/seed/parts/library'
import type { FormerRow, Library, LibraryKind } from '#shared/engine/library'
import type {
  InsulationBoundary, LibraryReference, Pin, RequirementSheet, SequenceStep, SpecificationDocument, TestRow, Winding, WindingSpecification, WindingStep, WireUse,
} from '#shared/engine/specification'
import { blankSpecification, row, stated } from './blank-specification'

export const sampleLibrary: Library = shippedLibrary()

const reference = (kind: LibraryKind, id: string): LibraryReference => ({ kind, id, version: 1 })

const wire = (id: string, parallel = 1, insulation: WireUse['insulation'] = 'enamel-grade-2'): WireUse => ({
  wire: reference('wire', id),
  parallel,
  thermalClassC: 155,
  insulation,
  certificate: insulation === 'triple-insulated' ? { standard: 'IEC 62368-1, Annex J', number: 'to be declared', peakVoltageV: 1000, maximumFrequencyHz: 300e3 } : null,
  lay: null,
})

function winding(id: string, fields: Pick<Winding, 'name' | 'role' | 'side' | 'startTerminal' | 'finishTerminal' | 'turns' | 'wire'> & Partial<Winding>): Winding {
  return row(id, { outputId: null, rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null, ...fields })
}

const resistance = (nominalOhm: number, maximumOhm: number): Winding['dcResistance'] => ({ nominalOhm, maximumOhm, minimumOhm: null, temperatureC: 20, fourTerminal: true })

function wind(id: string, of: Winding, fields: Partial<WindingStep> = {}): WindingStep {
  return row(id, {
    kind: 'winding' as const, windingId: of.id, startTerminal: of.startTerminal, finishTerminal: of.finishTerminal, turns: of.turns, section: 1,
    direction: 'clockwise' as const, lay: 'close-wound' as const, layers: null, marginLeftMm: 0, marginRightMm: 0, interlayerTape: null,
    leadExitStart: 'left' as const, leadExitFinish: 'right' as const, startSleeve: null, finishSleeve: null, remark: '', ...fields,
  })
}

const tape = (id: string, layers: number, purpose: 'interwinding' | 'outer' | 'interlayer' | 'base'): SequenceStep =>
  row(id, { kind: 'tape' as const, tape: reference('tape', 'polyester-0.055'), layers, widthMm: null, purpose, remark: '' })

const margin = (id: string, sideMm: number): SequenceStep =>
  row(id, { kind: 'margin' as const, tape: reference('tape', 'margin-polyester-0.250'), leftMm: sideMm, rightMm: sideMm, heightMm: null, remark: '' })

function test(number: number, fields: Partial<TestRow> & Pick<TestRow, 'characteristic' | 'symbol' | 'unit'>): TestRow {
  return row(`t${number}`, {
    number, windingId: null, boundaryId: null, drivenTerminals: [], shortedTerminals: [], openTerminals: [], method: '', instrumentClass: '',
    frequencyHz: null, levelV: null, biasA: null, temperatureC: null, minimum: null, nominal: null, maximum: null, extent: 'every-part' as const,
    acceptableQualityLimit: null, criticalToQuality: false, reaction: 'reject part', record: 'reading' as const, ...fields,
  })
}

function pinsOf(former: FormerRow, used: readonly string[], missing: readonly string[]): Pin[] {
  return former.pins.map(({ number, xMm, yMm }) => ({ number, xMm, yMm, state: missing.includes(number) ? 'missing' : used.includes(number) ? 'fitted' : 'no-connection' }))
}

function withFormer(specification: WindingSpecification, formerId: string, coreId: string, missing: readonly string[]): FormerRow {
  const former = sampleLibrary.formers.find(({ id }) => id === formerId)!
  const used = specification.windings.flatMap(({ startTerminal, finishTerminal }) => [startTerminal, finishTerminal])
  specification.core.core = stated(reference('core', coreId))
  specification.core.material = stated(reference('material', 'mnzn-25-100khz'))
  specification.core.approvedEquivalents = stated(['MnZn power ferrite, loss at 100 kHz, 200 mT, 100 °C not above 450 kW/m³'])
  specification.core.equivalenceRule = stated('subject-to-written-approval' as const)
  specification.core.numberOfSets = stated(1)
  specification.former = {
    ...specification.former,
    former: stated(reference('former', formerId)),
    material: stated(former.material, 'vendor-choice'),
    plastic: stated(former.plastic),
    flammability: stated(former.flammability),
    materialGroup: stated(former.materialGroup),
    mounting: stated(former.mounting),
    pins: pinsOf(former, used, missing),
    pinView: stated('top' as const),
    pinOneMark: stated('chamfer on the flange at pin 1'),
    pinPitchMm: stated(former.pinPitchMm),
    rowSpacingMm: stated(former.pinRowSpacingMm),
    pinSection: stated(former.pinSection),
    pinLengthMm: stated(former.pinLengthMm),
    standoffMm: stated(former.standoffMm),
    truePositionMm: stated(0.4),
    recommendedHoleMm: stated(1.3, 'reference'),
    envelope: stated({ lengthMm: former.envelopeMm.length, widthMm: former.envelopeMm.width, heightMm: former.envelopeMm.height }),
    massG: stated(48, 'reference'),
    fixing: stated('pins soldered; no further fixing'),
  }
  return former
}

function withTitle(specification: WindingSpecification, partNumber: string, title: string, supplementary: string): void {
  Object.assign(specification.title, {
    legalOwner: stated('Brightmoor Power Works'),
    confidentiality: stated('Confidential. Property of Brightmoor Power Works; not to be passed on or copied without written consent.'),
    partNumber: stated(partNumber),
    title: stated(title),
    supplementaryTitle: stated(supplementary),
    documentType: stated('Component drawing – winding specification'),
    responsibleDepartment: stated('Magnetics'),
    technicalReference: stated('E. Halloran'),
    languageCode: stated('en'),
    classification: stated('internal'),
    documentStatus: stated('released' as const),
    paperSize: stated('A3' as const),
    projection: stated('first-angle' as const),
    relatedDocuments: [row('d1', { kind: 'footprint' as const, number: `${partNumber}-FP`, title: 'Footprint and keep-out' }, 'reference')],
  })
  specification.tolerances = {
    general: stated('ISO 2768-1 m'),
    angular: stated('±1°'),
    pins: stated('true position Ø 0.4 at the tips'),
    electrical: stated('no electrical row is without limit or reference mark'),
  }
}

function withTrade(specification: WindingSpecification): void {
  specification.impregnation = {
    ...specification.impregnation,
    process: stated('dip' as const),
    resin: stated('polyester varnish, solvent-free', 'vendor-choice'),
    thermalClassC: stated(155),
    compatibility: stated('proven with the named wire enamel'),
    bake: stated({ temperatureC: 125, durationS: 7200 }),
    extent: stated('coil-and-core' as const),
    pinsMasked: stated(true),
  }
  specification.marking = {
    ...specification.marking,
    content: stated(['part number', 'revision', 'vendor code', 'date code']),
    position: stated('top of the core'),
    dateCode: stated('YYWW' as const),
    revisionOnPart: stated(true),
    machineReadable: stated('none' as const),
  }
  specification.packing = { ...specification.packing, form: stated('tray' as const), piecesPerPack: stated(60), piecesPerCarton: stated(480), solderProfile: stated('wave' as const), washable: stated(false) }
  specification.compliance = { ...specification.compliance, rohs: stated('2011/65/EU with (EU) 2015/863, no exemption used'), reachListDate: stated('2025-06-25'), traceability: stated('core, wire and tester lots by date code'), retentionYears: stated(10) }
  specification.notes = [
    row('n1', { number: 1, text: 'No change of material, process, site or sub-supplier without written approval.', fields: [] }),
    row('n2', { number: 2, text: 'Core halves are seated without force; no adhesive or varnish on the mating faces.', fields: ['core.assembly'] }),
  ]
}

function electricalTests(specification: WindingSpecification): TestRow[] {
  const { windings, electrical } = specification
  const primary = windings[0]!
  const limit = electrical.inductance.value!
  const others = windings.filter(({ role }) => role !== 'shield')
  const pins = ({ startTerminal, finishTerminal }: Winding) => [startTerminal, finishTerminal]
  const rows: Omit<Parameters<typeof test>[1], never>[] = [
    { characteristic: 'inductance', symbol: `L ${primary.name}`, unit: 'H', windingId: primary.id, drivenTerminals: pins(primary), method: 'IEC 61007, 4.3', frequencyHz: limit.frequencyHz, levelV: limit.levelV, temperatureC: 25, minimum: Number((limit.nominalH * 0.9).toPrecision(6)), nominal: limit.nominalH, maximum: Number((limit.nominalH * 1.1).toPrecision(6)), criticalToQuality: true },
    ...electrical.leakage.map((leakage) => ({ characteristic: 'leakage' as const, symbol: `Ls ${primary.name}`, unit: 'H' as const, windingId: primary.id, drivenTerminals: pins(primary), shortedTerminals: windings.filter(({ id }) => leakage.shortedWindingIds.includes(id)).map(pins), method: 'IEC 61007, 4.4', frequencyHz: leakage.frequencyHz, levelV: leakage.levelV, temperatureC: 25, maximum: leakage.maximumH })),
    ...others.map((each) => ({ characteristic: 'dc-resistance' as const, symbol: `R ${each.name}`, unit: 'Ω' as const, windingId: each.id, drivenTerminals: pins(each), method: 'four-terminal', temperatureC: 20, maximum: each.dcResistance?.maximumOhm ?? null, extent: 'sample' as const, acceptableQualityLimit: 0.65 })),
    ...others.slice(1).map((each) => ({ characteristic: 'turns-ratio' as const, symbol: `${primary.name}:${each.name}`, unit: '1' as const, windingId: each.id, drivenTerminals: pins(primary), method: 'voltage ratio', frequencyHz: 10e3, levelV: 1, minimum: Number(((primary.turns / each.turns) * 0.99).toPrecision(5)), nominal: Number((primary.turns / each.turns).toPrecision(5)), maximum: Number(((primary.turns / each.turns) * 1.01).toPrecision(5)) })),
    { characteristic: 'polarity', symbol: 'dots', unit: '1', drivenTerminals: pins(primary), method: 'with the ratio', record: 'pass-fail' },
    ...specification.insulation.boundaries.map((boundary) => ({ characteristic: 'hipot' as const, symbol: `HV ${boundary.name}`, unit: 'V' as const, boundaryId: boundary.id, drivenTerminals: pins(primary), shortedTerminals: groupsOf(boundary, others, pins), method: 'IEC 61180', frequencyHz: 50, levelV: boundary.test?.routineVoltageV ?? null, temperatureC: 23, record: 'pass-fail' as const, criticalToQuality: true })),
  ]
  return rows.map((fields, index) => test(index + 1, fields))
}

/** What is tied together on either side while a boundary is tested. */
function groupsOf({ between }: InsulationBoundary, windings: readonly Winding[], pins: (winding: Winding) => string[]): string[][] {
  const first = windings.filter(({ side, id }) => between.some((end, index) => index === 0 && (end.kind === 'side' ? end.side === side : end.kind === 'winding' && end.windingId === id)))
  return [first, windings.filter((each) => !first.includes(each))].map((group) => group.flatMap(pins)).filter((group) => group.length > 0)
}

function boundary(id: string, name: string, fields: Pick<InsulationBoundary, 'between' | 'insulation'> & Partial<InsulationBoundary>, testV: number): InsulationBoundary {
  return row(id, {
    name, workingVoltageVRms: null, recurringPeakV: null, frequencyHz: null, clearanceMm: null, creepageMm: null, distanceThroughInsulationMm: null, insulationLayers: null,
    test: { voltageV: testV, kind: 'ac-rms' as const, frequencyHz: 50, rampS: 2, dwellS: 60, tripA: 0.005, routineDwellS: 2, routineVoltageV: testV },
    ...fields,
  })
}

/** A 13.8 V harbour supply from 100–240 V mains, isolated by margin tape. */
export function mainsFlyback(): SpecificationDocument {
  const specification = blankSpecification()
  const p = winding('w1', { name: 'P', role: 'primary', side: 'primary', startTerminal: '1', finishTerminal: '3', turns: 46, wire: wire('iec-0.355'), rmsCurrentA: 0.72, peakCurrentA: 1.86, dcCurrentA: 0.41, dcResistance: resistance(0.485, 0.54) })
  const s = winding('w2', { name: 'S1', role: 'secondary', side: 'secondary', startTerminal: '9', finishTerminal: '12', turns: 6, wire: wire('iec-0.500', 3), outputId: 'o1', rmsCurrentA: 4.9, peakCurrentA: 13.4, dcCurrentA: 2.9, dcResistance: resistance(0.0102, 0.0118) })
  const aux = winding('w3', { name: 'AUX', role: 'auxiliary', side: 'primary', startTerminal: '5', finishTerminal: '6', turns: 6, wire: wire('iec-0.200'), outputId: 'o2', rmsCurrentA: 0.045, peakCurrentA: 0.12, dcCurrentA: 0.02, dcResistance: resistance(0.22, 0.25) })
  specification.windings = [p, s, aux]
  withTitle(specification, 'BM-T-4710-01', 'Transformer, flyback, 40 W', 'Harbour supply 100–240 V to 13.8 V')
  withFormer(specification, 'etd29-16-10-h', 'etd29-16-10', ['14'])
  specification.core.gap = { control: stated('al' as const), alH: stated(310e-9), alTolerance: stated(0.05), lengthMm: stated(0.28, 'reference'), lengthToleranceMm: stated(0.02, 'reference'), position: stated('centre-leg' as const), grinding: stated('one-half' as const) }
  specification.core.potential = stated({ connection: 'floating' as const, pin: null, side: 'primary' as const })
  specification.core.assembly = { ...specification.core.assembly, adhesive: stated('epoxy, class 155', 'vendor-choice'), adhesivePosition: stated('outer legs'), tapeLayers: stated(2) }
  const margins = { marginLeftMm: 3, marginRightMm: 3 }
  specification.sequence = [
    margin('s1', 3),
    wind('s2', p, { ...margins, turns: 23, finishTerminal: '2', interlayerTape: null, startSleeve: { sleeve: reference('sleeve', 'ptfe-0.5'), lengthMm: 22, intoWindingMm: 3 } }),
    tape('s3', 3, 'interwinding'),
    margin('s4', 3),
    wind('s5', s, { ...margins, startSleeve: { sleeve: reference('sleeve', 'ptfe-2.0'), lengthMm: 25, intoWindingMm: 3 }, remark: '3 in hand, wound together' }),
    tape('s6', 3, 'interwinding'),
    margin('s7', 3),
    wind('s8', p, { ...margins, turns: 23, startTerminal: '2', finishTerminal: '3' }),
    tape('s9', 1, 'interlayer'),
    margin('s10', 3),
    wind('s11', aux, { ...margins, lay: 'spread' }),
    tape('s12', 3, 'outer'),
    row('s13', { kind: 'core-tape' as const, tape: reference('tape', 'polyester-0.065'), layers: 2, purpose: 'banding' as const, remark: 'around the core after gluing' }),
    row('s14', { kind: 'varnish' as const, extent: 'coil-and-core' as const, remark: 'pins 1–14 clean' }),
  ]
  specification.former.pins = specification.former.pins.map((pin) => (pin.number === '2' ? { ...pin, state: 'fitted' } : pin))
  specification.electrical = {
    ...specification.electrical,
    topology: stated('flyback' as const),
    switchingFrequencyHz: stated({ minimum: 95e3, maximum: 105e3 }, 'reference'),
    dutyRatio: stated({ minimum: 0.12, maximum: 0.45 }, 'reference'),
    inductance: stated({ windingId: 'w1', nominalH: 656e-6, lowerTolerance: -0.1, upperTolerance: 0.1, frequencyHz: 100e3, levelV: 0.25, temperatureC: 25, model: 'series' as const }),
    leakage: [row('l1', { windingId: 'w1', shortedWindingIds: ['w2', 'w3'], maximumH: 12e-6, minimumH: null, frequencyHz: 100e3, levelV: 0.25, temperatureC: 25, model: 'series' as const })],
    saturation: [row('x1', { windingId: 'w1', currentA: 2.2, temperatureC: 100, remainingShare: 0.9, method: 'pulse' as const })],
    turnsRatios: [row('r1', { numeratorWindingId: 'w1', denominatorWindingId: 'w2', tolerance: 0.01, frequencyHz: 10e3, levelV: 1 }), row('r2', { numeratorWindingId: 'w1', denominatorWindingId: 'w3', tolerance: 0.01, frequencyHz: 10e3, levelV: 1 })],
    polarity: stated('as-dotted' as const),
    selfResonance: stated({ minimumHz: 900e3, windingId: 'w1', terminalsTied: 'secondary open' }),
    interwindingCapacitance: [row('c1', { windingIds: ['w1', 'w2'], maximumF: 90e-12, frequencyHz: 100e3, terminalsTied: 'each winding tied to itself' })],
  }
  specification.insulation = {
    ...specification.insulation,
    productStandard: stated('IEC 62368-1' as const),
    standardEdition: stated('2018'),
    mainsVoltageV: stated(240),
    overvoltageCategory: stated('II' as const),
    pollutionDegree: stated(2 as const),
    altitudeM: stated(2000),
    materialGroup: stated('IIIb' as const),
    systemThermalClassC: stated(130),
    maximumAmbientC: stated(60),
    maximumWindingC: stated({ temperatureC: 120, method: 'resistance' as const }),
    boundaries: [
      boundary('b1', 'P–S', { between: [{ kind: 'side', side: 'primary' }, { kind: 'side', side: 'secondary' }], insulation: 'reinforced', workingVoltageVRms: 255, recurringPeakV: 540, frequencyHz: 100e3, clearanceMm: 4, creepageMm: 6, distanceThroughInsulationMm: 0.4, insulationLayers: 3 }, 3000),
      boundary('b2', 'S–core', { between: [{ kind: 'side', side: 'secondary' }, { kind: 'core' }], insulation: 'reinforced', workingVoltageVRms: 255, recurringPeakV: 540, frequencyHz: 100e3, clearanceMm: 4, creepageMm: 6 }, 3000),
    ],
    polymers: [row('y1', { use: 'Coil former', material: 'phenolic moulding compound', flammability: 'UL 94 V-0', fileNumber: 'to be declared' })],
    cautions: stated(['The primary is connected to the mains in use.']),
  }
  withTrade(specification)
  specification.tests = electricalTests(specification)
  specification.revisions = [
    { revision: 'A', date: '2026-05-11', zones: '', changes: [], reason: 'first issue', effect: '', by: 'E. Halloran', checkedBy: 'M. Okafor', approvedBy: 'J. Lindqvist' },
    { revision: 'B', date: '2026-09-02', zones: 'C4, D6', changes: [{ field: 'Leakage P, maximum', before: '15 µH', after: '12 µH' }, { field: 'Margin, each side', before: '2.5 mm', after: '3 mm' }], reason: 'ECO 2291: creepage after review', effect: 're-sample; scrap stock of A', by: 'E. Halloran', checkedBy: 'M. Okafor', approvedBy: 'J. Lindqvist' },
  ]
  return { specification, requirement: mainsRequirement() }
}

function mainsRequirement(): RequirementSheet {
  return {
    duty: {
      topology: 'flyback',
      supply: { kind: 'mains', minimumV: 85, nominalV: 230, maximumV: 265, lineFrequencyHz: 50, bulkCapacitanceF: 100e-6, conductionTimeS: 3e-3 },
      outputs: [
        { id: 'o1', name: '13.8 V', role: 'main', voltageV: 13.8, rectifierDropV: 0.6, fullLoadCurrentA: 2.9, lightLoadCurrentA: 0.2, side: 'secondary' },
        { id: 'o2', name: 'auxiliary', role: 'auxiliary', voltageV: 13, rectifierDropV: 0.9, fullLoadCurrentA: 0.02, lightLoadCurrentA: 0.02, side: 'primary' },
      ],
      switchingFrequencyHz: 100e3,
      conduction: { kind: 'boundary' },
      efficiency: 0.86,
      maximumDutyRatio: 0.5,
      reflectedVoltageV: null,
      switchDropV: 1.5,
      currentLimit: { nominalA: 2, tolerance: 0.08, delayS: 150e-9 },
      clampSpikeV: 80,
      switchRatingV: 650,
    },
    ambientC: 60,
    permittedRiseK: 60,
    fluxUtilisation: 0.85,
    targetCurrentDensityAPerMm2: 5,
    insulationMethod: 'margin-tape',
    maximumHeightMm: null,
  }
}

/** A buoy supply: 18–32 V battery to +5.2 V and ±15 V. */
export function buoySupply(): SpecificationDocument {
  const specification = blankSpecification()
  const p = winding('w1', { name: 'P', role: 'primary', side: 'primary', startTerminal: '1', finishTerminal: '2', turns: 14, wire: wire('iec-0.400', 2), rmsCurrentA: 1.42, peakCurrentA: 3.3, dcCurrentA: 0.92, dcResistance: resistance(0.042, 0.048) })
  const s1 = winding('w2', { name: 'S1', role: 'secondary', side: 'secondary', startTerminal: '10', finishTerminal: '9', turns: 4, wire: wire('iec-0.500', 2), outputId: 'o1', rmsCurrentA: 2.6, peakCurrentA: 6.2, dcCurrentA: 1.5, dcResistance: resistance(0.0061, 0.007) })
  const s2 = winding('w3', { name: 'S2', role: 'secondary', side: 'secondary', startTerminal: '8', finishTerminal: '7', turns: 11, wire: wire('iec-0.280'), outputId: 'o2', rmsCurrentA: 0.45, peakCurrentA: 1.1, dcCurrentA: 0.25, dcResistance: resistance(0.12, 0.135) })
  const s3 = winding('w4', { name: 'S3', role: 'secondary', side: 'secondary', startTerminal: '7', finishTerminal: '6', turns: 11, wire: wire('iec-0.280'), outputId: 'o3', rmsCurrentA: 0.45, peakCurrentA: 1.1, dcCurrentA: 0.25, dcResistance: resistance(0.13, 0.145) })
  const sh = winding('w5', { name: 'SH', role: 'shield', side: 'primary', startTerminal: '2', finishTerminal: '', turns: 1, wire: wire('iec-0.200', 1, 'bare') })
  specification.windings = [p, s1, s2, s3, sh]
  withTitle(specification, 'BM-T-2205-03', 'Transformer, flyback, 18 W', 'Buoy supply 18–32 V to +5.2 V, ±15 V')
  withFormer(specification, 'efd25-13-9-h', 'efd25-13-9', [])
  specification.core.gap = { control: stated('length' as const), alH: stated(160e-9, 'reference'), alTolerance: stated<number>(null), lengthMm: stated(0.45), lengthToleranceMm: stated(0.03), position: stated('centre-leg' as const), grinding: stated('one-half' as const) }
  specification.core.potential = stated({ connection: 'pin' as const, pin: '2', side: 'primary' as const })
  specification.sequence = [
    wind('s1', p),
    tape('s2', 1, 'interwinding'),
    row('s3', { kind: 'shield' as const, windingId: 'w5', form: 'foil' as const, thicknessMm: 0.035, widthMm: 14, overlapMm: 3, overlapInsulation: 'polyester tape 0.055 mm', connectedTerminal: '2', remark: 'free end insulated' }),
    tape('s4', 2, 'interwinding'),
    wind('s5', s1, { lay: 'spread' }),
    tape('s6', 1, 'interwinding'),
    wind('s7', s2, { lay: 'spread', direction: 'clockwise' }),
    tape('s8', 1, 'interlayer'),
    wind('s9', s3, { lay: 'spread' }),
    tape('s10', 2, 'outer'),
  ]
  specification.electrical = {
    ...specification.electrical,
    topology: stated('flyback' as const),
    switchingFrequencyHz: stated({ minimum: 190e3, maximum: 210e3 }, 'reference'),
    inductance: stated({ windingId: 'w1', nominalH: 31.4e-6, lowerTolerance: -0.1, upperTolerance: 0.1, frequencyHz: 100e3, levelV: 0.1, temperatureC: 25, model: 'series' as const }),
    leakage: [row('l1', { windingId: 'w1', shortedWindingIds: ['w2', 'w3', 'w4'], maximumH: 0.9e-6, minimumH: null, frequencyHz: 100e3, levelV: 0.1, temperatureC: 25, model: 'series' as const })],
    saturation: [row('x1', { windingId: 'w1', currentA: 4, temperatureC: 100, remainingShare: 0.9, method: 'pulse' as const })],
    turnsRatios: [
      row('r1', { numeratorWindingId: 'w1', denominatorWindingId: 'w2', tolerance: 0.02, frequencyHz: 100e3, levelV: 0.5 }),
      row('r2', { numeratorWindingId: 'w1', denominatorWindingId: 'w3', tolerance: 0.02, frequencyHz: 100e3, levelV: 0.5 }),
      row('r3', { numeratorWindingId: 'w1', denominatorWindingId: 'w4', tolerance: 0.02, frequencyHz: 100e3, levelV: 0.5 }),
    ],
    polarity: stated('as-dotted' as const),
  }
  specification.insulation = {
    ...specification.insulation,
    productStandard: stated('IEC 60664-1' as const),
    standardEdition: stated('2020'),
    overvoltageCategory: stated('I' as const),
    pollutionDegree: stated(2 as const),
    altitudeM: stated(2000),
    materialGroup: stated('IIIb' as const),
    systemThermalClassC: stated(130),
    maximumAmbientC: stated(55),
    boundaries: [boundary('b1', 'P–S', { between: [{ kind: 'side', side: 'primary' }, { kind: 'side', side: 'secondary' }], insulation: 'functional', workingVoltageVRms: 40, recurringPeakV: 92, frequencyHz: 200e3, clearanceMm: 0.2, creepageMm: 0.7 }, 500)],
  }
  withTrade(specification)
  specification.tests = electricalTests(specification)
  return { specification, requirement: buoyRequirement() }
}

function buoyRequirement(): RequirementSheet {
  const output = (id: string, voltageV: number, fullLoadCurrentA: number) => ({ id, name: `${voltageV} V`, role: 'main' as const, voltageV, rectifierDropV: 0.5, fullLoadCurrentA, lightLoadCurrentA: fullLoadCurrentA / 10, side: 'secondary' as const })
  return {
    ...mainsRequirement(),
    duty: {
      topology: 'flyback',
      supply: { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 },
      outputs: [output('o1', 5.2, 1.5), output('o2', 15, 0.25), output('o3', -15, 0.25)],
      switchingFrequencyHz: 200e3,
      conduction: { kind: 'boundary' },
      efficiency: 0.82,
      maximumDutyRatio: 0.5,
      reflectedVoltageV: null,
      switchDropV: 0.2,
      currentLimit: null,
      clampSpikeV: null,
      switchRatingV: 100,
    },
    insulationMethod: 'functional',
  }
}

/** Two equal windings on one core for a 9–18 V input, as a draft that still has empty fields. */
export function coupledInductor(): SpecificationDocument {
  const specification = blankSpecification()
  const l1 = winding('w1', { name: 'L1', role: 'primary', side: 'primary', startTerminal: '1', finishTerminal: '4', turns: 12, wire: wire('iec-0.500'), rmsCurrentA: 1.9, peakCurrentA: 2.6, dcCurrentA: 1.8, dcResistance: resistance(0.028, 0.032) })
  const l2 = winding('w2', { name: 'L2', role: 'secondary', side: 'primary', startTerminal: '8', finishTerminal: '5', turns: 12, wire: wire('iec-0.500'), outputId: 'o1', rmsCurrentA: 1.9, peakCurrentA: 2.6, dcCurrentA: 1.5, dcResistance: resistance(0.03, 0.034) })
  specification.contract = 'build-to-performance'
  specification.windings = [l1, l2]
  withTitle(specification, 'BM-L-0318-01', 'Inductor, coupled, 1:1', '22 µH for 9–18 V input')
  specification.title.projection = stated('third-angle' as const)
  withFormer(specification, 'rm8-v', 'rm8', [])
  specification.core.gap = { ...specification.core.gap, control: stated('al' as const), alH: stated(160e-9), alTolerance: stated(0.03), position: stated('centre-leg' as const) }
  specification.sequence = [wind('s1', l1), tape('s2', 1, 'interwinding'), wind('s3', l2), tape('s4', 2, 'outer')]
  specification.electrical = {
    ...specification.electrical,
    topology: stated('coupled-inductor' as const),
    inductance: stated({ windingId: 'w1', nominalH: 22e-6, lowerTolerance: -0.2, upperTolerance: 0.2, frequencyHz: 100e3, levelV: 0.25, temperatureC: 25, model: 'series' as const }),
    leakage: [row('l1', { windingId: 'w1', shortedWindingIds: ['w2'], maximumH: 0.6e-6, minimumH: null, frequencyHz: 100e3, levelV: 0.25, temperatureC: 25, model: 'series' as const })],
    polarity: stated('as-dotted' as const),
  }
  specification.insulation.boundaries = [boundary('b1', 'L1–L2', { between: [{ kind: 'winding', windingId: 'w1' }, { kind: 'winding', windingId: 'w2' }], insulation: 'functional', workingVoltageVRms: 18, recurringPeakV: 42, frequencyHz: 300e3 }, 250)]
  specification.tests = electricalTests(specification)
  return {
    specification,
    requirement: {
      ...mainsRequirement(),
      duty: { topology: 'coupled-inductor', supply: { kind: 'dc', minimumV: 9, nominalV: 12, maximumV: 18 }, outputVoltageV: 12, outputDropV: 0.5, outputCurrentA: 1.5, ratio: 1, switchingFrequencyHz: 300e3, rippleRatio: 0.4, efficiency: 0.9, switchDropV: 0.1, currentLimit: null },
      insulationMethod: 'functional',
    },
  }
}
