import type { Layout } from '../../../engine/evaluation'
import type { Library } from '../../../engine/library'
import type { WindingSpecification } from '../../../engine/specification'
import { horizontalDimension, verticalDimension } from '../../dimensions'
import type { BoxMm, Picture, PointMm, Shape } from '../../model'
import { box, label, labelLines, LETTERING, line, moved, rectangle } from '../../shapes'
import { formatNumber } from '../../../number-format'
import { millimetres, plain, PREDICTED } from '../../sheets/figures'
import { wrapText } from '../../text-metrics'
import { scaleBar, scaleBarWidthMm } from '../scale-bar'
import { scaleText, standardScale } from '../scales'
import { pinDimensions, pinNumbers, pinOneCorner, pinPlaces, presentPins } from './pin-dimensions'
import { bounds, projected, viewShapes, type ViewName } from './project'
import { partSolids, type Solid } from './solids'

export interface OutlinePicture extends Picture {
  scale: number
}

export interface OutlineInput {
  specification: WindingSpecification
  library: Library
  layout: Layout | null
  widthMm: number
  heightMm: number
}

/** Room around a view for its dimensions and its name. */
const ROOM = { left: 15, right: 22, bottom: 12.5, top: 10.5 } as const
const FOOT_MM = 8

type Envelope = { lengthMm: number; widthMm: number; heightMm: number }

interface Pen {
  specification: WindingSpecification
  solids: Solid[]
  envelope: Envelope | null
  scale: number
}

/**
 * Front, side and bottom view in the projection that the title block names, with the stated envelope as a chain line
 * around the bodies of the library, dimensioned after ISO 129-1. Null when there is nothing to draw.
 */
export function outline({ specification, library, layout, widthMm, heightMm }: OutlineInput): OutlinePicture | null {
  const { solids, notes } = partSolids(specification, library, layout)
  const envelope = usable(specification.former.envelope.value)
  if (solids.length === 0 && !envelope) return null
  const third = specification.title.projection.value === 'third-angle'
  const views = ['front', third ? 'right' : 'left', 'below'] as const
  const lines = [...notes, ...missing(specification)].flatMap((text) => wrapText(text, 'sans', LETTERING.small, widthMm - 4))
  const foot = FOOT_MM + lines.length * LETTERING.small * 1.6
  const sizes = views.map((view) => extent(view, solids, envelope))
  const [front, side, below] = sizes.map(({ rightMm, leftMm, topMm, bottomMm }) => ({ width: rightMm - leftMm, height: topMm - bottomMm }))
  const need = { width: Math.max(front!.width, below!.width) + side!.width, height: Math.max(front!.height, side!.height) + below!.height }
  const fixed = { width: 2 * (ROOM.left + ROOM.right), height: 2 * (ROOM.bottom + ROOM.top) + foot }
  const scale = standardScale(need, { width: widthMm - fixed.width, height: heightMm - fixed.height })
  const pen: Pen = { specification, solids, envelope, scale }
  const shapes = arrange(pen, views, sizes, third)
  const bottom = foot
  return {
    widthMm,
    heightMm: need.height * scale + fixed.height,
    scale,
    shapes: [
      ...moved(shapes, 0, bottom),
      ...scaleBar([2, foot - FOOT_MM + 1], scale),
      label([2 + scaleBarWidthMm(scale) + 3, foot - FOOT_MM + 1], `Scale ${scaleText(scale)}`, { heightMm: LETTERING.small }),
      ...labelLines(2, foot - FOOT_MM - 1.5, lines, { heightMm: LETTERING.small }),
    ],
  }
}

const usable = (envelope: Envelope | null): Envelope | null => (envelope && envelope.lengthMm > 0 && envelope.widthMm > 0 && envelope.heightMm > 0 ? envelope : null)

/** What a layout engineer would look for in vain. */
function missing({ former }: WindingSpecification): string[] {
  const absent = [
    ...(former.envelope.value === null ? ['maximum envelope'] : []),
    ...(former.pins.length > 0 && former.pinLengthMm.value === null ? ['length of the pins'] : []),
    ...(former.pins.length > 0 && former.pinSection.value === null ? ['section of the pins'] : []),
    ...(former.pins.length > 0 && former.standoffMm.value === null ? ['standoff'] : []),
  ]
  return absent.length === 0 ? [] : [`Not stated: ${absent.join(', ')}.`]
}

/** What a view shows, in mm of the part. */
function extent(view: ViewName, solids: readonly Solid[], envelope: Envelope | null): BoxMm {
  const corners = solids.flatMap((solid) => bounds(solid)).map((corner) => projected(view, corner))
  const around = envelope ? envelopeBox(view, envelope) : null
  const xs = [...corners.map(([x]) => x), ...(around ? [around.leftMm, around.rightMm] : [])]
  const ys = [...corners.map(([, y]) => y), ...(around ? [around.bottomMm, around.topMm] : [])]
  return { leftMm: Math.min(...xs), rightMm: Math.max(...xs), bottomMm: Math.min(...ys), topMm: Math.max(...ys) }
}

function envelopeBox(view: ViewName, { lengthMm, widthMm, heightMm }: Envelope): BoxMm {
  const across = view === 'left' || view === 'right' ? widthMm : lengthMm
  return view === 'below' || view === 'above' ? box(-across / 2, -widthMm / 2, across, widthMm) : box(-across / 2, 0, across, heightMm)
}

/** The bottom view lies above the front view in first-angle and below it in third-angle projection (ISO 5456-2). */
function arrange(pen: Pen, [front, side, below]: readonly ViewName[], sizes: readonly BoxMm[], third: boolean): Shape[] {
  const [f, s, b] = sizes.map((size) => ({ left: size.leftMm * pen.scale, right: size.rightMm * pen.scale, low: size.bottomMm * pen.scale, high: size.topMm * pen.scale }))
  const axisX = ROOM.left - Math.min(f!.left, b!.left)
  const sideX = axisX + Math.max(f!.right, b!.right) + ROOM.right + ROOM.left - s!.left
  const lowRow = third ? b! : { low: Math.min(f!.low, s!.low), high: Math.max(f!.high, s!.high) }
  const highRow = third ? { low: Math.min(f!.low, s!.low) } : b!
  const lowY = ROOM.bottom - lowRow.low
  const highY = lowY + lowRow.high + ROOM.top + ROOM.bottom - highRow.low
  const [elevationY, belowY] = third ? [highY, lowY] : [lowY, highY]
  return [
    ...moved(frontView(pen, front!), axisX, elevationY),
    ...moved(sideView(pen, side!), sideX, elevationY),
    ...moved(bottomView(pen, below!), axisX, belowY),
  ]
}

function envelopeShapes({ envelope, scale }: Pen, view: ViewName): Shape[] {
  if (!envelope) return []
  const { leftMm, rightMm, bottomMm, topMm } = envelopeBox(view, envelope)
  return [rectangle(box(leftMm * scale, bottomMm * scale, (rightMm - leftMm) * scale, (topMm - bottomMm) * scale), { layer: 'phantom', tag: 'envelope' })]
}

function seatingPlane({ scale }: Pen, { leftMm, rightMm }: BoxMm): Shape {
  return line([leftMm * scale - 3, 0], [rightMm * scale + 3, 0], 'thin')
}

function frontView(pen: Pen, view: ViewName): Shape[] {
  const { envelope, scale, specification } = pen
  const size = extent(view, pen.solids, envelope)
  const [left, right] = [size.leftMm * scale, size.rightMm * scale]
  const pin = specification.former.pinLengthMm.value ?? 0
  const standoff = specification.former.standoffMm.value ?? 0
  const pins = presentPins(specification)
  const xs = pins.map(({ xMm }) => xMm * scale)
  const reach: PointMm = xs.length > 0 ? [Math.min(...xs), Math.max(...xs)] : [left, right]
  return [
    ...viewShapes(view, pen.solids, scale),
    ...envelopeShapes(pen, view),
    seatingPlane(pen, size),
    ...(envelope ? horizontalDimension([-envelope.lengthMm * scale / 2, envelope.heightMm * scale], [envelope.lengthMm * scale / 2, envelope.heightMm * scale], size.topMm * scale + 6, `${plain(envelope.lengthMm)} max.`) : []),
    ...(envelope ? verticalDimension([envelope.lengthMm * scale / 2, 0], [envelope.lengthMm * scale / 2, envelope.heightMm * scale], right + 12, `${plain(envelope.heightMm)} max.`) : []),
    ...(pin > 0 && pins.length > 0 ? verticalDimension([reach[0], -pin * scale], [reach[0], 0], left - 6, plain(pin)) : []),
    ...(standoff > 0 && pins.length > 0 ? verticalDimension([reach[1], 0], [reach[1], standoff * scale], right + 5, plain(standoff)) : []),
    ...ringDimensions(pen, view, size),
    ...viewName('Front view', (left + right) / 2, size.bottomMm * scale),
  ]
}

/** A wound ring has no stated envelope to lean on: its calculated size stands in parentheses. */
function ringDimensions({ solids, envelope, scale }: Pen, view: ViewName, size: BoxMm): Shape[] {
  const ring = solids.find((solid) => solid.shape === 'ring')
  if (!ring || envelope) return []
  const half = (ring.outsideMm / 2) * scale
  const top = size.topMm * scale
  if (view === 'below') return horizontalDimension([-half, 0], [half, 0], top + 6, `(Ø ${predicted(ring.outsideMm)})`)
  return verticalDimension([half, ring.low * scale], [half, ring.high * scale], size.rightMm * scale + 12, `(${predicted(ring.high - ring.low)})`)
}

const predicted = (value: number) => formatNumber(value, PREDICTED)

function sideView(pen: Pen, view: ViewName): Shape[] {
  const { envelope, scale } = pen
  const size = extent(view, pen.solids, envelope)
  return [
    ...viewShapes(view, pen.solids, scale),
    ...envelopeShapes(pen, view),
    seatingPlane(pen, size),
    ...(envelope ? horizontalDimension([-envelope.widthMm * scale / 2, envelope.heightMm * scale], [envelope.widthMm * scale / 2, envelope.heightMm * scale], size.topMm * scale + 6, `${plain(envelope.widthMm)} max.`) : []),
    ...viewName(view === 'left' ? 'View from the left' : 'View from the right', (size.leftMm + size.rightMm) * scale / 2, size.bottomMm * scale),
  ]
}

function bottomView(pen: Pen, view: ViewName): Shape[] {
  const { envelope, scale, specification } = pen
  const size = extent(view, pen.solids, envelope)
  const pins = presentPins(specification)
  const places = pinPlaces(view, pins, scale)
  const section = specification.former.pinSection.value
  const half = Math.max(((section?.sizeMm ?? 0.6) * scale) / 2, 0.35)
  const middle = ((size.leftMm + size.rightMm) * scale) / 2
  return [
    ...viewShapes(view, pen.solids, scale),
    ...envelopeShapes(pen, view),
    ...(envelope ? pinOneCorner(places, [envelope.lengthMm * scale / 2, envelope.widthMm * scale / 2]) : []),
    ...ringDimensions(pen, view, size),
    ...pinNumbers(places, half + 0.8),
    ...pinDimensions(places, scale, { leftMm: size.leftMm * scale - 8, lowMm: size.bottomMm * scale - 6, rightMm: size.rightMm * scale + 8 }),
    ...viewName(['Bottom view', pinText(specification, pins.length)].filter((text) => text !== '').join(': '), middle, size.bottomMm * scale - 6),
  ]
}

/** `14 pins Ø 0.8 mm, true position Ø 0.4 mm`. */
function pinText({ former }: WindingSpecification, count: number): string {
  const section = former.pinSection.value
  if (count === 0) return ''
  const size = section ? ` ${section.shape === 'round' ? 'Ø' : 'square'} ${millimetres(section.sizeMm)}` : ''
  const position = former.truePositionMm.value === null ? '' : `, true position Ø ${millimetres(former.truePositionMm.value)}`
  return `${count} pins${size}${position}`
}

const viewName = (text: string, xMm: number, lowMm: number): Shape[] => [label([xMm, lowMm - 5.5], text, { align: 'middle', heightMm: LETTERING.small })]
