import { existsSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { seconds } from './report'

export interface Running {
  address: string
  /** Page of the mail catcher; without it mail leaves through `smtpUrl`. */
  mailPage: string | undefined
  smtpUrl: string
  dataDir: string
  isDemo: boolean
  tookMs: number
}

/** Written by the seed. */
interface SignIns {
  demo?: { role: string; name: string; email: string; password: string }[]
  firstAdminLink?: string
  firstOperatorLink?: string
}

const LINE = '-'.repeat(78)

/** What a person needs to begin. */
export function startBlock({ address, mailPage, smtpUrl, dataDir, isDemo, tookMs }: Running): string {
  return [
    '',
    LINE,
    `Dotside is running (ready in ${seconds(tookMs)})`,
    '',
    `  Address   ${address}`,
    `  Mail      ${mailPage ? `${mailPage}  (every mail is caught here, none leaves this machine)` : smtpUrl.replace(/\/\/.*@/, '//')}`,
    `  Data      ${dataDir}  (logs in logs/)`,
    ...signInLines(readSignIns(dataDir), isDemo),
    '',
    '  Stop with ctrl-C.',
    LINE,
  ].join('\n')
}

function readSignIns(dataDir: string): SignIns {
  const file = path.join(dataDir, 'sign-ins.json')
  return existsSync(file) ? (JSON.parse(readFileSync(file, 'utf8')) as SignIns) : {}
}

function signInLines({ demo = [], firstAdminLink, firstOperatorLink }: SignIns, isDemo: boolean): string[] {
  if (isDemo) return demo.length > 0 ? ['', ...demoLines(demo)] : []
  return [...linkLines('First administrator', firstAdminLink), ...linkLines('First operator', firstOperatorLink)]
}

const linkLines = (who: string, link: string | undefined) => (link ? ['', `  ${who}: set a password with this one-time link`, `            ${link}`] : [])

function demoLines(demo: Required<SignIns>['demo']): string[] {
  const passwords = new Set(demo.map(({ password }) => password))
  const isShared = passwords.size === 1
  const rows = demo.map(({ role, email, name, password }) => [role, email, ...(isShared ? [] : [password]), name])
  const widths = [0, 1, 2].map((column) => Math.max(...rows.map((row) => row[column]?.length ?? 0)))
  const heading = isShared ? `  Sign in (demo; the password of all is: ${[...passwords].join('')})` : '  Sign in (demo)'
  return [heading, ...rows.map((row) => `            ${row.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ')}`.trimEnd())]
}
