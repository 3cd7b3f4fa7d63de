import { outline, type OutlinePicture } from '../figures/outline'
import { pinsInWords, pinView } from '../figures/pin-view'
import { scaleText } from '../figures/scales'
import { schematic, schematicInWords } from '../figures/schematic'
import { drawTablePart, layoutTable, tableHeightMm } from '../table'
import { electricalTable } from './electrical-table'
import { add, addParagraphs, addTable, BODY_BOTTOM_MM, FIGURE_TITLE_MM, type Flow, newPage, placeFigure, roomMm, setScale, take } from './flow'
import { SPACE } from './frame'
import type { DrawingInput } from './input'
import { contradictions } from './notices'
import { terminalTable } from './record-tables'
import { windingTable } from './winding-tables'

const CIRCUIT_MM = 116
const PIN_LEFT_MM = SPACE.leftMm + CIRCUIT_MM + 5
const PIN_WIDTH_MM = 128
const PIN_VIEW_MM = 50
const OUTLINE_LEFT_MM = PIN_LEFT_MM + PIN_WIDTH_MM + 5
const OUTLINE_WIDTH_MM = SPACE.rightMm - OUTLINE_LEFT_MM
const OUTLINE_MM = 118

/** Schematic, pin-out, outline, windings and electrical data. */
export function connectionSheets(flow: Flow, input: DrawingInput): void {
  const { specification, library } = input
  newPage(flow, 'Connections and electrical data')
  const circuit = schematic({ specification, library, widthMm: CIRCUIT_MM, maximumHeightMm: roomMm(flow) - FIGURE_TITLE_MM })
  const terminals = layoutTable(terminalTable(specification), PIN_WIDTH_MM)
  const views = outline(specification, OUTLINE_WIDTH_MM, OUTLINE_MM)
  const pinsMm = FIGURE_TITLE_MM + PIN_VIEW_MM + 3 + tableHeightMm(terminals)
  const height = Math.min(Math.max(circuit.heightMm + FIGURE_TITLE_MM, (views?.heightMm ?? 0) + FIGURE_TITLE_MM, pinsMm), roomMm(flow))
  const top = take(flow, height)
  placeFigure(flow, 'Schematic', schematicInWords(specification), circuit, SPACE.leftMm, top, CIRCUIT_MM)
  if (views) outlineFigure(flow, views, top)
  pinFigures(flow, input, top, terminals)
  addTable(flow, windingTable(input))
  addTable(flow, electricalTable(specification))
  addParagraphs(flow, 'Contradictions in this draft', input.release ? [] : contradictions(specification))
}

function pinFigures(flow: Flow, { specification }: DrawingInput, topMm: number, terminals: ReturnType<typeof layoutTable>): void {
  const words = pinsInWords(specification)
  const width = PIN_WIDTH_MM / 2 - 1
  const place = (view: 'top' | 'bottom', leftMm: number) =>
    placeFigure(flow, view === 'top' ? 'Pin-out from above' : 'Pin-out from below', words, pinView(specification, view, width, PIN_VIEW_MM), leftMm, topMm, width)
  place('top', PIN_LEFT_MM)
  place('bottom', PIN_LEFT_MM + width + 2)
  const part = drawTablePart(terminals, 0, PIN_LEFT_MM, topMm - FIGURE_TITLE_MM - PIN_VIEW_MM - 3, BODY_BOTTOM_MM)
  if (!part) return
  add(flow, part.block)
  flow.topMm = Math.min(flow.topMm, part.bottomMm - 4)
  const rest = terminalTable(specification)
  if (part.nextRow < terminals.rows.length) addTable(flow, { ...rest, rows: rest.rows.slice(part.nextRow) })
}

function outlineFigure(flow: Flow, picture: OutlinePicture, topMm: number): void {
  setScale(flow, `outline ${scaleText(picture.scale)}`)
  const title = `Outline, maximum dimensions, scale ${scaleText(picture.scale)}`
  placeFigure(flow, title, 'Front, side and top view with maximum length, width and height', picture, OUTLINE_LEFT_MM, topMm, OUTLINE_WIDTH_MM)
}
