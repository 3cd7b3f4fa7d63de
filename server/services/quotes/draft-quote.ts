import type { Context } from '#server/context'
import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { quoteDrafts } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { keepFile, referToFile } from '#server/services/files/store-file'
import type { StagedFile } from '#server/services/files/staged-file'
import { lockInvitation, requireAcceptedTerms, requireOpenForAnswers, type InvitationRow } from '#server/services/rfqs/lock-rfq'
import type { QuoteDraft } from '#shared/contracts/quotes'
import { eq } from 'drizzle-orm'
import { readOwnQuote } from './read-quotes'

type DraftRow = typeof quoteDrafts.$inferSelect

/** Keeps what was typed, finished or not. Typing goes on after the due time for nobody. */
export async function saveQuoteDraft(tx: Transaction, actor: Actor, rfqId: string, version: number, content: QuoteDraft) {
  const { row, rfq, now } = await lockInvitation(tx, actor, rfqId)
  requireAcceptedTerms(row)
  requireOpenForAnswers(rfq, now)
  const present = await findDraft(tx, row)
  if (present && present.version !== version) {
    throw new AppError('stale-version', 'A colleague changed this quotation meanwhile; load it again and enter yours.')
  }
  await writeDraft(tx, actor, row, present, now, { content })
  return readOwnQuote(tx, actor, rfqId)
}

/** The file is stored whole before anything refers to it; an upload that breaks off leaves nothing behind. */
export async function uploadQuoteFile(ctx: Context, actor: Actor, rfqId: string, staged: StagedFile) {
  await keepFile(ctx, staged)
  return asActor(ctx, actor, async (tx) => {
    const { row, rfq, now } = await lockInvitation(tx, actor, rfqId)
    requireAcceptedTerms(row)
    requireOpenForAnswers(rfq, now)
    const file = await referToFile(tx, actor, staged)
    await writeDraft(tx, actor, row, await findDraft(tx, row), now, { fileId: file.id })
    return readOwnQuote(tx, actor, rfqId)
  })
}

export async function removeQuoteFile(tx: Transaction, actor: Actor, rfqId: string) {
  const { row, rfq, now } = await lockInvitation(tx, actor, rfqId)
  requireOpenForAnswers(rfq, now)
  const present = await findDraft(tx, row)
  if (present) await writeDraft(tx, actor, row, present, now, { fileId: null })
  return readOwnQuote(tx, actor, rfqId)
}

export async function findDraft(tx: Transaction, invitation: InvitationRow): Promise<DraftRow | null> {
  const [row] = await tx.select().from(quoteDrafts).where(eq(quoteDrafts.invitationId, invitation.id))
  return row ?? null
}

/** The version is that of the typed form: a file laid beside it makes nobody's typing stale. */
async function writeDraft(tx: Transaction, actor: Actor, invitation: InvitationRow, present: DraftRow | null, now: Date, change: Partial<Pick<DraftRow, 'content' | 'fileId'>>) {
  const step = change.content ? 1 : 0
  const common = { ...change, updatedBy: actor.personId, updatedAt: now, version: (present?.version ?? 0) + step }
  if (present) {
    await tx
      .update(quoteDrafts)
      .set(common)
      .where(eq(quoteDrafts.invitationId, invitation.id))
    return
  }
  await tx.insert(quoteDrafts).values({ content: { form: {} }, ...common, invitationId: invitation.id, vendorCompanyId: actor.companyId })
}
