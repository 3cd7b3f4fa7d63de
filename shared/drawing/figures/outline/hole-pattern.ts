import type { WindingSpecification } from '../../../engine/specification'
import type { Picture, PointMm, Shape } from '../../model'
import { box, circle, label, LETTERING, line, moved, rectangle } from '../../shapes'
import { millimetres } from '../../sheets/figures'
import { standardScale } from '../scales'
import { pinDimensions, pinNumbers, pinOneCorner, pinPlaces, presentPins } from './pin-dimensions'

const ROOM = { left: 20, right: 20, bottom: 16, top: 4 } as const

export interface HolePicture extends Picture {
  scale: number
}

/** Holes of the board seen from the component side, with the stated envelope; null for a part without pins. */
export function holePattern(specification: WindingSpecification, widthMm: number, heightMm: number): HolePicture | null {
  const pins = presentPins(specification)
  if (pins.length === 0) return null
  const envelope = specification.former.envelope.value
  const hole = specification.former.recommendedHoleMm.value
  const span = (values: number[], least: number) => Math.max(least, 2 * Math.max(...values.map(Math.abs)) + (hole ?? 0) + 1)
  const size = { width: span(pins.map(({ xMm }) => xMm), envelope?.lengthMm ?? 0), height: span(pins.map(({ yMm }) => yMm), envelope?.widthMm ?? 0) }
  const scale = standardScale(size, { width: widthMm - ROOM.left - ROOM.right, height: heightMm - ROOM.bottom - ROOM.top })
  const [half, low] = [(size.width * scale) / 2, (-size.height * scale) / 2]
  const places = pinPlaces('above', pins, scale)
  const radius = Math.max(((hole ?? 0) * scale) / 2, 0.4)
  const arm = radius + 1
  const shapes: Shape[] = [
    ...(envelope ? [rectangle(box(-(envelope.lengthMm * scale) / 2, -(envelope.widthMm * scale) / 2, envelope.lengthMm * scale, envelope.widthMm * scale), { layer: 'phantom', tag: 'envelope' }), ...pinOneCorner(places, [(envelope.lengthMm * scale) / 2, (envelope.widthMm * scale) / 2])] : []),
    ...places.flatMap(({ pin, at }) => holeShapes(at, hole === null ? null : radius, arm, `pin:${pin.number}`)),
    ...pinNumbers(places, arm + 0.6),
    ...pinDimensions(places, scale, { leftMm: -half - 7, lowMm: low - 6, rightMm: half + 7 }),
    label([0, low - 12], hole === null ? `${pins.length} holes, diameter not stated` : `${pins.length} holes Ø ${millimetres(hole)}`, { align: 'middle', heightMm: LETTERING.small }),
  ]
  return { widthMm, heightMm: size.height * scale + ROOM.bottom + ROOM.top, scale, shapes: moved(shapes, ROOM.left + half, ROOM.bottom - low) }
}

function holeShapes([x, y]: PointMm, radiusMm: number | null, arm: number, tag: string): Shape[] {
  return [
    ...(radiusMm === null ? [] : [circle([x, y], radiusMm, { layer: 'outline', tag })]),
    line([x - arm, y], [x + arm, y], 'dimension', tag),
    line([x, y - arm], [x, y + arm], 'dimension', tag),
  ]
}
