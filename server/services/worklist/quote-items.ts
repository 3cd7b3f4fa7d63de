import type { Actor, Transaction } from '#server/db/as-actor'
import { quoteDrafts, quotes, quoteStates, rfqInvitations } from '#server/db/schema/index'
import { answerableInvitations } from '#server/policies/rfqs'
import { listVendorRfqs } from '#server/services/rfqs/vendor-rfq'
import type { INVITATION_STATES } from '#shared/contracts/rfqs'
import type { WorklistItem } from '#shared/contracts/worklist'
import { and, eq } from 'drizzle-orm'
import type { WorklistMoment, WorklistProvider } from './provider'

type Row = Awaited<ReturnType<typeof listVendorRfqs>>[number]

interface Answer {
  rfqId: string
  decidedAt: Date | null
  /** The quotation that lies in the box. */
  revision: number | null
  submittedAt: Date | null
  /** Something was typed, submitted or not. */
  draftVersion: number | null
}

/** Where each of the vendor's own answers stands. */
function answersOf(tx: Transaction, actor: Actor): Promise<Answer[]> {
  const lying = tx
    .select({ invitationId: quotes.invitationId, revision: quotes.revision, submittedAt: quotes.submittedAt })
    .from(quotes)
    .innerJoin(quoteStates, and(eq(quoteStates.quoteId, quotes.id), eq(quoteStates.state, 'submitted')))
    .as('lying')
  return tx
    .select({ rfqId: rfqInvitations.rfqId, decidedAt: rfqInvitations.decidedAt, revision: lying.revision, submittedAt: lying.submittedAt, draftVersion: quoteDrafts.version })
    .from(rfqInvitations)
    .leftJoin(lying, eq(lying.invitationId, rfqInvitations.id))
    .leftJoin(quoteDrafts, eq(quoteDrafts.invitationId, rfqInvitations.id))
    .where(answerableInvitations(actor))
}

type State = (typeof INVITATION_STATES)[number]
const STEPS: Record<Exclude<State, 'no-bid'>, string> = {
  invited: 'New enquiry',
  seen: 'Accept confidentiality or decline',
  'terms-accepted': 'Quote or decline',
  'intends-to-quote': 'Quote or decline',
}

const itemOf = (row: Row, kind: string): Pick<WorklistItem, 'id' | 'kind' | 'detail' | 'link'> => ({
  id: `${kind}-${row.id}`,
  kind,
  detail: `${row.customerName} · ${row.title}`,
  link: { route: 'enquiry', params: { rfqId: row.id } },
})

function openItem(row: Row, answer: Answer): WorklistItem[] {
  if (row.state !== 'open' || row.invitationState === 'no-bid' || answer.revision !== null) return []
  const common = { state: 'open', since: row.issuedAt, dueAt: row.dueAt } as const
  if (answer.draftVersion) return [{ ...itemOf(row, 'quote-draft'), ...common, title: `Submit your quotation: ${row.number}` }]
  return [{ ...itemOf(row, 'enquiry'), ...common, title: `${STEPS[row.invitationState]}: ${row.number}` }]
}

function doneItem(row: Row, { revision, submittedAt, decidedAt }: Answer, doneSince: Date): WorklistItem[] {
  const common = { state: 'done', dueAt: null } as const
  if (revision !== null && submittedAt! >= doneSince) {
    return [{ ...itemOf(row, 'quote-submitted'), ...common, title: `You quoted ${row.number}, revision ${revision}`, since: submittedAt!.toISOString() }]
  }
  if (row.invitationState === 'no-bid' && decidedAt && decidedAt >= doneSince) {
    return [{ ...itemOf(row, 'enquiry-declined'), ...common, title: `You declined ${row.number}`, since: decidedAt.toISOString() }]
  }
  return []
}

/** For a vendor: enquiries without an answer, quotations begun and not submitted, and what was answered lately. */
export const quoteItems: WorklistProvider = async (tx, actor, { doneSince }: WorklistMoment) => {
  if (actor.companyKind !== 'vendor') return []
  const answers = new Map((await answersOf(tx, actor)).map((answer) => [answer.rfqId, answer]))
  return (await listVendorRfqs(tx, actor)).flatMap((row) => {
    const answer = answers.get(row.id)
    return answer ? [...openItem(row, answer), ...doneItem(row, answer, doneSince)] : []
  })
}
