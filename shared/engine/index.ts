/**
 * The only way into the engine for the rest of the product. Lengths in mm, temperatures in °C, everything else SI.
 */

export { evaluate } from './evaluate'
export type { EvaluateOptions } from './evaluate'
export { ENGINE_VERSION } from './version'
