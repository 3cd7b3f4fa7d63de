import { onScopeDispose, ref, shallowRef } from 'vue'
import type { SearchOutcome, SearchProgress } from '#shared/engine/index'
import type { SearchNews, SearchOrder, SearchRequest } from './search.worker'

/** Runs a search beside the page; stopped, it keeps what it has found. */
export function useSearch() {
  const outcome = shallowRef<SearchOutcome | null>(null)
  const progress = shallowRef<SearchProgress | null>(null)
  const failure = ref<string | null>(null)
  const busy = ref(false)
  let worker: Worker | null = null

  function end() {
    worker?.terminate()
    worker = null
    busy.value = false
    progress.value = null
  }

  function hear(news: SearchNews) {
    if (news.kind === 'progress') {
      progress.value = news.progress
      return
    }
    if (news.kind === 'done') outcome.value = news.outcome
    else failure.value = news.failure
    end()
  }

  function forget() {
    end()
    outcome.value = null
    failure.value = null
  }

  function run(request: SearchRequest) {
    forget()
    busy.value = true
    worker = new Worker(new URL('./search.worker.ts', import.meta.url), { type: 'module' })
    worker.onmessage = ({ data }: MessageEvent<SearchNews>) => hear(data)
    worker.onerror = ({ message }) => hear({ kind: 'failed', failure: message || 'The calculation could not be started.' })
    // What is sent must be plain data, not the page's reactive objects.
    worker.postMessage({ kind: 'start', request: JSON.parse(JSON.stringify(request)) as SearchRequest } satisfies SearchOrder)
  }

  const stop = () => worker?.postMessage({ kind: 'stop' } satisfies SearchOrder)

  onScopeDispose(end)
  return { outcome, progress, failure, busy, run, stop, forget }
}
