import type { BoundaryResult, InsulationPath } from '../../engine/evaluation'
import { insulationMap, MAP_LEGEND, mapInWords } from '../figures/insulation-map'
import { markedPaths, pathPins, pathSection, PATHS_LEGEND, type MarkedPath } from '../figures/insulation-paths'
import { scaleText } from '../figures/scales'
import { formatNumber } from '../../number-format'
import { LETTERING } from '../shapes'
import type { TableContent } from '../table'
import { PREDICTED } from './figures'
import { addParagraphs, FIGURE_TITLE_MM, type Flow, placeFigure, roomMm, setScale, take } from './flow'
import { SPACE } from './frame'
import type { DrawingInput } from './input'

const GAP_MM = 6
const HEIGHT_MM = 78

/** Map of the sides with their boundaries, and the weakest ways drawn where they run: in the coil and among the pins. */
export function insulationFigures(flow: Flow, input: DrawingInput): void {
  const { specification, evaluation, library } = input
  if (specification.insulation.boundaries.length === 0) return
  const map = insulationMap(specification)
  const paths = evaluation ? markedPaths(specification, evaluation) : []
  const sectionIn = (maximumWidthMm: number) => (evaluation ? pathSection({ specification, evaluation, library, paths, maximumWidthMm, maximumHeightMm: HEIGHT_MM }) : null)
  const [narrow, wide] = [sectionIn(SPACE.rightMm - SPACE.leftMm - map.widthMm - GAP_MM), sectionIn(SPACE.rightMm - SPACE.leftMm)]
  const beside = narrow !== null && wide !== null && narrow.scale === wide.scale
  const section = beside ? narrow : wide
  const heightMm = FIGURE_TITLE_MM + Math.max(map.heightMm, beside ? (section?.heightMm ?? 0) : 0)
  const top = take(flow, Math.min(heightMm, roomMm(flow)))
  placeFigure(flow, 'Insulation diagram', mapInWords(specification), map, SPACE.leftMm, top, map.widthMm)
  if (section) {
    const at = beside ? { left: SPACE.leftMm + map.widthMm + GAP_MM, top } : { left: SPACE.leftMm, top: take(flow, FIGURE_TITLE_MM + section.heightMm) }
    setScale(flow, `coil ${scaleText(section.scale)}`)
    placeFigure(flow, `Weakest ways in the coil section, scale ${scaleText(section.scale)}`, pathsInWords(paths), section, at.left, at.top, section.widthMm)
  }
  pinFigure(flow, input, paths)
  addParagraphs(flow, 'Reading the diagrams', [MAP_LEGEND, ...(paths.length > 0 ? [PATHS_LEGEND] : [])], LETTERING.small)
}

function pinFigure(flow: Flow, { specification }: DrawingInput, paths: readonly MarkedPath[]): void {
  const pins = pathPins(specification, paths, 130, HEIGHT_MM)
  if (!pins) return
  const top = take(flow, FIGURE_TITLE_MM + pins.heightMm)
  placeFigure(flow, `Weakest ways among the pins, seen from above, scale ${scaleText(pins.scale)}`, pathsInWords(paths), pins, SPACE.leftMm, top, pins.widthMm)
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
