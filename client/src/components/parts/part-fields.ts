import type { LibraryKind } from '#shared/engine/library'
import { CORE_SHAPES } from '#shared/contracts/part-rows'
import type { Choice, ChoiceField, FigureField, PartField, PartSection, TextField, VariantField } from './field-types'
import { familyWord } from './part-words'

type FigureOptions = Pick<FigureField, 'optional' | 'whole' | 'help'>

const figure = (path: string, label: string, unit: string, options: FigureOptions = {}): FigureField => ({ type: 'figure', path, label, unit, ...options })
const text = (path: string, label: string, options: Pick<TextField, 'optional' | 'help' | 'wide'> = {}): TextField => ({ type: 'text', path, label, ...options })
const choice = (path: string, label: string, choices: readonly Choice[]): ChoiceField => ({ type: 'choice', path, label, choices })
const same = (...values: string[]): Choice[] => values.map((value) => ({ value, label: value }))
const families = (...values: readonly string[]): Choice[] => values.map((value) => ({ value, label: familyWord(value) }))

const optional = { optional: true } as const

const materialGroup = choice('materialGroup', 'Material group (IEC 60664-1)', [
  { value: 'I', label: 'I: CTI 600 and above' },
  { value: 'II', label: 'II: CTI 400 to 600' },
  { value: 'IIIa', label: 'IIIa: CTI 175 to 400' },
  { value: 'IIIb', label: 'IIIb: CTI 100 to 175, or unknown' },
])
const thermalClass = figure('thermalClassC', 'Thermal class (IEC 60085)', '°C')

const round = { value: 'round', label: 'Round', make: () => ({ shape: 'round', diameterMm: null }), fields: [figure('diameterMm', 'Diameter', 'mm')] }
const shapeOf = (value: Record<string, unknown> | null) => (value === null ? 'none' : String(value.shape))

const centreLeg: VariantField = {
  type: 'variant',
  path: 'centreLeg',
  label: 'Cross-section of the centre leg',
  forms: [
    round,
    {
      value: 'rectangular',
      label: 'Rectangular',
      make: () => ({ shape: 'rectangular', widthMm: null, depthMm: null }),
      fields: [figure('widthMm', 'Width', 'mm'), figure('depthMm', 'Depth', 'mm')],
    },
    { value: 'none', label: 'No centre leg', make: () => null, fields: [] },
  ],
  formOf: shapeOf,
}

const coating: VariantField = {
  type: 'variant',
  path: 'coatedMm',
  label: 'Ring core: greatest size over its coating',
  forms: [
    { value: 'none', label: 'Not stated', make: () => null, fields: [] },
    {
      value: 'given',
      label: 'Stated',
      make: () => ({ outside: null, inside: null, height: null }),
      fields: [figure('outside', 'Outside diameter', 'mm'), figure('inside', 'Inside diameter', 'mm'), figure('height', 'Height', 'mm')],
    },
  ],
  // Rows from before the field have none.
  formOf: (value) => (value == null ? 'none' : 'given'),
}

const tube: VariantField = {
  type: 'variant',
  path: 'tube',
  label: 'Outside of the winding tube',
  forms: [
    round,
    {
      value: 'rectangular',
      label: 'Rectangular',
      make: () => ({ shape: 'rectangular', widthMm: null, depthMm: null, cornerRadiusMm: null }),
      fields: [figure('widthMm', 'Width', 'mm'), figure('depthMm', 'Depth', 'mm'), figure('cornerRadiusMm', 'Corner radius', 'mm')],
    },
  ],
  formOf: shapeOf,
}

const frequencyRange: VariantField = {
  type: 'variant',
  path: 'frequencyRangeHz',
  label: 'Frequency range',
  forms: [
    {
      value: 'given',
      label: 'Stated',
      make: () => ({ minimum: null, maximum: null }),
      fields: [figure('minimum', 'From', 'kHz'), figure('maximum', 'To', 'kHz')],
    },
    { value: 'none', label: 'Not stated', make: () => null, fields: [] },
  ],
  formOf: (value) => (value === null ? 'none' : 'given'),
}

const CORE: readonly PartSection[] = [
  {
    title: 'Effective parameters (IEC 60205), set of two halves',
    fields: [
      figure('effectiveAreaMm2', 'Effective area Ae', 'mm²'),
      figure('minimumAreaMm2', 'Least area Amin', 'mm²'),
      figure('effectiveLengthMm', 'Effective length le', 'mm'),
      figure('effectiveVolumeMm3', 'Effective volume Ve', 'mm³'),
      figure('massG', 'Mass', 'g', optional),
    ],
  },
  {
    title: 'Shape and dimensions',
    fields: [
      choice('shape', 'Shape', families(...CORE_SHAPES)),
      text('standard', 'Standard', optional),
      figure('dimensionsMm.a', 'A, full width', 'mm', { ...optional, help: 'Ring core: outside diameter.' }),
      figure('dimensionsMm.b', 'B, height of a half', 'mm', { ...optional, help: 'Ring core: inside diameter.' }),
      figure('dimensionsMm.c', 'C, depth', 'mm', { ...optional, help: 'Ring core: height.' }),
      figure('dimensionsMm.d', 'D, height of a half window', 'mm', optional),
      figure('dimensionsMm.e', 'E, window from outer leg to outer leg', 'mm', optional),
      figure('dimensionsMm.f', 'F, centre leg', 'mm', optional),
      centreLeg,
      coating,
    ],
  },
]

const FORMER: readonly PartSection[] = [
  {
    title: 'Winding space',
    fields: [
      text('coreId', 'Identifier of the core'),
      figure('windingWidthMm', 'Winding width', 'mm'),
      figure('windingHeightMm', 'Winding height', 'mm'),
      figure('sections', 'Sections', '', { whole: true }),
      figure('meanTurnLengthMm', 'Mean length of turn', 'mm', { ...optional, help: 'Left empty it follows from the geometry.' }),
      tube,
      figure('tubeWallMm', 'Wall of the tube', 'mm'),
      figure('flangeThicknessMm', 'Thickness of a flange', 'mm'),
    ],
  },
  {
    title: 'Pins, seen from above the board',
    fields: [
      choice('mounting', 'Axis of the coil', [
        { value: 'horizontal', label: 'Horizontal, along the board' },
        { value: 'vertical', label: 'Vertical, standing on the board' },
      ]),
      figure('pinPitchMm', 'Pitch', 'mm'),
      figure('pinRowSpacingMm', 'Spacing of the rows', 'mm'),
      choice('pinSection.shape', 'Section of a pin', [
        { value: 'round', label: 'Round' },
        { value: 'square', label: 'Square' },
      ]),
      figure('pinSection.sizeMm', 'Size of a pin', 'mm'),
      figure('pinLengthMm', 'Length below the seating plane', 'mm'),
      figure('standoffMm', 'Standoff', 'mm'),
      { type: 'list', path: 'pins', label: 'Pins', line: 'pin', columns: [text('number', 'Pin'), figure('xMm', 'x', 'mm'), figure('yMm', 'y', 'mm')] },
    ],
  },
  {
    title: 'Plastic and size',
    fields: [
      text('material', 'Material'),
      choice('plastic', 'Plastic', [
        { value: 'thermoset', label: 'Thermoset' },
        { value: 'thermoplastic', label: 'Thermoplastic' },
      ]),
      text('flammability', 'Flammability', optional),
      materialGroup,
      thermalClass,
      figure('envelopeMm.length', 'Length with core', 'mm'),
      figure('envelopeMm.width', 'Width with core', 'mm'),
      figure('envelopeMm.height', 'Height with core', 'mm'),
    ],
  },
]

const MATERIAL: readonly PartSection[] = [
  {
    title: 'Magnetic properties',
    fields: [
      choice('use', 'Use', families('power', 'wideband', 'common-mode', 'powder')),
      figure('initialPermeability', 'Initial permeability µi', ''),
      figure('permeabilityTolerance', 'Tolerance of µi, ±', '%'),
      figure('remanenceT', 'Remanence Br', 'mT', optional),
      figure('curieC', 'Curie temperature', '°C', optional),
      figure('densityKgPerM3', 'Density', 'kg/m³'),
      frequencyRange,
      {
        type: 'list',
        path: 'saturation',
        label: 'Saturation flux density',
        line: 'point',
        columns: [figure('temperatureC', 'Temperature', '°C'), figure('fluxDensityT', 'Bs', 'mT')],
      },
      {
        type: 'list',
        path: 'biasPoints',
        label: 'Powder: permeability left under a static field',
        line: 'point',
        columns: [figure('fieldAPerM', 'Field', 'A/m'), figure('permeabilityShare', 'Left of µi', '%')],
      },
    ],
  },
  {
    title: 'Core loss: P = Cm · f^x · B^y · (ct0 − ct1·T + ct2·T²), f in Hz, B peak in T, T in °C, P in W/m³',
    fields: [
      {
        type: 'list',
        path: 'lossFits',
        label: 'Fits',
        line: 'fit',
        columns: [
          figure('minimumHz', 'From', 'kHz'),
          figure('maximumHz', 'To', 'kHz'),
          figure('cm', 'Cm', ''),
          figure('x', 'x', ''),
          figure('y', 'y', ''),
          figure('ct0', 'ct0', ''),
          figure('ct1', 'ct1', ''),
          figure('ct2', 'ct2', ''),
          figure('minimumC', 'Measured from', '°C', optional),
          figure('maximumC', 'to', '°C', optional),
          figure('minimumT', 'at peak flux from', 'mT', optional),
          figure('maximumT', 'to', 'mT', optional),
          text('source', 'Source', { wide: true }),
          choice('confidence', 'Confidence', same('high', 'medium', 'low', 'generic')),
        ],
      },
      {
        type: 'list',
        path: 'lossPoints',
        label: 'Published points, for checking the fits',
        line: 'point',
        columns: [
          figure('frequencyHz', 'Frequency', 'kHz'),
          figure('fluxDensityT', 'Peak flux density', 'mT'),
          figure('temperatureC', 'Temperature', '°C'),
          figure('lossWPerM3', 'Loss', 'kW/m³'),
        ],
      },
    ],
  },
]

const WIRE: readonly PartSection[] = [
  {
    title: 'Conductor',
    fields: [
      choice('form', 'Form', families('round', 'litz', 'foil')),
      text('standard', 'Standard', optional),
      text('size', 'Size'),
      figure('conductorMm', 'Diameter of a strand, thickness of a foil', 'mm'),
      figure('conductorToleranceMm', 'Tolerance, ±', 'mm', optional),
      figure('strands', 'Strands', '', { whole: true }),
      figure('widthMm', 'Width of a foil', 'mm', optional),
      figure('copperAreaMm2', 'Copper area', 'mm²'),
    ],
  },
  {
    title: 'Resistance at 20 °C',
    fields: [
      figure('resistance20.nominalOhmPerM', 'Nominal resistance', 'mΩ/m'),
      figure('resistance20.minimumOhmPerM', 'Least resistance', 'mΩ/m', optional),
      figure('resistance20.maximumOhmPerM', 'Greatest resistance', 'mΩ/m', optional),
    ],
  },
  {
    title: 'Greatest overall diameter',
    fields: [
      figure('overallMm.bare', 'Overall, bare', 'mm', optional),
      figure('overallMm.enamel-grade-1', 'Overall, enamel grade 1', 'mm', optional),
      figure('overallMm.enamel-grade-2', 'Overall, enamel grade 2', 'mm', optional),
      figure('overallMm.enamel-grade-3', 'Overall, enamel grade 3', 'mm', optional),
      figure('overallMm.triple-insulated', 'Overall, triple-insulated', 'mm', optional),
      figure('overallMm.fully-insulated', 'Overall, fully insulated', 'mm', optional),
    ],
  },
]

const TAPE: readonly PartSection[] = [
  {
    title: 'Tape',
    fields: [
      choice('use', 'Use', families('insulation', 'margin')),
      text('material', 'Material'),
      figure('thicknessMm', 'Thickness', 'mm'),
      { type: 'figures', path: 'widthsMm', label: 'Widths sold', unit: 'mm', help: 'Empty when it is slit to order.' },
      thermalClass,
      figure('layerWithstandVRms', 'Withstand voltage of one layer, rms', 'V', { ...optional, help: 'From the type test; empty when not known.' }),
      materialGroup,
    ],
  },
]

const SLEEVE: readonly PartSection[] = [
  {
    title: 'Sleeve',
    fields: [
      text('material', 'Material'),
      figure('boreMm', 'Bore', 'mm'),
      figure('wallMm', 'Wall', 'mm'),
      thermalClass,
      figure('withstandVRms', 'Withstand voltage, rms', 'V', { ...optional, help: 'From the type test; empty when not known.' }),
    ],
  },
]

/** Every field of every kind of row, in the order in which it is read and entered. */
export const PART_SECTIONS: Readonly<Record<LibraryKind, readonly PartSection[]>> = {
  core: CORE,
  former: FORMER,
  material: MATERIAL,
  wire: WIRE,
  tape: TAPE,
  sleeve: SLEEVE,
}

export const partFields = (kind: LibraryKind): readonly PartField[] => PART_SECTIONS[kind].flatMap((section) => section.fields)

/** Wholes that a mark may name at once. */
const WHOLES: Readonly<Record<LibraryKind, readonly { path: string; label: string }[]>> = {
  core: [{ path: 'dimensionsMm', label: 'All dimensions' }],
  former: [
    { path: 'pinSection', label: 'Section and size of a pin' },
    { path: 'envelopeMm', label: 'Size with core' },
  ],
  material: [],
  wire: [
    { path: 'resistance20', label: 'All resistances' },
    { path: 'overallMm', label: 'All overall diameters' },
  ],
  tape: [],
  sleeve: [],
}

/** What can be marked as unverified: each field, each figure of a part that takes several forms, and wholes. */
export function markableFields(kind: LibraryKind): { path: string; label: string }[] {
  return [...fieldMarks(kind), ...WHOLES[kind]]
}

function fieldMarks(kind: LibraryKind): { path: string; label: string }[] {
  return partFields(kind).flatMap((field) => {
    const whole = { path: field.path, label: field.label }
    if (field.type !== 'variant') return [whole]
    const inner = field.forms.flatMap((form) => form.fields.map(({ path, label }) => ({ path: `${field.path}.${path}`, label: `${field.label}: ${label.toLowerCase()}` })))
    return [whole, ...new Map(inner.map((entry) => [entry.path, entry])).values()]
  })
}
