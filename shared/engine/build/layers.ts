import type { WindingStep } from '../specification'
import { requirePositive } from '../require'

/** Turns of one layer with the position of each. */
export interface LayerPlan {
  turns: number
  /** Centre of each turn's bundle from the left end of the available width, mm, in winding order. */
  centresMm: number[]
}

export interface LayersInput {
  turns: number
  /** Width that one turn takes: overall diameter times the wires side by side. */
  bundleWidthMm: number
  /** Width of the former less the margins. */
  availableMm: number
  lay: WindingStep['lay']
  /** Layers that the specification asks for; null lets the width decide. */
  layers: number | null
}

/**
 * Most turns that one layer holds. The helix advances one bundle per turn, so its ends lie one bundle
 * further apart than its turns: (t + 1)·d ≤ width.
 *
 * Source: geometry of a helical layer.
 *
 * @throws RangeError when the bundle has no width
 */
export function mostTurnsPerLayer(availableMm: number, bundleWidthMm: number): number {
  requirePositive('bundleWidthMm', bundleWidthMm)
  // The hair's breadth keeps 11 × 0.6 mm in a width of 6.6 mm from failing by rounding.
  return Math.max(0, Math.floor(availableMm / bundleWidthMm - 1 + 1e-9))
}

/**
 * Turns in each layer. Without a stated number of layers each is filled before the next begins; with one
 * the turns are shared evenly, as far as a layer holds them.
 */
export function turnsByLayer({ turns, bundleWidthMm, availableMm, layers }: LayersInput): number[] {
  const most = Math.max(1, mostTurnsPerLayer(availableMm, bundleWidthMm))
  const count = Math.ceil(turns)
  const needed = Math.max(1, Math.ceil(count / most))
  const perLayer = layers !== null && layers >= needed ? Math.ceil(count / layers) : most
  const full = Math.floor(count / perLayer)
  const rest = count - full * perLayer
  return [...new Array<number>(full).fill(perLayer), ...(rest > 0 ? [rest] : [])]
}

/**
 * Every turn's place in its layers. The section is taken half a turn from the start, so that a turn
 * stands half a pitch from where its helix began. Layers alternate in sense: a second layer that is not
 * full begins where the first ended.
 */
export function planLayers(input: LayersInput): LayerPlan[] {
  return turnsByLayer(input).map((turns, layer) => {
    const centresMm = layerCentres(input, turns)
    if (layer % 2 === 0) return { turns, centresMm }
    if (input.lay === 'close-wound') return { turns, centresMm: centresMm.map((centreMm) => input.availableMm - centreMm) }
    return { turns, centresMm: centresMm.reverse() }
  })
}

function layerCentres({ bundleWidthMm, availableMm, lay }: LayersInput, turns: number): number[] {
  const slackMm = Math.max(0, availableMm - (turns + 1) * bundleWidthMm)
  const pitchMm = lay === 'spread' ? bundleWidthMm + slackMm / turns : bundleWidthMm
  const offsetMm = { 'close-wound': 0, 'close-wound-left': 0, spread: 0, centred: slackMm / 2, 'close-wound-right': slackMm }[lay]
  return Array.from({ length: turns }, (_, turn) => offsetMm + bundleWidthMm / 2 + (turn + 0.5) * pitchMm)
}
