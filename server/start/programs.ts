import { spawn, type ChildProcess } from 'node:child_process'
import { closeSync, existsSync, openSync, readFileSync, renameSync, statSync } from 'node:fs'
import path from 'node:path'
import { setTimeout as sleep } from 'node:timers/promises'
import { noteRun, releaseDataFolder } from './data-folder'
import { stopStartedCluster } from './postmaster'
import { Refusal, lastLines, say } from './report'
import { endRunning } from './run'
import { ROOT } from './settings'

export type ProgramName = 'server' | 'worker' | 'mail' | 'vite'

const LARGEST_LOG_BYTES = 10_000_000
/** A program that does not end in this time is cut. */
const PATIENCE_MS = 11_000

const children = new Map<ProgramName, ChildProcess>()
const expectedToEnd = new WeakSet<ChildProcess>()
let stopping: Promise<void> | undefined
/** While someone edits the programs, one that fails waits for the next change. */
let editing = false

export const isStopping = () => stopping !== undefined

export function surviveFailures(): void {
  editing = true
}

/**
 * Starts a program that ends by itself when this command is gone (its channel to us closes).
 * It gets a process group of its own, so that ctrl-C reaches only this command, which stops all in order.
 */
export function launch(name: ProgramName, args: string[], env: NodeJS.ProcessEnv, logs: string): void {
  const log = path.join(logs, `${name}.log`)
  if (existsSync(log) && statSync(log).size > LARGEST_LOG_BYTES) renameSync(log, `${log}.1`)
  const output = openSync(log, 'a', 0o600)
  const child = spawn(process.execPath, args, { cwd: ROOT, env, detached: true, stdio: ['ignore', output, output, 'ipc'] })
  closeSync(output)
  children.set(name, child)
  noteRun({ children: [...children.values()].flatMap(({ pid }) => pid ?? []) })
  child.on('exit', (code, signal) => {
    if (children.get(name) === child) children.delete(name)
    if (stopping || expectedToEnd.has(child)) return
    say(`The ${name} ended unexpectedly (${signal ?? `exit code ${code}`}). The end of ${log}:\n${lastLines(readFileSync(log, 'utf8'), 25)}`)
    if (!editing) finish(1)
  })
}

export async function endProgram(name: ProgramName): Promise<void> {
  const child = children.get(name)
  if (!child) return
  expectedToEnd.add(child)
  const ended = new Promise((resolve) => child.once('exit', resolve))
  child.kill('SIGTERM')
  const hard = setTimeout(() => child.kill('SIGKILL'), PATIENCE_MS)
  await ended
  clearTimeout(hard)
}

/** Those that use the database or send mail go first. */
async function stopAll(): Promise<void> {
  if (children.size > 0) say('\nStopping ...')
  noteRun({ stopping: true })
  endRunning()
  await Promise.all([endProgram('vite'), endProgram('server'), endProgram('worker')])
  await endProgram('mail')
  await stopStartedCluster()
  releaseDataFolder()
}

/** Stops everything that was started, then ends this command. */
export function finish(code: number): void {
  stopping ??= stopAll()
  stopping.then(
    () => process.exit(code),
    (error: unknown) => {
      console.error(error)
      process.exit(1)
    },
  )
}

/** Answers when the server does, or as soon as it has ended. */
export async function waitForServer(port: number): Promise<void> {
  const url = `http://127.0.0.1:${port}/api/health`
  for (const deadline = Date.now() + 60_000; Date.now() < deadline; await sleep(100)) {
    if (stopping || !children.has('server')) return
    const answer = await fetch(url, { signal: AbortSignal.timeout(5_000) }).catch(() => undefined)
    if (answer?.ok) return
  }
  throw new Refusal(`The server does not answer at ${url}. See logs/server.log in the data folder.`)
}
