import type { PartSummary } from '#shared/contracts/parts'
import type { LibraryKind } from '#shared/engine/library'
import { enteredText } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'
import type { SheetColumn } from '@/components/base/sheet-columns'

/** One figure of the list, by its key in a summary. */
export interface FigureColumn {
  key: string
  header: string
  unit: string
}

/** The figures that tell one row from the next. */
export const FIGURE_COLUMNS: Readonly<Record<LibraryKind, readonly FigureColumn[]>> = {
  core: [
    { key: 'effectiveAreaMm2', header: 'Ae', unit: 'mm²' },
    { key: 'effectiveLengthMm', header: 'le', unit: 'mm' },
    { key: 'effectiveVolumeMm3', header: 'Ve', unit: 'mm³' },
    { key: 'massG', header: 'Mass', unit: 'g' },
  ],
  former: [
    { key: 'windingWidthMm', header: 'Winding width', unit: 'mm' },
    { key: 'windingHeightMm', header: 'Winding height', unit: 'mm' },
    { key: 'pins', header: 'Pins', unit: '' },
  ],
  material: [
    { key: 'initialPermeability', header: 'µi', unit: '' },
    { key: 'fluxDensityT', header: 'Bs, hottest point', unit: 'mT' },
    { key: 'temperatureC', header: 'at', unit: '°C' },
    { key: 'curieC', header: 'Curie temperature', unit: '°C' },
  ],
  wire: [
    { key: 'conductorMm', header: 'Conductor', unit: 'mm' },
    { key: 'copperAreaMm2', header: 'Copper area', unit: 'mm²' },
    { key: 'overallMm.enamel-grade-2', header: 'Overall, grade 2', unit: 'mm' },
    { key: 'overallMm.triple-insulated', header: 'Overall, triple-insulated', unit: 'mm' },
  ],
  tape: [
    { key: 'thicknessMm', header: 'Thickness', unit: 'mm' },
    { key: 'thermalClassC', header: 'Thermal class', unit: '°C' },
    { key: 'layerWithstandVRms', header: 'Withstand of a layer, rms', unit: 'V' },
  ],
  sleeve: [
    { key: 'boreMm', header: 'Bore', unit: 'mm' },
    { key: 'wallMm', header: 'Wall', unit: 'mm' },
    { key: 'thermalClassC', header: 'Thermal class', unit: '°C' },
    { key: 'withstandVRms', header: 'Withstand, rms', unit: 'V' },
  ],
}

/** The list as a file: figures in the unit of the header. */
export function csvColumns(kind: LibraryKind): SheetColumn<PartSummary>[] {
  const figures = FIGURE_COLUMNS[kind].map(({ key, header, unit }): SheetColumn<PartSummary> => ({
    key,
    header: unit === '' ? header : `${header} [${unit}]`,
    value: ({ figures }) => (figures[key] == null ? null : Number(enteredText(figures[key], shownUnit(unit)))),
  }))
  return [
    { key: 'name', header: 'Name', value: ({ name }) => name },
    { key: 'id', header: 'Identifier', value: ({ id }) => id },
    { key: 'family', header: 'Family', value: ({ family }) => family },
    ...figures,
    { key: 'confidence', header: 'Confidence', value: ({ confidence }) => confidence },
    { key: 'unverified', header: 'Unverified fields', value: ({ unverified }) => unverified },
    { key: 'origin', header: 'Origin', value: ({ origin }) => origin },
    { key: 'version', header: 'Version', value: ({ version }) => version },
    { key: 'preferred', header: 'Preferred', value: ({ flags }) => (flags.preferred ? 'yes' : 'no') },
    { key: 'stocked', header: 'In store', value: ({ flags }) => (flags.stocked ? 'yes' : 'no') },
    { key: 'source', header: 'Source', value: ({ source }) => source },
  ]
}
