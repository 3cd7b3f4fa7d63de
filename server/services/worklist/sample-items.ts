import type { Actor, Transaction } from '#server/db/as-actor'
import { listSampleRequests } from '#server/services/samples/list-samples'
import type { SampleRequestSummary } from '#shared/contracts/samples'
import type { WorklistItem } from '#shared/contracts/worklist'
import type { WorklistProvider } from './provider'

const DISPOSERS = ['quality', 'engineer'] as const

/** End of the day named, in UTC: a calendar date has no clock time. */
const endOfDay = (date: string) => `${date}T23:59:59.999Z`

export const sampleItems: WorklistProvider = async (tx: Transaction, actor: Actor) => {
  if (actor.roles.includes('vendor')) return (await listSampleRequests(tx, actor)).filter(({ state }) => state === 'requested').map(reportItem)
  if (!DISPOSERS.some((role) => actor.roles.includes(role))) return []
  return (await listSampleRequests(tx, actor)).filter(({ state }) => state === 'reported').map(dispositionItem)
}

function reportItem({ id, number, quantity, partNumber, revision, counterpart, requestedAt, dueOn }: SampleRequestSummary): WorklistItem {
  return {
    id: `sample-report-${id}`,
    kind: 'sample-report',
    title: `Send ${quantity} samples with their report: ${number}`,
    detail: `${partNumber}, revision ${revision}, for ${counterpart}`,
    state: 'open',
    since: requestedAt,
    dueAt: endOfDay(dueOn),
    link: { route: 'vendor-sample', params: { requestId: id } },
  }
}

function dispositionItem({ id, number, partNumber, revision, counterpart, requestedAt }: SampleRequestSummary): WorklistItem {
  return {
    id: `sample-disposition-${id}`,
    kind: 'sample-disposition',
    title: `Decide about the samples ${number}`,
    detail: `${partNumber}, revision ${revision}, from ${counterpart}`,
    state: 'open',
    since: requestedAt,
    dueAt: null,
    link: { route: 'sample', params: { requestId: id } },
  }
}
