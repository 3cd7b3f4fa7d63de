import type { SampleRequest, SampleSet } from '#shared/contracts/samples'
import { buildConfirmedSet, buildSampleRequest, DECLARATION, GOOD_REPORT, sampleInput, uploadTo } from '../../support/build-opened'
import type { CallParts } from '../../support/test-app'
import type { Expectation, FeatureExpectations } from './expectation'
import { openedRfq } from './opened'
import type { MatrixWorld, World } from './world'

const requested = async (matrix: MatrixWorld, world: World): Promise<SampleRequest> => buildSampleRequest(matrix.test, world, (await openedRfq(matrix, world)).rfq)
const vendorOf = (world: World) => world.vendors[0]!.person

async function open(matrix: MatrixWorld, world: World, content?: string): Promise<SampleSet> {
  return uploadTo(matrix.test, vendorOf(world), (await requested(matrix, world)).id, content)
}

async function confirmed(matrix: MatrixWorld, world: World): Promise<SampleSet> {
  return buildConfirmedSet(matrix.test, vendorOf(world), (await requested(matrix, world)).id)
}

/** The same call about an object of the own world and about one of elsewhere. */
const both = (parts: (matrix: MatrixWorld, world: World) => Promise<CallParts>): Expectation => ({
  own: (matrix) => parts(matrix, matrix.own),
  foreign: (matrix) => parts(matrix, matrix.foreign),
})

const scan = { name: 'scan.pdf', content: '%PDF-1.7\n%%EOF\n' }
const withQuestion = GOOD_REPORT.replace('602,2', '0,6022')

export const samples: FeatureExpectations = {
  listSampleRequests: {
    own: async (matrix) => {
      await requested(matrix, matrix.foreign)
      return {}
    },
  },
  requestSamples: { own: async (matrix) => ({ body: sampleInput(matrix.own, (await openedRfq(matrix, matrix.own)).rfq) }) },
  getSampleRequest: both(async (matrix, world) => ({ params: { requestId: (await requested(matrix, world)).id } })),
  cancelSampleRequest: both(async (matrix, world) => ({ params: { requestId: (await requested(matrix, world)).id }, body: { reason: 'Not needed' } })),
  getSampleSet: both(async (matrix, world) => ({ params: { setId: (await confirmed(matrix, world)).id } })),
  sampleFile: both(async (matrix, world) => {
    const { id, file } = await confirmed(matrix, world)
    return { params: { setId: id, fileId: file.id } }
  }),
  disposeSet: both(async (matrix, world) => ({ params: { setId: (await confirmed(matrix, world)).id }, body: { disposition: 'accepted', reason: 'Met', concession: null } })),

  listVendorSamples: {
    own: async (matrix) => {
      await requested(matrix, matrix.foreign)
      return {}
    },
  },
  getVendorSample: both(async (matrix, world) => ({ params: { requestId: (await requested(matrix, world)).id } })),
  sampleTemplate: both(async (matrix, world) => ({ params: { requestId: (await requested(matrix, world)).id } })),
  uploadReport: both(async (matrix, world) => ({ params: { requestId: (await requested(matrix, world)).id }, file: { name: 'report.csv', content: GOOD_REPORT } })),
  getVendorSet: both(async (matrix, world) => ({ params: { setId: (await open(matrix, world)).id } })),
  answerQuestions: both(async (matrix, world) => {
    const { id, version } = await open(matrix, world, withQuestion)
    return { params: { setId: id }, body: { version, answers: [{ questionId: 'cell-factor:B3', option: 'scale:3' }] } }
  }),
  saveReport: both(async (matrix, world) => {
    const { id, version } = await open(matrix, world)
    return { params: { setId: id }, body: { version, report: DECLARATION } }
  }),
  uploadEvidence: both(async (matrix, world) => ({ params: { setId: (await open(matrix, world)).id }, file: scan })),
  confirmSet: {
    // Without its declaration: that it is refused as unfinished shows that it was found.
    own: async (matrix) => {
      const { id, version } = await open(matrix, matrix.own)
      return { params: { setId: id }, body: { version } }
    },
    status: 409,
    foreign: async (matrix) => {
      const { id, version } = await open(matrix, matrix.foreign)
      return { params: { setId: id }, body: { version } }
    },
  },
  vendorSampleFile: both(async (matrix, world) => {
    const { id, file } = await open(matrix, world)
    return { params: { setId: id, fileId: file.id } }
  }),
}
