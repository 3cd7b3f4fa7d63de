import { describe, expect, it } from 'vitest'
import type { WorklistItem } from '#shared/contracts/worklist'
import { sortWorklist } from './sort-worklist'

const item = (id: string, rest: Partial<WorklistItem>): WorklistItem => ({
  id,
  kind: 'test',
  title: id,
  detail: '',
  state: 'open',
  since: '2026-01-01T00:00:00.000Z',
  dueAt: null,
  link: { route: 'worklist', params: {} },
  ...rest,
})
const ids = (items: readonly WorklistItem[]) => items.map(({ id }) => id)

describe('sortWorklist', () => {
  it('sets apart what is overdue by the server’s time and orders the rest by due time, undated last', () => {
    const sorted = sortWorklist(
      [
        item('undated', {}),
        item('later', { dueAt: '2026-02-09T00:00:00.000Z' }),
        item('soon', { dueAt: '2026-02-02T00:00:00.000Z' }),
        item('late', { dueAt: '2026-01-31T00:00:00.000Z' }),
        item('old', { state: 'done', since: '2026-01-02T00:00:00.000Z' }),
        item('recent', { state: 'done', since: '2026-01-20T00:00:00.000Z', dueAt: '2026-01-21T00:00:00.000Z' }),
      ],
      '2026-02-01T00:00:00.000Z',
    )
    expect(ids(sorted.overdue)).toEqual(['late'])
    expect(ids(sorted.open)).toEqual(['soon', 'later', 'undated'])
    expect(ids(sorted.done)).toEqual(['recent', 'old'])
  })
})
