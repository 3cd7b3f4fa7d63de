import type { FormerRow } from '../../../engine/library'
import { clearedLabel, horizontalDimension, verticalDimension } from '../../dimensions'
import type { Picture, Shape } from '../../model'
import { box, hatchRectangle, label, LETTERING, line, moved, rectangle } from '../../shapes'
import { plain } from '../../sheets/figures'
import { standardScale } from '../scales'

export interface FormerPicture extends Picture {
  scale: number
}

const ROOM = { left: 20, right: 22, bottom: 12, top: 12 } as const

/** Section through the axis of the coil former with its winding space, from the library row. */
export function formerFigure(former: FormerRow, widthMm: number, heightMm: number): FormerPicture {
  const { tube, windingWidthMm: width, windingHeightMm: height, flangeThicknessMm: flange, tubeWallMm: wall, sections } = former
  const tubeMm = tube.shape === 'round' ? tube.diameterMm : tube.widthMm
  const size = { width: width + 2 * flange, height: tubeMm + 2 * height }
  const scale = standardScale(size, { width: widthMm - ROOM.left - ROOM.right, height: heightMm - ROOM.bottom - ROOM.top })
  const s = (mm: number) => mm * scale
  const [tubeLow, tubeHigh] = [s(height), s(height + tubeMm)]
  const full = s(size.height)
  const parts = [
    box(0, 0, s(flange), tubeLow + s(wall)),
    box(0, tubeHigh - s(wall), s(flange), full - tubeHigh + s(wall)),
    box(s(flange + width), 0, s(flange), tubeLow + s(wall)),
    box(s(flange + width), tubeHigh - s(wall), s(flange), full - tubeHigh + s(wall)),
    box(s(flange), tubeLow, s(width), s(wall)),
    box(s(flange), tubeHigh - s(wall), s(width), s(wall)),
  ]
  const outside = tube.shape === 'round' ? `(Ø ${plain(tube.diameterMm)})` : `(${plain(tube.widthMm)})`
  const shapes: Shape[] = [
    ...parts.flatMap((part) => [rectangle(part, { layer: 'thin', tag: 'former' }), ...hatchRectangle(part, 1.8, -1)]),
    line([-2, full / 2], [s(size.width) + 2, full / 2], 'centre'),
    ...horizontalDimension([s(flange), full], [s(flange + width), full], full + 5, `(${plain(width)})`),
    ...verticalDimension([0, tubeHigh], [0, full], -7, `(${plain(height)})`, 'beside'),
    ...verticalDimension([s(size.width), tubeLow], [s(size.width), tubeHigh], s(size.width) + 9, outside, 'beside'),
    ...clearedLabel(label([s(size.width / 2), full / 2 - LETTERING.small / 2], wallText(former), { align: 'middle', heightMm: LETTERING.small })),
    label([s(size.width / 2), -5], tubeText(former, sections), { align: 'middle', heightMm: LETTERING.small }),
  ]
  return { widthMm, heightMm: full + ROOM.bottom + ROOM.top, shapes: moved(shapes, ROOM.left, ROOM.bottom), scale }
}

const wallText = ({ tubeWallMm, flangeThicknessMm }: FormerRow) => `wall (${plain(tubeWallMm)}), flange (${plain(flangeThicknessMm)})`

function tubeText({ tube }: FormerRow, sections: number): string {
  const across = tube.shape === 'rectangular' ? `tube outside (${plain(tube.widthMm)} × ${plain(tube.depthMm)}), ` : ''
  return `${across}${plain(sections)} section${sections === 1 ? '' : 's'}`
}
