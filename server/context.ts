import type { Config } from './config'
import { closeDatabase, openDatabase, type Database } from './db/client'
import { createLogger, type Logger } from './logger'
import { createTransport } from './mail/transport'
import type { MailTransport } from './mail/transport'
import { diskStore } from './storage/disk-store'
import type { FileStore } from './storage/file-store'

/** Everything a request or a task depends on; tests hand in their own parts. */
export interface Context {
  config: Config
  logger: Logger
  database: Database
  files: FileStore
  mail: MailTransport
}

export function createContext(config: Config, own: Partial<Omit<Context, 'config'>> = {}): Context {
  return {
    config,
    logger: own.logger ?? createLogger(),
    database: own.database ?? openDatabase(config),
    files: own.files ?? diskStore(config.DATA_DIR),
    mail: own.mail ?? createTransport(config.SMTP_URL),
  }
}

export async function closeContext(ctx: Context): Promise<void> {
  ctx.mail.close()
  await closeDatabase(ctx.database)
}
