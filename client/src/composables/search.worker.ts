import { searchSteps, type SearchOutcome, type SearchPreferences, type SearchProgress } from '#shared/engine/index'
import type { Library } from '#shared/engine/library'
import type { RequirementSheet } from '#shared/engine/specification'

export interface SearchRequest {
  requirement: RequirementSheet
  library: Library
  preferences: SearchPreferences
}

/** What the page sends: a search, or the wish to stop it with what it has. */
export type SearchOrder = { kind: 'start'; request: SearchRequest } | { kind: 'stop' }
export type SearchNews = { kind: 'progress'; progress: SearchProgress } | { kind: 'done'; outcome: SearchOutcome } | { kind: 'failed'; failure: string }

/** Long enough for the work to get on, short enough for a stop to be heard. */
const SLICE_MS = 60

let stopped = false
const breath = () => new Promise<void>((resolve) => setTimeout(resolve))

async function run({ requirement, library, preferences }: SearchRequest): Promise<SearchOutcome> {
  const steps = searchSteps(requirement, library, preferences)
  let since = performance.now()
  let step = steps.next()
  while (!step.done) {
    if (performance.now() - since > SLICE_MS) {
      postMessage({ kind: 'progress', progress: step.value } satisfies SearchNews)
      await breath()
      since = performance.now()
    }
    step = steps.next(stopped)
  }
  return step.value
}

addEventListener('message', ({ data }: MessageEvent<SearchOrder>) => {
  if (data.kind === 'stop') {
    stopped = true
    return
  }
  run(data.request).then(
    (outcome) => postMessage({ kind: 'done', outcome } satisfies SearchNews),
    (error: unknown) => postMessage({ kind: 'failed', failure: error instanceof Error ? error.message : String(error) } satisfies SearchNews),
  )
})
