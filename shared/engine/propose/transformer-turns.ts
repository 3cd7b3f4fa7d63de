import type { ConverterOutput } from '../specification'

export interface TransformerTurns {
  primary: number
  /** Turns of one half where the winding is tapped, by output. */
  outputs: ReadonlyMap<string, number>
}

const windingV = ({ voltageV, rectifierDropV }: ConverterOutput): number => Math.abs(voltageV) + rectifierDropV

/** More secondary turns than flux asks for are tried while they bring the ratio nearer. */
const MOST_MORE = 6
/** Growth of the coil against error of the ratio. */
const GROWTH_WEIGHT = 0.5

/**
 * Whole turns for at least so many primary turns. The primary takes no more turns than the ratio allows where the greatest ratio is a
 * limit (the duty ratio would not suffice), else the nearest number; the other outputs follow the regulated one.
 */
export function transformerTurns(outputs: readonly ConverterOutput[], { ratio, least, isLimit }: { ratio: number; least: number; isLimit: boolean }): TransformerTurns {
  const main = outputs.find(({ role }) => role === 'main') ?? outputs[0]!
  const leastPrimary = Math.max(1, Math.ceil(least - 1e-9))
  const rounded = isLimit ? (turns: number) => Math.floor(turns + 1e-9) : Math.round
  const first = Math.max(1, Math.floor(leastPrimary / ratio))
  let best: { turns: TransformerTurns; cost: number } | null = null
  for (let mainTurns = first; mainTurns <= first + MOST_MORE; mainTurns++) {
    const primary = rounded(ratio * mainTurns)
    if (primary < leastPrimary) continue
    const perTurnV = windingV(main) / mainTurns
    const others = new Map(outputs.map((output) => [output.id, output === main ? mainTurns : Math.max(1, Math.round(windingV(output) / perTurnV))]))
    const error = Math.max(0, ...outputs.map((output) => Math.abs((perTurnV * others.get(output.id)!) / windingV(output) - 1) * (output.role === 'main' ? 1 : 0.3)))
    const cost = GROWTH_WEIGHT * (primary / leastPrimary - 1) + Math.abs(primary / mainTurns / ratio - 1) + error
    if (!best || cost < best.cost - 1e-12) best = { turns: { primary, outputs: others }, cost }
  }
  return best?.turns ?? { primary: leastPrimary, outputs: new Map(outputs.map((output) => [output.id, Math.max(1, Math.ceil((leastPrimary / ratio) * (windingV(output) / windingV(main))))])) }
}
