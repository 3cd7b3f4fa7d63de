import { MessageStore, type StoredMessage } from './message-store'
import { startPage } from './page-server'
import { startSmtp, type MailBehaviour } from './smtp-server'

export type { MailAttempt, MailBehaviour, MailFault } from './smtp-server'
export type { StoredMessage } from './message-store'

export interface MailFakeOptions {
  /** 0 takes any free port. */
  smtpPort: number
  pagePort: number
  /** Messages are kept here and found again after a restart. */
  folder: string
  behaviour?: MailBehaviour
}

export interface MailFake {
  smtpPort: number
  pagePort: number
  /** Messages taken so far, oldest first; only those to one address if it is given. */
  messages(to?: string): Promise<StoredMessage[]>
  clear(): Promise<void>
  /** Replaces the faults that are played; none without an argument. */
  behave(behaviour?: MailBehaviour): void
  stop(): Promise<void>
}

/** A mail server on loopback that delivers nothing and shows everything. */
export async function startMailFake({ smtpPort, pagePort, folder, behaviour }: MailFakeOptions): Promise<MailFake> {
  const store = new MessageStore(folder)
  const smtp = await startSmtp(smtpPort, store, behaviour)
  const page = await startPage(pagePort, store).catch(async (error: unknown) => {
    await smtp.stop()
    throw error
  })
  return {
    smtpPort: smtp.port,
    pagePort: page.port,
    messages: (to) => store.list(to),
    clear: () => store.clear(),
    behave: smtp.behave,
    async stop() {
      await Promise.all([smtp.stop(), page.stop()])
    },
  }
}
