import type { SpecificationDocument } from '#shared/engine/specification'
import { row, stated } from './blank-specification'
import { mainsFlyback } from './sample-specification'

const sleeve = { kind: 'sleeve' as const, id: 'ptfe-1.0', version: 1 }

/** The mains flyback with every field filled that a document can hold. */
export function fullSpecification(): SpecificationDocument {
  const document = mainsFlyback()
  const { specification } = document
  specification.title.drawingNumber = stated('BM-D-4710')
  Object.assign(specification.electrical, {
    voltSecondProduct: stated({ windingId: 'w1', minimumVs: 2.45e-3, waveform: 'unipolar-pulse' as const, temperatureC: 100 }),
    windingCapacitance: [row('c2', { windingIds: ['w1'], maximumF: 31e-12, frequencyHz: 150e3, terminalsTied: 'others open' })],
    currentSense: stated({ burdenOhm: 12.5, ratioError: 0.015, droop: 0.022, bandwidthHz: { minimum: 55, maximum: 210e3 }, maximumPrimaryCurrentA: 21.5, maximumDcA: 0.35 }),
    commonMode: stated({ impedance: [{ frequencyHz: 125e3, minimumOhm: 1350 }], differentialLeakageH: 4.5e-6, ratedCurrentA: 2.6, ratedVoltageV: 250, ratedTemperatureC: 70 }),
    gateDrive: stated({ dvDtImmunityVPerS: 5.5e10, propagationDelayS: 45e-9, isolationCapacitanceF: 6.5e-12 }),
  })
  specification.electrical.leakage[0]!.minimumH = 7.5e-6
  Object.assign(specification.core, {
    orientation: stated('gap at the pin-1 end'),
    fluxBand: stated('copper foil, connected to pin 3'),
    insulationOverCore: stated('two layers of tape under the flux band'),
    coating: stated({ material: 'epoxy', withstandVRms: 1250 }),
    surfaceIrregularities: stated('IEC 60424-2'),
  })
  Object.assign(specification.core.assembly, { clip: stated('two steel clips'), bandingTensionN: stated(12.5) })
  Object.assign(specification.former, {
    toolNumber: stated('T-118'), relativeTemperatureIndexC: stated(150), fileNumber: stated('E00000'), coplanarityMm: stated(0.15), leadSlotWidthMm: stated(1.45),
    flyingLeads: [row('f1', { name: 'FL1', wireStyle: 'UL 1015, 18 AWG', lengthMm: 125.5, measuredFrom: 'edge of the core', stripLengthMm: 6.5, tinned: true, colour: 'blue', sleeve: 'PTFE', termination: 'ring M4' })],
  })
  Object.assign(specification.impregnation, { pressureCycle: stated('5 mbar, then 2 bar'), fillLevelMm: stated(18.5) })
  Object.assign(specification.insulation, {
    systemFileNumber: stated('E11111'),
    partialDischarge: stated({ required: true, extinctionVPeak: 765, limitC: 1.05e-11, method: 'IEC 60270' }),
    impulse: stated({ voltageV: 4250, shots: 5, polarity: 'both' as const, where: 'P to S' }),
  })
  specification.insulation.criticalMaterials = [
    row('k1', { part: 'Interwinding tape', maker: 'Larkfell Films', type: 'LF-25 polyester', rating: '130 °C', standard: 'IEC 60454-3-1', certificate: 'VB-20418', expiresOn: '2029-04-30' }),
  ]
  const bare = specification.insulation.boundaries[1]!
  Object.assign(bare, { distanceThroughInsulationMm: 0.45, insulationLayers: 2 })
  Object.assign(specification.marking, { safetyMark: stated('none'), legibleAfter: stated('varnish and wash') })
  Object.assign(specification.packing, {
    pinProtection: stated('foam'), orientation: stated('pins down'), cartonLabel: stated('part, revision, quantity, lot'), moistureLevel: stated('not applicable'), storage: stated('24 months, dry'),
    solderability: stated('IEC 60068-2-20'),
  })
  Object.assign(specification.compliance, {
    rohsExemption: stated({ exemption: '7(a)', expiresOn: '2027-06-30' }), halogenFree: stated(true), conflictMinerals: stated('IPC-1755 declaration'), pfas: stated('PTFE sleeves'), packagingMarks: stated('PAP 20'),
  })
  const { wire, dcResistance } = specification.windings[1]!
  Object.assign(wire, { certificate: { standard: 'IEC 62368-1, Annex J', number: 'C-553', peakVoltageV: 1050, maximumFrequencyHz: 310e3 }, lay: { lengthMm: 22.5, direction: 'S' } })
  Object.assign(dcResistance!, { minimumOhm: 0.0091 })
  specification.sequence.push(
    row('s15', { kind: 'sleeve' as const, sleeve, lead: 'S1 start', lengthMm: 31.5, remark: 'over both ends' }),
    row('s16', { kind: 'shield' as const, windingId: 'w3', form: 'foil' as const, thicknessMm: 0.035, widthMm: 13.5, overlapMm: 3.5, overlapInsulation: 'polyester tape', connectedTerminal: '3', remark: 'free end insulated' }),
    row('s17', { kind: 'tape' as const, tape: { kind: 'tape' as const, id: 'polyester-0.065', version: 1 }, layers: 2, widthMm: 12.5, purpose: 'base' as const, remark: 'under the leads' }),
    row('s18', { kind: 'margin' as const, tape: { kind: 'tape' as const, id: 'margin-aramid-0.250', version: 1 }, leftMm: 2.5, rightMm: 2.25, heightMm: 1.35, remark: 'trimmed' }),
  )
  const winding = specification.sequence.find((step) => step.kind === 'winding')!
  Object.assign(winding, { layers: 2, finishSleeve: { sleeve, lengthMm: 24.5, intoWindingMm: 2.75 } })
  Object.assign(specification.tests[0]!, { instrumentClass: '0.1 %', biasA: 1.15, openTerminals: ['9', '12'] })
  return document
}
