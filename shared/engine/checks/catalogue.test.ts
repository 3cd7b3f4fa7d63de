import { describe, expect, it } from 'vitest'
import { CHECK_CATALOGUE } from './catalogue'

const withSeverity = (severity: string) => CHECK_CATALOGUE.filter((entry) => entry.severity === severity).map(({ code }) => code)

/** What stops a release, by topic. A code that is taken away here is a check that nobody makes any more. */
const STOPPING = {
  electrical: ['E01', 'E03', 'E04', 'E06', 'E07', 'E09', 'E14', 'E18', 'E19', 'E27', 'E35'],
  thermal: ['T08', 'T11', 'T12'],
  insulation: ['I01', 'I02', 'I03', 'I04', 'I05', 'I06', 'I07', 'I08', 'I09', 'I10', 'I11', 'I13', 'I14', 'I15', 'I16', 'I17', 'I26', 'I28', 'I29', 'I31', 'I32', 'I33'],
  windability: ['W01', 'W02', 'W03', 'W17', 'W18', 'W19', 'W20', 'W25'],
  terminations: ['P01', 'P02', 'P05', 'P08', 'P11', 'P12', 'P14', 'P21', 'P22'],
  documents: ['D01', 'D02', 'D06', 'D07', 'D08', 'D14'],
  tests: ['Q01', 'Q02', 'Q05', 'Q12', 'Q14', 'Q16'],
  library: ['L01'],
}

/** What only somebody who has the part, the board or the wire's data sheet before them can tell. */
const BY_A_PERSON = ['T15', 'I12', 'I15', 'I20', 'P10', 'P21']

/** How many codes each topic has; codes run without a gap but where a rule was split off under its own code. */
const COUNTS = { E: 35, T: 17, I: 33, W: 27, P: 22, D: 14, Q: 18, L: 2 }

describe('the catalogue of release checks', () => {
  it('has each code once, of every topic without a gap', () => {
    const codes = CHECK_CATALOGUE.map(({ code }) => code)
    expect(new Set(codes).size).toBe(codes.length)
    for (const [letter, count] of Object.entries(COUNTS)) {
      expect(codes.filter((code) => code.startsWith(letter)), letter).toEqual(Array.from({ length: count }, (_, index) => `${letter}${String(index + 1).padStart(2, '0')}`))
    }
  })

  it('stops a release by every check that has to', () => {
    expect(withSeverity('S').sort()).toEqual(Object.values(STOPPING).flat().sort())
  })

  it('leaves to a person only what no data can tell, one by one', () => {
    expect(CHECK_CATALOGUE.filter(({ decidedBy }) => decidedBy === 'person').map(({ code }) => code).sort()).toEqual([...BY_A_PERSON].sort())
  })

  it('decides at least 110 checks by data', () => {
    expect(CHECK_CATALOGUE.filter(({ decidedBy }) => decidedBy === 'data').length).toBeGreaterThanOrEqual(110)
  })
})
