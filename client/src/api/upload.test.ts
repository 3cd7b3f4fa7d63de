import { afterEach, describe, expect, it, vi } from 'vitest'
import { z } from 'zod'
import { defineEndpoint } from '#shared/contracts/endpoint'
import { setSessionGate } from './session-gate'
import { upload } from './upload'

const sendFile = defineEndpoint({
  method: 'POST',
  path: '/api/things/:thingId/file',
  summary: 'A file',
  access: 'signed-in',
  params: z.strictObject({ thingId: z.string() }),
  body: z.strictObject({ note: z.string(), pages: z.number() }),
  upload: { field: 'file', kinds: ['pdf'], required: true },
  response: z.object({ hash: z.string() }),
})

/** Stands in for the browser's request: answers what the test wants, in order. */
class FakeRequest {
  static answers: { status: number; body: unknown }[] = []
  static sent: { address: string; form: FormData }[] = []
  upload: { onprogress?: (event: ProgressEvent) => void } = {}
  status = 0
  responseText = ''
  onload = () => {}
  onabort = () => {}
  private address = ''

  open(_method: string, address: string) {
    this.address = address
  }

  send(form: FormData) {
    FakeRequest.sent.push({ address: this.address, form })
    const next = FakeRequest.answers.shift()
    if (!next) return
    this.upload.onprogress?.({ lengthComputable: true, loaded: 50, total: 200 } as ProgressEvent)
    this.status = next.status
    this.responseText = JSON.stringify(next.body)
    this.onload()
  }

  abort() {
    this.onabort()
  }
}

const file = new File(['%PDF'], 'quotation.pdf')
const input = { params: { thingId: '7' }, body: { note: 'signed', pages: 2 } }

describe('upload', () => {
  afterEach(() => {
    vi.unstubAllGlobals()
    setSessionGate(null)
    FakeRequest.answers = []
    FakeRequest.sent = []
  })

  it('sends the text fields before the file and reports progress', async () => {
    vi.stubGlobal('XMLHttpRequest', FakeRequest)
    FakeRequest.answers = [{ status: 200, body: { hash: 'ab' } }]
    const shares: number[] = []

    await expect(upload(sendFile, file, { onProgress: (share) => shares.push(share) }, input)).resolves.toEqual({ hash: 'ab' })
    expect([...FakeRequest.sent[0]!.form.keys()]).toEqual(['note', 'pages', 'file'])
    expect(FakeRequest.sent[0]!.form.get('pages')).toBe('2')
    expect(FakeRequest.sent[0]!.address).toBe('/api/things/7/file')
    expect(shares).toEqual([0.25])
  })

  it('sends again after signing in again', async () => {
    vi.stubGlobal('XMLHttpRequest', FakeRequest)
    setSessionGate(async () => true)
    FakeRequest.answers = [
      { status: 401, body: { code: 'not-signed-in', message: 'Sign in first.' } },
      { status: 200, body: { hash: 'ab' } },
    ]
    await expect(upload(sendFile, file, {}, input)).resolves.toEqual({ hash: 'ab' })
    expect(FakeRequest.sent).toHaveLength(2)
  })

  it('throws the refusal of the server', async () => {
    vi.stubGlobal('XMLHttpRequest', FakeRequest)
    FakeRequest.answers = [{ status: 415, body: { code: 'file-type-not-accepted', message: 'This is not a PDF.' } }]
    await expect(upload(sendFile, file, {}, input)).rejects.toMatchObject({ code: 'file-type-not-accepted', message: 'This is not a PDF.' })
  })

  it('can be stopped on the way', async () => {
    vi.stubGlobal('XMLHttpRequest', FakeRequest)
    const control = new AbortController()
    const sending = upload(sendFile, file, {}, { ...input, signal: control.signal })
    control.abort()
    await expect(sending).rejects.toMatchObject({ code: 'stopped' })
  })
})
