import { onScopeDispose, ref, shallowRef } from 'vue'
import type { Proposal } from '#shared/engine/index'
import type { ProposalAnswer, ProposalRequest } from './propose.worker'

/** Runs a proposal beside the page, so that it can be stopped. */
export function useProposal() {
  const proposal = shallowRef<Proposal | null>(null)
  const failure = ref<string | null>(null)
  const busy = ref(false)
  let worker: Worker | null = null

  function stop() {
    worker?.terminate()
    worker = null
    busy.value = false
  }

  function finish(answer: ProposalAnswer) {
    if ('proposal' in answer) proposal.value = answer.proposal
    else failure.value = answer.failure
    stop()
  }

  function run(request: ProposalRequest) {
    stop()
    proposal.value = null
    failure.value = null
    busy.value = true
    worker = new Worker(new URL('./propose.worker.ts', import.meta.url), { type: 'module' })
    worker.onmessage = ({ data }: MessageEvent<ProposalAnswer>) => finish(data)
    worker.onerror = ({ message }) => finish({ failure: message || 'The calculation could not be started.' })
    // What is sent must be plain data, not the page's reactive objects.
    worker.postMessage(JSON.parse(JSON.stringify(request)))
  }

  function forget() {
    stop()
    proposal.value = null
    failure.value = null
  }

  onScopeDispose(stop)
  return { proposal, failure, busy, run, stop, forget }
}
