import { box, label, LETTERING, line, rectangle } from '../shapes'
import type { Fill, Picture, Shape } from '../model'
import { textWidthMm } from '../text-metrics'
import { formatEngineering, formatNumber } from '../../number-format'
import { axisOver, tickText } from './axis'
import { axisTitle } from './frame'

export interface Bar {
  name: string
  value: number
  fill?: Exclude<Fill, 'none'>
}

export interface BarPlot {
  widthMm: number
  name: string
  unit: string
  /** Units such as °C take no prefix. */
  plain?: boolean
  bars: readonly Bar[]
  /** Values marked by a line across all bars, such as a limit. */
  marks?: readonly { name: string; value: number }[]
}

const BAR_MM = 4
const PITCH_MM = 6.5

/**
 * Lying bars with their figures at the end, filled so that they stay apart in grey.
 *
 * @throws RangeError when a value is not finite
 */
export function barPlot({ widthMm, name, unit, plain = false, bars, marks = [] }: BarPlot): Picture {
  const values = [...bars, ...marks].map(({ value }) => value)
  if (!values.every(Number.isFinite)) throw new RangeError('a plot takes finite values')
  const small = LETTERING.small
  const axis = axisOver(values, unit, { plain, fromZero: true })
  const text = (value: number) => (plain ? `${formatNumber(value)}\u00a0${unit}` : formatEngineering(value, unit))
  const leftMm = Math.max(0, ...bars.map((bar) => textWidthMm(bar.name, 'sans', small))) + 2
  const rightMm = Math.max(0, ...bars.map((bar) => textWidthMm(text(bar.value), 'mono', small))) + 2
  const headMm = marks.length > 0 ? 5 : 1
  const heightMm = 9 + bars.length * PITCH_MM + headMm
  const at = (value: number) => leftMm + ((value - axis.minimum) / (axis.maximum - axis.minimum)) * (widthMm - leftMm - rightMm)
  const shapes: Shape[] = bars.flatMap((bar, index) => {
    const bottomMm = heightMm - headMm - (index + 1) * PITCH_MM + (PITCH_MM - BAR_MM) / 2
    const [from, to] = [Math.min(at(0), at(bar.value)), Math.max(at(0), at(bar.value))]
    return [
      label([leftMm - 1.5, bottomMm + (BAR_MM - small) / 2], bar.name, { align: 'end', heightMm: small }),
      rectangle(box(from, bottomMm, to - from, BAR_MM), { layer: 'thin', fill: bar.fill ?? 'dark-tint' }),
      label([to + 1, bottomMm + (BAR_MM - small) / 2], text(bar.value), { heightMm: small, font: 'mono' }),
    ]
  })
  const ticks = axis.ticks.flatMap((tick): Shape[] => [
    line([at(tick), 8], [at(tick), 9]),
    label([at(tick), 5], tickText(axis, tick), { align: 'middle', heightMm: small, font: 'mono' }),
  ])
  const limits = marks.flatMap((mark): Shape[] => [line([at(mark.value), 9], [at(mark.value), heightMm - headMm], 'hidden'), label([at(mark.value), heightMm - small - 1], `${mark.name} ${text(mark.value)}`, { align: 'middle', heightMm: small })])
  return { widthMm, heightMm, shapes: [line([leftMm, 9], [widthMm - rightMm, 9]), ...ticks, ...shapes, ...limits, label([widthMm, 1], axisTitle(name, axis.unit), { align: 'end', heightMm: small })] }
}
