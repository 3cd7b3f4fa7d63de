import { search, type SearchOutcome, type SearchPreferences } from '#shared/engine/index'
import type { Library } from '#shared/engine/library'
import type { RequirementSheet } from '#shared/engine/specification'
import { parentPort, workerData } from 'node:worker_threads'

export interface SearchOrder {
  requirement: RequirementSheet
  library: Library
  preferences: SearchPreferences
  /** After this long it stops with what it has. */
  mostMs: number
}

/** The search of the engine beside the server's own thread, which goes on answering. */
const { requirement, library, preferences, mostMs } = workerData as SearchOrder
const end = performance.now() + mostMs
const outcome: SearchOutcome = search(requirement, library, preferences, () => performance.now() < end)
parentPort!.postMessage(outcome)
