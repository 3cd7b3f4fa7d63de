import { currentLibrary } from '#server/services/parts/library-for'
import { asActor } from '#server/db/as-actor'
import { BUOY_SUPPLY } from '#server/db/seed/specifications/requirements'
import { searchCandidates } from '#shared/contracts/specifications'
import { search, type SearchOutcome } from '#shared/engine/index'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildWorld } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test)
})
afterAll(() => test.stop())

const asked = (body: unknown) => request(test.app, searchCandidates, { body, as: world.engineer.cookie })
const preferences = { finalists: 6, shapes: ['ETD', 'ER'] as const }

describe('the search on the server', () => {
  it('finds in its thread what the engine finds beside it, figure by figure', async () => {
    const { body, status } = await asked({ requirement: BUOY_SUPPLY, preferences })
    expect(status, test.log.join('\n')).toBe(200)
    const library = await asActor(test.ctx, world.engineer, (tx) => currentLibrary(tx, world.engineer))
    const here = search(BUOY_SUPPLY, library, preferences)
    const there = body as SearchOutcome
    expect(there.candidates.map(({ id }) => id)).toEqual(here.candidates.map(({ id }) => id))
    there.candidates.forEach(({ figures }, index) => {
      for (const [key, value] of Object.entries(here.candidates[index]!.figures)) {
        const other = figures[key as keyof typeof figures]
        expect(value === null ? other : Math.abs(other! / value - 1), key).toSatisfy((error: number | null) => (value === null ? error === null : error! <= 1e-9))
      }
    })
    expect(there.rejected).toEqual(here.rejected)
  })

  it('says at which field a duty makes no sense, and takes nothing that it does not know', async () => {
    const broken = structuredClone(BUOY_SUPPLY)
    Object.assign(broken.duty, { switchingFrequencyHz: -1 })
    const answer = await asked({ requirement: broken, preferences: {} }).expect(400)
    expect(answer.body.code).toBe('invalid-input')
    expect(Object.keys(answer.body.fields)).toContainEqual(expect.stringMatching(/^requirement\.duty/))
    await asked({ requirement: BUOY_SUPPLY, preferences: { shapes: ['cube'] } }).expect(400)
  })

  it('runs one search per person at a time', async () => {
    const both = await Promise.all([asked({ requirement: BUOY_SUPPLY, preferences }), asked({ requirement: BUOY_SUPPLY, preferences })])
    expect(both.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(both.find(({ status }) => status === 409)!.body.code).toBe('busy')
  })
})
