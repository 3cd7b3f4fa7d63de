import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { effectScope, type EffectScope } from 'vue'
import type { Revision } from '#shared/contracts/specifications'
import type { SpecificationDocument } from '#shared/engine/specification'
import { ApiError } from '@/api/api-error'
import { mainsFlyback } from '../../../tests/support/sample-specification'
import { useSpecificationDraft } from './useSpecificationDraft'

const revision = (version: number, document: SpecificationDocument): Revision => ({
  id: 'r1', specificationId: 's1', label: 'P1', state: 'draft', createdBy: { id: 'p1', name: 'Eve' }, checkedBy: null, updatedAt: '2026-01-01T00:00:00.000Z', release: null,
  version, document, overrides: [], returnedReason: null, withdrawnReason: null, editors: [],
})

/** A server that keeps one document and refuses what was made from an older version. */
function serverWith(document: SpecificationDocument) {
  const held = { version: 1, document }
  return {
    held,
    save: vi.fn(async (version: number, sent: SpecificationDocument) => {
      if (version !== held.version) throw new ApiError({ code: 'stale-version', message: 'Somebody stored a change meanwhile.' })
      Object.assign(held, { version: version + 1, document: sent })
      return revision(held.version, sent)
    }),
    load: vi.fn(async () => revision(held.version, held.document)),
  }
}

let scope: EffectScope
const open = (server: ReturnType<typeof serverWith>, initial = revision(1, server.held.document)) => scope.run(() => useSpecificationDraft(initial, 'p1', server))!
const titleOf = (document: SpecificationDocument) => document.specification.title.title.value
const retitle = (draft: ReturnType<typeof open>, title: string) => draft.write({ 'title.title.value': title })
const pause = () => vi.advanceTimersByTimeAsync(2000)

describe('useSpecificationDraft', () => {
  beforeEach(() => {
    vi.useFakeTimers()
    scope = effectScope()
  })
  afterEach(() => {
    scope.stop()
    vi.useRealTimers()
    sessionStorage.clear()
  })

  it('stores after a pause, each time from the version before', async () => {
    const server = serverWith(mainsFlyback())
    const draft = open(server)
    retitle(draft, 'A')
    retitle(draft, 'AB')
    await pause()
    retitle(draft, 'ABC')
    await pause()
    expect(server.save.mock.calls.map(([version, document]) => [version, titleOf(document)])).toEqual([[1, 'AB'], [2, 'ABC']])
    expect(draft.state.value).toBe('stored')
    expect(sessionStorage).toHaveLength(0)
  })

  it('stores what was typed while it was storing', async () => {
    const server = serverWith(mainsFlyback())
    const draft = open(server)
    server.save.mockImplementationOnce(async (_, sent) => {
      retitle(draft, 'later')
      Object.assign(server.held, { version: 2, document: sent })
      return revision(2, sent)
    })
    retitle(draft, 'first')
    await pause()
    await pause()
    expect(titleOf(server.held.document)).toBe('later')
    expect(draft.state.value).toBe('stored')
  })

  it('does not send what does not fit, says where, and keeps it through a reload', async () => {
    const server = serverWith(mainsFlyback())
    const draft = open(server)
    draft.write({ 'windings.0.turns': -1 })
    await pause()
    expect([draft.state.value, server.save.mock.calls.length]).toEqual(['not-fitting', 0])
    expect([...draft.schemaProblems.value.keys()]).toEqual(['windings.0.turns'])

    const again = open(serverWith(mainsFlyback()))
    expect(again.document.value.specification.windings[0]!.turns).toBe(-1)
    expect(again.restored).toBe(true)
  })

  describe('when somebody else stored meanwhile', () => {
    async function conflict() {
      const server = serverWith(mainsFlyback())
      const draft = open(server)
      const theirs = structuredClone(server.held.document)
      theirs.specification.title.title.value = 'theirs'
      Object.assign(server.held, { version: 2, document: theirs })
      retitle(draft, 'mine')
      await pause()
      return { server, draft }
    }

    it('keeps mine in sight, stores nothing and asks', async () => {
      const { server, draft } = await conflict()
      expect([draft.state.value, titleOf(draft.document.value), titleOf(server.held.document)]).toEqual(['conflict', 'mine', 'theirs'])
      retitle(draft, 'mine still')
      await pause()
      expect(server.save).toHaveBeenCalledTimes(1)
    })

    it('goes on with theirs or with mine, as chosen for the field', async () => {
      const { server, draft } = await conflict()
      draft.merge.choose('specification.title.title', 'theirs')
      await draft.resolve()
      expect([draft.state.value, titleOf(draft.document.value), draft.version.value]).toEqual(['stored', 'theirs', 2])

      const second = await conflict()
      second.draft.merge.chooseAll('mine')
      await second.draft.resolve()
      expect([second.draft.state.value, titleOf(second.server.held.document), second.server.held.version]).toEqual(['stored', 'mine', 3])
      expect(server.save).toHaveBeenCalledTimes(1)
    })

    it('takes over what only the other one changed, by itself, and undo does not take it away', async () => {
      const server = serverWith(mainsFlyback())
      const draft = open(server)
      retitle(draft, 'before')
      await pause()
      const theirs = structuredClone(server.held.document)
      theirs.specification.windings[0]!.turns = 77
      Object.assign(server.held, { version: 3, document: theirs })
      retitle(draft, 'mine')
      await pause()
      await pause()
      const kept = (document: SpecificationDocument) => [titleOf(document), document.specification.windings[0]!.turns]
      expect([draft.state.value, kept(server.held.document), server.held.version]).toEqual(['stored', ['mine', 77], 4])
      draft.undo()
      expect(kept(draft.document.value)).toEqual(['before', 77])
    })

    it('brings together after a reload too, from what was stored when it was typed', async () => {
      const { server } = await conflict()
      const again = open(server, revision(2, server.held.document))
      await pause()
      expect(again.merge.conflicts.value.map(({ key }) => key)).toEqual(['specification.title.title'])
    })
  })

  it('keeps what could not be sent, and sends it by itself when the server is back', async () => {
    const server = serverWith(mainsFlyback())
    const draft = open(server)
    server.save.mockRejectedValueOnce(new ApiError({ code: 'no-connection', message: 'The server could not be reached.' }))
    retitle(draft, 'offline')
    await pause()
    expect([draft.state.value, draft.failure.value?.code, sessionStorage.length]).toEqual(['failed', 'no-connection', 1])
    await vi.advanceTimersByTimeAsync(10_000)
    expect(draft.state.value).toBe('stored')
    expect(titleOf(server.held.document)).toBe('offline')
  })
})
