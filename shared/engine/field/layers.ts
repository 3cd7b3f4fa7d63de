import type { Layout } from '../evaluation'
import { isConductor } from './layout-turns'
import type { LaidCoil } from './layout-turns'

/** One layer of one winding as a band of even current, in the coordinates of the layout, mm. */
export interface CurrentLayer {
  windingId: string
  stepId: string
  layer: number
  /** Ampere-turns per ampere of the winding. */
  turns: number
  /** From the winding tube: the height of the square of equal copper area (round wire), or of the foil. */
  fromMm: number
  toMm: number
  /** Along the former, half a pitch beyond the first and the last turn. */
  leftMm: number
  rightMm: number
  axialMm: readonly number[]
  /** Of round wires; null for a foil. */
  wire: { conductorMm: number; pitchMm: number } | null
}

/** Side of the square of a round wire's area. Source: P. Dowell, Proc. IEE 113 (1966) 1387. */
const SQUARE_OF_ROUND = Math.sqrt(Math.PI) / 2

interface Gathered {
  windingId: string
  stepId: string
  layer: number
  middlesMm: number[]
  yMm: number
  heightMm: number
  wireMm: number
  conductorMm: number
  strandsPerTurn: number
  foilMm: number | null
}

/**
 * The layers of the laid coil from the winding tube outward. A layer of round wires (litz: of bundles) counts as a band of the
 * height of the equal square, see `wireEnergyShare` for what single wires have beyond; every foil is a layer of its own.
 */
export function currentLayers({ layout, windings }: Pick<LaidCoil, 'layout' | 'windings'>): CurrentLayer[] {
  const parallel = new Map(windings.map(({ id, wire }) => [id, Math.max(1, Math.floor(wire.parallel))]))
  const gathered = new Map<string, Gathered>()
  for (const item of layout.items.filter(isConductor)) gather(gathered, item, parallel.get(item.windingId) ?? 1)
  return [...gathered.values()].map(layerOf).sort((a, b) => a.fromMm - b.fromMm || a.leftMm - b.leftMm)
}

function gather(gathered: Map<string, Gathered>, item: Extract<Layout['items'][number], { kind: 'turn' | 'foil' }>, strandsPerTurn: number): void {
  const shared = { windingId: item.windingId, stepId: item.stepId }
  if (item.kind === 'foil') {
    const middle = item.xMm + item.widthMm / 2
    gathered.set(`${item.stepId} foil ${item.turn} ${item.yMm}`, { ...shared, layer: item.turn, middlesMm: [middle], yMm: item.yMm + item.thicknessMm / 2, heightMm: item.thicknessMm, wireMm: item.widthMm, conductorMm: item.thicknessMm, strandsPerTurn: 1, foilMm: item.widthMm })
    return
  }
  const key = `${item.stepId} ${item.windingId} ${item.layer}`
  const held = gathered.get(key)
  if (held) held.middlesMm.push(item.xMm)
  else gathered.set(key, { ...shared, layer: item.layer, middlesMm: [item.xMm], yMm: item.yMm, heightMm: item.conductorMm * SQUARE_OF_ROUND, wireMm: item.overallMm, conductorMm: item.conductorMm, strandsPerTurn, foilMm: null })
}

function layerOf({ windingId, stepId, layer, middlesMm, yMm, heightMm, wireMm, conductorMm, strandsPerTurn, foilMm }: Gathered): CurrentLayer {
  const first = middlesMm.reduce((least, mm) => Math.min(least, mm), Infinity)
  const last = middlesMm.reduce((most, mm) => Math.max(most, mm), -Infinity)
  const pitchMm = middlesMm.length > 1 ? (last - first) / (middlesMm.length - 1) : wireMm
  const halfMm = foilMm === null ? Math.max(pitchMm, 1e-6) / 2 : foilMm / 2
  return {
    windingId, stepId, layer, turns: middlesMm.length / strandsPerTurn,
    fromMm: yMm - heightMm / 2, toMm: yMm + heightMm / 2, leftMm: first - halfMm, rightMm: last + halfMm,
    axialMm: middlesMm, wire: foilMm === null ? { conductorMm, pitchMm: 2 * halfMm } : null,
  }
}
