import { describe, expect, it } from 'vitest'
import type { FaultCoverage, RowForecast } from '#shared/engine/index'
import { causesText, faultText, forecastText, foundByText, shareText } from './coverage-words'

const plain = (text: string) => text.replace(/\s/g, ' ')
const fault = (part: Partial<FaultCoverage>): FaultCoverage => ({ kind: 'one-turn-more', values: { winding: 'P', turns: 64 }, foundBy: [], state: 'never', ...part })

describe('a fault in words', () => {
  it('names winding and number', () => expect(faultText(fault({}))).toBe('P has one turn too many (64)'))
  it('has its length in mm', () => expect(plain(faultText(fault({ kind: 'core-not-seated', values: { openMm: 0.03 } })))).toBe('The core halves stand 0.03 mm open'))
  it('names the rows that find it, and says which measure samples', () => {
    const foundBy = [{ rowId: 't1', symbol: 'P:S1', extent: 'every-part' as const, share: 1 }, { rowId: 't2', symbol: 'L P bias', extent: 'sample' as const, share: 0.162 }]
    expect(foundByText(fault({ foundBy }))).toBe('P:S1 100 %, L P bias 16.2 % (sample)')
  })
})

it('does not call nearly all of the parts all of them', () => {
  expect(shareText(0.994)).toBe('99.4 %')
  expect(shareText(0.012)).toBe('1 %')
})

it('shows a reading with its deviation, and a dash where there is none', () => {
  const forecast = { mean: 730e-6, deviation: 12.2e-6, shares: [{ cause: 'core-factor', halfWidth: 0.05, source: '' }] } as unknown as RowForecast
  expect(plain(forecastText(forecast, 'H'))).toBe('730 µH, s 12.2 µH')
  expect(forecastText({ ...forecast, mean: null }, 'H')).toBe('–')
  expect(causesText(forecast)).toBe('AL of the core ±5 %')
})
