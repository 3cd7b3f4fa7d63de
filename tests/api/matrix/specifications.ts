import { COUPLED_INDUCTOR } from '#server/db/seed/specifications/requirements'
import type { Revision } from '#shared/contracts/specifications'
import { buildRelease } from '../../support/build-release'
import { buildChecked, buildDraft, buildInCheck, newPartNumber, releasableDocument, revisionParams } from '../../support/build-specification'
import * as contract from '#shared/contracts/specifications'
import { request, type CallParts } from '../../support/test-app'
import type { Expectation, FeatureExpectations } from './expectation'
import type { MatrixWorld, World } from './world'

type Make = (world: MatrixWorld, of: World, title?: string) => Promise<Revision>

const draft: Make = ({ test }, of, title) => buildDraft(test, of.engineer, title)
const inCheck: Make = ({ test }, of, title) => buildInCheck(test, of.engineer, title)

const checked: Make = ({ test }, of, title) => buildChecked(test, of.engineer, of.quality, title)

/** About a revision of one's own, and about one of elsewhere. */
const about = (make: Make, call: (revision: Revision) => Omit<CallParts, 'params'> = () => ({})): Expectation => {
  const parts = (revision: Revision): CallParts => ({ params: revisionParams(revision), ...call(revision) })
  return {
    own: async (world) => parts(await make(world, world.own)),
    foreign: async (world) => parts(await make(world, world.foreign, world.foreignMark)),
  }
}

const released = (world: MatrixWorld, of: World, partNumber?: string) => buildRelease(world.test, of.engineer, of.checker, partNumber)
const aboutReleased: Expectation = {
  own: async (world) => ({ params: paramsOf(await released(world, world.own)) }),
  foreign: async (world) => ({ params: paramsOf(await released(world, world.foreign, `${world.foreignMark}-${newPartNumber()}`)) }),
}
const paramsOf = ({ specificationId, revisionId }: { specificationId: string; revisionId: string }) => ({ specificationId, revisionId })

/** A draft that somebody said something about; what was said carries the mark too. */
const commented: Make = async (world, of, title) => {
  const made = await draft(world, of, title)
  await request(world.test.app, contract.writeComment, { as: of.engineer.cookie, params: revisionParams(made), body: { place: 'core.core', text: title ?? 'Is there a second source?' } }).expect(200)
  return made
}
async function commentCall(world: MatrixWorld, of: World, title?: string): Promise<CallParts> {
  const made = await commented(world, of, title)
  const { body } = await request(world.test.app, contract.listComments, { as: of.engineer.cookie, params: revisionParams(made) }).expect(200)
  return { params: { ...revisionParams(made), commentId: body[0]!.id }, body: { settled: true } }
}

const reason = 'Looked at with the author.'

export const specifications: FeatureExpectations = {
  listSpecifications: {
    own: async (world) => {
      await draft(world, world.foreign, world.foreignMark)
      return {}
    },
  },
  createSpecification: {
    own: () => {
      const partNumber = newPartNumber()
      return { body: { partNumber, title: 'Inductor', document: releasableDocument(partNumber) } }
    },
  },
  searchCandidates: { own: () => ({ body: { requirement: COUPLED_INDUCTOR, preferences: { shapes: ['EP'], finalists: 1 } } }) },
  getSpecification: {
    own: async (world) => ({ params: { specificationId: (await draft(world, world.own)).specificationId } }),
    foreign: async (world) => ({ params: { specificationId: (await draft(world, world.foreign, world.foreignMark)).specificationId } }),
  },
  specificationUse: {
    own: async (world) => ({ params: { specificationId: (await draft(world, world.own)).specificationId } }),
    foreign: async (world) => ({ params: { specificationId: (await draft(world, world.foreign, world.foreignMark)).specificationId } }),
  },
  getRevision: about(draft),
  createDraft: {
    own: async (world) => ({ params: { specificationId: (await released(world, world.own)).specificationId } }),
    foreign: async (world) => ({ params: { specificationId: (await released(world, world.foreign)).specificationId } }),
  },
  saveDraft: about(draft, ({ version, document }) => ({ body: { version, document } })),
  submitDraft: about(draft, ({ version }) => ({ body: { version } })),
  returnDraft: about(inCheck, () => ({ body: { reason } })),
  overrideCheck: about(inCheck, () => ({ body: { code: 'Q06', path: 'electrical.selfResonance', reason } })),
  releaseRevision: about(checked, ({ version }) => ({ body: { version } })),
  // An engineer withdraws a draft; a checker only what was released.
  withdrawRevision: { ...about(draft, () => ({ body: { reason } })), status: { checker: 409 } },
  listComments: about(commented),
  writeComment: about(draft, () => ({ body: { place: 'core.core', text: 'Is there a second source?' } })),
  settleComment: {
    own: async (world) => commentCall(world, world.own),
    foreign: async (world) => commentCall(world, world.foreign, world.foreignMark),
  },
  draftPdf: about(draft),
  calculationPdf: about(draft),
  outlineDxf: about(draft),
  releasedDocument: aboutReleased,
  releasedResults: aboutReleased,
  listReleases: {
    own: async (world) => {
      await released(world, world.foreign, `${world.foreignMark}-${newPartNumber()}`)
      return {}
    },
  },
  specificationJsonSchema: { own: () => ({}) },
}
