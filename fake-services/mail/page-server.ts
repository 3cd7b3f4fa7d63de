import { createServer, type IncomingMessage, type ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import type { MessageStore } from './message-store'
import { listPage, messagePage, missingPage } from './pages'

export interface RunningPage {
  port: number
  stop(): Promise<void>
}

interface Request {
  method: string
  parts: string[]
  to: string | undefined
}

/** The mails as pages for people and as JSON for programs. */
export async function startPage(port: number, store: MessageStore): Promise<RunningPage> {
  const server = createServer((request, response) => {
    respond(readRequest(request), response, store).catch((error: unknown) => {
      console.error(error)
      send(response, 500, 'text/plain', 'The mail could not be read.')
    })
  })
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, '127.0.0.1', resolve)
  })
  return {
    port: (server.address() as AddressInfo).port,
    async stop() {
      const closed = new Promise((resolve) => server.close(resolve))
      server.closeAllConnections()
      await closed
    },
  }
}

function readRequest({ method = 'GET', url = '/' }: IncomingMessage): Request {
  const { pathname, searchParams } = new URL(url, 'http://localhost')
  return { method, parts: pathname.split('/').filter(Boolean), to: searchParams.get('to')?.trim() || undefined }
}

async function respond({ method, parts, to }: Request, response: ServerResponse, store: MessageStore): Promise<void> {
  const [first, id = '', kind, index] = parts
  if (method === 'DELETE' && first === 'messages' && parts.length === 1) {
    await store.clear()
    return send(response, 204, 'text/plain', '')
  }
  if (method === 'POST' && first === 'clear') {
    await store.clear()
    response.writeHead(303, { location: '/' }).end()
    return
  }
  if (method !== 'GET') return send(response, 405, 'text/plain', 'Only GET, and DELETE /messages.')
  if (parts.length === 0) return sendPage(response, 200, listPage(await store.list(to), to ?? ''))
  if (first === 'messages.json') return send(response, 200, 'application/json', JSON.stringify(await store.list(to), null, 2))
  if (first === 'messages' && kind === 'source') return sendSource(response, store, id)
  if (first === 'messages' && kind === 'attachments') return sendAttachment(response, store, id, Number(index))
  if (first === 'messages' && parts.length === 2) return sendMessage(response, store, id)
  sendPage(response, 404, missingPage())
}

async function sendMessage(response: ServerResponse, store: MessageStore, name: string): Promise<void> {
  const asJson = name.endsWith('.json')
  const message = await store.get(asJson ? name.slice(0, -5) : name)
  if (!message) return sendPage(response, 404, missingPage())
  if (asJson) send(response, 200, 'application/json', JSON.stringify(message, null, 2))
  else sendPage(response, 200, messagePage(message))
}

async function sendSource(response: ServerResponse, store: MessageStore, id: string): Promise<void> {
  const source = await store.source(id)
  if (source) send(response, 200, 'text/plain', source)
  else sendPage(response, 404, missingPage())
}

async function sendAttachment(response: ServerResponse, store: MessageStore, id: string, index: number): Promise<void> {
  const found = await store.attachment(id, index)
  if (!found) return sendPage(response, 404, missingPage())
  response.setHeader('content-disposition', `attachment; filename*=UTF-8''${encodeURIComponent(found.name)}`)
  send(response, 200, 'application/octet-stream', found.content)
}

function sendPage(response: ServerResponse, status: number, html: string): void {
  // Nothing in a mail may run, load or be framed; links are the only way out.
  response.setHeader('content-security-policy', "default-src 'none'; style-src 'unsafe-inline'; form-action 'self'; frame-ancestors 'none'")
  send(response, status, 'text/html', html)
}

function send(response: ServerResponse, status: number, type: string, body: string | Buffer): void {
  const charset = type === 'application/octet-stream' ? '' : '; charset=utf-8'
  response.writeHead(status, { 'content-type': `${type}${charset}`, 'cache-control': 'no-store', 'x-content-type-options': 'nosniff', 'referrer-policy': 'no-referrer' })
  response.end(body)
}
