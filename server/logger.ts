export type LogLevel = 'info' | 'warn' | 'error'
export type LogFields = Readonly<Record<string, unknown>>

export interface Logger {
  info(message: string, fields?: LogFields): void
  warn(message: string, fields?: LogFields): void
  error(message: string, fields?: LogFields): void
}

/** The query builder puts the parameters of a failed query into its message: prices and addresses among them. */
const withoutParameters = (text: string | undefined) => text?.replace(/\nparams: [^]*?(?=\n {4}at |$)/, '')

function plain(value: unknown): unknown {
  if (!(value instanceof Error)) return value
  const code = 'code' in value && typeof value.code === 'string' ? value.code : undefined
  return { name: value.name, code, message: withoutParameters(value.message), stack: withoutParameters(value.stack), cause: value.cause && plain(value.cause) }
}

/** One JSON object a line. Never hand it a body, a token, a price or an address. */
export function createLogger(write: (line: string) => void = (line) => process.stderr.write(line)): Logger {
  const log = (level: LogLevel) => (message: string, fields: LogFields = {}) => {
    const entries = Object.entries(fields).map(([key, value]) => [key, plain(value)])
    write(`${JSON.stringify({ time: new Date().toISOString(), level, message, ...Object.fromEntries(entries) })}\n`)
  }
  return { info: log('info'), warn: log('warn'), error: log('error') }
}
