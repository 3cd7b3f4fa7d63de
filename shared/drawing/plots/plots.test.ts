import { describe, expect, it } from 'vitest'
import { labelBox } from '../text-metrics'
import type { LabelShape, Picture } from '../model'
import { axisOver, roundStep, tickText } from './axis'
import { barPlot } from './bar-plot'
import { linePlot } from './line-plot'

const texts = ({ shapes }: Picture) => shapes.filter((shape): shape is LabelShape => shape.kind === 'label')

function overlaps({ shapes }: Picture): string[] {
  const boxes = shapes.filter((shape): shape is LabelShape => shape.kind === 'label').map((label) => ({ text: label.text, box: labelBox(label) }))
  return boxes.flatMap((one, index) =>
    boxes.slice(index + 1).filter(({ box }) => one.box.leftMm < box.rightMm && box.leftMm < one.box.rightMm && one.box.bottomMm < box.topMm && box.bottomMm < one.box.topMm).map(({ text }) => `${one.text} × ${text}`),
  )
}

describe('an axis', () => {
  it.each([
    [10, 5, 2],
    [1.3, 5, 0.5],
    [97, 5, 20],
    [0.0042, 4, 0.002],
  ])('over %d in about %i parts steps by %d', (span, parts, step) => {
    expect(roundStep(span, parts)).toBeCloseTo(step, 12)
  })

  it.each([
    [[0, 9.7e-6], 's', 'µs', ['0', '2', '4', '6', '8', '10']],
    [[-0.31, 2.2], 'A', 'A', ['−1', '0', '1', '2', '3']],
    [[0, 0.28], 'T', 'mT', ['0', '100', '200', '300']],
  ] as const)('over %j in %s reads %s', (values, unit, shown, ticks) => {
    const axis = axisOver(values, unit, { parts: unit === 'T' ? 4 : 5 })
    expect(axis.ticks.map((tick) => tickText(axis, tick))).toEqual(ticks)
    expect(axis.unit).toBe(shown)
  })

  it('takes one value, and values without a spread', () => {
    for (const values of [[3], [3, 3], [0], [-2], []]) {
      const axis = axisOver(values, 'W')
      expect(axis.minimum).toBeLessThanOrEqual(values[0] ?? 0)
      expect(axis.maximum).toBeGreaterThan(axis.minimum)
    }
  })
})

const triangle = (peak: number) => [[0, 0], [4e-6, peak], [4e-6, 0], [10e-6, 0]] as const

describe('a plot of lines', () => {
  const plot = linePlot({ widthMm: 150, heightMm: 70, x: { name: 't', unit: 's' }, y: { name: 'i', unit: 'A' }, series: ['P', 'S1', 'S2', 'AUX', 'SH', 'a rather long name of a winding'].map((name, index) => ({ name, points: triangle(index + 0.5) })) })

  it('names its axes with their unit and its lines in a legend, and no two texts touch', () => {
    expect(texts(plot).map(({ text }) => text)).toEqual(expect.arrayContaining(['t, µs', 'i, A', 'P', 'AUX', '10']))
    expect(overlaps(plot)).toEqual([])
  })

  it('tells its lines apart without colour, and stays on its paper', () => {
    const lines = plot.shapes.filter((shape) => shape.tag?.startsWith('series:'))
    expect(new Set(lines.map((shape) => ('layer' in shape ? shape.layer : ''))).size).toBe(6)
    for (const shape of plot.shapes) {
      if (shape.kind !== 'path') continue
      for (const [x, y] of [shape.from, ...shape.steps.map(({ to }) => to)]) expect(x >= 0 && x <= 150 && y >= 0 && y <= 70).toBe(true)
    }
  })

  it('refuses what cannot be drawn', () => {
    expect(() => linePlot({ widthMm: 100, heightMm: 50, x: { name: 't', unit: 's' }, y: { name: 'i', unit: 'A' }, series: [{ name: 'P', points: [[0, NaN], [1, 1]] }] })).toThrow(RangeError)
  })
})

describe('a plot of bars', () => {
  it('draws each bar as long as its figure says', () => {
    const plot = barPlot({ widthMm: 150, name: 'P', unit: 'W', bars: [{ name: 'Copper P', value: 0.5 }, { name: 'Core', value: 1 }] })
    const widths = plot.shapes.flatMap((shape) => (shape.kind === 'path' && shape.closed ? [shape.steps[0]!.to[0] - shape.from[0]] : []))
    expect(widths[1]! / widths[0]!).toBeCloseTo(2, 9)
    expect(texts(plot).map(({ text }) => text)).toEqual(expect.arrayContaining(['500\u00a0mW', '1\u00a0W']))
    expect(overlaps(plot)).toEqual([])
  })

  it('marks a limit, and shows °C without a prefix', () => {
    const plot = barPlot({ widthMm: 150, name: 'T', unit: '°C', plain: true, bars: [{ name: 'Winding', value: 96.4 }], marks: [{ name: 'limit', value: 120 }] })
    expect(texts(plot).map(({ text }) => text)).toEqual(expect.arrayContaining(['96.4\u00a0°C', 'limit 120\u00a0°C', 'T, °C']))
  })
})
