import { spawn } from 'node:child_process'
import path from 'node:path'
import { ArchiveRefusal } from './manifest'

/** Runs a program to its end. @throws Error with what it said when it fails */
export function runTool(program: string, args: string[], env: NodeJS.ProcessEnv = process.env): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { env, stdio: ['ignore', 'ignore', 'pipe'] })
    let said = ''
    child.stderr.setEncoding('utf8').on('data', (text: string) => (said += text))
    child.on('error', reject)
    child.on('close', (code) => (code === 0 ? resolve() : reject(new Error(`${path.basename(program)} failed: ${said.trim() || `exit code ${code}`}`))))
  })
}

/** A program of PostgreSQL's, from the folder the start command found or from the search path. */
export const postgresTool = (name: string) => path.join(process.env.POSTGRES_BIN ?? '', name)

/** The environment that points PostgreSQL's programs to a database; a password on the command line could be read by others. */
export function toolEnvironment(url: string): NodeJS.ProcessEnv {
  const { hostname, port, username, password, searchParams } = new URL(url)
  const sslMode = searchParams.get('sslmode')
  return {
    ...process.env,
    PGHOST: hostname.replace(/^\[|\]$/g, ''),
    PGPORT: port || '5432',
    PGUSER: decodeURIComponent(username),
    PGPASSWORD: decodeURIComponent(password),
    PGDATABASE: databaseName(url),
    PGTZ: 'UTC',
    ...(sslMode && { PGSSLMODE: sslMode }),
  }
}

export const databaseName = (url: string) => decodeURIComponent(new URL(url).pathname.slice(1))

/** The same server and person, another database. */
export function withDatabase(url: string, database: string): string {
  return Object.assign(new URL(url), { pathname: `/${encodeURIComponent(database)}` }).href
}

/** Ends the program with a sentence for a failure that is the reader's to solve, with the stack for ours. */
export async function asCommand(work: () => Promise<void>): Promise<void> {
  process.on('disconnect', () => process.exit(1))
  try {
    await work()
    process.exit(0)
  } catch (error) {
    console.error(error instanceof ArchiveRefusal ? error.message : error)
    process.exit(1)
  }
}
