import { describe, expect, it } from 'vitest'
import { fileProblem, formatBytes } from './file-rules'

describe('fileProblem', () => {
  it('takes a file of a listed kind, whatever the case of its ending', () => {
    expect(fileProblem({ name: 'Quotation.PDF', size: 10 }, ['pdf', 'xlsx'], 100)).toBeNull()
  })

  it.each([
    [{ name: 'virus.exe', size: 10 }, '“virus.exe” is of a kind that is not taken here. Choose a file ending in .pdf.'],
    [{ name: 'a.pdf', size: 0 }, '“a.pdf” is empty (0 bytes). Save it again and choose it anew.'],
    [{ name: 'a.pdf', size: 100_000_000 }, '“a.pdf” has 100.0 MB; at most 25.0 MB are taken.'],
  ])('refuses %o', (file, sentence) => {
    expect(fileProblem(file, ['pdf'], 25_000_000)).toBe(sentence)
  })
})

describe('formatBytes', () => {
  it.each([
    [999, '999 B'],
    [1500, '2 kB'],
    [2_340_000, '2.3 MB'],
  ])('%d', (bytes, text) => {
    expect(formatBytes(bytes)).toBe(text)
  })
})
