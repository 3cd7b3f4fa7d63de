import { spawn, type ChildProcess } from 'node:child_process'
import { appendFileSync, writeFileSync } from 'node:fs'
import { Refusal, lastLines } from './report'
import { ROOT } from './settings'

export interface Ended {
  code: number
  stdout: string
  stderr: string
}

export interface RunOptions {
  uid?: number
  gid?: number
  cwd?: string
  env?: NodeJS.ProcessEnv
  input?: string
}

const running = new Set<ChildProcess>()
let log: string | undefined

/** From here on what set-up programs print is kept in a file. */
export function keepOutput(file: string): void {
  writeFileSync(file, '', { mode: 0o600 })
  log = file
}

/** Runs a program to its end and keeps what it printed. */
export function run(command: string, args: string[], { input = '', ...options }: RunOptions = {}): Promise<Ended> {
  return new Promise((resolve) => {
    const child = spawn(command, args, { cwd: ROOT, ...options, stdio: 'pipe' })
    running.add(child)
    const output = { stdout: '', stderr: '' }
    for (const stream of ['stdout', 'stderr'] as const) {
      child[stream].setEncoding('utf8').on('data', (text: string) => {
        output[stream] += text
        if (log) appendFileSync(log, text)
      })
    }
    // One that ends without reading is told apart by its exit code.
    child.stdin.on('error', () => {}).end(input)
    const end = (code: number | null) => {
      running.delete(child)
      resolve({ code: code ?? 1, ...output })
    }
    child.on('error', (error) => {
      output.stderr += error.message
      end(127)
    })
    child.on('close', end)
  })
}

/** Runs one of our TypeScript programs to its end. @throws Refusal with the end of what it said when it fails */
export async function runProgram(program: string, env: NodeJS.ProcessEnv): Promise<string> {
  const { code, stdout, stderr } = await run(process.execPath, ['--import', 'tsx', program], { env })
  if (code !== 0) throw new Refusal(`${program} failed:\n${lastLines(stderr || stdout, 25)}`)
  return stdout
}

/** Runs one of our TypeScript programs whose output is the reader's. Answers its exit code. */
export function runShown(program: string, args: string[], env: NodeJS.ProcessEnv): Promise<number> {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, ['--import', 'tsx', program, ...args], { cwd: ROOT, env, stdio: ['ignore', 'inherit', 'inherit', 'ipc'] })
    running.add(child)
    child.on('close', (code) => {
      running.delete(child)
      resolve(code ?? 1)
    })
  })
}

export function endRunning(): void {
  for (const child of running) child.kill('SIGTERM')
}
