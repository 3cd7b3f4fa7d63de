import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { z } from 'zod'
import { defineEndpoint } from '#shared/contracts/endpoint'
import { call, fileNameOf } from './call'
import { setSessionGate } from './session-gate'

const readThing = defineEndpoint({
  method: 'GET',
  path: '/api/things/:thingId',
  summary: 'One thing',
  access: 'signed-in',
  params: z.strictObject({ thingId: z.string() }),
  query: z.strictObject({ limit: z.coerce.number().optional() }),
  response: z.object({ name: z.string() }),
})
const writeThing = defineEndpoint({
  method: 'POST',
  path: '/api/things',
  summary: 'A new thing',
  access: 'signed-in',
  body: z.strictObject({ name: z.string() }),
  response: z.object({ name: z.string() }),
})

const answer = (status: number, body: unknown) => new Response(JSON.stringify(body), { status })
const ended = () => answer(401, { code: 'not-signed-in', message: 'Sign in first.' })

describe('call', () => {
  const fetching = vi.fn<typeof fetch>()

  beforeEach(() => vi.stubGlobal('fetch', fetching))
  afterEach(() => {
    vi.unstubAllGlobals()
    fetching.mockReset()
    setSessionGate(null)
  })

  it('fills parameters and query into the address of the contract', async () => {
    fetching.mockResolvedValue(answer(200, { name: 'core', extra: 1 }))
    await expect(call(readThing, { params: { thingId: 'a/b' }, query: { limit: 5 } })).resolves.toEqual({ name: 'core' })
    expect(fetching.mock.calls[0]![0]).toBe('/api/things/a%2Fb?limit=5')
    expect(fetching.mock.calls[0]![1]).not.toHaveProperty('body')
  })

  it('sends the body as JSON', async () => {
    fetching.mockResolvedValue(answer(200, { name: 'core' }))
    await call(writeThing, { body: { name: 'core' } })
    expect(fetching.mock.calls[0]![1]).toMatchObject({ method: 'POST', body: '{"name":"core"}', headers: { 'content-type': 'application/json' } })
  })

  it('throws code, sentence and fields of a refusal', async () => {
    fetching.mockResolvedValue(answer(400, { code: 'invalid-input', message: 'Look at the name.', fields: { name: 'It is missing.' }, requestId: 'r1' }))
    await expect(call(writeThing, { body: { name: '' } })).rejects.toMatchObject({ code: 'invalid-input', message: 'Look at the name.', fields: { name: 'It is missing.' }, requestId: 'r1' })
  })

  it('calls a lost connection and a page of a proxy the same', async () => {
    fetching.mockRejectedValueOnce(new TypeError('Failed to fetch'))
    await expect(call(readThing, { params: { thingId: '1' } })).rejects.toMatchObject({ code: 'no-connection' })
    fetching.mockResolvedValueOnce(new Response('<html>Bad gateway</html>', { status: 502 }))
    await expect(call(readThing, { params: { thingId: '1' } })).rejects.toMatchObject({ code: 'no-connection' })
  })

  it('tells an answer that does not fit the contract from a refusal', async () => {
    fetching.mockResolvedValue(answer(200, { title: 'core' }))
    await expect(call(readThing, { params: { thingId: '1' } })).rejects.toMatchObject({ code: 'answer-unreadable' })
  })

  it('says stopped when the caller stops it', async () => {
    const control = new AbortController()
    fetching.mockImplementation(async () => {
      control.abort()
      throw new DOMException('aborted', 'AbortError')
    })
    await expect(call(readThing, { params: { thingId: '1' }, signal: control.signal })).rejects.toMatchObject({ code: 'stopped' })
  })

  it('asks once for several calls whose session has ended, and repeats each of them', async () => {
    const ask = vi.fn(async () => true)
    setSessionGate(ask)
    let refused = 0
    fetching.mockImplementation(async () => (refused++ < 2 ? ended() : answer(200, { name: 'core' })))

    const both = await Promise.all([call(writeThing, { body: { name: 'a' } }), call(writeThing, { body: { name: 'b' } })])
    expect(both).toEqual([{ name: 'core' }, { name: 'core' }])
    expect(ask).toHaveBeenCalledTimes(1)
    expect(fetching.mock.calls.slice(2).map(([, init]) => init!.body)).toEqual(['{"name":"a"}', '{"name":"b"}'])
  })

  it('gives up when the person does not sign in again', async () => {
    setSessionGate(async () => false)
    fetching.mockResolvedValue(ended())
    await expect(call(writeThing, { body: { name: 'a' } })).rejects.toMatchObject({ code: 'not-signed-in' })
    expect(fetching).toHaveBeenCalledTimes(1)
  })

  it('does not take a wrong password for an ended session', async () => {
    const ask = vi.fn(async () => true)
    setSessionGate(ask)
    fetching.mockResolvedValue(answer(401, { code: 'sign-in-refused', message: 'They do not fit together.' }))
    await expect(call(writeThing, { body: { name: 'a' } })).rejects.toMatchObject({ code: 'sign-in-refused' })
    expect(ask).not.toHaveBeenCalled()
  })
})

describe('fileNameOf', () => {
  it.each([
    [`attachment; filename="a.pdf"; filename*=UTF-8''%C3%9Cbertrager%20B.pdf`, 'Übertrager B.pdf'],
    ['attachment; filename="BMP-1042 B.pdf"', 'BMP-1042 B.pdf'],
    [`attachment; filename*=UTF-8''%E0%A4%A`, 'file'],
    [null, 'file'],
  ])('reads %s', (header, name) => {
    expect(fileNameOf(header)).toBe(name)
  })
})
