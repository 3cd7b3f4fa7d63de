/**
 * How long the engine takes, as a multiple of a fixed arithmetic loop on the same machine, so that figures of two
 * machines, or of a busy and an idle one, compare. Prints a table and writes it as JSON.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { evaluate, propose } from '#shared/engine/index'

const FOLDER = fileURLToPath(new URL('../../node_modules/.cache/bench/', import.meta.url))

/** A million dependent multiplications and additions: the unit of the table. */
function arithmeticLoop(): number {
  let value = 1
  for (let index = 0; index < 1_000_000; index++) value = value * 0.999_999 + 1e-6
  return value
}

/** Least time of several runs, ms: what the work costs when nothing disturbs it. */
function leastMs(work: () => unknown, runs: number): number {
  work()
  let least = Infinity
  for (let run = 0; run < runs; run++) {
    const start = performance.now()
    work()
    least = Math.min(least, performance.now() - start)
  }
  return least
}

const library = shippedLibrary()
const [buoy, harbour, coupled] = [BUOY_SUPPLY, HARBOUR_SUPPLY, COUPLED_INDUCTOR].map((sheet) => propose(sheet, library).document)
const CASES: [name: string, work: () => unknown, runs: number][] = [
  ['evaluate, four windings', () => evaluate(buoy!, library), 60],
  ['evaluate with working, four windings', () => evaluate(buoy!, library, { working: true }), 60],
  ['evaluate, mains, three windings', () => evaluate(harbour!, library), 60],
  ['evaluate, coupled inductor', () => evaluate(coupled!, library), 60],
  ['propose, four windings', () => propose(BUOY_SUPPLY, library), 3],
  ['propose, mains', () => propose(HARBOUR_SUPPLY, library), 3],
]

const unitMs = leastMs(arithmeticLoop, 60)
const rows = CASES.map(([name, work, runs]) => {
  const ms = leastMs(work, runs)
  return { name, ms, ratio: ms / unitMs }
})
console.log(`engine: multiples of a loop of a million multiplications and additions (${unitMs.toFixed(2)} ms here)`)
for (const { name, ms, ratio } of rows) console.log(`${name.padEnd(40)} ${ratio.toFixed(1).padStart(8)}  ${ms.toFixed(1).padStart(8)} ms`)
mkdirSync(FOLDER, { recursive: true })
writeFileSync(`${FOLDER}engine.json`, `${JSON.stringify({ unitMs, rows }, null, 2)}\n`)
