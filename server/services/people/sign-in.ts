import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { credentials, people } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { recordAudit } from '#server/services/audit/record-audit'
import type { SessionPerson } from '#shared/contracts/people'
import { and, eq, isNotNull, isNull } from 'drizzle-orm'
import { countAttempt, type AttemptLimit } from './count-attempt'
import { passwordMatches } from './secrets'
import { readSessionPerson, startSession } from './sessions'

const QUARTER_HOUR = 15 * 60
const PER_ADDRESS_AND_CALLER: AttemptLimit = { bucket: 'sign-in-pair', limit: 10, windowSeconds: QUARTER_HOUR }
const PER_ADDRESS: AttemptLimit = { bucket: 'sign-in-address', limit: 50, windowSeconds: QUARTER_HOUR }
const PER_CALLER: AttemptLimit = { bucket: 'sign-in-caller', limit: 100, windowSeconds: QUARTER_HOUR }

export interface SignedIn {
  person: SessionPerson
  cookie: string
}

/** The same words, and the same work, for an unknown address as for a wrong password. */
export async function signIn(ctx: Context, { email, password, ip }: { email: string; password: string; ip: string }): Promise<SignedIn> {
  await countAttempt(ctx, PER_CALLER, ip)
  await countAttempt(ctx, PER_ADDRESS, email)
  await countAttempt(ctx, PER_ADDRESS_AND_CALLER, `${email} ${ip}`)

  const known = await findCredentials(ctx, email)
  // Outside the transaction: the check takes tens of milliseconds on purpose.
  const matches = await passwordMatches(known?.passwordHash ?? null, password)
  if (!known || !matches) throw new AppError('sign-in-refused', 'The mail address or the password is not right.')
  return openSession(ctx, known.personId)
}

async function findCredentials(ctx: Context, email: string) {
  const [row] = await asAuth(ctx, (tx) =>
    tx
      .select({ personId: people.id, passwordHash: credentials.passwordHash })
      .from(people)
      .innerJoin(credentials, eq(credentials.personId, people.id))
      .where(and(eq(people.email, email), isNotNull(people.acceptedAt), isNull(people.leftAt))),
  )
  return row
}

function openSession(ctx: Context, personId: string): Promise<SignedIn> {
  return asAuth(ctx, async (tx) => {
    const person = await readSessionPerson(tx, personId)
    if (!person) throw new AppError('sign-in-refused', 'The mail address or the password is not right.')
    const cookie = await startSession(tx, ctx.config, personId)
    await recordAudit(tx, { personId, companyId: person.company.id }, { type: 'signed-in', personId })
    return { person, cookie }
  })
}
