import { pinsInWords, pinView } from '../figures/pin-view'
import { schematic, schematicInWords } from '../figures/schematic'
import { drawTablePart, layoutTable, tableHeightMm } from '../table'
import { contradictions } from './contradictions'
import { electricalTable } from './electrical-table'
import { add, addParagraphs, addTable, BODY_BOTTOM_MM, continuePage, FIGURE_TITLE_MM, type Flow, newPage, placeFigure, roomMm, take } from './flow'
import { SPACE } from './frame'
import type { DrawingInput } from './input'
import { terminalTable } from './record-tables'
import { windingTable } from './winding-tables'

const CIRCUIT_MM = 118
/** The circuit is not squeezed into less than this below a list of contradictions. */
const LEAST_CIRCUIT_MM = 110
const PIN_LEFT_MM = SPACE.leftMm + CIRCUIT_MM + 5
const PIN_WIDTH_MM = 128
const PIN_VIEW_MM = 62
const TERMINALS_LEFT_MM = PIN_LEFT_MM + PIN_WIDTH_MM + 5
const TERMINALS_WIDTH_MM = SPACE.rightMm - TERMINALS_LEFT_MM

/** Schematic, pin-out, terminals, windings and electrical data. */
export function connectionSheets(flow: Flow, input: DrawingInput): void {
  const { specification, library } = input
  newPage(flow, 'Connections and electrical data')
  addParagraphs(flow, 'Contradictions in this draft', input.release ? [] : contradictions(specification))
  if (roomMm(flow) < LEAST_CIRCUIT_MM) continuePage(flow)
  const circuit = schematic({ specification, library, widthMm: CIRCUIT_MM, maximumHeightMm: roomMm(flow) - FIGURE_TITLE_MM })
  const terminals = layoutTable(terminalTable(specification), TERMINALS_WIDTH_MM)
  const height = Math.min(Math.max(circuit.heightMm + FIGURE_TITLE_MM, FIGURE_TITLE_MM + PIN_VIEW_MM, tableHeightMm(terminals)), roomMm(flow))
  const top = take(flow, height)
  placeFigure(flow, 'Schematic', schematicInWords(specification), circuit, SPACE.leftMm, top, CIRCUIT_MM)
  pinFigures(flow, input, top)
  terminalPart(flow, input, top, terminals)
  addTable(flow, windingTable(input))
  addTable(flow, electricalTable(specification))
}

function pinFigures(flow: Flow, { specification }: DrawingInput, topMm: number): void {
  if (specification.former.pins.length === 0) return
  const words = pinsInWords(specification)
  const width = PIN_WIDTH_MM / 2 - 1
  const place = (view: 'top' | 'bottom', leftMm: number) =>
    placeFigure(flow, view === 'top' ? 'Pin-out from above' : 'Pin-out from below', words, pinView(specification, view, width, PIN_VIEW_MM), leftMm, topMm, width)
  place('top', PIN_LEFT_MM)
  place('bottom', PIN_LEFT_MM + width + 2)
}

/** Beside the pin-out; what finds no room there goes on as a table of its own. */
function terminalPart(flow: Flow, { specification }: DrawingInput, topMm: number, terminals: ReturnType<typeof layoutTable>): void {
  const part = drawTablePart(terminals, 0, TERMINALS_LEFT_MM, topMm, BODY_BOTTOM_MM)
  if (!part) return
  add(flow, part.block)
  flow.topMm = Math.min(flow.topMm, part.bottomMm - 4)
  const rest = terminalTable(specification)
  if (part.nextRow < terminals.rows.length) addTable(flow, { ...rest, rows: rest.rows.slice(part.nextRow) })
}
