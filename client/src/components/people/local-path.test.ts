import { describe, expect, it } from 'vitest'
import { localPath } from './local-path'

describe('localPath', () => {
  it('goes on to a path of this program', () => {
    expect(localPath('/rfqs/7?tab=2#due')).toBe('/rfqs/7?tab=2#due')
  })

  it.each(['https://elsewhere.example/', '//elsewhere.example/', '/\\elsewhere.example', 'javascript:alert(1)', undefined, ['/a']])('does not follow %s', (next) => {
    expect(localPath(next)).toBe('/')
  })
})
