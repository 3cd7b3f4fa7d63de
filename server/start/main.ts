import { bench, test, testOffice } from './check'
import { finish, isStopping } from './programs'
import { Refusal } from './report'
import { backup, restore, verifyAudit } from './safekeeping'
import { dev, start } from './serve'
import { readSettings, testSettings } from './settings'

/** Those that answer an exit code end with it; the others run until they are stopped. */
const COMMANDS: Record<string, (args: string[]) => Promise<number | void>> = {
  start: () => start(readSettings()),
  dev: () => dev(readSettings()),
  test: () => test(testSettings()),
  'test-office': testOffice,
  bench: () => bench(testSettings()),
  backup: (args) => backup(readSettings(), args),
  restore: (args) => restore(readSettings(), args),
  'verify-audit': () => verifyAudit(readSettings()),
}

/**
 * Carries out a command of the start script, whose packages are installed by now.
 *
 * @param parent process that started it; npm, killed outright, passes no signal on, its end shows as a new parent
 */
export async function main(name: string, args: string[], parent: number): Promise<void> {
  const interrupted = name === 'start' || name === 'dev' ? 0 : 130
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, () => finish(interrupted))
  // A reader that closed the pipe is no reason to break off.
  process.stdout.on('error', () => {})
  if (process.env.npm_lifecycle_event) setInterval(() => process.ppid !== parent && finish(1), 500).unref()
  try {
    const code = await carryOut(name, args)
    if (typeof code === 'number') finish(code)
  } catch (error) {
    if (isStopping()) return
    console.error(error instanceof Refusal ? error.message : error)
    if (name === 'test') console.log('0 passed, 1 failed, 0 skipped')
    finish(1)
  }
}

function carryOut(name: string, args: string[]): Promise<number | void> {
  const command = COMMANDS[name]
  if (!command) throw new Refusal(`There is no command ${name}. There are: ${Object.keys(COMMANDS).join(', ')}.`)
  return command(args)
}
