import { buildApproved, buildProposal, comparisonBasis, proposal } from '../../support/build-opened'
import type { CallParts } from '../../support/test-app'
import type { Expectation, FeatureExpectations } from './expectation'
import { openedRfq } from './opened'
import type { MatrixWorld, World } from './world'

const both = (parts: (matrix: MatrixWorld, world: World) => Promise<CallParts>): Expectation => ({
  own: (matrix) => parts(matrix, matrix.own),
  foreign: (matrix) => parts(matrix, matrix.foreign),
})

const proposed = async (matrix: MatrixWorld, world: World) => buildProposal(matrix.test, world, await openedRfq(matrix, world))

export const awards: FeatureExpectations = {
  compareOffers: both(async (matrix, world) => {
    const opened = await openedRfq(matrix, world)
    return { params: { rfqId: opened.rfq.id }, body: { basis: comparisonBasis(opened) } }
  }),
  proposeAward: both(async (matrix, world) => {
    const opened = await openedRfq(matrix, world)
    return { params: { rfqId: opened.rfq.id }, body: proposal(opened) }
  }),
  listAwards: {
    own: async (matrix) => {
      await proposed(matrix, matrix.foreign)
      return {}
    },
  },
  // Approved, since who does not buy reads what was decided only.
  getAward: both(async (matrix, world) => ({ params: { awardId: (await buildApproved(matrix.test, world, await openedRfq(matrix, world))).id } })),
  approveAward: both(async (matrix, world) => {
    const { id, comparisonSha256 } = await proposed(matrix, world)
    return { params: { awardId: id }, body: { comparisonSha256, remark: '' } }
  }),
  rejectAward: both(async (matrix, world) => ({ params: { awardId: (await proposed(matrix, world)).id }, body: { reason: 'Ask again' } })),
}
