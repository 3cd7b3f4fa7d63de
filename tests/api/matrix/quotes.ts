import { uploadQuoteFile } from '#shared/contracts/quotes'
import { acceptConfidentiality, type Rfq } from '#shared/contracts/rfqs'
import { buildIssuedRfq, buildQuote, quoteInput } from '../../support/build-rfq'
import { request, type CallParts } from '../../support/test-app'
import type { Expectation, FeatureExpectations } from './expectation'
import { openedRfq } from './opened'
import type { MatrixWorld, World } from './world'

const PDF = Buffer.from('%PDF-1.4\n1 0 obj<</Type/Catalog>>endobj\ntrailer<</Root 1 0 R>>\n%%EOF\n')

const both = (parts: (matrix: MatrixWorld, world: World) => Promise<CallParts>, status?: Expectation['status']): Expectation => ({
  own: (matrix) => parts(matrix, matrix.own),
  foreign: (matrix) => parts(matrix, matrix.foreign),
  status,
})

const vendorOf = (world: World) => world.vendors[0]!.person

async function accepted({ test }: MatrixWorld, world: World): Promise<Rfq> {
  const rfq = await buildIssuedRfq(test, world)
  await request(test.app, acceptConfidentiality, { params: { rfqId: rfq.id }, body: { accepted: true }, as: vendorOf(world).cookie }).expect(200)
  return rfq
}

const ofAccepted = (body?: (rfq: Rfq) => object, file?: CallParts['file']) =>
  both(async (matrix, world) => {
    const rfq = await accepted(matrix, world)
    return { params: { rfqId: rfq.id }, body: body?.(rfq), file }
  })

async function submittedWithFile(matrix: MatrixWorld, world: World) {
  const rfq = await accepted(matrix, world)
  const parts = { params: { rfqId: rfq.id }, as: vendorOf(world).cookie }
  await request(matrix.test.app, uploadQuoteFile, { ...parts, file: { name: 'offer.pdf', content: PDF } }).expect(200)
  const own = await buildQuote(matrix.test, vendorOf(world), rfq.id)
  return { rfq, quote: own.submitted[0] }
}

export const quotes: FeatureExpectations = {
  getOwnQuote: ofAccepted(),
  saveQuoteDraft: ofAccepted(() => ({ version: 0, form: {} })),
  uploadQuoteFile: ofAccepted(undefined, { name: 'offer.pdf', content: PDF }),
  removeQuoteFile: ofAccepted(),
  submitQuote: ofAccepted((rfq) => quoteInput(rfq)),
  withdrawQuote: both(async (matrix, world) => {
    const { rfq, quote } = await submittedWithFile(matrix, world)
    return { params: { rfqId: rfq.id, quoteId: quote.id } }
  }),
  ownQuoteFile: both(async (matrix, world) => {
    const { rfq, quote } = await submittedWithFile(matrix, world)
    return { params: { rfqId: rfq.id, fileId: quote.file.id } }
  }),
  listQuotes: both(async (matrix, world) => ({ params: { rfqId: (await openedRfq(matrix, world)).rfq.id } })),
  // Sealed: to the buying side the file of a quotation is not there before the opening.
  quoteFile: {
    own: async (matrix) => {
      const { rfq, quote } = await submittedWithFile(matrix, matrix.own)
      return { params: { rfqId: rfq.id, quoteId: quote.id } }
    },
    foreign: async (matrix) => {
      const { rfq, quote } = await submittedWithFile(matrix, matrix.foreign)
      return { params: { rfqId: rfq.id, quoteId: quote.id } }
    },
    status: 404,
  },
}
