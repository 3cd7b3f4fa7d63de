import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync } from 'node:fs'
import { readFile, readdir, rename, rm, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { simpleParser, type ParsedMail } from 'mailparser'

export interface Envelope {
  from: string
  to: string[]
}

export interface StoredAttachment {
  name: string
  contentType: string
  sizeBytes: number
}

export interface StoredMessage {
  id: string
  receivedAt: string
  /** Whom the sending server named; the headers are what a reader sees. */
  envelope: Envelope
  messageId: string | null
  from: string
  to: string
  subject: string
  text: string
  html: string | null
  /** Web addresses of the text, in their order. */
  links: string[]
  headers: { name: string; value: string }[]
  attachments: StoredAttachment[]
}

const ID = /^\d{13}-[0-9a-f]{8}$/
export const LINK = /https?:\/\/[^\s<>"']*[^\s<>"'.,;:!?)\]]/g

/** Each mail is two files: its bytes as they came, and the envelope, whose presence says that both are whole. */
export class MessageStore {
  readonly #folder: string
  readonly #parsed = new Map<string, Promise<StoredMessage>>()
  #lastTime = 0

  constructor(folder: string) {
    this.#folder = folder
    mkdirSync(folder, { recursive: true, mode: 0o700 })
  }

  async add(envelope: Envelope, bytes: Buffer): Promise<string> {
    // Two mails of one millisecond keep their order.
    this.#lastTime = Math.max(Date.now(), this.#lastTime + 1)
    const id = `${this.#lastTime}-${randomBytes(4).toString('hex')}`
    await writeFile(this.#file(id, 'eml'), bytes, { mode: 0o600 })
    const whole = this.#file(id, 'json')
    await writeFile(`${whole}.new`, JSON.stringify(envelope), { mode: 0o600 })
    await rename(`${whole}.new`, whole)
    return id
  }

  /** Oldest first. An address is compared without regard to case. */
  async list(to?: string): Promise<StoredMessage[]> {
    const names = (await readdir(this.#folder)).filter((name) => name.endsWith('.json')).sort()
    const messages = await Promise.all(names.map((name) => this.get(path.basename(name, '.json'))))
    const wanted = to?.trim().toLowerCase()
    const isWanted = (message: StoredMessage) => !wanted || message.envelope.to.some((address) => address.toLowerCase() === wanted)
    return messages.filter((message) => message !== undefined).filter(isWanted)
  }

  async get(id: string): Promise<StoredMessage | undefined> {
    if (!this.#has(id)) return undefined
    const known = this.#parsed.get(id) ?? this.#read(id)
    this.#parsed.set(id, known)
    return known
  }

  async source(id: string): Promise<Buffer | undefined> {
    return this.#has(id) ? readFile(this.#file(id, 'eml')) : undefined
  }

  async attachment(id: string, index: number): Promise<{ name: string; content: Buffer } | undefined> {
    const source = await this.source(id)
    if (!source) return undefined
    const found = (await simpleParser(source)).attachments[index]
    return found && { name: found.filename ?? `attachment-${index + 1}`, content: found.content }
  }

  async clear(): Promise<void> {
    for (const name of await readdir(this.#folder)) await rm(path.join(this.#folder, name), { force: true })
    this.#parsed.clear()
  }

  #file(id: string, kind: 'eml' | 'json'): string {
    return path.join(this.#folder, `${id}.${kind}`)
  }

  #has(id: string): boolean {
    return ID.test(id) && existsSync(this.#file(id, 'json'))
  }

  async #read(id: string): Promise<StoredMessage> {
    const envelope = JSON.parse(await readFile(this.#file(id, 'json'), 'utf8')) as Envelope
    return describe(id, envelope, await simpleParser(await readFile(this.#file(id, 'eml')), { skipHtmlToText: true, skipTextToHtml: true }))
  }
}

function describe(id: string, envelope: Envelope, mail: ParsedMail): StoredMessage {
  const text = mail.text ?? ''
  const recipients = mail.to === undefined ? [] : [mail.to].flat()
  return {
    id,
    receivedAt: new Date(Number(id.slice(0, 13))).toISOString(),
    envelope,
    messageId: mail.messageId ?? null,
    from: mail.from?.text ?? '',
    to: recipients.map((recipient) => recipient.text).join(', '),
    subject: mail.subject ?? '',
    text,
    html: mail.html || null,
    links: text.match(LINK) ?? [],
    headers: mail.headerLines.map(({ key, line }) => ({ name: line.slice(0, key.length), value: line.slice(key.length + 1).trim() })),
    attachments: mail.attachments.map((part, index) => ({
      name: part.filename ?? `attachment-${index + 1}`,
      contentType: part.contentType,
      sizeBytes: part.size,
    })),
  }
}
