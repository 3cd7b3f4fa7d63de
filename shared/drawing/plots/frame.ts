import { box, label, LETTERING, line, rectangle } from '../shapes'
import type { BoxMm, Layer, PointMm, Shape } from '../model'
import { textWidthMm } from '../text-metrics'
import { tickText, type Axis } from './axis'

/** Lines that stay apart in grey and in one colour: by dash and width. */
export const SERIES_LAYERS: readonly Layer[] = ['outline', 'hidden', 'thin', 'centre', 'screen', 'symbol', 'fine', 'dimension']

export interface PlotFrame {
  area: BoxMm
  shapes: Shape[]
  /** A point of the plot on paper. */
  at: (x: number, y: number) => PointMm
}

const share = ({ minimum, maximum }: Axis, value: number) => (value - minimum) / (maximum - minimum)

/** Axes with ticks, figures and units. `legendMm` is kept free above the plot. */
export function plotFrame(widthMm: number, heightMm: number, x: Axis, y: Axis, titles: { x: string; y: string }, legendMm: number): PlotFrame {
  const small = LETTERING.small
  const left = Math.max(...y.ticks.map((tick) => textWidthMm(tickText(y, tick), 'mono', small))) + 4
  const area = box(left, 8, widthMm - left - 4, heightMm - 8 - 5 - legendMm)
  const at = (ofX: number, ofY: number): PointMm => [
    area.leftMm + share(x, ofX) * (area.rightMm - area.leftMm),
    area.bottomMm + share(y, ofY) * (area.topMm - area.bottomMm),
  ]
  const shapes: Shape[] = [rectangle(area, { layer: 'thin' })]
  for (const tick of x.ticks) {
    const [xMm] = at(tick, y.minimum)
    shapes.push(line([xMm, area.bottomMm], [xMm, area.bottomMm - 1]), label([xMm, area.bottomMm - 1.5 - small], tickText(x, tick), { align: 'middle', heightMm: small, font: 'mono' }))
  }
  for (const tick of y.ticks) {
    const [, yMm] = at(x.minimum, tick)
    shapes.push(line([area.leftMm, yMm], [area.rightMm, yMm], 'fine'), label([area.leftMm - 1.5, yMm - small / 2], tickText(y, tick), { align: 'end', heightMm: small, font: 'mono' }))
  }
  if (y.minimum < 0 && y.maximum > 0) shapes.push(line(at(x.minimum, 0), at(x.maximum, 0), 'thin'))
  shapes.push(label([area.rightMm, 1], titles.x, { align: 'end', heightMm: small }), label([0, area.topMm + 1.6], titles.y, { heightMm: small }))
  return { area, shapes, at }
}

/** `t, µs` */
export const axisTitle = (name: string, unit: string): string => (unit === '' ? name : `${name}, ${unit}`)
