import { closeDatabase, openDatabase } from './db/client'
import { asWorker } from './db/as-actor'
import { verifyChain } from './services/audit/chain'

const url = process.env.DATABASE_WORKER_URL
if (!url) throw new Error('DATABASE_WORKER_URL is not set.')
const database = openDatabase({ DATABASE_AUTH_URL: url, DATABASE_APP_URL: url, DATABASE_WORKER_URL: url })
const { linked, broken, head } = await asWorker({ database }, verifyChain)
await closeDatabase(database)

if (broken) {
  console.error(`The audit trail is broken at entry ${broken.position}: ${broken.reason}. The ${linked} entries before it are whole.`)
  process.exitCode = 1
} else {
  console.log(`The audit trail is whole: ${linked} entries, last hash ${head}.`)
}
