import { requireBetween, requireCount, requirePositive } from '../require'

/** Beyond this argument the hyperbolic quotients are 1 to all digits, and cosh would overflow. */
const SATURATED_ARGUMENT = 20

/**
 * Ratio of ac to dc resistance of a winding section of m layers in a one-dimensional field, sine current:
 *
 *     F = x·[(sinh 2x + sin 2x)/(cosh 2x − cos 2x) + (2·(m² − 1)/3)·(sinh x − sin x)/(cosh x + cos x)]
 *
 * x is layer height over skin depth, with porosity as x = h·√η/δ. m = ½ is one layer between equal fields.
 * Source: P. Dowell, Proc. IEE 113 (1966) 1387; exact one-dimensional solution.
 *
 * @throws RangeError unless x is positive and m at least ½
 */
export function dowellFactor({ heightInSkinDepths: x, layers }: { heightInSkinDepths: number; layers: number }): number {
  requirePositive('heightInSkinDepths', x)
  requireBetween('layers', layers, 0.5, Number.MAX_SAFE_INTEGER)
  const own = x > SATURATED_ARGUMENT ? 1 : (Math.sinh(2 * x) + Math.sin(2 * x)) / (Math.cosh(2 * x) - Math.cos(2 * x))
  const proximity = x > 2 * SATURATED_ARGUMENT ? 1 : (Math.sinh(x) - Math.sin(x)) / (Math.cosh(x) + Math.cos(x))
  return x * (own + ((2 * (layers ** 2 - 1)) / 3) * proximity)
}

/** A layer as the one-dimensional model sees it. */
export interface EquivalentLayer {
  /** Height of the foil of equal area. */
  heightMm: number
  /** Share of the breadth that conducts, η. */
  porosity: number
}

/**
 * Layer of round wires as a foil: h = d·√π/2, η = N·h/b.
 *
 * Source: P. Dowell (1966); L. Dixon, SLUP127.
 *
 * @throws RangeError unless all are positive and the wires fit side by side as squares of equal area (η ≤ 1)
 */
export function roundWireLayer(input: { conductorDiameterMm: number; wiresPerLayer: number; breadthMm: number }): EquivalentLayer {
  const { conductorDiameterMm, wiresPerLayer, breadthMm } = input
  requirePositive('conductorDiameterMm', conductorDiameterMm)
  requirePositive('wiresPerLayer', wiresPerLayer)
  requirePositive('breadthMm', breadthMm)
  const heightMm = (conductorDiameterMm * Math.sqrt(Math.PI)) / 2
  const porosity = (wiresPerLayer * heightMm) / breadthMm
  requireBetween('porosity', porosity, Number.MIN_VALUE, 1)
  return { heightMm, porosity }
}

/**
 * Layers of litz wire as layers of its strands: a bundle of k strands is √k strands high and √k wide.
 *
 * Source: L. Dixon, SLUP127; C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283.
 *
 * @throws RangeError unless all are positive, the strands a whole number, and the strands fit
 */
export function litzLayers(input: { strandCount: number; strandDiameterMm: number; wiresPerLayer: number; breadthMm: number; layers: number }): {
  layer: EquivalentLayer
  layers: number
} {
  const { strandCount, strandDiameterMm, wiresPerLayer, breadthMm, layers } = input
  requireCount('strandCount', strandCount)
  requirePositive('layers', layers)
  const side = Math.sqrt(strandCount)
  return { layer: roundWireLayer({ conductorDiameterMm: strandDiameterMm, wiresPerLayer: wiresPerLayer * side, breadthMm }), layers: layers * side }
}

/** x = h·√η/δ of an equivalent layer. Source: P. Dowell (1966). @throws RangeError unless the skin depth is positive */
export function heightInSkinDepths(layer: EquivalentLayer, skinDepthMm: number): number {
  requirePositive('skinDepthMm', skinDepthMm)
  return (layer.heightMm * Math.sqrt(layer.porosity)) / skinDepthMm
}
