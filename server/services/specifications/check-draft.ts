import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { specificationOverrides, specificationRevisions } from '#server/db/schema/index'
import { AppError, violates } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { isSecondPerson } from '#server/policies/specifications'
import type { Revision } from '#shared/contracts/specifications'
import { eq } from 'drizzle-orm'
import { findRevision, lockRevision, presentRevision, type RevisionRow } from './read-revision'
import { lockDraft, type DraftKey } from './write-draft'

/** Hands the draft to the checkers of the company. */
export async function submitDraft(tx: Transaction, actor: Actor, key: DraftKey, version: number): Promise<Revision> {
  const row = await lockDraft(tx, actor, key, version)
  const at = await appNow(tx)
  const saved = await move(tx, row, { state: 'in-check', returnedReason: null, submittedAt: at, updatedAt: at, version: row.version + 1 })
  await recordAudit(tx, actor, { type: 'draft-submitted', specificationId: row.specificationId, revisionId: row.id })
  await queueMail(tx, actor, {
    template: 'check-requested',
    props: { specificationId: row.specificationId, revisionId: row.id },
    to: { companyId: actor.companyId, roles: ['checker'] },
  })
  return presentRevision(tx, saved)
}

/** Back to the author, with what has to change. */
export async function returnDraft(tx: Transaction, actor: Actor, key: DraftKey, reason: string): Promise<Revision> {
  const row = await lockInCheck(tx, actor, key)
  const saved = await move(tx, row, { state: 'draft', returnedReason: reason, updatedAt: await appNow(tx), version: row.version + 1 })
  await recordAudit(tx, actor, { type: 'draft-returned', specificationId: row.specificationId, revisionId: row.id })
  await queueMail(tx, actor, {
    template: 'draft-returned',
    props: { specificationId: row.specificationId, revisionId: row.id },
    to: { personId: row.createdBy },
  })
  return presentRevision(tx, saved)
}

interface CheckAnswer {
  code: string
  path: string
  reason: string
}

/**
 * A check that stops release passes at one place, because a second person says why. Nothing is locked: should the
 * revision move meanwhile, row security refuses the entry, or the next check does not count it.
 */
export async function overrideCheck(tx: Transaction, actor: Actor, key: DraftKey, { code, path, reason }: CheckAnswer): Promise<Revision> {
  const row = inCheckFor(actor, await findRevision(tx, actor, key.specificationId, key.revisionId))
  try {
    await tx
      .insert(specificationOverrides)
      .values({ revisionId: row.id, companyId: row.companyId, byId: actor.personId, code, path, reason, submittedAt: row.submittedAt!, at: await appNow(tx) })
  } catch (error) {
    if (!violates(error, 'specification_overrides_code_key')) throw error
    throw new AppError('already-decided', `The check ${code} has been let pass at this place already.`)
  }
  await recordAudit(tx, actor, { type: 'check-overridden', specificationId: row.specificationId, revisionId: row.id, code, path })
  return presentRevision(tx, row)
}

/** A draft that nobody wants, or a release that must not be used any more. */
export async function withdrawRevision(tx: Transaction, actor: Actor, key: DraftKey, reason: string): Promise<Revision> {
  const row = await lockRevision(tx, actor, key.specificationId, key.revisionId)
  const open = row.state === 'draft' && actor.roles.includes('engineer')
  const released = row.state === 'released' && actor.roles.includes('checker')
  if (!open && !released) {
    throw new AppError('conflict', 'An engineer withdraws a draft, a checker a released revision; this one is neither for you.')
  }
  const saved = await move(tx, row, { state: 'withdrawn', withdrawnReason: reason, updatedAt: await appNow(tx) })
  await recordAudit(tx, actor, { type: 'revision-withdrawn', specificationId: row.specificationId, revisionId: row.id })
  return presentRevision(tx, saved)
}

/** The revision in check, locked, for a person who did not work on it. */
export async function lockInCheck(tx: Transaction, actor: Actor, key: DraftKey): Promise<RevisionRow> {
  return inCheckFor(actor, await lockRevision(tx, actor, key.specificationId, key.revisionId))
}

function inCheckFor(actor: Actor, row: RevisionRow): RevisionRow {
  if (row.state !== 'in-check') throw new AppError('not-in-check', 'This revision is not in check; load the page again to see where it is.')
  if (!isSecondPerson(actor, row)) {
    throw new AppError('second-person-needed', 'You worked on this draft; somebody else has to check it.')
  }
  return row
}

async function move(tx: Transaction, row: RevisionRow, change: Partial<RevisionRow>): Promise<RevisionRow> {
  const [saved] = await tx.update(specificationRevisions).set(change).where(eq(specificationRevisions.id, row.id)).returning()
  return saved!
}
