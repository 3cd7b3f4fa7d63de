import { label, LETTERING, line, polyline } from '../shapes'
import type { Picture, PointMm, Shape } from '../model'
import { textWidthMm } from '../text-metrics'
import { axisOver } from './axis'
import { axisTitle, plotFrame, SERIES_LAYERS } from './frame'

export interface PlotSeries {
  name: string
  points: readonly PointMm[]
}

export interface LinePlot {
  widthMm: number
  heightMm: number
  x: { name: string; unit: string }
  y: { name: string; unit: string }
  series: readonly PlotSeries[]
}

const LEGEND_LINE_MM = 4
const SAMPLE_MM = 9

/**
 * Lines over one axis, told apart by dash and width and named in a legend above; a single line needs none. Points are in SI units.
 *
 * @throws RangeError when a point is not finite
 */
export function linePlot({ widthMm, heightMm, x, y, series }: LinePlot): Picture {
  const points = series.flatMap((one) => one.points)
  if (points.some((point) => !point.every(Number.isFinite))) throw new RangeError('a plot takes finite points')
  const [xAxis, yAxis] = [axisOver(points.map(([value]) => value), x.unit, { parts: 5 }), axisOver(points.map(([, value]) => value), y.unit, { parts: 4, fromZero: true })]
  const legend = legendShapes(series.length === 1 ? [] : series.map(({ name }) => name), widthMm)
  const { shapes, at } = plotFrame(widthMm, heightMm, xAxis, yAxis, { x: axisTitle(x.name, xAxis.unit), y: axisTitle(y.name, yAxis.unit) }, legend.heightMm)
  const lines = series.flatMap(({ points: own }, index): Shape[] => (own.length < 2 ? [] : [polyline(own.map(([a, b]) => at(a, b)), { layer: layerOf(index), tag: `series:${index}` })]))
  return { widthMm, heightMm, shapes: [...shapes, ...lines, ...legend.at(heightMm)] }
}

const layerOf = (index: number) => SERIES_LAYERS[index % SERIES_LAYERS.length]!

/** Names with a sample of their line, as many beside each other as fit. */
function legendShapes(names: readonly string[], widthMm: number) {
  const small = LETTERING.small
  const places: { name: string; index: number; leftMm: number; row: number }[] = []
  let [leftMm, row] = [0, 0]
  names.forEach((name, index) => {
    const wide = SAMPLE_MM + 1.5 + textWidthMm(name, 'sans', small) + 4
    if (leftMm > 0 && leftMm + wide > widthMm) [leftMm, row] = [0, row + 1]
    places.push({ name, index, leftMm, row })
    leftMm += wide
  })
  const at = (topMm: number): Shape[] =>
    places.flatMap(({ name, index, leftMm: left, row: of }) => {
      const base = topMm - (of + 1) * LEGEND_LINE_MM + 1
      return [line([left, base + small / 2], [left + SAMPLE_MM, base + small / 2], layerOf(index)), label([left + SAMPLE_MM + 1.5, base], name, { heightMm: small })]
    })
  return { heightMm: names.length === 0 ? 0 : (row + 1) * LEGEND_LINE_MM, at }
}
