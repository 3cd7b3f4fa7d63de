import type { BoundaryResult, InsulationPath } from '../../engine/evaluation'
import { insulationMap, MAP_LEGEND, mapInWords } from '../figures/insulation-map'
import { markedPaths, pathPins, pathSection, PATHS_LEGEND, type MarkedPath } from '../figures/insulation-paths'
import { scaleText } from '../figures/scales'
import { formatNumber } from '../../number-format'
import { LETTERING } from '../shapes'
import type { TableContent } from '../table'
import { PREDICTED } from './figures'
import { addFigures, addParagraphs, BODY_WIDTH_MM, type Flow, setScale } from './flow'
import type { DrawingInput } from './input'

const HEIGHT_MM = 78
const PINS_MM = 110

/** Map of the sides with their boundaries, and the weakest ways drawn where they run: in the coil and among the pins. */
export function insulationFigures(flow: Flow, input: DrawingInput): void {
  const { specification, evaluation, library } = input
  if (specification.insulation.boundaries.length === 0) return
  const map = insulationMap(specification)
  const paths = evaluation ? markedPaths(specification, evaluation) : []
  const section = evaluation ? pathSection({ specification, evaluation, library, paths, maximumWidthMm: BODY_WIDTH_MM, maximumHeightMm: HEIGHT_MM }) : null
  const pins = pathPins(specification, paths, PINS_MM, HEIGHT_MM)
  if (section) setScale(flow, `coil ${scaleText(section.scale)}`)
  addFigures(flow, [
    { title: 'Insulation diagram', words: mapInWords(specification), picture: map },
    ...(section ? [{ title: `Weakest ways in the coil section, scale ${scaleText(section.scale)}`, words: pathsInWords(paths), picture: section }] : []),
    ...(pins ? [{ title: `Weakest ways among the pins, seen from above, scale ${scaleText(pins.scale)}`, words: pathsInWords(paths), picture: pins }] : []),
  ])
  addParagraphs(flow, 'Reading the diagrams', [MAP_LEGEND, ...(paths.length > 0 ? [PATHS_LEGEND] : [])], LETTERING.small)
}

const KIND_WORDS: Record<InsulationPath['kind'], string> = { clearance: 'clearance', creepage: 'creepage distance', 'through-insulation': 'through the insulation' }

const figure = (value: number | null | undefined) => (value == null ? '–' : formatNumber(value, PREDICTED))

const pathsInWords = (paths: readonly MarkedPath[]): string => paths.map(({ mark, kind, lengthMm }) => `${mark}: ${KIND_WORDS[kind]} ${figure(lengthMm)} mm`).join('; ')

const REQUIRED: Record<InsulationPath['kind'], 'clearanceMm' | 'creepageMm' | 'distanceThroughInsulationMm'> = {
  clearance: 'clearanceMm',
  creepage: 'creepageMm',
  'through-insulation': 'distanceThroughInsulationMm',
}


/** Each drawn way with what is required and what the build provides along it. */
export function pathTable({ specification, evaluation }: DrawingInput): TableContent {
  const paths = evaluation ? markedPaths(specification, evaluation) : []
  const results = new Map<string, BoundaryResult>(evaluation?.boundaries.map((result) => [result.boundaryId, result]) ?? [])
  const name = (id: string) => specification.insulation.boundaries.find((boundary) => boundary.id === id)?.name ?? id
  return {
    title: 'Weakest ways as drawn',
    columns: [
      { key: 'mark', header: 'Mark', font: 'sans-bold', align: 'middle' },
      { key: 'boundary', header: 'Boundary' },
      { key: 'kind', header: 'Distance' },
      { key: 'required', header: 'Required, mm', align: 'end' },
      { key: 'provided', header: 'Provided, mm', align: 'end' },
      { key: 'how', header: 'The way' },
    ],
    rows: paths.map((path) => ({
      tag: `boundary:${path.boundaryId}`,
      cells: {
        mark: path.mark,
        boundary: name(path.boundaryId),
        kind: KIND_WORDS[path.kind],
        required: figure(results.get(path.boundaryId)?.required[REQUIRED[path.kind]].value),
        provided: `(${figure(path.lengthMm)})`,
        how: path.how,
      },
    })),
  }
}
