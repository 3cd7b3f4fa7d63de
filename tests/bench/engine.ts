/**
 * How long the engine takes, as a multiple of a fixed arithmetic loop on the same machine, so that figures of two
 * machines, or of a busy and an idle one, compare. Prints a table and writes it as JSON.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { setFlagsFromString } from 'node:v8'
import { runInNewContext } from 'node:vm'
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

/** Times of several runs in ascending order, ms. */
function timesMs(work: () => unknown, runs: number): number[] {
  work()
  work()
  return Array.from({ length: runs }, () => {
    const start = performance.now()
    work()
    return performance.now() - start
  }).sort((a, b) => a - b)
}

/** Time that a share of the runs keeps. */
const percentile = (ascending: readonly number[], share: number) => ascending[Math.min(ascending.length - 1, Math.ceil(share * ascending.length) - 1)]!

setFlagsFromString('--expose-gc')
const collectGarbage = runInNewContext('gc') as () => void

/** Bytes that one run allocates on the heap: growth after a collection, median of several, runs that were collected amid left out. */
function allocatedBytes(work: () => unknown): number {
  const grown = Array.from({ length: 9 }, () => {
    collectGarbage()
    const before = process.memoryUsage().heapUsed
    work()
    return process.memoryUsage().heapUsed - before
  })
  return percentile(grown.filter((bytes) => bytes > 0).sort((a, b) => a - b), 0.5)
}

const library = shippedLibrary()
const [buoy, harbour, coupled] = [BUOY_SUPPLY, HARBOUR_SUPPLY, COUPLED_INDUCTOR].map((sheet) => propose(sheet, library).document)
const CASES: [name: string, work: () => unknown, runs: number][] = [
  ['evaluate, four windings', () => evaluate(buoy!, library), 100],
  ['evaluate with working, four windings', () => evaluate(buoy!, library, { working: true }), 100],
  ['evaluate, mains, three windings', () => evaluate(harbour!, library), 100],
  ['evaluate, coupled inductor', () => evaluate(coupled!, library), 100],
  ['propose, four windings', () => propose(BUOY_SUPPLY, library), 3],
  ['propose, mains', () => propose(HARBOUR_SUPPLY, library), 3],
]

/** A frame of a screen of 60 Hz, in which an evaluation answers while somebody types. */
const FRAME_MS = 1000 / 60

const unitMs = percentile(timesMs(arithmeticLoop, 60), 0.5)
const rows = CASES.map(([name, work, runs]) => {
  const times = timesMs(work, runs)
  const [p50Ms, p95Ms] = [percentile(times, 0.5), percentile(times, 0.95)]
  return { name, p50Ms, p95Ms, p50Ratio: p50Ms / unitMs, p95Ratio: p95Ms / unitMs, allocatedBytes: allocatedBytes(work) }
})
console.log(`engine: multiples of a loop of a million multiplications and additions (median ${unitMs.toFixed(2)} ms here)`)
console.log(`${''.padEnd(38)}${['p50', 'p95', 'p50 ms', 'p95 ms', 'MB'].map((head) => head.padStart(10)).join('')}`)
for (const { name, p50Ms, p95Ms, p50Ratio, p95Ratio, allocatedBytes: bytes } of rows) {
  const figures = [p50Ratio, p95Ratio, p50Ms, p95Ms, bytes / 1e6].map((figure) => figure.toFixed(1).padStart(10)).join('')
  console.log(`${name.padEnd(38)}${figures}`)
}
console.log(`evaluate of four windings within one frame of ${FRAME_MS.toFixed(1)} ms at p95: ${rows[0]!.p95Ms <= FRAME_MS ? 'yes' : 'no'}`)
mkdirSync(FOLDER, { recursive: true })
writeFileSync(`${FOLDER}engine.json`, `${JSON.stringify({ unitMs, rows }, null, 2)}\n`)
