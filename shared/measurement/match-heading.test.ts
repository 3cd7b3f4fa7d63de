import { expect, it } from 'vitest'
import { ROWS } from './expected-rows.fixture'
import { matchHeading } from './match-heading'

it.each([
  ['Lp', 't1', 'symbol'],
  ['LP', 't1', 'symbol'],
  ['Inductance', 't1', 'synonym'],
  ['Leakage', 't2', 'synonym'],
  ['rdc_s1', 't4', 'symbol'],
  ['DCR S1', 't4', 'synonym'],
  ['DCR P', 't3', 'synonym'],
  ['P : S1', 't5', 'symbol'],
  ['Ratio', 't5', 'synonym'],
  ['Hipot', 't6', 'synonym'],
  ['HV P-S (pass/fail)', 't6', 'symbol'],
  ['Lp @ 100 kHz', 't1', 'symbol'],
])('%s means %s by its %s', (label, rowId, how) => {
  expect(matchHeading(label, ROWS)).toEqual({ rowId, how })
})

it.each(['DCR', 'Remark', '', 'Rdc S2', 'Serial'])('“%s” means no row for certain', (label) => {
  expect(matchHeading(label, ROWS)).toBeNull()
})
