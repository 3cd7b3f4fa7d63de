import { mkdtemp, rm } from 'node:fs/promises'
import { connect } from 'node:net'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { createTransport, type SendMailOptions } from 'nodemailer'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { startMailFake, type MailBehaviour, type MailFake } from './mail-fake'

const LETTER: SendMailOptions = {
  from: 'Dotside <no-reply@dotside.example>',
  to: 'ines@quillon.example',
  subject: 'Invitation to quote',
  messageId: '<event-1@dotside.example>',
  text: 'Follow https://dotside.example/invitations/a1?b=2&c=3.\nIt ends on Friday.',
}

let folder: string
let fake: MailFake

const start = (behaviour?: MailBehaviour) => startMailFake({ smtpPort: 0, pagePort: 0, folder, behaviour })

function send(letter: SendMailOptions = LETTER) {
  const transport = createTransport({ host: '127.0.0.1', port: fake.smtpPort, secure: false, ignoreTLS: true })
  return transport.sendMail(letter).finally(() => transport.close())
}

const get = (address: string, init?: RequestInit) => fetch(`http://127.0.0.1:${fake.pagePort}${address}`, init)

beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'mail-fake-'))
  fake = await start()
})

afterEach(async () => {
  await fake.stop()
  await rm(folder, { recursive: true })
})

describe('a mail that was handed over', () => {
  it('is listed with its envelope, Message-ID, text and links', async () => {
    await send()
    expect(await fake.messages()).toMatchObject([
      {
        envelope: { from: 'no-reply@dotside.example', to: ['ines@quillon.example'] },
        messageId: '<event-1@dotside.example>',
        subject: 'Invitation to quote',
        links: ['https://dotside.example/invitations/a1?b=2&c=3'],
      },
    ])
  })

  it('is found again after a restart', async () => {
    await send()
    await fake.stop()
    fake = await start()
    expect((await fake.messages()).map(({ subject }) => subject)).toEqual(['Invitation to quote'])
  })

  it('is found by its recipient only, in any case of letters', async () => {
    await send()
    await send({ ...LETTER, to: 'piet@tamsen.example' })
    const found = (await (await get('/messages.json?to=PIET@tamsen.example')).json()) as { to: string }[]
    expect(found.map(({ to }) => to)).toEqual(['piet@tamsen.example'])
  })

  it('is gone after DELETE /messages', async () => {
    await send()
    expect((await get('/messages', { method: 'DELETE' })).status).toBe(204)
    expect(await fake.messages()).toEqual([])
  })

  it('gives back an attachment byte for byte, as a download', async () => {
    const content = Buffer.from([0, 255, 10, 13, 10])
    await send({ ...LETTER, attachments: [{ filename: 'drawing µ.pdf', content }] })
    const [message] = await fake.messages()
    const answer = await get(`/messages/${message!.id}/attachments/0`)
    expect(Buffer.from(await answer.arrayBuffer())).toEqual(content)
    expect(answer.headers.get('content-disposition')).toBe("attachment; filename*=UTF-8''drawing%20%C2%B5.pdf")
  })

  it('is shown with its links to follow and its markup harmless', async () => {
    await send({ ...LETTER, subject: '<b>5 & 6</b>', text: '<script>alert(1)</script> https://dotside.example/?q=<i>', html: '<img src=x onerror=alert(2)>' })
    const [message] = await fake.messages()
    const html = await (await get(`/messages/${message!.id}`)).text()
    expect(html).toContain('<h1>&lt;b&gt;5 &amp; 6&lt;/b&gt;</h1>')
    expect(html).toContain('<a href="https://dotside.example/?q=" rel="noreferrer">')
    expect(html).not.toMatch(/<script|<img|<i>/)
  })
})

it.each(['/messages/1', '/messages/../index.ts', '/messages/1234567890123-00000000', '/messages/1234567890123-00000000/attachments/0', '/elsewhere'])('answers %s with 404', async (address) => {
  expect((await get(address)).status).toBe(404)
})

describe('played faults', () => {
  it('rejects one recipient for good and keeps the mail for the other', async () => {
    fake.behave(({ recipient }) => (recipient.startsWith('gone@') ? { kind: 'reject-recipient' } : undefined))
    const sent = await send({ ...LETTER, to: ['gone@quillon.example', 'ines@quillon.example'] })
    expect(sent.rejected).toEqual(['gone@quillon.example'])
    expect((await fake.messages()).map(({ envelope }) => envelope.to)).toEqual([['ines@quillon.example']])
  })

  it('rejects a recipient for now with the code asked for', async () => {
    fake.behave(() => ({ kind: 'reject-recipient', code: 450 }))
    await expect(send()).rejects.toMatchObject({ responseCode: 450 })
  })

  it('drops the first connection before the data and takes the second try', async () => {
    fake.behave(({ number }) => (number === 1 ? { kind: 'drop-before-data' } : undefined))
    await expect(send()).rejects.toThrow()
    expect(await fake.messages()).toEqual([])
    await send()
    expect(await fake.messages()).toHaveLength(1)
  })

  it('keeps a mail whose sender never heard of it', async () => {
    fake.behave(() => ({ kind: 'drop-before-accept' }))
    await expect(send()).rejects.toThrow()
    expect(await fake.messages()).toHaveLength(1)
  })

  it('keeps a mail whose sender heard 250 before the connection broke', async () => {
    fake.behave(() => ({ kind: 'drop-after-accept' }))
    expect((await send()).response).toMatch(/^250 /)
    expect(await fake.messages()).toHaveLength(1)
  })

  it('answers late when told to', async () => {
    fake.behave(() => ({ kind: 'delay', milliseconds: 150 }))
    const begin = performance.now()
    await send()
    expect(performance.now() - begin).toBeGreaterThan(140)
  })

  it('keeps nothing of a mail that broke off in the middle', async () => {
    const socket = connect(fake.smtpPort, '127.0.0.1')
    const lines = ['EHLO me', 'MAIL FROM:<a@b.example>', 'RCPT TO:<c@d.example>', 'DATA', 'Subject: half']
    for await (const answer of socket) {
      if (/^250-/.test(String(answer)) && !/^250 /m.test(String(answer))) continue
      socket.write(`${lines.shift()}\r\n`)
      if (lines.length === 0) break
    }
    socket.destroy()
    await new Promise((resolve) => setTimeout(resolve, 100))
    expect(await fake.messages()).toEqual([])
  })
})
