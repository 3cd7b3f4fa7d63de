import { coreFigure } from '../figures/outline/core-figure'
import { formerFigure } from '../figures/outline/former-figure'
import { holePattern } from '../figures/outline/hole-pattern'
import { outline } from '../figures/outline/outline'
import { scaleText } from '../figures/scales'
import type { Picture } from '../model'
import { FIGURE_TITLE_MM, type Flow, newPage, placeFigure, roomMm, setScale } from './flow'
import { SPACE } from './frame'
import { findRow, type DrawingInput } from './input'

const VIEWS_MM = 228
const SIDE_LEFT_MM = SPACE.leftMm + VIEWS_MM + 6
const SIDE_MM = SPACE.rightMm - SIDE_LEFT_MM
const GAP_MM = 2

/** Outline in three views, recommended holes, core and coil former with the dimensions of the library. */
export function outlineSheet(flow: Flow, input: DrawingInput): void {
  const { specification, library, evaluation } = input
  newPage(flow, 'Outline and pins')
  const top = flow.topMm
  const views = outline({ specification, library, layout: evaluation?.layout ?? null, widthMm: VIEWS_MM, heightMm: roomMm(flow) - FIGURE_TITLE_MM })
  if (views) {
    setScale(flow, `outline ${scaleText(views.scale)}`)
    placeFigure(flow, `Outline, dimensions in mm, scale ${scaleText(views.scale)}; chain line: largest envelope over solder, tape, varnish and label`, 'Front, side and bottom view with largest length, width and height, pins with pitch and spacing', views, SPACE.leftMm, top, VIEWS_MM)
  }
  let y = top
  for (const { title, words, picture } of sideFigures(input, roomMm(flow))) {
    placeFigure(flow, title, words, picture, SIDE_LEFT_MM, y, SIDE_MM)
    y -= FIGURE_TITLE_MM + picture.heightMm + GAP_MM
  }
  flow.topMm = Math.min(top - (views?.heightMm ?? 0), y)
}

interface SideFigure {
  title: string
  words: string
  picture: Picture
}

function sideFigures({ specification, library }: DrawingInput, roomHeightMm: number): SideFigure[] {
  const core = findRow(library, 'core', specification.core.core.value)
  const former = findRow(library, 'former', specification.former.former.value)
  const figures = [core, former, specification.former.pins.length > 0 || null].filter((each) => each !== null).length
  const share = roomHeightMm / Math.max(figures, 1) - FIGURE_TITLE_MM - GAP_MM
  const half = core ? coreFigure(core, SIDE_MM, share) : null
  const section = former ? formerFigure(former, SIDE_MM, share) : null
  const takenMm = [half, section].reduce((sum, figure) => sum + (figure ? figure.heightMm + FIGURE_TITLE_MM + GAP_MM : 0), 0)
  const holes = holePattern(specification, SIDE_MM, roomHeightMm - takenMm - FIGURE_TITLE_MM)
  return [
    ...(holes ? [{ title: `Recommended holes from the component side, scale ${scaleText(holes.scale)}`, words: 'Holes of the board with pitch and spacing', picture: holes }] : []),
    ...(core && half ? [{ title: `${core.shape === 'toroid' ? 'Ring core' : 'Core half'} ${core.name}, scale ${scaleText(half.scale)}${half.missing.length > 0 ? `; not in the library: ${half.missing.join(', ')}` : ''}`, words: 'Core with the dimensions of its library row', picture: half }] : []),
    ...(former && section ? [{ title: `Coil former ${former.name}, scale ${scaleText(section.scale)}`, words: 'Section through the axis of the coil former with the winding space', picture: section }] : []),
  ]
}
