import nodemailer from 'nodemailer'

export interface OutgoingMail {
  from: string
  to: string
  messageId: string
  subject: string
  text: string
}

/** What became of a mail: taken over, refused for good, or to be tried again. */
export type MailOutcome = { kind: 'sent' } | { kind: 'refused'; reason: string } | { kind: 'failed'; reason: string }

export interface MailTransport {
  send(mail: OutgoingMail): Promise<MailOutcome>
  close(): void
}

const TIMEOUTS = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 }

export function createTransport(smtpUrl: string): MailTransport {
  const transport = nodemailer.createTransport({ url: smtpUrl, ...TIMEOUTS })
  return {
    async send({ from, to, ...mail }) {
      try {
        await transport.sendMail({ ...mail, from, to: { name: '', address: to }, disableUrlAccess: true, disableFileAccess: true })
        return { kind: 'sent' }
      } catch (error) {
        return outcomeOf(error)
      }
    },
    close: () => transport.close(),
  }
}

/** Replies from 500 on are final (RFC 5321, 4.2.1); everything else may be better later. */
function outcomeOf(error: unknown): MailOutcome {
  const reason = error instanceof Error ? error.message.slice(0, 500) : String(error)
  const code = error instanceof Error && 'responseCode' in error ? Number(error.responseCode) : 0
  return code >= 500 && code < 600 ? { kind: 'refused', reason } : { kind: 'failed', reason }
}
