import { LETTERING } from '../shapes'
import { addColumns, addParagraphs, addTable, type Flow, newPage } from './flow'
import type { DrawingInput } from './input'
import { criticalMaterialsTable } from './critical-materials'
import { insulationFigures, pathTable } from './insulation-figures'
import { insulationSection } from './insulation-table'
import { cautionLines, noteLines, notStated } from './notices'
import { fieldTable, flyingLeadTable, relatedTable, revisionTable } from './record-tables'
import { fieldGroups, INSULATION_SYSTEM } from './stated-fields'
import { testTable } from './test-table'

/** Single-valued fields of core, former, impregnation, marking, packing and compliance. */
export function dataSheets(flow: Flow, input: DrawingInput): void {
  const { specification } = input
  newPage(flow, 'Core, former, marking and packing')
  const groups = fieldGroups(input).filter(({ title }) => title !== INSULATION_SYSTEM)
  addColumns(flow, [...groups.map(fieldTable), relatedTable(specification)], 3)
  addTable(flow, flyingLeadTable(specification))
}

/** Insulation boundaries, tests, cautions, notes, revisions and what is not stated. */
export function insulationSheets(flow: Flow, input: DrawingInput, also: { revisions: boolean; notStated: boolean }): void {
  const { specification } = input
  newPage(flow, 'Insulation')
  const { boundaries, withstand, sources } = insulationSection(input)
  insulationFigures(flow, input)
  addTable(flow, boundaries)
  addTable(flow, pathTable(input))
  addTable(flow, withstand)
  addParagraphs(flow, 'Sources of required values', sources, LETTERING.small)
  addColumns(flow, fieldGroups(input).filter(({ title }) => title === INSULATION_SYSTEM).map(fieldTable), 3)
  addTable(flow, criticalMaterialsTable(input))
  newPage(flow, 'Tests and notes')
  addTable(flow, testTable(specification))
  addParagraphs(flow, 'CAUTION', cautionLines(input))
  addParagraphs(flow, 'Notes', noteLines(specification))
  if (also.revisions) addTable(flow, revisionTable(specification))
  if (also.notStated) addParagraphs(flow, 'Not stated', notStated(input), LETTERING.small)
}
