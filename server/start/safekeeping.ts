import { existsSync } from 'node:fs'
import path from 'node:path'
import { claimDataFolder, runningStart } from './data-folder'
import { databaseOfRunning, setUpDatabase, type DatabaseEnvironment } from './database'
import { ensureDebian } from './debian'
import { Refusal } from './report'
import { runShown } from './run'
import type { Settings } from './settings'

/** A path as the reader typed it: npm changes the working folder. */
const asTyped = (file: string) => path.resolve(process.env.INIT_CWD ?? process.cwd(), file)

/** `npm run backup [file]`: works beside a running Dotside, and without one. */
export async function backup(settings: Settings, [file]: string[]): Promise<number> {
  const { dataDir, env } = settings
  if (!existsSync(dataDir)) throw new Refusal(`There is nothing to back up: ${dataDir} does not exist.`)
  const stamp = new Date().toISOString().replace(/\D/g, '').slice(0, 14)
  const archive = file ? asTyped(file) : path.join(dataDir, 'backups', `dotside-${stamp}.tar.gz`)
  return runShown('server/backup.ts', [archive], { ...env, ...(await databaseAsFound(settings)), DATA_DIR: dataDir })
}

/** `npm run verify-audit`: computes the hash chain of the audit trail again, beside a running Dotside or without one. */
export async function verifyAudit(settings: Settings): Promise<number> {
  if (!existsSync(settings.dataDir)) throw new Refusal(`There is nothing to verify: ${settings.dataDir} does not exist.`)
  return runShown('server/verify-audit.ts', [], { ...settings.env, ...(await databaseAsFound(settings)) })
}

async function databaseAsFound(settings: Settings): Promise<DatabaseEnvironment> {
  if (settings.ownerUrl) await ensureDebian('postgresql-client')
  else if (runningStart(settings)) return databaseOfRunning(settings)
  else await claimDataFolder(settings)
  return setUpDatabase(settings)
}

/** `npm run restore -- file [--replace]`: only while Dotside does not run. */
export async function restore(settings: Settings, args: string[]): Promise<number> {
  const options = args.filter((arg) => arg.startsWith('--'))
  const [file] = args.filter((arg) => !arg.startsWith('--'))
  if (!file) throw new Refusal('Which archive? npm run restore -- FILE [--replace]')
  if (!existsSync(asTyped(file))) throw new Refusal(`There is no file ${asTyped(file)}.`)
  const starter = runningStart(settings)
  if (starter) throw new Refusal(`Dotside runs on the data folder ${settings.dataDir} (process ${starter}). Stop it before restoring.`)
  await claimDataFolder(settings)
  if (settings.ownerUrl) await ensureDebian('postgresql-client')
  const environment = { ...settings.env, ...(await setUpDatabase(settings)), DATA_DIR: settings.dataDir }
  return runShown('server/restore.ts', [asTyped(file), ...options], environment)
}
