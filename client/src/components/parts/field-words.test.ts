import { expect, it } from 'vitest'
import { shippedLibrary } from '../../../../server/db/seed/parts/library'
import { fieldWord } from './field-words'

it('calls a field what the form calls it, in a sentence', () => {
  expect(['tubeWallMm', 'windingWidthMm', 'pinSection', 'envelopeMm', 'initialPermeability'].map(fieldWord)).toEqual(['wall of the tube', 'winding width', 'section and size of a pin', 'size with core', 'initial permeability µi'])
})

it('has a word for every field that a shipped row leaves unverified', () => {
  const fields = new Set(Object.values(shippedLibrary()).flat().flatMap(({ unverified }) => unverified))
  expect([...fields].filter((path) => fieldWord(path) === null)).toEqual([])
})
