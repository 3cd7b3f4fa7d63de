export type LogLevel = 'info' | 'warn' | 'error'
export type LogFields = Readonly<Record<string, unknown>>

export interface Logger {
  info(message: string, fields?: LogFields): void
  warn(message: string, fields?: LogFields): void
  error(message: string, fields?: LogFields): void
}

const plain = (value: unknown) => (value instanceof Error ? { name: value.name, message: value.message, stack: value.stack, cause: value.cause } : value)

/** One JSON object a line. Never hand it a body, a token, a price or an address. */
export function createLogger(write: (line: string) => void = (line) => process.stderr.write(line)): Logger {
  const log = (level: LogLevel) => (message: string, fields: LogFields = {}) => {
    const entries = Object.entries(fields).map(([key, value]) => [key, plain(value)])
    write(`${JSON.stringify({ time: new Date().toISOString(), level, message, ...Object.fromEntries(entries) })}\n`)
  }
  return { info: log('info'), warn: log('warn'), error: log('error') }
}
