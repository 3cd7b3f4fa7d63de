import { accessSync, constants, existsSync, linkSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { setTimeout as sleep } from 'node:timers/promises'
import { Refusal, say } from './report'
import { keepOutput } from './run'
import type { Settings } from './settings'

interface Process {
  pid: number
  identity: string | undefined
}

/** Who uses the data folder. */
interface RunRecord {
  starter: Process
  children: Process[]
  address?: string
  stopping?: boolean
}

let claim: { file: string; record: RunRecord } | undefined

/** Tells a process from a later one that got the same number. */
function processIdentity(pid: number): string | undefined {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'latin1')
    const [state, ...fields] = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    const boot = readFileSync('/proc/sys/kernel/random/boot_id', 'latin1').trim()
    return state === 'Z' ? undefined : `${boot}/${fields[18]}`
  } catch {
    return undefined
  }
}

const describeProcess = (pid: number): Process => ({ pid, identity: processIdentity(pid) })
const isAlive = ({ pid, identity }: Process) => identity !== undefined && processIdentity(pid) === identity
const runFile = ({ dataDir }: Settings) => path.join(dataDir, 'run.json')

function readRunRecord(file: string): RunRecord | undefined {
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as RunRecord
  } catch {
    return undefined
  }
}

/** Number of the running start command of this data folder, if there is one. */
export function runningStart(settings: Settings): number | undefined {
  const record = readRunRecord(runFile(settings))
  return record && isAlive(record.starter) ? record.starter.pid : undefined
}

function prepareDataFolder({ dataDir }: Settings): void {
  const logs = path.join(dataDir, 'logs')
  try {
    for (const folder of [dataDir, logs]) mkdirSync(folder, { recursive: true, mode: 0o700 })
    accessSync(dataDir, constants.W_OK)
    keepOutput(path.join(logs, 'setup.log'))
  } catch (error) {
    throw new Refusal(`The data folder ${dataDir} cannot be written (${(error as Error).message}). Set DATA_DIR to a folder of yours.`)
  }
}

/** One start command per data folder; what a killed one left behind is waited for, then ended. */
export async function claimDataFolder(settings: Settings): Promise<void> {
  prepareDataFolder(settings)
  const file = runFile(settings)
  const begin = Date.now()
  for (let told = false; ; ) {
    const earlier = readRunRecord(file)
    const alive = earlier ? [earlier.starter, ...earlier.children].filter(isAlive) : []
    if (alive.length === 0 && (await takeRunFile(file))) return
    const waited = Date.now() - begin
    if (waited > patienceMs(earlier)) endLeftovers(settings, earlier, alive)
    if (!told && (told = waited > 500)) say('An earlier start still uses this data folder; waiting for it to end.')
    await sleep(100)
  }
}

/** A start whose npm was just killed needs a moment to notice. */
function patienceMs(earlier: RunRecord | undefined): number {
  if (earlier?.stopping) return 60_000
  return earlier && isAlive(earlier.starter) ? 2_000 : 10_000
}

/** Of two starts at once one gets the folder: a link appears whole, and the later one stands. */
async function takeRunFile(file: string): Promise<boolean> {
  const record: RunRecord = { starter: describeProcess(process.pid), children: [] }
  const whole = `${file}.${process.pid}`
  writeFileSync(whole, JSON.stringify(record), { mode: 0o600 })
  rmSync(file, { force: true })
  try {
    linkSync(whole, file)
  } catch {
    return false
  } finally {
    rmSync(whole, { force: true })
  }
  await sleep(50)
  if (readRunRecord(file)?.starter.pid !== process.pid) return false
  claim = { file, record }
  return true
}

function endLeftovers(settings: Settings, earlier: RunRecord | undefined, alive: Process[]): void {
  if (earlier && isAlive(earlier.starter)) {
    const where = earlier.address ? ` at ${earlier.address}` : ''
    throw new Refusal(`Dotside already runs${where} on the data folder ${settings.dataDir} (process ${earlier.starter.pid}). Stop it first, or set another DATA_DIR.`)
  }
  for (const { pid } of alive) process.kill(pid, 'SIGKILL')
}

/** Writes down what the next start has to know if this one is killed. */
export function noteRun({ children, ...change }: { children?: number[]; address?: string; stopping?: boolean }): void {
  if (!claim || !existsSync(claim.file)) return
  Object.assign(claim.record, change, children && { children: children.map(describeProcess) })
  writeFileSync(`${claim.file}.new`, JSON.stringify(claim.record), { mode: 0o600 })
  renameSync(`${claim.file}.new`, claim.file)
}

export function releaseDataFolder(): void {
  if (claim) rmSync(claim.file, { force: true })
}
