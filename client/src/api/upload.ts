import type { Endpoint, ResponseOf } from '#shared/contracts/endpoint'
import { answerUnreadable, ApiError, noConnection, stopped } from './api-error'
import { callAddress, readAnswer, readFailure, type CallArguments, type LooseInput } from './call'
import { passSessionGate } from './session-gate'

export interface UploadOptions {
  /** Share of the bytes that have left, from 0 to 1. */
  onProgress?: (share: number) => void
}

function formOf(endpoint: Endpoint, file: File | null, body: unknown): FormData {
  if (!endpoint.upload) throw new RangeError(`takes no file: ${endpoint.path}`)
  const form = new FormData()
  for (const [key, value] of Object.entries((body ?? {}) as Record<string, unknown>)) {
    if (value !== undefined) form.append(key, typeof value === 'string' ? value : JSON.stringify(value))
  }
  // The file goes last: the server has read the text fields when it begins to store.
  if (file) form.append(endpoint.upload.field, file, file.name)
  return form
}

/** fetch cannot tell how much has been sent, hence the older interface. */
function sendForm(endpoint: Endpoint, input: LooseInput, form: FormData, { onProgress }: UploadOptions): Promise<string> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest()
    request.open(endpoint.method, callAddress(endpoint, input))
    request.upload.onprogress = (event) => {
      if (event.lengthComputable) onProgress?.(event.loaded / event.total)
    }
    request.onload = () => {
      if (request.status >= 200 && request.status < 300) resolve(request.responseText)
      else reject(readFailure(request.responseText))
    }
    request.onerror = () => reject(noConnection())
    request.onabort = () => reject(stopped())
    input.signal?.addEventListener('abort', () => request.abort(), { once: true })
    if (input.signal?.aborted) reject(stopped())
    else request.send(form)
  })
}

/** Sends one file with its text fields as a multipart form, with progress; can be stopped by `signal`. */
export async function upload<E extends Endpoint>(
  endpoint: E,
  file: File | null,
  options: UploadOptions,
  ...[input]: CallArguments<E>
): Promise<ResponseOf<E>> {
  const loose: LooseInput = input ?? {}
  const form = formOf(endpoint, file, loose.body)
  const text = await sendForm(endpoint, loose, form, options).catch(async (failure: unknown) => {
    const ended = failure instanceof ApiError && failure.code === 'not-signed-in'
    if (!ended || !(await passSessionGate())) throw failure
    return sendForm(endpoint, loose, form, options)
  })
  try {
    return readAnswer(endpoint, JSON.parse(text))
  } catch (failure) {
    throw failure instanceof ApiError ? failure : answerUnreadable()
  }
}
