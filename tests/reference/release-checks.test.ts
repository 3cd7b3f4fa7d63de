import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { evaluate, propose } from '#shared/engine/index'
import type { CheckResult } from '#shared/engine/evaluation'
import type { Library } from '#shared/engine/library'
import type { Duty, FlybackDuty, RequirementSheet, SpecificationDocument, Topology, WindingStep } from '#shared/engine/specification'

/**
 * One document for each rule of the release checks that breaks it, made from a proposal by the smallest change. What the change
 * must do to the check stands beside it; the sources of the rules are those that the checks name.
 */

const library = shippedLibrary()
const sheets = { insulated: HARBOUR_SUPPLY, margin: { ...HARBOUR_SUPPLY, insulationMethod: 'margin-tape' } as RequirementSheet, buoy: BUOY_SUPPLY, coupled: COUPLED_INDUCTOR }
type Base = keyof typeof sheets
const proposed = new Map(Object.entries(sheets).map(([name, sheet]) => [name as Base, propose(sheet, library).document]))
const copyOf = (base: Base): SpecificationDocument => structuredClone(proposed.get(base)!)

const winding = ({ specification }: SpecificationDocument, name: string) => specification.windings.find((one) => one.name === name)!
const boundary = ({ specification }: SpecificationDocument, name: string) => specification.insulation.boundaries.find((one) => one.name === name)!
const row = ({ specification }: SpecificationDocument, symbol: string) => specification.tests.find((one) => one.symbol === symbol)!
const steps = ({ specification }: SpecificationDocument) => specification.sequence.filter((step): step is WindingStep => step.kind === 'winding')
const duty = ({ requirement }: SpecificationDocument) => requirement!.duty as FlybackDuty
const wireRow = (id: RegExp | string, form = 'round') => library.wires.find((one) => one.form === form && (typeof id === 'string' ? one.size === id : id.test(one.size)))!
const draw = (document: SpecificationDocument, topology: Topology) => {
  document.requirement = null
  document.specification.electrical.topology.value = topology
}
const wind = (document: SpecificationDocument, name: string, size: string, form = 'round') => {
  const { kind, id, version } = wireRow(size, form)
  winding(document, name).wire.wire = { kind, id, version }
}

interface Break {
  code: string
  name: string
  base?: Base
  change: (document: SpecificationDocument) => void
  state?: CheckResult['state']
  library?: Library
}

const ELECTRICAL: Break[] = [
  { code: 'E03', name: 'a forward part whose swing nobody knows', change: (d) => draw(d, 'forward'), state: 'not-checkable' },
  { code: 'E04', name: 'a bridge whose flux nobody knows', change: (d) => draw(d, 'full-bridge'), state: 'not-checkable' },
  { code: 'E05', name: 'a resonant part whose flux nobody knows', change: (d) => draw(d, 'llc'), state: 'not-checkable' },
  { code: 'E06', name: 'a gate drive without a volt-second product', change: (d) => draw(d, 'gate-drive'), state: 'not-checkable' },
  { code: 'E13', name: 'a spacer that no note explains', change: ({ specification }) => { specification.core.gap.position.value = 'all-legs-spacer'; specification.notes = [] } },
  { code: 'E19', name: 'bias far beyond the knee', change: ({ specification }) => specification.electrical.saturation.forEach((limit) => { limit.currentA *= 3 }) },
  { code: 'E21', name: 'leakage and capacitance limits that exclude each other', change: ({ specification: { electrical } }) => {
    const [limit] = electrical.leakage
    electrical.interwindingCapacitance = [{ id: 'c1', status: 'mandatory', origin: { kind: 'entered' }, windingIds: [limit!.windingId, ...limit!.shortedWindingIds], maximumF: 1e-12, frequencyHz: 100e3, terminalsTied: 'each shorted' }]
  } },
  { code: 'E22', name: 'a clamp that takes half of the power', change: (d) => { duty(d).clampSpikeV = 1 } },
  { code: 'E23', name: 'a self-resonance at twice the switching frequency', change: ({ specification: { electrical, windings } }) => { electrical.selfResonance.value = { minimumHz: 130e3, windingId: windings[0]!.id, terminalsTied: '' } } },
  { code: 'E24', name: 'a capacitance that the build does not keep', change: ({ specification: { electrical } }) => {
    electrical.interwindingCapacitance = [{ id: 'c1', status: 'mandatory', origin: { kind: 'entered' }, windingIds: ['w1', 'w2'], maximumF: 1e-15, frequencyHz: 100e3, terminalsTied: 'each shorted' }]
  } },
  { code: 'E25', name: 'a current transformer with 5 % of droop', change: (d) => { draw(d, 'current-sense'); d.specification.electrical.currentSense.value = { burdenOhm: 10, ratioError: 0.01, droop: 0.05, bandwidthHz: { minimum: 1e3, maximum: 1e6 }, maximumPrimaryCurrentA: 10, maximumDcA: 0.1 } } },
  { code: 'E26', name: 'a current transformer with a direct current of 1 kA', change: (d) => { draw(d, 'current-sense'); d.specification.electrical.currentSense.value = { burdenOhm: 10, ratioError: 0.01, droop: 0.01, bandwidthHz: { minimum: 1e3, maximum: 1e6 }, maximumPrimaryCurrentA: 10, maximumDcA: 1000 } } },
  { code: 'E27', name: 'a common-mode choke with much leakage', change: (d) => { draw(d, 'common-mode-choke'); d.specification.electrical.commonMode.value = { impedance: [], differentialLeakageH: 1, ratedCurrentA: 10, ratedVoltageV: 250, ratedTemperatureC: 60 } } },
  { code: 'E28', name: 'a common-mode choke of unequal turns', change: (d) => draw(d, 'common-mode-choke') },
  { code: 'E29', name: 'a common-mode choke with one point of impedance', change: (d) => { draw(d, 'common-mode-choke'); d.specification.electrical.commonMode.value = { impedance: [{ frequencyHz: 1e6, minimumOhm: 1000 }], differentialLeakageH: null, ratedCurrentA: 1, ratedVoltageV: 250, ratedTemperatureC: 60 } } },
  { code: 'E30', name: 'a coupled inductor tested with the current of one winding', base: 'coupled', change: ({ specification }) => specification.electrical.saturation.forEach((limit) => { limit.currentA /= 3 }) },
  { code: 'E32', name: 'a part at 200 °C', change: (d) => { d.requirement!.ambientC = 200 } },
  { code: 'E34', name: 'an unregulated output of fine wire', base: 'buoy', change: (d) => wind(d, 'S2', '0.080 mm') },
]

const HEAT: Break[] = [
  { code: 'T04', name: 'litz of thick strands at 600 kHz', base: 'buoy', change: (d) => { duty(d).switchingFrequencyHz = 600e3; d.specification.electrical.switchingFrequencyHz.value = { minimum: 600e3, maximum: 600e3 } } },
  { code: 'T06', name: 'a bundle wider than its layer', change: (d) => { winding(d, 'S1').wire.parallel = 40 } },
  { code: 'T09', name: 'copper whose temperature nobody knows', change: ({ specification }) => { specification.core.core.value = null }, state: 'not-checkable' },
  { code: 'T10', name: 'a rise that nobody can estimate', change: ({ specification }) => { specification.core.core.value = null }, state: 'not-checkable' },
  { code: 'T13', name: 'class 130 across the mains without a file', change: ({ specification: { insulation } }) => { insulation.systemThermalClassC.value = 130; insulation.systemFileNumber.status = 'mandatory' } },
  { code: 'T15', name: 'a winding of 20 A at a pin', change: (d) => { d.requirement = null; winding(d, 'S1').rmsCurrentA = 20 }, state: 'not-checkable' },
  { code: 'T17', name: 'a gap of some millimetres under the winding', base: 'coupled', change: ({ specification: { core: { gap }, electrical } }) => { gap.alH.value! /= 8; electrical.inductance.value!.nominalH /= 8; gap.lengthMm.value = 4 } },
]

const INSULATION: Break[] = [
  { code: 'I05', name: 'a recurring peak beyond the table', change: (d) => { boundary(d, 'PRI–SEC').recurringPeakV = 12e3 }, state: 'not-checkable' },
  { code: 'I05', name: 'a mains voltage beyond the table of impulse voltages', base: 'margin', change: ({ specification }) => { specification.insulation.mainsVoltageV.value = 1200 }, state: 'not-checkable' },
  { code: 'I04', name: 'a standard whose own distances are not at hand', base: 'margin', change: ({ specification }) => { specification.insulation.productStandard.value = 'IEC 61558-1' }, state: 'not-checkable' },
  { code: 'I05', name: 'a medical part that does not say whom it protects', base: 'margin', change: ({ specification }) => { specification.insulation.productStandard.value = 'IEC 60601-1' }, state: 'not-checkable' },
  { code: 'I12', name: 'insulated wire, whose stripped ends a person sees', change: (d) => { winding(d, 'AUX').wire.insulation = 'triple-insulated' }, state: 'not-checkable' },
  { code: 'I19', name: 'a direct test of the alternating voltage', change: (d) => { Object.assign(boundary(d, 'PRI–SEC').test!, { kind: 'dc', voltageV: 3000 }) } },
  { code: 'I21', name: 'a core tested with 300 V', base: 'buoy', change: (d) => { boundary(d, 'PRI–CORE').test!.voltageV = 300 } },
  { code: 'I22', name: 'no row for insulation resistance', change: ({ specification }) => { specification.tests = specification.tests.filter(({ characteristic }) => characteristic !== 'insulation-resistance') } },
  { code: 'I23', name: '900 V without a discharge test', change: (d) => { boundary(d, 'PRI–SEC').recurringPeakV = 900 } },
  { code: 'I24', name: 'layers of the mains winding without tape', change: (d) => { (duty(d).supply as { maximumV: number }).maximumV = 500; steps(d).forEach((step) => { Object.assign(step, { interlayerTape: null, layers: 2 }) }) } },
  { code: 'I25', name: 'no impulse voltage beyond category II', base: 'buoy', change: ({ specification }) => { specification.insulation.overvoltageCategory.value = 'III' } },
  { code: 'I31', name: 'functional insulation of an output', change: (d) => { boundary(d, 'PRI–SEC').insulation = 'functional' } },
]

const WINDABILITY: Break[] = [
  { code: 'W09', name: 'wire of 2 mm', change: (d) => wind(d, 'AUX', '1.250 mm') },
  { code: 'W10', name: 'wire of two systems', change: (d) => { const awg = wireRow(/^AWG 30/); winding(d, 'AUX').wire.wire = { kind: 'wire', id: awg.id, version: awg.version } } },
  { code: 'W14', name: 'a corner sharper than the wire', change: (d) => wind(d, 'AUX', '1.250 mm'), library: { ...library, formers: library.formers.map((former) => ({ ...former, tube: { shape: 'rectangular' as const, widthMm: 12, depthMm: 12, cornerRadiusMm: 0.3 } })) } },
  { code: 'W15', name: 'film narrower than the former', change: ({ specification }) => specification.sequence.forEach((step) => { if (step.kind === 'tape') step.widthMm = 5 }) },
  { code: 'W17', name: 'leads wider than the slot', change: ({ specification }) => { specification.former.leadSlotWidthMm.value = 0.2 } },
  { code: 'W18', name: 'a coil that the core does not close over', change: ({ specification }) => { specification.sequence.push({ ...specification.sequence.find(({ kind }) => kind === 'tape')!, id: 's99', layers: 90 } as never) } },
  { code: 'W21', name: 'an auxiliary winding in a corner', change: (d) => { steps(d).forEach((step) => { if (step.windingId === winding(d, 'AUX').id) step.lay = 'close-wound-left' }) } },
  { code: 'W22', name: 'fine wire with a tight resistance', change: (d) => { wind(d, 'AUX', '0.080 mm'); winding(d, 'AUX').dcResistance!.maximumOhm = winding(d, 'AUX').dcResistance!.nominalOhm * 1.01 } },
  { code: 'W23', name: 'a bake hotter than the tape', change: ({ specification: { impregnation } }) => { impregnation.process.value = 'dip'; impregnation.resin.value = 'Polyester'; impregnation.compatibility.value = 'Stated'; impregnation.bake.value = { temperatureC: 180, durationS: 3600 } } },
  { code: 'W24', name: 'halves that nothing holds', change: ({ specification: { core: { assembly } } }) => { assembly.adhesive.value = null; assembly.clip.value = 'None'; assembly.tapeLayers.value = 0 } },
  { code: 'W26', name: 'ten cores on pins', base: 'coupled', change: ({ specification }) => { specification.core.numberOfSets.value = 10 } },
  { code: 'W27', name: 'a gap that hums', change: ({ specification: { core: { assembly } } }) => { assembly.adhesive.value = 'None' } },
]

const TERMINATIONS: Break[] = [
  { code: 'P04', name: 'six wires on a pin', change: (d) => { winding(d, 'AUX').wire.parallel = 6 } },
  { code: 'P05', name: 'wire of 1.25 mm round a pin', change: (d) => wind(d, 'AUX', '1.250 mm') },
  { code: 'P06', name: 'wire of 0.08 mm on a pin', change: (d) => wind(d, 'AUX', '0.080 mm') },
  { code: 'P08', name: 'enamel that cannot be soldered', change: (d) => { winding(d, 'P').wire.thermalClassC = 200 } },
  { code: 'P09', name: 'a thermoplastic former in a hot bath', change: (d) => { winding(d, 'P').wire.thermalClassC = 180; d.specification.former.plastic.value = 'thermoplastic' } },
  { code: 'P12', name: 'leads of both sides at one flange', change: (d) => steps(d).forEach((step) => { Object.assign(step, { leadExitStart: 'left', leadExitFinish: 'left', startSleeve: null, finishSleeve: null }) }), state: 'not-checkable' },
  { code: 'P13', name: 'a winding of 380 V on touching pins', change: (d) => { const at = (number: string) => d.specification.former.pins.find((pin) => pin.number === number)!; const { startTerminal, finishTerminal } = winding(d, 'P'); Object.assign(at(finishTerminal), { xMm: at(startTerminal).xMm + 0.7, yMm: at(startTerminal).yMm }) } },
  { code: 'P16', name: 'pins of 1 mm', change: ({ specification }) => { specification.former.pinLengthMm.value = 1 } },
  { code: 'P17', name: 'a hole as wide as the pin', change: ({ specification }) => { specification.former.recommendedHoleMm.value = specification.former.pinSection.value!.sizeMm } },
  { code: 'P18', name: 'a reflowed part of unknown coplanarity', change: ({ specification }) => { specification.packing.solderProfile.value = 'reflow' }, state: 'not-checkable' },
  { code: 'P19', name: 'no statement on lead', change: ({ specification }) => { specification.compliance.rohs.value = null } },
  { code: 'P20', name: 'a flying lead of no length', change: ({ specification }) => { specification.former.flyingLeads = [{ id: 'f1', status: 'mandatory', origin: { kind: 'entered' }, name: 'FL1', wireStyle: 'Stranded', lengthMm: 0, measuredFrom: 'Flange', stripLengthMm: 5, tinned: true, colour: 'red', sleeve: '', termination: '' }] } },
]

const DOCUMENTS: Break[] = [
  { code: 'D06', name: 'a revision without a reason', change: ({ specification }) => { specification.revisions = [{ revision: 'B', date: '2026-03-01', zones: '', changes: [{ field: 'windings.0.turns', before: '60', after: '61' }], reason: '', effect: '', by: '', checkedBy: '', approvedBy: '' }] } },
  { code: 'D09', name: 'notes with two decimal signs', change: ({ specification }) => { specification.notes.push({ ...specification.notes[0]!, id: 'n90', text: 'Varnish to 0,5 mm above the flange, glue at 1.5 N.' }) } },
  { code: 'D10', name: 'an exemption without an end', change: ({ specification }) => { specification.compliance.rohsExemption.value = { exemption: '7(a)', expiresOn: '' } } },
  { code: 'D12', name: 'a drawing for nobody knows what', change: ({ specification }) => { specification.title.documentStatus.value = null } },
  { code: 'D13', name: 'an attachment without a title', change: ({ specification }) => { specification.title.relatedDocuments = [{ id: 'd1', status: 'mandatory', origin: { kind: 'entered' }, kind: 'other', number: 'X-1', title: '' }] } },
]

const TESTS: Break[] = [
  { code: 'Q04', name: 'a winding that no row touches', change: (d) => { const aux = winding(d, 'AUX'); const ends = [aux.startTerminal, aux.finishTerminal]; d.specification.tests.forEach((one) => { one.drivenTerminals = one.drivenTerminals.filter((end) => !ends.includes(end)); one.openTerminals = one.openTerminals.filter((end) => !ends.includes(end)); if (one.characteristic !== 'hipot') one.shortedTerminals = one.shortedTerminals.map((group) => group.filter((end) => !ends.includes(end))) }) } },
  { code: 'Q07', name: 'leakage at 100 Hz', change: ({ specification }) => specification.electrical.leakage.forEach((limit) => { limit.frequencyHz = 100 }) },
  { code: 'Q09', name: 'an inductance read at 10 V and 1 kHz', change: (d) => { Object.assign(row(d, 'L P'), { levelV: 10, frequencyHz: 1e3 }) } },
  { code: 'Q10', name: 'a bridge of 5 % for a ratio of 1 %', change: (d) => { row(d, 'P:S1').instrumentClass = 'Ratio bridge, 5 %' } },
  { code: 'Q15', name: 'a critical row that is ticked only', change: (d) => { row(d, 'L P').record = 'pass-fail' } },
  { code: 'Q17', name: 'bias below the converter’s limit', change: ({ specification }) => specification.electrical.saturation.forEach((limit) => { limit.currentA = 1 }) },
  { code: 'Q18', name: 'no type test', change: ({ specification }) => specification.tests.forEach((one) => { one.extent = 'every-part' }) },
]

const foiled = (d: SpecificationDocument, thicknessMm: (mm: number) => boolean) => {
  const foil = library.wires.find(({ form, conductorMm }) => form === 'foil' && thicknessMm(conductorMm))!
  Object.assign(winding(d, 'S1').wire, { wire: { kind: 'wire', id: foil.id, version: foil.version }, parallel: 1, insulation: 'bare' })
}
const rings = library.cores.filter(({ shape }) => shape === 'toroid').sort((a, b) => a.dimensionsMm.b! - b.dimensionsMm.b!)
const onRing = (d: SpecificationDocument, nth = 0) => {
  const ring = rings.at(nth)!
  d.specification.core.core.value = { kind: 'core', id: ring.id, version: ring.version }
  d.specification.former.former.value = null
  d.specification.sequence = d.specification.sequence.filter(({ kind }) => kind === 'winding')
  steps(d).forEach((step, index) => Object.assign(step, { section: index + 1, layers: null, marginLeftMm: 0, marginRightMm: 0, interlayerTape: null }))
}
const halves: Library = { ...library, formers: library.formers.map((former) => ({ ...former, sections: 2, windingWidthMm: former.windingWidthMm / 2, flangeThicknessMm: 0.2 })) }

const BUILDS: Break[] = [
  { code: 'T05', name: 'foil of ten turns as thick as one skin depth', change: (d) => foiled(d, (mm) => mm >= 0.2) },
  { code: 'W12', name: 'foil much narrower than the former', change: (d) => foiled(d, () => true) },
  { code: 'W13', name: 'litz thinner than its strands', base: 'buoy', change: () => undefined, library: { ...library, wires: library.wires.map((wire) => (wire.form === 'litz' ? { ...wire, overallMm: { ...wire.overallMm, 'enamel-grade-1': wire.conductorMm * 2 } } : wire)) } },
  { code: 'W16', name: 'margin tape lower than the wire', base: 'margin', change: ({ specification }) => specification.sequence.forEach((step) => { if (step.kind === 'margin') step.heightMm = 0.01 }) },
  { code: 'W19', name: 'a ring whose hole is wound full', base: 'coupled', change: (d) => { onRing(d); steps(d).forEach((step) => { step.turns = 2000 }) } },
  { code: 'W20', name: 'a ring whose windings touch', base: 'coupled', change: (d) => { onRing(d, -1); steps(d).forEach((step) => { Object.assign(step, { turns: 12, lay: 'spread' }) }) } },
  { code: 'I29', name: 'a ring without coating', base: 'coupled', change: (d) => onRing(d) },
  { code: 'I30', name: 'a flange thinner than solid insulation', change: (d) => { steps(d).forEach((step) => { step.section = step.windingId === winding(d, 'S1').id ? 2 : 1 }) }, library: halves },
  { code: 'P07', name: 'litz of more than 100 strands on one pin', change: (d) => { const litz = library.wires.find(({ form, strands }) => form === 'litz' && strands > 100)!; winding(d, 'AUX').wire.wire = { kind: 'wire', id: litz.id, version: litz.version } } },
  { code: 'P15', name: 'a part that a missing pin keys', change: ({ specification }) => { specification.former.pins.find(({ state }) => state !== 'fitted')!.state = 'missing' }, state: 'met' },
  { code: 'Q08', name: 'leakage at a hundred times the turns of the short', change: (d) => { winding(d, 'S1').turns = 1 } },
]

// ---------------------------------------------------------------------------------------------
// Converters whose flux follows the volt-seconds

const CONVERTER = { efficiency: 0.9, currentLimit: { nominalA: 3, tolerance: 0.1, delayS: 1e-7 }, clampSpikeV: null, switchRatingV: 500, supply: { kind: 'dc' as const, minimumV: 250, nominalV: 320, maximumV: 380 }, switchDropV: 1 }
const OUTPUT = { id: 'o1', name: '12 V', role: 'main' as const, voltageV: 12, rectifierDropV: 0.6, fullLoadCurrentA: 3, lightLoadCurrentA: 0.3, side: 'secondary' as const }
const FILTERED = { ...OUTPUT, filterInductanceH: null, rippleRatio: 0.3 }
const forward = (switchingFrequencyHz: number): Duty => ({ topology: 'forward', ...CONVERTER, reset: 'two-switch', switchingFrequencyHz, maximumDutyRatio: 0.48, outputs: [FILTERED] })
const fullBridge = (switchingFrequencyHz: number): Duty => ({ topology: 'full-bridge', ...CONVERTER, control: 'pulse-width', switchingFrequencyHz, maximumDutyRatio: 0.48, outputs: [{ ...FILTERED, rectifier: 'full-wave' }] })
const halfBridge = (switchingFrequencyHz: number): Duty => ({ topology: 'half-bridge', ...CONVERTER, switchingFrequencyHz, maximumDutyRatio: 0.48, outputs: [{ ...FILTERED, rectifier: 'full-wave' }] })
const resonant: Duty = { topology: 'llc', ...CONVERTER, outputs: [{ ...OUTPUT, voltageV: 24, rectifier: 'full-wave' }], resonantInductanceH: 80e-6, resonantCapacitanceF: 30e-9, resonantInductor: 'separate', minimumFrequencyHz: 50e3, maximumFrequencyHz: 250e3, deadTimeS: null, bridgeCapacitanceF: null }

/** The harbour supply's part, driven by another converter. */
function driven(duty: Duty): CheckResult[] {
  const document = copyOf('insulated')
  document.requirement = { ...document.requirement!, duty }
  document.specification.electrical.topology.value = duty.topology
  winding(document, 'AUX').outputId = null
  return evaluate(document, library).checks
}

describe('flux that follows the volt-seconds', () => {
  const of = (duty: Duty, code: string) => driven(duty).filter((check) => check.code === code)

  it.each([
    { name: 'a forward transformer at 130 kHz', duty: forward(130e3), code: 'E03', states: ['met'] },
    { name: 'a forward transformer at 30 kHz', duty: forward(30e3), code: 'E03', states: ['not-met'] },
    { name: 'a half bridge at 65 kHz', duty: halfBridge(65e3), code: 'E04', states: ['met', 'met'] },
    { name: 'a full bridge at 20 kHz, whose first pulse saturates it', duty: fullBridge(20e3), code: 'E04', states: ['not-met', 'met'] },
    { name: 'a resonant half bridge, by voltage and by current', duty: resonant, code: 'E05', states: ['met'] },
  ])('$code says $states of $name', ({ duty: one, code, states }) => {
    expect(of(one, code).map(({ state }) => state)).toEqual(states)
  })

  it('is that of Faraday’s law on the least area', () => {
    const [check] = of(forward(130e3), 'E03')
    const core = library.cores.find(({ id }) => id === copyOf('insulated').specification.core.core.value!.id)!
    // Volt-second balance of the output inductor: U_in·D·N_s/N_p = 12.6 V whatever the input, and up to 1/η more to make up for the losses.
    const document = copyOf('insulated')
    const perTurnV = 12.6 / winding(document, 'S1').turns
    const ratio = check!.value! / (perTurnV / 130e3 / (core.minimumAreaMm2 * 1e-6))
    expect(ratio).toBeGreaterThanOrEqual(1)
    expect(ratio).toBeLessThanOrEqual(1 / CONVERTER.efficiency)
  })

  it('stops a switch beyond its rated voltage, and asks about one above 80 % of it', () => {
    const rated = (switchRatingV: number) => driven({ ...forward(130e3), switchRatingV } as Duty).find(({ code }) => code === 'E16')!
    expect(rated(600)).toMatchObject({ severity: 'M', state: 'met' })
    expect(rated(400)).toMatchObject({ severity: 'M', state: 'not-met' })
    expect(rated(300)).toMatchObject({ severity: 'S', state: 'not-met' })
  })
})

const keyOf = ({ code, path, state, values }: CheckResult) => `${code} ${path} ${state} ${values.row ?? values.winding ?? ''}`

describe.each(Object.entries({ ELECTRICAL, HEAT, INSULATION, WINDABILITY, TERMINATIONS, DOCUMENTS, TESTS, BUILDS }))('%s', (_, breaks) => {
  it.each(breaks)('$code is open for $name', ({ code, base = 'insulated', change, state = 'not-met', library: from = library }) => {
    const before = new Set(evaluate(copyOf(base), library).checks.map(keyOf))
    const document = copyOf(base)
    change(document)
    const opened = evaluate(document, from).checks.filter((check) => check.code === code && !before.has(keyOf(check)))
    expect(opened.map((check) => check.state)).toContain(state)
  })
})
