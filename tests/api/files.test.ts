import * as contract from '#shared/contracts/people'
import { createHash } from 'node:crypto'
import { readdir } from 'node:fs/promises'
import { createServer, request as httpRequest, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildCompany, buildPerson, buildWorld } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>
let server: Server

beforeAll(async () => {
  test = await startTestApp({ UPLOAD_LIMIT_BYTES: 1024 * 1024 })
  world = await buildWorld(test)
  server = createServer(test.app).listen(0, '127.0.0.1')
})
afterAll(async () => {
  server.close()
  await test.stop()
})

const PDF = Buffer.from('%PDF-1.7\n1 0 obj\n<<>>\nendobj\ntrailer\n<<>>\n%%EOF\n')
const PNG = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13])
const vendorId = () => world.vendors[0]!.company.id

const upload = (name: string, content: Buffer | string, as = world.buyer.cookie) =>
  request(test.app, contract.uploadAgreement, { as, params: { vendorId: vendorId() }, file: { name, content } })
const download = (as: string) => request(test.app, contract.downloadAgreement, { as, params: { vendorId: vendorId() } })
const storedFiles = async () => (await test.database.query('SELECT id FROM files')).length
const staged = () => readdir(test.ctx.files.stagingFolder).catch(() => [])

describe('an upload', () => {
  it('is kept under the hash of its bytes and comes back byte for byte, as an attachment', async () => {
    const { body } = await upload('Vertraulichkeit – Zell­märk.pdf', PDF).expect(200)
    expect(body.agreementFileName).toContain('Vertraulichkeit')
    const sha256 = createHash('sha256').update(PDF).digest('hex')
    expect(await test.ctx.files.has(sha256)).toBe(true)
    const answer = await download(world.buyer.cookie).buffer(true).parse((res, done) => {
      const chunks: Buffer[] = []
      res.on('data', (chunk: Buffer) => chunks.push(chunk)).on('end', () => done(null, Buffer.concat(chunks)))
    })
    expect(answer.status).toBe(200)
    expect(answer.body).toEqual(PDF)
    expect(answer.headers).toMatchObject({ 'content-type': 'application/pdf', 'x-content-type-options': 'nosniff', 'cache-control': 'private, no-store' })
    expect(answer.headers['content-disposition']).toMatch(/^attachment; filename="[\x20-\x7e]+"; filename\*=UTF-8''Vertraulichkeit/)
  })

  it.each([
    ['nothing in it', 'empty.pdf', '', 400, 'file-empty'],
    ['a name that says something else', 'agreement.docx', PDF, 400, 'file-name-mismatch'],
    ['a picture called PDF', 'agreement.pdf', PNG, 400, 'file-name-mismatch'],
    ['content of no known kind', 'agreement.pdf', Buffer.from([0, 1, 2, 3, 4]), 415, 'file-type-not-accepted'],
    ['a known kind that is not asked for here', 'list.csv', 'a;b\n1;2\n', 415, 'file-type-not-accepted'],
    ['a program called PDF', 'agreement.pdf', Buffer.from('MZ\x90\x00'), 415, 'file-type-not-accepted'],
    ['its end missing', 'agreement.pdf', '%PDF-1.7\n1 0 obj', 400, 'file-unreadable'],
    ['an archive that was cut off', 'agreement.docx', Buffer.from([0x50, 0x4b, 3, 4, 20, 0, 0, 0]), 400, 'file-unreadable'],
    ['more bytes than the limit', 'agreement.pdf', Buffer.alloc(1024 * 1024 + 1, '%PDF-'), 413, 'file-too-large'],
  ])('with %s is refused, and nothing is stored', async (_, name, content, status, code) => {
    const before = await storedFiles()
    const answer = await upload(name, content)
    expect([answer.status, answer.body.code]).toEqual([status, code])
    expect(answer.body.message.length).toBeGreaterThan(20)
    expect(await storedFiles()).toBe(before)
    expect(await staged()).toEqual([])
  })

  it('without a file is refused with a sentence', async () => {
    const answer = await request(test.app, contract.uploadAgreement, { as: world.buyer.cookie, params: { vendorId: vendorId() } }).field('x', '1')
    expect([answer.status, answer.body.code]).toEqual([400, 'file-missing'])
  })

  it('of 100 MB is refused while it is still coming, with an answer that the sender can read', async () => {
    const { status, body } = await sendLarge(100)
    expect([status, JSON.parse(body).code]).toEqual([413, 'file-too-large'])
    expect(await staged()).toEqual([])
  })

  it('that breaks off leaves nothing behind', async () => {
    await breakOff()
    await expect.poll(staged, { timeout: 5000 }).toEqual([])
  })

  it('to another company’s vendor is not found and leaves no row', async () => {
    const stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['buyer'])
    const before = await storedFiles()
    expect((await upload('agreement.pdf', PDF, stranger.cookie)).body.code).toBe('not-found')
    expect(await storedFiles()).toBe(before)
  })
})

describe('a download', () => {
  it('asks for the right anew each time', async () => {
    await upload('agreement.pdf', PDF).expect(200)
    const stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['buyer'])
    expect((await download(world.approver.cookie)).status).toBe(200)
    expect((await download(world.admin.cookie)).status).toBe(403)
    expect((await download(stranger.cookie)).status).toBe(404)
    expect((await download(world.vendors[0]!.person.cookie)).status).toBe(403)
    await test.database.query('DELETE FROM sessions WHERE user_id = $1', [world.approver.personId])
    expect((await download(world.approver.cookie)).status).toBe(401)
  })
})

const BOUNDARY = 'form-boundary'
const HEAD = `--${BOUNDARY}\r\ncontent-disposition: form-data; name="file"; filename="large.pdf"\r\ncontent-type: application/pdf\r\n\r\n%PDF-1.7\n`

function open() {
  const { port } = server.address() as AddressInfo
  return httpRequest({
    port,
    host: '127.0.0.1',
    method: 'POST',
    path: `/api/vendors/${vendorId()}/agreement`,
    headers: { cookie: world.buyer.cookie, origin: `http://127.0.0.1:${port}`, 'content-type': `multipart/form-data; boundary=${BOUNDARY}` },
  })
}

function sendLarge(megabytes: number): Promise<{ status: number; body: string }> {
  return new Promise((resolve, reject) => {
    const sending = open()
    sending.on('error', reject).on('response', (answer) => {
      let body = ''
      answer.setEncoding('utf8').on('data', (text: string) => (body += text)).on('end', () => resolve({ status: answer.statusCode!, body }))
    })
    sending.write(HEAD)
    const block = Buffer.alloc(1024 * 1024, 'x')
    for (let i = 0; i < megabytes; i += 1) sending.write(block)
    sending.end(`\r\n--${BOUNDARY}--\r\n`)
  })
}

function breakOff(): Promise<void> {
  return new Promise((resolve) => {
    const sending = open()
    sending.on('error', () => resolve())
    sending.write(HEAD)
    sending.write(Buffer.alloc(64 * 1024, 'x'), () => setTimeout(() => sending.destroy(new Error('gone')), 100))
  })
}
