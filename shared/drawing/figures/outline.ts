import type { WindingSpecification } from '../../engine/specification'
import { horizontalDimension, verticalDimension } from '../dimensions'
import type { Picture, PointMm, Shape } from '../model'
import { box, circle, line, moved, polyline, rectangle } from '../shapes'
import { plain } from '../sheets/figures'
import { standardScale } from './scales'
import { scaleBar } from './scale-bar'

export interface OutlinePicture extends Picture {
  scale: number
}

const BETWEEN_MM = 23
const MARGIN = { left: 12, right: 14, bottom: 18, top: 10 } as const

interface Size {
  length: number
  width: number
  height: number
  pin: number
}

/** Maximum envelope with pins in three views, dimensioned after ISO 129-1; null while no envelope is stated. */
export function outline(specification: WindingSpecification, widthMm: number, heightMm: number): OutlinePicture | null {
  const envelope = specification.former.envelope.value
  if (!envelope || !(envelope.lengthMm > 0 && envelope.widthMm > 0 && envelope.heightMm > 0)) return null
  const size: Size = { length: envelope.lengthMm, width: envelope.widthMm, height: envelope.heightMm, pin: specification.former.pinLengthMm.value ?? 0 }
  const fixed = { width: MARGIN.left + MARGIN.right + BETWEEN_MM, height: MARGIN.top + MARGIN.bottom + BETWEEN_MM }
  const scale = standardScale(
    { width: size.length + size.width, height: size.height + size.pin + size.width },
    { width: widthMm - fixed.width, height: heightMm - fixed.height },
  )
  const pen: Pen = { specification, size, scale }
  const firstAngle = specification.title.projection.value !== 'third-angle'
  const stacked = (size.height + size.pin) * scale
  const frontY = firstAngle ? MARGIN.bottom + size.width * scale + BETWEEN_MM + size.pin * scale : MARGIN.bottom + size.pin * scale
  const topY = firstAngle ? MARGIN.bottom : MARGIN.bottom + stacked + BETWEEN_MM
  const sideX = MARGIN.left + size.length * scale + BETWEEN_MM
  const shapes = [
    ...moved(front(pen), MARGIN.left, frontY),
    ...moved(side(pen), sideX, frontY),
    ...moved(top(pen), MARGIN.left, topY),
    ...scaleBar([MARGIN.left, 2], scale),
  ]
  return { widthMm, heightMm: fixed.height + stacked + size.width * scale, shapes, scale }
}

interface Pen {
  specification: WindingSpecification
  size: Size
  scale: number
}

const fitted = ({ specification }: Pen) => specification.former.pins.filter(({ state }) => state !== 'missing')
const distinct = (values: number[]) => [...new Set(values.map((value) => Number(value.toFixed(3))))].sort((a, b) => a - b)

/** Body above its seating plane with the pins that show. */
function elevation(pen: Pen, span: number, pins: readonly number[]): Shape[] {
  const { size, scale, specification } = pen
  const standoff = (specification.former.standoffMm.value ?? 0) * scale
  const thick = Math.max((specification.former.pinSection.value?.sizeMm ?? 0.6) * scale, 0.5)
  const width = span * scale
  return [
    ...pins.map((x) => rectangle(box(width / 2 + x * scale - thick / 2, -size.pin * scale, thick, size.pin * scale + standoff), { layer: 'thin', fill: 'paper' })),
    rectangle(box(0, standoff, width, size.height * scale - standoff), { layer: 'outline' }),
    line([-4, 0], [width + 4, 0], 'thin'),
    line([width / 2, -2], [width / 2, size.height * scale + 2], 'centre'),
  ]
}

function front(pen: Pen): Shape[] {
  const { size, scale } = pen
  const width = size.length * scale
  const height = size.height * scale
  return [
    ...elevation(pen, size.length, distinct(fitted(pen).map(({ xMm }) => xMm))),
    ...horizontalDimension([0, height], [width, height], height + 6, `${plain(size.length)} max`),
  ]
}

function side(pen: Pen): Shape[] {
  const { size, scale, specification } = pen
  const width = size.width * scale
  const height = size.height * scale
  const standoff = specification.former.standoffMm.value
  return [
    ...elevation(pen, size.width, distinct(fitted(pen).map(({ yMm }) => yMm))),
    ...horizontalDimension([0, height], [width, height], height + 6, `${plain(size.width)} max`),
    ...verticalDimension([width, 0], [width, height], width + 9, `${plain(size.height)} max`),
    ...(size.pin > 0 ? verticalDimension([0, -size.pin * scale], [0, 0], -7, plain(size.pin)) : []),
    ...(standoff ? [...verticalDimension([width, 0], [width, standoff * scale], width + 4, plain(standoff))] : []),
  ]
}

function top(pen: Pen): Shape[] {
  const { size, scale, specification } = pen
  const middle: PointMm = [(size.length * scale) / 2, (size.width * scale) / 2]
  const radius = Math.max(((specification.former.pinSection.value?.sizeMm ?? 0.6) * scale) / 2, 0.35)
  const place = ({ xMm, yMm }: { xMm: number; yMm: number }): PointMm => [middle[0] + xMm * scale, middle[1] + yMm * scale]
  return [
    rectangle(box(0, 0, size.length * scale, size.width * scale), { layer: 'outline' }),
    ...fitted(pen).map((pin) => circle(place(pin), radius, { layer: 'thin', tag: `pin:${pin.number}` })),
    line([-2, middle[1]], [size.length * scale + 2, middle[1]], 'centre'),
    line([middle[0], -2], [middle[0], size.width * scale + 2], 'centre'),
    ...pitchDimensions(pen, place),
    ...pinOne(pen, place),
  ]
}

function pinOne(pen: Pen, place: (pin: { xMm: number; yMm: number }) => PointMm): Shape[] {
  const pins = pen.specification.former.pins
  const one = pins.find(({ number }) => number === '1') ?? pins[0]
  if (!one) return []
  const [x, y] = place(one)
  const x0 = one.xMm < 0 ? 0 : pen.size.length * pen.scale
  const y0 = one.yMm < 0 ? 0 : pen.size.width * pen.scale
  const [dx, dy] = [Math.sign(x - x0) * 2, Math.sign(y - y0) * 2]
  return [polyline([[x0, y0], [x0 + dx, y0], [x0, y0 + dy]], { layer: 'thin', fill: 'ink', closed: true })]
}

/** Pitch between the first neighbours of a row, spacing between rows, whichever way the rows run. */
function pitchDimensions({ specification, size, scale }: Pen, place: (pin: { xMm: number; yMm: number }) => PointMm): Shape[] {
  const { pins, pinPitchMm, rowSpacingMm } = specification.former
  const [left, below] = [Math.min(...pins.map(({ xMm }) => xMm)), Math.min(...pins.map(({ yMm }) => yMm))]
  const lowest = pins.filter(({ yMm }) => near(yMm, below)).sort((a, b) => a.xMm - b.xMm)
  const right = Math.max(...pins.map(({ xMm }) => xMm))
  const rightmost = pins.filter(({ xMm }) => near(xMm, right)).sort((a, b) => a.yMm - b.yMm)
  const rowsRunUp = new Set(pins.map(({ xMm }) => xMm.toFixed(1))).size < new Set(pins.map(({ yMm }) => yMm.toFixed(1))).size
  const alongX = rowsRunUp ? rowSpacingMm.value : pinPitchMm.value
  const alongY = rowsRunUp ? pinPitchMm.value : rowSpacingMm.value
  const across = neighbours(lowest.length > 1 ? lowest : [pins.find(({ xMm }) => near(xMm, left))!, ...lowest], ({ xMm }) => xMm, alongX)
  const up = neighbours(rightmost, ({ yMm }) => yMm, alongY)
  return [
    ...(across && alongX !== null ? horizontalDimension(place(across[0]), place(across[1]), -7, plain(alongX)) : []),
    ...(up && alongY !== null ? verticalDimension(place(up[0]), place(up[1]), size.length * scale + 7, plain(alongY)) : []),
  ]
}

const near = (a: number, b: number) => Math.abs(a - b) < 0.01

type Placed = WindingSpecification['former']['pins'][number]

/** The first two pins that lie a stated distance apart; pins that do not agree with it get no dimension. */
function neighbours(pins: readonly (Placed | undefined)[], along: (pin: Placed) => number, distance: number | null): [Placed, Placed] | null {
  if (distance === null) return null
  for (const first of pins) {
    const second = pins.find((each) => first && each && near(along(each) - along(first), distance))
    if (first && second) return [first, second]
  }
  return null
}
