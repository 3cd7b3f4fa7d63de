import type { AddressInfo, Socket } from 'node:net'
import { setTimeout as sleep } from 'node:timers/promises'
import { SMTPServer, type SMTPServerSession } from 'smtp-server'
import type { MessageStore } from './message-store'

/** One try to hand over a mail, as far as the server knows it when it is asked about a recipient. */
export interface MailAttempt {
  /** 1 for the first mail since the start. */
  number: number
  from: string
  recipient: string
}

/** What can go wrong between two mail servers. */
export type MailFault =
  /** 550 for good; 450 for now. */
  | { kind: 'reject-recipient'; code?: number }
  /** The connection breaks before any of the mail was sent. */
  | { kind: 'drop-before-data' }
  /** The mail is kept, but the connection breaks before the sender hears of it. */
  | { kind: 'drop-before-accept' }
  /** The sender hears 250, then the connection breaks. */
  | { kind: 'drop-after-accept' }
  /** The answer to the mail takes its time. */
  | { kind: 'delay'; milliseconds: number }

/** Decides for each recipient of each try; undefined lets it pass. */
export type MailBehaviour = (attempt: MailAttempt) => MailFault | undefined

export interface RunningSmtp {
  port: number
  behave(behaviour?: MailBehaviour): void
  stop(): Promise<void>
}

const LARGEST_MAIL_BYTES = 25 * 1024 * 1024

class RefusedMail extends Error {
  constructor(
    readonly responseCode: number,
    message: string,
  ) {
    super(message)
  }
}

export async function startSmtp(port: number, store: MessageStore, first?: MailBehaviour): Promise<RunningSmtp> {
  const sockets = new Set<Socket>()
  const faults = new Map<string, MailFault>()
  let behaviour = first
  let attempts = 0

  const drop = ({ remotePort }: SMTPServerSession) => {
    for (const socket of sockets) if (socket.remotePort === remotePort) socket.destroy()
  }

  /** `faults` holds a session's fault from the recipient's command until the mail itself came. */
  function judgeRecipient(recipient: string, session: SMTPServerSession): Error | null | 'dropped' {
    const { mailFrom, rcptTo } = session.envelope
    if (rcptTo.length === 0) attempts += 1
    const fault = behaviour?.({ number: attempts, from: mailFrom ? mailFrom.address : '', recipient })
    if (fault?.kind === 'reject-recipient') return new RefusedMail(fault.code ?? 550, 'No such mailbox here')
    if (fault) faults.set(session.id, fault)
    if (fault?.kind !== 'drop-before-data') return null
    drop(session)
    return 'dropped'
  }

  const server = new SMTPServer({
    size: LARGEST_MAIL_BYTES,
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    logger: false,
    closeTimeout: 1000,
    onRcptTo({ address }, session, answer) {
      const verdict = judgeRecipient(address, session)
      if (verdict !== 'dropped') answer(verdict)
    },
    async onData(stream, session, answer) {
      const fault = faults.get(session.id)
      faults.delete(session.id)
      try {
        const chunks: Buffer[] = []
        for await (const chunk of stream) chunks.push(chunk as Buffer)
        if (stream.sizeExceeded) return answer(new RefusedMail(552, 'The mail is larger than this server takes'))
        const { mailFrom, rcptTo } = session.envelope
        await store.add({ from: mailFrom ? mailFrom.address : '', to: rcptTo.map(({ address }) => address) }, Buffer.concat(chunks))
        if (fault?.kind === 'drop-before-accept') return drop(session)
        if (fault?.kind === 'delay') await sleep(fault.milliseconds)
        answer(null, 'kept')
        // The answer must have left the socket before it is cut.
        if (fault?.kind === 'drop-after-accept') setTimeout(() => drop(session), 20)
      } catch (error) {
        answer(error as Error)
      }
    },
  })
  // A peer that breaks off is the peer's matter.
  server.on('error', () => {})
  server.server.on('connection', (socket: Socket) => {
    sockets.add(socket)
    socket.once('close', () => sockets.delete(socket))
  })

  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject)
    server.listen(port, '127.0.0.1', () => resolve())
  })
  return {
    port: (server.server.address() as AddressInfo).port,
    behave: (next) => (behaviour = next),
    async stop() {
      const closed = new Promise<void>((resolve) => server.close(() => resolve()))
      for (const socket of sockets) socket.destroy()
      await closed
    },
  }
}
