import { acceptConfidentiality, createRfq, type Rfq } from '#shared/contracts/rfqs'
import { buildIssuedRfq, rfqInput } from '../../support/build-rfq'
import { buildRelease } from '../../support/build-release'
import { request, type CallParts } from '../../support/test-app'
import type { Expectation, FeatureExpectations } from './expectation'
import type { MatrixWorld, World } from './world'

const both = (parts: (matrix: MatrixWorld, world: World) => Promise<CallParts>, status?: Expectation['status']): Expectation => ({
  own: (matrix) => parts(matrix, matrix.own),
  foreign: (matrix) => parts(matrix, matrix.foreign),
  status,
})

const vendorIds = (world: World) => world.vendors.map(({ company }) => company.id)

async function prepared({ test }: MatrixWorld, world: World): Promise<{ rfq: Rfq; input: ReturnType<typeof rfqInput> }> {
  const input = rfqInput(await buildRelease(test, world.engineer, world.checker), vendorIds(world))
  const { body } = await request(test.app, createRfq, { body: input, as: world.buyer.cookie }).expect(200)
  return { rfq: body as Rfq, input }
}

const issued = ({ test }: MatrixWorld, world: World) => buildIssuedRfq(test, world)

/** For the asking vendor's endpoints the other world's enquiry is one it was not invited to. */
const ofIssued = (status?: Expectation['status'], body?: object) => both(async (matrix, world) => ({ params: { rfqId: (await issued(matrix, world)).id }, body }), status)

async function acceptedLine({ test }: MatrixWorld, world: World): Promise<CallParts> {
  const rfq = await buildIssuedRfq(test, world)
  await request(test.app, acceptConfidentiality, { params: { rfqId: rfq.id }, body: { accepted: true }, as: world.vendors[0]!.person.cookie }).expect(200)
  return { params: { rfqId: rfq.id, lineId: rfq.lines[0]!.id } }
}

const later = () => new Date(Date.now() + 7 * 86_400_000).toISOString()

export const rfqs: FeatureExpectations = {
  listRfqs: {
    own: async (matrix) => {
      await issued(matrix, matrix.foreign)
      return {}
    },
  },
  createRfq: {
    own: async ({ test, own }) => ({ body: rfqInput(await buildRelease(test, own.engineer, own.checker), vendorIds(own)) }),
  },
  getRfq: ofIssued(),
  updateRfq: both(async (matrix, world) => {
    const { rfq, input } = await prepared(matrix, world)
    return { params: { rfqId: rfq.id }, body: { ...input, version: rfq.version } }
  }),
  issueRfq: both(async (matrix, world) => {
    const { rfq } = await prepared(matrix, world)
    return { params: { rfqId: rfq.id }, body: { version: rfq.version } }
  }),
  extendRfq: both(async (matrix, world) => ({ params: { rfqId: (await issued(matrix, world)).id }, body: { dueAt: later(), reason: 'For all' } })),
  cancelRfq: ofIssued(undefined, { reason: 'Stopped' }),
  // Both halves of the opening wait for the due time.
  askOpening: ofIssued(409),
  openRfq: ofIssued(409),
  listVendorRfqs: {
    own: async (matrix) => {
      await issued(matrix, matrix.foreign)
      return {}
    },
  },
  getVendorRfq: ofIssued(),
  acceptConfidentiality: ofIssued(undefined, { accepted: true }),
  declineRfq: ofIssued(undefined, { reason: 'capacity', text: '' }),
  vendorDrawing: both(acceptedLine),
}
