/** Where to go after signing in: a path of this program and nothing else, `/` when in doubt. */
export function localPath(next: unknown): string {
  if (typeof next !== 'string' || !next.startsWith('/')) return '/'
  try {
    const base = 'http://local.invalid'
    return new URL(next, base).origin === base ? next : '/'
  } catch {
    return '/'
  }
}
