import { coilSection, type CoilPicture } from '../figures/coil-section'
import { scaleText } from '../figures/scales'
import { turnMark } from '../figures/turn-marks'
import type { Evaluation, Layout } from '../../engine/evaluation'
import { formatNumber } from '../../number-format'
import type { Picture, Shape } from '../model'
import { box, label, labelLines, LETTERING, linesHeightMm, moved } from '../shapes'
import { wrapText } from '../text-metrics'
import { PREDICTED } from './figures'
import { add, addTable, BODY_BOTTOM_MM, continuePage, FIGURE_TITLE_MM, type Flow, newPage, placeFigure, roomMm, setScale, take } from './flow'
import { SPACE } from './frame'
import { rowName, type DrawingInput } from './input'
import { materialsTable } from './materials-table'
import { sequenceTable } from './winding-tables'

const WINDOW_MM = 262
const SIDE_LEFT_MM = SPACE.leftMm + WINDOW_MM + 6
const SIDE_MM = SPACE.rightMm - SIDE_LEFT_MM
/** Below this the window is drawn on a sheet of its own. */
const LEAST_MM = 62

/** Winding sequence, coil section to scale with the core around it, materials. */
export function constructionSheets(flow: Flow, input: DrawingInput): void {
  newPage(flow, 'Construction')
  addTable(flow, sequenceTable(input))
  if (input.evaluation && drawnItems(input.evaluation.layout) > 0) coilFigures(flow, input, input.evaluation)
  addTable(flow, materialsTable(input))
}

const drawnItems = ({ items, ring }: Layout) => items.length + (ring?.passes.length ?? 0)

function coilFigures(flow: Flow, input: DrawingInput, evaluation: Evaluation): void {
  const side = sideColumn(input, evaluation)
  let picture = windowPicture(input, evaluation, Math.max(roomMm(flow) - FIGURE_TITLE_MM, LEAST_MM))
  const needMm = () => Math.max(picture.heightMm + FIGURE_TITLE_MM, side.heightMm)
  if (needMm() > roomMm(flow)) {
    continuePage(flow)
    picture = windowPicture(input, evaluation, roomMm(flow) - FIGURE_TITLE_MM)
  }
  const top = take(flow, Math.min(needMm(), roomMm(flow)))
  setScale(flow, `coil ${scaleText(picture.scale)}`)
  const words = `Turns, tapes and margins by step of the winding sequence; ${drawnItems(evaluation.layout)} items`
  placeFigure(flow, `${evaluation.layout.ring ? 'Ring core along its axis' : 'Coil section, winding window'}, scale ${scaleText(picture.scale)}`, words, picture, SPACE.leftMm, top, WINDOW_MM)
  drawSideColumn(flow, side, top)
}

function windowPicture({ specification, library }: DrawingInput, { layout }: Evaluation, maximumHeightMm: number): CoilPicture {
  return coilSection({ specification, library, layout, gapMm: null, extent: 'window', balloons: true, maximumWidthMm: WINDOW_MM, maximumHeightMm })
}

interface SideColumn {
  core: CoilPicture
  coreTitle: string
  legend: Picture
  heightMm: number
}

function sideColumn(input: DrawingInput, evaluation: Evaluation): SideColumn {
  const { specification, library } = input
  const gapMm = specification.core.gap.lengthMm.value ?? evaluation.magnetics.gapMm
  const core = coilSection({ specification, library, layout: evaluation.layout, gapMm, extent: 'whole', balloons: false, maximumWidthMm: SIDE_MM, maximumHeightMm: 66 })
  const legend = legendPicture(input, evaluation)
  const coreTitle = core.coreDrawn ? `Core, former and coil, scale ${scaleText(core.scale)}` : `Former and coil, scale ${scaleText(core.scale)} (the library has no dimensions of the core)`
  return { core, coreTitle, legend, heightMm: FIGURE_TITLE_MM + core.heightMm + legend.heightMm }
}

function drawSideColumn(flow: Flow, { core, coreTitle, legend }: SideColumn, topMm: number): void {
  placeFigure(flow, coreTitle, 'Half section through centre leg, coil and outer leg', core, SIDE_LEFT_MM, topMm, SIDE_MM)
  const top = topMm - FIGURE_TITLE_MM - core.heightMm
  const bottom = Math.max(top - legend.heightMm, BODY_BOTTOM_MM)
  add(flow, { kind: 'text', box: box(SIDE_LEFT_MM, bottom, SIDE_MM, legend.heightMm), shapes: moved(legend.shapes, SIDE_LEFT_MM, top - legend.heightMm) })
}

const LEGEND_ROW_MM = 4.6

/** Marks of the windings in the section, then what is predicted of the build. */
function legendPicture({ specification, library }: DrawingInput, evaluation: Evaluation): Picture {
  const lines = predictedLines(evaluation).flatMap((text) => wrapText(text, 'sans', LETTERING.small, SIDE_MM))
  const linesMm = linesHeightMm(lines.length, LETTERING.small)
  const wound = specification.windings.filter(({ role }) => role !== 'shield')
  const heightMm = wound.length * LEGEND_ROW_MM + linesMm + 6
  const rows = wound.flatMap((winding, row): Shape[] => {
    const y = heightMm - 4.5 - row * LEGEND_ROW_MM
    const index = specification.windings.indexOf(winding)
    const tag = `winding:${winding.id}`
    const text = wrapText(`${winding.name}: ${winding.turns} turns, ${rowName(library, winding.wire.wire)}`, 'sans', LETTERING.small, SIDE_MM - 6)[0]!
    return [...turnMark(index, [2, y + 0.9], 1.6, 1.4, tag), label([5.5, y], text, { heightMm: LETTERING.small, tag })]
  })
  return { widthMm: SIDE_MM, heightMm, shapes: [...rows, ...labelLines(0, linesMm, lines, { heightMm: LETTERING.small })] }
}

function predictedLines({ layout, magnetics }: Evaluation): string[] {
  const figure = (value: number) => formatNumber(value, PREDICTED)
  const gap = magnetics.gapMm === null ? '' : `; gap (${figure(magnetics.gapMm)} mm)`
  return [
    `Tape grey, margin crossed, foil black. Window ${figure(layout.windowWidthMm)} × ${figure(layout.windowHeightMm)} mm.`,
    `Predicted: build (${figure(layout.buildMm)} mm), (${figure(layout.buildRatio * 100)} %) of the height; copper (${figure(layout.copperFill * 100)} %) of the window${gap}.`,
  ]
}
