import { ref } from 'vue'
import type { Endpoint } from '#shared/contracts/endpoint'
import type { CallArguments } from '@/api/call'
import { upload } from '@/api/upload'

/** One upload at a time with its progress; `stop` ends it and nothing is stored. */
export function useUpload<E extends Endpoint>(endpoint: E) {
  const progress = ref<number | null>(null)
  let control: AbortController | null = null

  async function send(file: File | null, ...[input]: CallArguments<E>) {
    control = new AbortController()
    progress.value = 0
    const onProgress = (share: number) => (progress.value = share)
    try {
      const withSignal = [{ ...input, signal: control.signal }] as unknown as CallArguments<E>
      return await upload(endpoint, file, { onProgress }, ...withSignal)
    } finally {
      progress.value = null
    }
  }

  return { progress, send, stop: () => control?.abort() }
}
