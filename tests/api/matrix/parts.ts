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
}
