import type { WindingSpecification } from '../../../engine/specification'
import { clearedLabel, horizontalDimension, verticalDimension } from '../../dimensions'
import type { PointMm, Shape } from '../../model'
import { label, LETTERING, polyline } from '../../shapes'
import { plain } from '../../sheets/figures'
import { textWidthMm } from '../../text-metrics'
import { projected, type ViewName } from './project'

type Pin = WindingSpecification['former']['pins'][number]

export const presentPins = ({ former }: WindingSpecification): Pin[] => former.pins.filter(({ state }) => state !== 'missing')

const rounded = (value: number) => Number(value.toFixed(3))
const distinct = (values: readonly number[]) => [...new Set(values.map(rounded))].sort((a, b) => a - b)

export interface PinPlace {
  pin: Pin
  at: PointMm
}

/** Where the pins lie in a view from above or below, on paper. */
export const pinPlaces = (view: ViewName, pins: readonly Pin[], scale: number): PinPlace[] =>
  pins.map((pin) => {
    const [x, y] = projected(view, [pin.xMm, pin.yMm, 0])
    return { pin, at: [x * scale, y * scale] }
  })

/** `6 × 5.08 (= 30.48)` for equal steps, shorter where it has to be, the whole span otherwise. */
function spanTexts(values: readonly number[]): string[] {
  const span = rounded(values.at(-1)! - values[0]!)
  const steps = values.slice(1).map((value, index) => rounded(value - values[index]!))
  if (steps.length === 1) return [plain(span)]
  if (!steps.every((step) => Math.abs(step - steps[0]!) < 0.002)) return [`${plain(span)}, see Terminals`, plain(span)]
  return [`${steps.length} × ${plain(steps[0])} (= ${plain(span)})`, `${steps.length} × ${plain(steps[0])}`]
}

function fittingText(values: readonly number[], scale: number): string {
  const texts = spanTexts(values)
  const lengthMm = (values.at(-1)! - values[0]!) * scale
  return texts.find((text) => textWidthMm(text, 'sans', LETTERING.body) < lengthMm - 1) ?? texts.at(-1)!
}

const near = (a: number, b: number) => Math.abs(a - b) < 0.01

/** Pitch and spacing of the pins by their places, below a view from above or below and beside it. */
export function pinDimensions(places: readonly PinPlace[], scale: number, { leftMm, lowMm, rightMm }: { leftMm: number; lowMm: number; rightMm: number }): Shape[] {
  const xs = distinct(places.map(({ at }) => at[0] / scale))
  const ys = distinct(places.map(({ at }) => at[1] / scale))
  const across = (x: number): PointMm => [x * scale, Math.min(...places.filter(({ at }) => near(at[0] / scale, x)).map(({ at }) => at[1]))]
  const hand = sideOf(places, ys.map((y) => y * scale))
  const beside = (y: number): PointMm => [hand * Math.max(...places.filter(({ at }) => near(at[1] / scale, y)).map(({ at }) => hand * at[0])), y * scale]
  return [
    ...(xs.length > 1 ? horizontalDimension(across(xs[0]!), across(xs.at(-1)!), lowMm, fittingText(xs, scale)) : []),
    ...(ys.length > 1 ? verticalDimension(beside(ys[0]!), beside(ys.at(-1)!), hand > 0 ? rightMm : leftMm, fittingText(ys, scale), 'beside') : []),
  ]
}

/** The side whose pins reach both ends, so that no extension line crosses the part. */
function sideOf(places: readonly PinPlace[], ys: readonly number[]): 1 | -1 {
  const reaches = (hand: 1 | -1) => [ys[0], ys.at(-1)].every((y) => places.some(({ at }) => near(at[1], y ?? 0) && Math.sign(at[0]) === hand))
  return reaches(1) || !reaches(-1) ? 1 : -1
}

/** Numbers beside the pins, towards the middle of the part. */
export function pinNumbers(places: readonly PinPlace[], clearanceMm: number): Shape[] {
  const levels = (index: 0 | 1) => distinct(places.map(({ at }) => at[index])).length
  const rowsUp = levels(0) <= levels(1)
  return places.flatMap(({ pin, at: [x, y] }) => {
    const options = { heightMm: LETTERING.small, font: 'sans-bold', tag: `pin:${pin.number}` } as const
    if (rowsUp) {
      const hand = x > 0 ? -1 : 1
      return clearedLabel(label([x + hand * clearanceMm, y - LETTERING.small / 2], pin.number, { ...options, align: hand > 0 ? 'start' : 'end' }))
    }
    const inward = y > 0 ? y - clearanceMm - LETTERING.small : y + clearanceMm
    return clearedLabel(label([x, inward], pin.number, { ...options, align: 'middle' }))
  })
}

/** A filled corner of the envelope next to pin 1. */
export function pinOneCorner(places: readonly PinPlace[], [halfWidthMm, halfHeightMm]: PointMm): Shape[] {
  const one = places.find(({ pin }) => pin.number === '1') ?? places[0]
  if (!one) return []
  const [hx, hy] = [one.at[0] < 0 ? -1 : 1, one.at[1] < 0 ? -1 : 1]
  const corner: PointMm = [hx * halfWidthMm, hy * halfHeightMm]
  const size = 2.2
  return [polyline([corner, [corner[0] - hx * size, corner[1]], [corner[0], corner[1] - hy * size]], { layer: 'thin', fill: 'ink', closed: true, tag: 'pin-one' })]
}
