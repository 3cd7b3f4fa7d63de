import { watch } from 'node:fs'
import path from 'node:path'
import { claimDataFolder, noteRun } from './data-folder'
import { setUpDatabase } from './database'
import { freePort } from './ports'
import { endProgram, isStopping, launch, surviveFailures, waitForServer } from './programs'
import { say, timed } from './report'
import { runProgram } from './run'
import { ROOT, type Settings } from './settings'
import { startBlock } from './start-block'

interface Prepared {
  environment: NodeJS.ProcessEnv
  logs: string
  port: number
  devPort: number
  publicUrl: string
  smtpUrl: string
  /** 0 when mail leaves through a server of the installation's. */
  mailPagePort: number
  isDemo: boolean
}

/** `npm start`: everything, from the built client. */
export async function start(settings: Settings): Promise<void> {
  await claimDataFolder(settings)
  const prepared = await prepare(settings, false)
  await Promise.all([prepareContent(prepared.environment), buildClient(prepared.environment)])
  launchPrograms(prepared)
  await announce(settings, prepared)
}

/** `npm run dev`: Vite with hot reload in front; server and worker start again when their sources change. */
export async function dev(settings: Settings): Promise<void> {
  await claimDataFolder(settings)
  const prepared = await prepare(settings, true)
  await prepareContent(prepared.environment)
  launchPrograms(prepared)
  launchVite(prepared)
  await announce(settings, prepared)
  surviveFailures()
  restartOnChange(() => launchServerAndWorker(prepared))
}

async function prepare(settings: Settings, isDev: boolean): Promise<Prepared> {
  const { env, dataDir, ports } = settings
  const database = await setUpDatabase(settings)
  const port = await freePort('PORT', ports.server)
  const devPort = isDev ? await freePort('DEV_PORT', ports.dev) : 0
  const mailPort = env.SMTP_URL ? 0 : await freePort('MAIL_PORT', ports.mail)
  const mailPagePort = env.SMTP_URL ? 0 : await freePort('MAIL_PAGE_PORT', ports.mailPage)
  const publicUrl = isDev ? `http://localhost:${devPort}` : env.PUBLIC_URL || `http://localhost:${port}`
  const smtpUrl = env.SMTP_URL || `smtp://127.0.0.1:${mailPort}`
  const isDemo = env.DEMO !== '0'
  const values = {
    DATA_DIR: dataDir,
    DEMO: isDemo ? '1' : '0',
    PORT: String(port),
    MAIL_PORT: String(mailPort),
    MAIL_PAGE_PORT: String(mailPagePort),
    SMTP_URL: smtpUrl,
    PUBLIC_URL: publicUrl,
    MAIL_FROM: env.MAIL_FROM || 'Dotside <no-reply@dotside.example>',
  }
  return { environment: { ...env, ...database, ...values }, logs: path.join(dataDir, 'logs'), port, devPort, publicUrl, smtpUrl, mailPagePort, isDemo }
}

async function prepareContent(environment: NodeJS.ProcessEnv): Promise<void> {
  await timed('Database up to date', async () => {
    await runProgram('server/db/migrate.ts', environment)
    await runProgram('server/db/seed/index.ts', environment)
  })
}

async function buildClient(environment: NodeJS.ProcessEnv): Promise<void> {
  const said = await runProgram('server/build-client.ts', environment)
  if (said) say(said.trimEnd())
}

/** The owner's rights stay with migrations and backup. */
function withoutOwner({ DATABASE_OWNER_URL: _owner, DATABASE_BACKUP_URL: _backup, POSTGRES_BIN: _bin, ...rest }: NodeJS.ProcessEnv): NodeJS.ProcessEnv {
  return rest
}

function launchPrograms(prepared: Prepared): void {
  const { environment, logs, mailPagePort } = prepared
  if (mailPagePort > 0) launch('mail', ['--import', 'tsx', 'fake-services/index.ts'], withoutOwner(environment), logs)
  launchServerAndWorker(prepared)
}

function launchServerAndWorker({ environment, logs }: Prepared): void {
  launch('server', ['--import', 'tsx', 'server/server.ts'], withoutOwner(environment), logs)
  launch('worker', ['--import', 'tsx', 'server/worker.ts'], withoutOwner(environment), logs)
}

/** Vite knows nothing of our channel, so it is told to end with it. */
function launchVite({ environment, logs, devPort }: Prepared): void {
  const endWithUs = 'data:text/javascript,process.on("disconnect",()=>process.exit())'
  const args = ['--import', endWithUs, 'node_modules/vite/bin/vite.js', '--port', String(devPort), '--strictPort', '--host', 'localhost', '--clearScreen', 'false']
  launch('vite', args, withoutOwner(environment), logs)
}

async function announce({ dataDir }: Settings, { port, publicUrl, smtpUrl, mailPagePort, isDemo }: Prepared): Promise<void> {
  await waitForServer(port)
  if (isStopping()) return
  noteRun({ address: publicUrl })
  const mailPage = mailPagePort > 0 ? `http://localhost:${mailPagePort}` : undefined
  say(startBlock({ address: publicUrl, mailPage, smtpUrl, dataDir, isDemo, tookMs: performance.now() }))
}

function restartOnChange(launchAgain: () => void): void {
  let pending: NodeJS.Timeout | undefined
  const restart = async () => {
    await Promise.all([endProgram('server'), endProgram('worker')])
    if (isStopping()) return
    launchAgain()
    say('Server and worker restarted.')
  }
  for (const folder of ['server', 'shared']) {
    watch(path.join(ROOT, folder), { recursive: true }, (_event, file) => {
      if (!file?.endsWith('.ts') || file.endsWith('.test.ts')) return
      clearTimeout(pending)
      pending = setTimeout(restart, 300)
    })
  }
}
