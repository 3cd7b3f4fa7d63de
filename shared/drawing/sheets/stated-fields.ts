import type { FieldStatus, Stated, WindingSpecification } from '../../engine/specification'
import { celsius, duration, joined, millimetres, percent, plain, quantity, yesNo } from './figures'
import { rowName, type DrawingInput } from './input'
import { CONTRACT_WORDS, SIDE_WORDS, STATUS_WORDS } from './words'

/** One single-valued field of the document as the sheets show it; `text` is null while it is not stated. */
export interface StatedField {
  label: string
  text: string | null
  status: FieldStatus
  /** Not listed as missing where it has no sense for this part. */
  applies: boolean
}

/** Title of the group that stands beside the insulation boundaries. */
export const INSULATION_SYSTEM = 'Insulation system'

export interface FieldGroup {
  title: string
  fields: StatedField[]
}

function field<T>(label: string, stated: Stated<T>, show: (value: T) => string, applies = true): StatedField {
  const text = stated.value === null ? null : show(stated.value)
  return { label, text: text === '' ? null : text, status: stated.status, applies: applies || stated.value !== null }
}

const same = (value: string) => value
const spaced = (value: string) => value.replaceAll('-', ' ')

/** Every single-valued field of the document, grouped as on the sheets; the title block's own fields last. */
export function fieldGroups(input: DrawingInput): FieldGroup[] {
  const { specification } = input
  return [coreGroup(input), gapGroup(specification), formerGroup(input), impregnationGroup(specification), insulationGroup(specification), markingGroup(specification), packingGroup(specification), complianceGroup(specification), toleranceGroup(specification)]
}

function coreGroup({ specification: { core }, library }: DrawingInput): FieldGroup {
  const toroid = library.cores.some((row) => row.id === core.core.value?.id && row.shape === 'toroid')
  return {
    title: 'Core and assembly',
    fields: [
      field('Core', core.core, (value) => rowName(library, value)),
      field('Material', core.material, (value) => rowName(library, value)),
      field('Approved equivalents', core.approvedEquivalents, (value) => (value.length === 0 ? 'none' : value.join(', '))),
      field('Equivalence rule', core.equivalenceRule, spaced),
      field('Number of core sets', core.numberOfSets, plain),
      field('Orientation', core.orientation, same),
      field('Adhesive', core.assembly.adhesive, same),
      field('Adhesive position', core.assembly.adhesivePosition, same),
      field('Clip', core.assembly.clip, same),
      field('Tape layers around the core', core.assembly.tapeLayers, plain),
      field('Banding tension', core.assembly.bandingTensionN, (value) => quantity(value, 'N')),
      field('Core potential', core.potential, (value) => `${value.connection === 'pin' ? `pin ${value.pin ?? '?'}` : 'floating'}, ${SIDE_WORDS[value.side]} side`),
      field('Flux band', core.fluxBand, same),
      field('Insulation over core', core.insulationOverCore, same),
      field('Coating', core.coating, (value) => joined([value.material, value.withstandVRms === null ? '' : `withstands ${quantity(value.withstandVRms, 'V')} r.m.s.`]), toroid),
      field('Surface irregularities', core.surfaceIrregularities, same),
    ],
  }
}

function gapGroup({ core: { gap } }: WindingSpecification): FieldGroup {
  const gapped = gap.control.value !== 'none'
  const control = { al: 'AL controls, length for reference', length: 'length controls, AL for reference', none: 'no gap' } as const
  return {
    title: 'Gap',
    fields: [
      field('What controls', gap.control, (value) => control[value]),
      field('AL', gap.alH, (value) => quantity(value, 'H'), gapped),
      field('AL tolerance', gap.alTolerance, (value) => `±${percent(value)}`, gapped),
      field('Length', gap.lengthMm, millimetres, gapped),
      field('Length tolerance', gap.lengthToleranceMm, (value) => `±${millimetres(value)}`, gapped),
      field('Position', gap.position, spaced, gapped),
      field('Grinding', gap.grinding, spaced, gapped),
    ],
  }
}

function formerGroup({ specification: { former }, library }: DrawingInput): FieldGroup {
  return {
    title: 'Coil former, pins, mechanics',
    fields: [
      field('Coil former', former.former, (value) => rowName(library, value)),
      field('Tool number', former.toolNumber, same),
      field('Material', former.material, same),
      field('Plastic', former.plastic, same),
      field('Flammability', former.flammability, same),
      field('Material group', former.materialGroup, same),
      field('Relative temperature index', former.relativeTemperatureIndexC, celsius),
      field('File number', former.fileNumber, same),
      field('Mounting', former.mounting, same),
      field('Pin view that governs', former.pinView, (value) => `${value} view`),
      field('Pin-1 mark', former.pinOneMark, same),
      field('Pin pitch', former.pinPitchMm, millimetres),
      field('Row spacing', former.rowSpacingMm, millimetres),
      field('Pin section', former.pinSection, (value) => `${value.shape}, ${millimetres(value.sizeMm)}`),
      field('Pin length below seating plane', former.pinLengthMm, millimetres),
      field('Standoff', former.standoffMm, millimetres),
      field('True position of pins', former.truePositionMm, (value) => `Ø ${millimetres(value)}`),
      field('Recommended hole', former.recommendedHoleMm, (value) => `Ø ${millimetres(value)}`),
      field('Coplanarity', former.coplanarityMm, millimetres, former.recommendedHoleMm.value === null),
      field('Envelope, maximum', former.envelope, (value) => `${plain(value.lengthMm)} × ${plain(value.widthMm)} × ${millimetres(value.heightMm)}`),
      field('Lead slot width', former.leadSlotWidthMm, millimetres),
      field('Mass', former.massG, (value) => `${plain(value)}\u00a0g`),
      field('Fixing', former.fixing, same),
    ],
  }
}

function impregnationGroup({ impregnation }: WindingSpecification): FieldGroup {
  const any = impregnation.process.value !== 'none'
  const potted = impregnation.process.value === 'potting'
  return {
    title: 'Impregnation, encapsulation',
    fields: [
      field('Process', impregnation.process, same),
      field('Resin', impregnation.resin, same, any),
      field('Thermal class', impregnation.thermalClassC, celsius, any),
      field('Compatibility with the wire', impregnation.compatibility, same, any),
      field('Pressure cycle', impregnation.pressureCycle, same, impregnation.process.value === 'vacuum'),
      field('Bake', impregnation.bake, (value) => `${celsius(value.temperatureC)}, ${duration(value.durationS)}`, any),
      field('Extent', impregnation.extent, spaced, any),
      field('Pins masked and clean', impregnation.pinsMasked, yesNo, any),
      field('Fill level', impregnation.fillLevelMm, millimetres, potted),
    ],
  }
}

function insulationGroup({ insulation }: WindingSpecification): FieldGroup {
  return {
    title: INSULATION_SYSTEM,
    fields: [
      field('Product standard', insulation.productStandard, same),
      field('Edition', insulation.standardEdition, same),
      field('Mains voltage, line to neutral', insulation.mainsVoltageV, (value) => `${quantity(value, 'V')} r.m.s.`),
      field('Overvoltage category', insulation.overvoltageCategory, same),
      field('Pollution degree', insulation.pollutionDegree, plain),
      field('Altitude up to', insulation.altitudeM, (value) => `${plain(value)}\u00a0m`),
      field('Material group', insulation.materialGroup, same),
      field('Class of the insulation system', insulation.systemThermalClassC, celsius),
      field('System file number', insulation.systemFileNumber, same),
      field('Maximum ambient', insulation.maximumAmbientC, celsius),
      field('Maximum winding temperature', insulation.maximumWindingC, (value) => `${celsius(value.temperatureC)}, ${value.method} method`),
      field('Partial discharge', insulation.partialDischarge, (value) =>
        value.required
          ? joined([`required, ${value.method}`, value.extinctionVPeak === null ? '' : `extinction ${quantity(value.extinctionVPeak, 'V')} peak`, value.limitC === null ? '' : `limit ${quantity(value.limitC, 'C')}`])
          : joined(['not required', value.method, value.extinctionVPeak === null ? '' : `extinction ${quantity(value.extinctionVPeak, 'V')} peak`, value.limitC === null ? '' : `limit ${quantity(value.limitC, 'C')}`]),
      ),
      field('Impulse 1.2/50 µs', insulation.impulse, (value) => joined([`${quantity(value.voltageV, 'V')} peak`, `${plain(value.shots)} shots`, value.polarity === 'both' ? 'both polarities' : `${value.polarity} polarity`, value.where])),
    ],
  }
}

function markingGroup({ marking }: WindingSpecification): FieldGroup {
  return {
    title: 'Marking',
    fields: [
      field('Content', marking.content, (value) => value.join(', ')),
      field('Position', marking.position, same),
      field('Date code', marking.dateCode, same),
      field('Revision on the part', marking.revisionOnPart, yesNo),
      field('Safety mark', marking.safetyMark, same),
      field('Machine-readable', marking.machineReadable, same),
      field('Legible after', marking.legibleAfter, same),
    ],
  }
}

function packingGroup({ packing }: WindingSpecification): FieldGroup {
  return {
    title: 'Packing, storage, soldering',
    fields: [
      field('Form', packing.form, spaced),
      field('Pieces per pack', packing.piecesPerPack, plain),
      field('Pieces per carton', packing.piecesPerCarton, plain),
      field('Pin protection', packing.pinProtection, same),
      field('Orientation', packing.orientation, same),
      field('Carton label', packing.cartonLabel, same),
      field('Moisture level', packing.moistureLevel, same),
      field('Storage', packing.storage, same),
      field('Solderability', packing.solderability, same),
      field('Solder profile', packing.solderProfile, same),
      field('Washable', packing.washable, yesNo),
    ],
  }
}

function complianceGroup({ compliance }: WindingSpecification): FieldGroup {
  return {
    title: 'Compliance, traceability',
    fields: [
      field('RoHS', compliance.rohs, same),
      field('RoHS exemption', compliance.rohsExemption, (value) => `${value.exemption}, expires ${value.expiresOn}`),
      field('REACH candidate list of', compliance.reachListDate, same),
      field('Halogen-free', compliance.halogenFree, yesNo),
      field('Conflict minerals', compliance.conflictMinerals, same),
      field('PFAS', compliance.pfas, same),
      field('Packaging marks', compliance.packagingMarks, same),
      field('Traceability', compliance.traceability, same),
      field('Records kept', compliance.retentionYears, (value) => `${plain(value)} years`),
    ],
  }
}

function toleranceGroup({ tolerances, contract }: WindingSpecification): FieldGroup {
  return {
    title: 'Tolerances',
    fields: [
      field('General', tolerances.general, same),
      field('Angular', tolerances.angular, same),
      field('Pins', tolerances.pins, same),
      field('Electrical rows without a tolerance', tolerances.electrical, same),
      { label: 'Contract', text: CONTRACT_WORDS[contract], status: 'mandatory', applies: true },
    ],
  }
}

/** Fields that stand in the title block; only asked whether they are stated. */
export function titleFields({ title, insulation, electrical }: WindingSpecification): StatedField[] {
  return [
    field('Legal owner', title.legalOwner, same),
    field('Confidentiality', title.confidentiality, same),
    field('Part number', title.partNumber, same),
    field('Title', title.title, same),
    field('Supplementary title', title.supplementaryTitle, same),
    field('Document type', title.documentType, same),
    field('Responsible department', title.responsibleDepartment, same),
    field('Technical reference', title.technicalReference, same),
    field('Language', title.languageCode, same),
    field('Classification', title.classification, same),
    field('Document status', title.documentStatus, (value) => STATUS_WORDS[value]),
    field('Sheet size', title.paperSize, same),
    field('Projection', title.projection, same),
    field('Switching frequency', electrical.switchingFrequencyHz, () => 'stated'),
    field('Duty ratio', electrical.dutyRatio, () => 'stated'),
    field('Inductance', electrical.inductance, () => 'stated'),
    field('Polarity', electrical.polarity, () => 'stated'),
    field('Self-resonant frequency', electrical.selfResonance, () => 'stated'),
    field('Cautions', insulation.cautions, () => 'stated'),
  ]
}
