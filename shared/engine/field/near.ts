import { erf } from './error-function'
import { curvatureRoot } from './series'
import type { ChannelFields, CurrentSources, FieldPlace } from './series'

/** Beyond this many spreads the smoothed current acts as the point: exp(−4²/2) = 3·10⁻⁴. */
export const NEAR_REACH = 4

interface NearSource {
  radialMm: number
  axialMm: number
  weight: number
  channel: number
  /** Index of the point itself, −1 for an image in a wall. */
  point: number
}

/**
 * What the smoothed field lacks near its sources: for each point current, own image currents in the walls included,
 * I/(2πρ)·e^(−ρ²/2s²); for a sheet half its density, erfc(|d|/√2·s), on either side of it. Added to `fields`.
 * `ownPoint` of each place is the index of the current that is left out there (the wire's own), −1 for none.
 *
 * Source: Ewald's splitting of a point source into a Gaussian and the rest; images in a highly permeable wall have the
 * current's own sign.
 */
export function addNearFields(fields: ChannelFields, sources: CurrentSources, places: readonly FieldPlace[], ownPoint: Int32Array, smoothMm: number): void {
  const reachMm = NEAR_REACH * smoothMm
  const grid = gridOf(nearSources(sources, reachMm), reachMm)
  const { channels, window } = sources
  const spread = 2 * smoothMm ** 2
  places.forEach(({ radialMm, axialMm }, place) => {
    const root = curvatureRoot(window, radialMm)
    grid.visit(radialMm, axialMm, (source) => {
      if (source.point >= 0 && source.point === ownPoint[place]) return
      const x = radialMm - source.radialMm
      const y = axialMm - source.axialMm
      const square = x * x + y * y
      if (square > reachMm * reachMm || square < 1e-12) return
      const strength = (source.weight * Math.exp(-square / spread)) / (2 * Math.PI * square * root)
      fields.radial[place * channels + source.channel]! -= strength * y
      fields.axial[place * channels + source.channel]! += strength * x
    })
  })
  addSheets(fields, sources, places, smoothMm)
}

/** The points and those of their images in the walls that lie within reach of the window; weights with the root of the radius. */
function nearSources({ window, points }: CurrentSources, reachMm: number): NearSource[] {
  const list: NearSource[] = []
  points.forEach(({ radialMm, axialMm, weight, channel }, point) => {
    const scaled = weight * curvatureRoot(window, radialMm)
    for (const [x, realX] of mirrored(radialMm, window.heightMm, reachMm)) {
      for (const [y, realY] of mirrored(axialMm, window.breadthMm, reachMm)) list.push({ radialMm: x, axialMm: y, weight: scaled, channel, point: realX && realY ? point : -1 })
    }
  })
  return list
}

/** A place and its images in the two walls of a stretch that lie within reach; true for the place itself. */
export function mirrored(placeMm: number, lengthMm: number, reachMm: number): [number, boolean][] {
  const places: [number, boolean][] = [[placeMm, true]]
  if (placeMm < reachMm) places.push([-placeMm, false])
  if (lengthMm - placeMm < reachMm) places.push([2 * lengthMm - placeMm, false])
  return places
}

/** Sources sorted into square cells as wide as the reach. */
function gridOf(sources: readonly NearSource[], reachMm: number): { visit: (x: number, y: number, take: (source: NearSource) => void) => void } {
  const cells = new Map<number, NearSource[]>()
  const cellOf = (x: number, y: number) => Math.floor(x / reachMm) * 65536 + Math.floor(y / reachMm)
  for (const source of sources) {
    const key = cellOf(source.radialMm, source.axialMm)
    const cell = cells.get(key)
    if (cell) cell.push(source)
    else cells.set(key, [source])
  }
  return {
    visit: (x, y, take) => {
      const middle = cellOf(x, y)
      for (let row = -65536; row <= 65536; row += 65536) for (let column = -1; column <= 1; column++) cells.get(middle + row + column)?.forEach(take)
    },
  }
}

function addSheets(fields: ChannelFields, { channels, window, sheets }: CurrentSources, places: readonly FieldPlace[], smoothMm: number): void {
  const scale = Math.SQRT2 * smoothMm
  for (const sheet of sheets) {
    const density = (sheet.weight * curvatureRoot(window, sheet.radialMm)) / (sheet.toMm - sheet.fromMm)
    for (const [sheetMm] of mirrored(sheet.radialMm, window.heightMm, NEAR_REACH * smoothMm)) {
      places.forEach(({ radialMm, axialMm }, place) => {
        const distanceMm = radialMm - sheetMm
        if (Math.abs(distanceMm) > NEAR_REACH * smoothMm || Math.abs(distanceMm) < 1e-9) return
        const beside = (erf((axialMm - sheet.fromMm) / scale) - erf((axialMm - sheet.toMm) / scale)) / 2
        fields.axial[place * channels + sheet.channel]! += (0.5 * density * beside * Math.sign(distanceMm) * (1 - erf(Math.abs(distanceMm) / scale))) / curvatureRoot(window, radialMm)
      })
    }
  }
}
