import { shippedLibrary } from '#server/db/seed/parts/library'
import * as contract from '#shared/contracts/parts'
import type { PartDraft } from '#shared/contracts/part-rows'
import { randomUUID } from 'node:crypto'
import { request } from '../../support/test-app'
import type { FeatureExpectations } from './expectation'
import type { MatrixWorld, World } from './world'

const { version: _version, ...shippedSleeve } = shippedLibrary().sleeves[0]!

const sleeve = (note = ''): PartDraft => ({ ...shippedSleeve, id: randomUUID(), note, unverified: [...shippedSleeve.unverified] })

/** A row that only this company has. Its identifier looks like a random one, so that an absent one can be asked for. */
async function madeBy({ test }: MatrixWorld, world: World, note?: string): Promise<PartDraft> {
  const row = sleeve(note)
  await request(test.app, contract.createPart, { as: world.engineer.cookie, body: { row, reason: `Needed. ${note ?? ''}` } }).expect(200)
  return row
}

const paramsOf = ({ kind, id }: PartDraft) => ({ kind, id })
const changeOf = (row: PartDraft) => ({ params: paramsOf(row), body: { row: { ...row, name: 'Changed' }, basedOn: 1, reason: 'Measured.' } })

const FLAGS = { preferred: true, stocked: true }

/** A table of one new row. */
const tableOf = (id: string) => ({ name: 'sleeves.csv', content: `id;name;source;edition;confidence;material;boreMm;wallMm;thermalClassC\n${id};Sleeve;Data sheet;2024;high;PTFE;1,5;0,4;180\n` })

/** The fingerprint of what an engineer of the company was shown. */
async function previewed({ test, own }: MatrixWorld, file: ReturnType<typeof tableOf>): Promise<string> {
  const { body } = await request(test.app, contract.previewPartImport, { as: own.engineer.cookie, body: { kind: 'sleeve' }, file }).expect(200)
  return body.fingerprint as string
}

export const parts: FeatureExpectations = {
  listParts: {
    own: async (world) => {
      await madeBy(world, world.foreign, world.foreignMark)
      return { query: { kind: 'sleeve', limit: 500 } }
    },
  },
  getLibrary: {
    own: async (world) => {
      await madeBy(world, world.foreign, world.foreignMark)
      return { query: { versions: 'all' } }
    },
  },
  getPart: {
    own: async (world) => ({ params: paramsOf(await madeBy(world, world.own)) }),
    foreign: async (world) => ({ params: paramsOf(await madeBy(world, world.foreign, world.foreignMark)) }),
  },
  createPart: { own: () => ({ body: { row: sleeve(), reason: 'Needed.' } }) },
  changePart: {
    own: async (world) => changeOf(await madeBy(world, world.own)),
    foreign: async (world) => changeOf(await madeBy(world, world.foreign, world.foreignMark)),
  },
  getPartFlags: {
    own: async (world) => {
      const row = await madeBy(world, world.foreign, world.foreignMark)
      await request(world.test.app, contract.setPartFlags, { as: world.foreign.engineer.cookie, params: paramsOf(row), body: FLAGS }).expect(200)
      return {}
    },
  },
  setPartFlags: {
    own: async (world) => ({ params: paramsOf(await madeBy(world, world.own)), body: FLAGS }),
    foreign: async (world) => ({ params: paramsOf(await madeBy(world, world.foreign, world.foreignMark)), body: FLAGS }),
  },
  previewPartImport: { own: () => ({ body: { kind: 'sleeve' }, file: tableOf(randomUUID()) }) },
  importParts: {
    own: async (world) => {
      const file = tableOf(randomUUID())
      return { body: { kind: 'sleeve', reason: 'Needed.', fingerprint: await previewed(world, file) }, file }
    },
  },
}
