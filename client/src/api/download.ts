import type { Endpoint } from '#shared/contracts/endpoint'
import { callForFile, type CallArguments } from './call'

/** Hands content to the browser's own way of saving files. */
export function saveFile(name: string, content: Blob): void {
  const address = URL.createObjectURL(content)
  const link = document.createElement('a')
  link.href = address
  link.download = name
  link.click()
  // The browser still reads the address after the click has returned.
  setTimeout(() => URL.revokeObjectURL(address), 60_000)
}

/** Fetches a file and saves it; a refusal is an ApiError like that of any other call. */
export async function download<E extends Endpoint>(endpoint: E, ...input: CallArguments<E>): Promise<void> {
  const { name, content } = await callForFile(endpoint, ...input)
  saveFile(name, content)
}
