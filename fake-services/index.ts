/** Stands in for the outside world on a machine of one's own: a mail server that keeps every mail. */
import path from 'node:path'
import { startMailFake } from './mail/mail-fake'

function port(name: string): number {
  const value = Number(process.env[name])
  if (!Number.isInteger(value) || value < 1) throw new Error(`${name} must be a port number.`)
  return value
}

const mail = await startMailFake({
  smtpPort: port('MAIL_PORT'),
  pagePort: port('MAIL_PAGE_PORT'),
  folder: path.resolve(process.env.DATA_DIR ?? 'data', 'mail'),
})
console.log(`Mail is taken at port ${mail.smtpPort} and shown at http://localhost:${mail.pagePort}`)

async function end(): Promise<void> {
  await mail.stop()
  process.exit(0)
}

process.once('SIGTERM', end)
process.once('SIGINT', end)
// The start command is gone.
process.once('disconnect', end)
