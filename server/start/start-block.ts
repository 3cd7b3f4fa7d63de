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

function signInLines({ demo = [], firstAdminLink }: SignIns, isDemo: boolean): string[] {
  const link = firstAdminLink ? ['', '  First administrator: set the password with this one-time link', `            ${firstAdminLink}`] : []
  if (!isDemo || demo.length === 0) return link
  const width = (key: 'role' | 'email' | 'password') => Math.max(...demo.map((person) => person[key].length))
  const people = demo.map(({ role, email, password, name }) => `            ${role.padEnd(width('role'))}  ${email.padEnd(width('email'))}  ${password.padEnd(width('password'))}  ${name}`)
  return [...link, '', '  Sign in as (demo: role, address, password, name)', ...people]
}
