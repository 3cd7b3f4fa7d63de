import { barPlot, type Bar } from '#shared/drawing/plots/bar-plot'
import { linePlot, type PlotSeries } from '#shared/drawing/plots/line-plot'
import type { Picture } from '#shared/drawing/model'
import type { CornerResult, Evaluation } from '#shared/engine/evaluation'
import type { WindingSpecification } from '#shared/engine/specification'

export interface Plot {
  key: string
  title: string
  /** What the picture says, for who does not see it. */
  words: string
  picture: Picture
}

const WIDTH_MM = 150
const HEIGHT_MM = 70

const namesOf = ({ windings }: WindingSpecification) => new Map(windings.map(({ id, name }) => [id, name]))
const finite = (points: readonly (readonly [number, number])[]) => points.length > 1 && points.every((point) => point.every(Number.isFinite))

function waves(key: string, title: string, y: { name: string; unit: string }, series: readonly PlotSeries[]): Plot[] {
  const shown = series.filter(({ points }) => finite(points))
  if (shown.length === 0) return []
  const peak = (points: PlotSeries['points']) => Math.max(...points.map(([, value]) => Math.abs(value)))
  const words = `${title}, one period. ${shown.map(({ name, points }) => `${name}: peak ${peak(points).toPrecision(3)} ${y.unit}`).join('; ')}.`
  return [{ key, title, words, picture: linePlot({ widthMm: WIDTH_MM, heightMm: HEIGHT_MM, x: { name: 't', unit: 's' }, y, series: shown }) }]
}

/** Currents of the windings and flux density at one corner, one period. */
export function waveformPlots(corner: CornerResult, specification: WindingSpecification): Plot[] {
  const names = namesOf(specification)
  const currents = corner.windings.map(({ windingId, currentWaveform }): PlotSeries => ({ name: names.get(windingId) ?? windingId, points: currentWaveform }))
  return [
    ...waves('currents', 'Winding currents', { name: 'i', unit: 'A' }, currents),
    ...waves('flux', 'Flux density on the effective area', { name: 'B', unit: 'T' }, corner.fluxWaveform ? [{ name: 'B', points: corner.fluxWaveform }] : []),
  ]
}

function bars(key: string, title: string, of: { name: string; unit: string; plain?: boolean }, all: readonly Bar[], marks: { name: string; value: number }[] = []): Plot[] {
  if (all.length === 0) return []
  const words = `${title}. ${[...all, ...marks].map(({ name, value }) => `${name}: ${value.toPrecision(3)} ${of.unit}`).join('; ')}.`
  return [{ key, title, words, picture: barPlot({ widthMm: WIDTH_MM, ...of, bars: all, marks }) }]
}

const known = (name: string, value: number | null, fill?: Bar['fill']): Bar[] => (value === null || !Number.isFinite(value) ? [] : [{ name, value, fill }])

/** Where the loss arises, and what it does to the temperature. */
export function lossPlots({ windings, losses, thermal }: Evaluation, specification: WindingSpecification): Plot[] {
  const names = namesOf(specification)
  const copper = windings.flatMap(({ windingId, copperLossW }) => known(`Copper ${names.get(windingId) ?? windingId}`, copperLossW, 'dark-tint'))
  const limit = thermal.limitC === null ? [] : [{ name: 'limit', value: thermal.limitC }]
  return [
    ...bars('loss', 'Loss', { name: 'P', unit: 'W' }, [...copper, ...known('Core', losses.coreW, 'tint'), ...known('In all', losses.totalW, 'ink')]),
    ...bars('temperature', 'Temperature', { name: 'T', unit: '°C', plain: true }, [...known('Surroundings', thermal.ambientC, 'tint'), ...known('Winding', thermal.windingC, 'dark-tint')], limit),
  ]
}
