import { onScopeDispose, ref, shallowRef } from 'vue'
import type { TestCoverage } from '#shared/engine/index'
import type { CoverageAnswer, CoverageRequest } from './coverage.worker'

/** What the test table finds, reckoned beside the page: every fault is an evaluation of its own. */
export function useCoverage() {
  const coverage = shallowRef<TestCoverage | null>(null)
  const failure = ref<string | null>(null)
  const busy = ref(false)
  let worker: Worker | null = null

  function stop() {
    worker?.terminate()
    worker = null
    busy.value = false
  }

  function hear(answer: CoverageAnswer) {
    if ('coverage' in answer) coverage.value = answer.coverage
    else failure.value = answer.failure
    stop()
  }

  function run(request: CoverageRequest) {
    stop()
    failure.value = null
    busy.value = true
    worker = new Worker(new URL('./coverage.worker.ts', import.meta.url), { type: 'module' })
    worker.onmessage = ({ data }: MessageEvent<CoverageAnswer>) => hear(data)
    worker.onerror = ({ message }) => hear({ failure: message || 'The calculation could not be started.' })
    worker.postMessage(JSON.parse(JSON.stringify(request)))
  }

  onScopeDispose(stop)
  return { coverage, failure, busy, run, stop }
}
