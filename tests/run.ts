/**
 * Everything there is to check, in one run: types, lint, client build, then the tests of every project.
 * Ends with one line of counts; `BROWSER=0` counts the browser tests as skipped.
 */
import { spawn, type ChildProcess } from 'node:child_process'
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { PROJECTS, countReport, countSkipped, type Counts, type Project } from './support/count-report'

const ROOT = path.dirname(path.dirname(fileURLToPath(import.meta.url)))
const REPORTS = mkdtempSync(path.join(tmpdir(), 'dotside-tests-'))
const total: Counts = { passed: 0, failed: 0, skipped: 0 }
const running = new Set<ChildProcess>()

function add(counts: Counts): void {
  total.passed += counts.passed
  total.failed += counts.failed
  total.skipped += counts.skipped
}

interface Ended {
  code: number
  output: string
}

function node(args: string[], shown: boolean): Promise<Ended> {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, args, { cwd: ROOT, stdio: ['ignore', shown ? 'inherit' : 'pipe', shown ? 'inherit' : 'pipe'] })
    running.add(child)
    let output = ''
    for (const stream of [child.stdout, child.stderr]) stream?.setEncoding('utf8').on('data', (text: string) => (output += text))
    child.on('close', (code) => {
      running.delete(child)
      resolve({ code: code ?? 1, output })
    })
  })
}

/** A check that passes or fails as a whole; its output is shown at once when it ends. */
async function check(name: string, args: string[]): Promise<void> {
  const start = Date.now()
  const { code, output } = await node(args, false)
  const verdict = code === 0 ? 'passed' : 'FAILED'
  console.log(`${name}: ${verdict} (${((Date.now() - start) / 1000).toFixed(0)} s)`)
  if (code !== 0) console.log(output.trimEnd())
  add({ passed: code === 0 ? 1 : 0, failed: code === 0 ? 0 : 1, skipped: 0 })
}

const vitest = (command: string, projects: Project[]) => ['node_modules/vitest/vitest.mjs', command, ...projects.flatMap((name) => ['--project', name])]

async function runTests(projects: Project[]): Promise<void> {
  console.log(`\nTests: ${projects.join(', ')}`)
  const report = path.join(REPORTS, `${projects.join('-')}.json`)
  const { code } = await node([...vitest('run', projects), '--passWithNoTests', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`], true)
  const counts = existsSync(report) ? countReport(JSON.parse(readFileSync(report, 'utf8')), ROOT) : {}
  for (const project of projects) {
    const found = counts[project]
    if (!found) console.log(`${project}: no tests`)
    else add(found)
  }
  // An error outside any test, or a run that broke off, fails the run although no test did.
  const failed = projects.some((project) => (counts[project]?.failed ?? 0) > 0)
  if (code !== 0 && !failed) add({ passed: 0, failed: 1, skipped: 0 })
}

async function skipBrowserTests(): Promise<void> {
  const list = path.join(REPORTS, 'list.json')
  const { code, output } = await node([...vitest('list', ['e2e']), `--json=${list}`], false)
  console.log('\nTests: e2e are skipped (BROWSER=0)')
  if (code === 0 && existsSync(list)) return add(countSkipped(JSON.parse(readFileSync(list, 'utf8'))))
  console.log(output.trimEnd())
  add({ passed: 0, failed: 1, skipped: 0 })
}

async function runAll(): Promise<void> {
  // Types take longest and one processor only: the first tests run beside them.
  const types = check('Types', ['node_modules/vue-tsc/bin/vue-tsc.js', '--build'])
  await Promise.all([
    check('Lint', ['node_modules/eslint/bin/eslint.js', '--config', '.config/eslint.config.js', '--max-warnings', '0', '.']),
    check('Client build', ['--import', 'tsx', 'server/build-client.ts']),
  ])
  await runTests(PROJECTS.filter((name) => name !== 'e2e'))
  await types
  if (process.env.BROWSER === '0') await skipBrowserTests()
  else await runTests(['e2e'])
}

function end(code: number): never {
  for (const child of running) child.kill('SIGTERM')
  rmSync(REPORTS, { recursive: true, force: true })
  process.exit(code)
}

process.on('disconnect', () => end(1))
process.on('SIGTERM', () => end(1))

await runAll()
console.log(`\n${total.passed} passed, ${total.failed} failed, ${total.skipped} skipped`)
end(total.failed > 0 || total.passed === 0 ? 1 : 0)
