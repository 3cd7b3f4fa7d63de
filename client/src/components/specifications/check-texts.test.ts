import { describe, expect, it } from 'vitest'
import { CHECK_CATALOGUE, evaluate } from '#shared/engine/index'
import { mainsFlyback, sampleLibrary } from '../../../../tests/support/sample-specification'
import { CHECK_TEXTS } from './check-sentences'
import { checkFigure, checkSubject, FINDING_TEXTS, findingText } from './check-texts'

describe('check texts', () => {
  it('have a sentence for every check of the engine, and for none that there is not', () => {
    expect(Object.keys(CHECK_TEXTS).sort()).toEqual(CHECK_CATALOGUE.map(({ code }) => code).sort())
  })

  it('say every finding without holes where its values are missing', () => {
    for (const [code, say] of Object.entries(FINDING_TEXTS)) {
      const sentence = say({})
      expect(sentence, code).toMatch(/^\p{Lu}.*\.$/u)
      expect(sentence, code).not.toMatch(/undefined/)
    }
  })

  it('say what the engine finds about a real part', () => {
    const { findings, checks } = evaluate(mainsFlyback(), sampleLibrary)
    for (const finding of findings) expect(findingText(finding)).not.toMatch(/undefined|NaN|–\./)
    for (const check of checks) expect(`${checkFigure(check, check.value)} ${checkSubject(check)}`).not.toMatch(/undefined|NaN/)
  })
})

describe('checkFigure', () => {
  it.each([
    [{ code: 'W03', unit: '1' }, 0.873, '87.3\u00a0%'],
    [{ code: 'T03', unit: '1' }, 2.514, '2.51'],
    [{ code: 'E01', unit: 'T' }, 0.3012, '301\u00a0mT'],
    [{ code: 'T07', unit: 'W/m³' }, 187_000, '187\u00a0kW/m³'],
    [{ code: 'I04', unit: 'mm' }, 6.4, '6.4\u00a0mm'],
    [{ code: 'E01', unit: 'T' }, null, '–'],
  ])('writes %j of %d as %s', (check, value, text) => {
    expect(checkFigure(check, value)).toBe(text)
  })
})
