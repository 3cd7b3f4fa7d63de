import type { Config } from '#server/config'
import type { Transaction } from '#server/db/as-actor'
import { companies, memberships, people, sessions } from '#server/db/schema/index'
import type { SessionPerson } from '#shared/contracts/people'
import { DrizzlePostgreSQLAdapter } from '@lucia-auth/adapter-drizzle'
import { and, eq, isNull, sql } from 'drizzle-orm'
import { Lucia, TimeSpan, type Adapter, type DatabaseSession } from 'lucia'
import { sha256 } from './secrets'

/** A session ends after this long without a request, */
const IDLE_HOURS = 12
/** and in any case this long after signing in. */
const ABSOLUTE_HOURS = 24 * 7

const hashed = (sessionId: string) => sha256(sessionId).toString('hex')

const idleEnd = sql<Date>`least(app_now() + make_interval(hours => ${IDLE_HOURS}), started_at + make_interval(hours => ${ABSOLUTE_HOURS}))`

/**
 * lucia's adapter, wrapped: the table holds SHA-256 of the session id instead of what the cookie holds, and the
 * database's clock decides when a session ends (lucia asks the clock of its own process).
 */
function sessionAdapter(tx: Transaction): Adapter {
  const inner = new DrizzlePostgreSQLAdapter(tx as never, sessions, people)
  return {
    getSessionAndUser: (sessionId) => findSession(tx, inner, sessionId),
    getUserSessions: (userId) => inner.getUserSessions(userId),
    async setSession(session) {
      await tx.insert(sessions).values({
        id: hashed(session.id),
        userId: session.userId,
        startedAt: sql`app_now()`,
        expiresAt: sql`app_now() + make_interval(hours => ${IDLE_HOURS})`,
      })
    },
    async updateSessionExpiration(sessionId) {
      await tx.update(sessions).set({ expiresAt: idleEnd }).where(eq(sessions.id, hashed(sessionId)))
    },
    deleteSession: (sessionId) => inner.deleteSession(hashed(sessionId)),
    deleteUserSessions: (userId) => inner.deleteUserSessions(userId),
    async deleteExpiredSessions() {
      await tx.delete(sessions).where(sql`expires_at <= app_now()`)
    },
  }
}

/** Hands back the plain id, since lucia passes it on to extend and delete; ended sessions do not exist. */
async function findSession(tx: Transaction, inner: DrizzlePostgreSQLAdapter, sessionId: string): ReturnType<Adapter['getSessionAndUser']> {
  const [session, user] = await inner.getSessionAndUser(hashed(sessionId))
  if (!session || !user) return [null, null]
  const [living] = await tx
    .select({ remainingMs: sql<number>`(extract(epoch from ${sessions.expiresAt} - app_now()) * 1000)::float8` })
    .from(sessions)
    .innerJoin(people, eq(people.id, sessions.userId))
    .where(and(eq(sessions.id, hashed(sessionId)), sql`${sessions.expiresAt} > app_now()`, sql`${sessions.startedAt} >= ${people.sessionsValidAfter}`, isNull(people.leftAt)))
  if (!living) return [null, null]
  // What remains, seen from this process's clock, which lucia compares with.
  const expiresAt = new Date(Date.now() + living.remainingMs)
  return [{ ...session, id: sessionId, expiresAt } satisfies DatabaseSession, user]
}

export const SESSION_COOKIE = 'dotside_session'

function lucia(tx: Transaction, config: Pick<Config, 'PUBLIC_URL'>) {
  return new Lucia(sessionAdapter(tx), {
    sessionExpiresIn: new TimeSpan(IDLE_HOURS, 'h'),
    sessionCookie: {
      name: SESSION_COOKIE,
      // Kept by the browser; the database ends the session.
      expires: false,
      attributes: { secure: config.PUBLIC_URL.startsWith('https:'), sameSite: 'lax', path: '/' },
    },
  })
}

export interface OpenSession {
  id: string
  person: SessionPerson
}

/** The session of a cookie header, extended when half of its time has passed; null when there is none any more. */
export async function resolveSession(tx: Transaction, config: Config, cookieHeader: string): Promise<OpenSession | null> {
  const auth = lucia(tx, config)
  const sessionId = readCookie(auth, cookieHeader)
  if (!sessionId || sessionId.length > 200) return null
  const { session } = await auth.validateSession(sessionId)
  const person = session && (await readSessionPerson(tx, session.userId))
  return person ? { id: sessionId, person } : null
}

/** A cookie header that cannot be decoded carries no session. */
function readCookie(auth: ReturnType<typeof lucia>, cookieHeader: string): string | null {
  try {
    return auth.readSessionCookie(cookieHeader)
  } catch (error) {
    if (error instanceof URIError) return null
    throw error
  }
}

/** Starts a session and returns the cookie that carries it. */
export async function startSession(tx: Transaction, config: Config, personId: string): Promise<string> {
  const auth = lucia(tx, config)
  const session = await auth.createSession(personId, {})
  return auth.createSessionCookie(session.id).serialize()
}

/** Ends one session and returns the cookie that makes the browser forget it. */
export async function endSession(tx: Transaction, config: Config, sessionId: string): Promise<string> {
  const auth = lucia(tx, config)
  await auth.invalidateSession(sessionId)
  return auth.createBlankSessionCookie().serialize()
}

export const endAllSessions = (tx: Transaction, config: Config, personId: string): Promise<void> => lucia(tx, config).invalidateUserSessions(personId)

export const deleteEndedSessions = (tx: Transaction, config: Config): Promise<void> => lucia(tx, config).deleteExpiredSessions()

export async function readSessionPerson(tx: Transaction, personId: string): Promise<SessionPerson | null> {
  const [row] = await tx
    .select({ person: people, membership: memberships, company: companies })
    .from(people)
    .innerJoin(memberships, eq(memberships.personId, people.id))
    .innerJoin(companies, eq(companies.id, memberships.companyId))
    .where(and(eq(people.id, personId), isNull(people.leftAt)))
  if (!row) return null
  const { person, membership, company } = row
  const { roles, approvalLimit, approvalCurrency } = membership
  return { id: person.id, name: person.name, email: person.email, roles, approvalLimit, approvalCurrency, company }
}
