import { describe, expect, it } from 'vitest'
import { changeOf, changeText, impedanceOf, impedanceText, terminalGroupsOf, terminalGroupsText, terminalsOf } from './line-texts'

describe('terminals', () => {
  it('stand apart by commas or blanks', () => {
    expect(terminalsOf('3, 4  7')).toEqual(['3', '4', '7'])
  })

  it('are grouped by semicolons and read back as written', () => {
    expect(terminalGroupsOf('3, 4; 7 8;')).toEqual([['3', '4'], ['7', '8']])
    expect(terminalGroupsText([['3', '4'], ['7']])).toBe('3, 4; 7')
  })
})

describe('a change of a revision', () => {
  it('is read with either arrow', () => {
    expect(changeOf('Turns S1: 5 -> 6')).toEqual({ field: 'Turns S1', before: '5', after: '6' })
    expect(changeText({ field: 'Turns S1', before: '5', after: '6' })).toBe('Turns S1: 5 → 6')
  })

  it('is not guessed at where the arrow is missing', () => {
    expect(changeOf('Turns S1: 6')).toBeNull()
  })
})

describe('a point of impedance', () => {
  it('is read with its units and written in kilohertz', () => {
    expect(impedanceOf('1 MHz: 5k Ω')).toEqual({ frequencyHz: 1e6, minimumOhm: 5000 })
    expect(impedanceText({ frequencyHz: 150e3, minimumOhm: 1000 })).toBe('150 kHz: 1000 Ω')
  })

  it.each(['150 kHz', '150 kHz: none', '-1 kHz: 5 Ω', '1 kHz: 2 Ω: 3'])('refuses “%s”', (line) => {
    expect(impedanceOf(line)).toBeNull()
  })
})
