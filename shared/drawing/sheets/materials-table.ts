import type { LibraryReference, SequenceStep, WindingSpecification } from '../../engine/specification'
import type { Column, Row, TableContent } from '../table'
import { celsius, joined, millimetres, plain } from './figures'
import { findRow, rowName, type DrawingInput } from './input'

const COLUMNS: readonly Column[] = [
  { key: 'use', header: 'Use', always: true },
  { key: 'name', header: 'Material', always: true },
  { key: 'data', header: 'Data' },
  { key: 'equivalents', header: 'Approved equivalents' },
  { key: 'confidence', header: 'Library row' },
]

/** Every library row that the specification uses, once, with the rule for equivalents. */
export function materialsTable(input: DrawingInput): TableContent {
  const { specification } = input
  const rule = equivalenceWords(specification)
  const rows = used(specification).map(([use, reference]) => materialRow(input, use, reference, rule))
  return { title: 'Materials', columns: COLUMNS, rows }
}

function equivalenceWords({ core }: WindingSpecification): string {
  const listed = core.approvedEquivalents.value ?? []
  const rule = core.equivalenceRule.value
  return joined([listed.join(', '), rule === 'listed-alternates-only' ? 'listed alternates only' : rule === null ? '' : 'others subject to written approval'], '; ')
}

function used(specification: WindingSpecification): [string, LibraryReference][] {
  const { core, former, windings, sequence } = specification
  const uses: [string, LibraryReference | null][] = [
    ['Core', core.core.value],
    ['Core material', core.material.value],
    ['Coil former', former.former.value],
    ...windings.map((winding): [string, LibraryReference] => [`Wire ${winding.name}`, winding.wire.wire]),
    ...sequence.flatMap(stepReferences),
  ]
  const merged = new Map<string, [string[], LibraryReference]>()
  for (const [use, reference] of uses) {
    if (!reference) continue
    const key = `${reference.kind} ${reference.id} ${reference.version}`
    const entry = merged.get(key)
    if (!entry) merged.set(key, [[use], reference])
    else if (!entry[0].includes(use)) entry[0].push(use)
  }
  return [...merged.values()].map(([names, reference]) => [mergedUse(names), reference])
}

/** `Wire P`, `Wire AUX` → `Wire P, AUX`. */
const mergedUse = (names: readonly string[]) => names.map((name, index) => (index > 0 ? name.replace(/^Wire /, '') : name)).join(', ')

function stepReferences(step: SequenceStep): [string, LibraryReference | null][] {
  switch (step.kind) {
    case 'winding':
      return [['Tape', step.interlayerTape], ['Sleeve', step.startSleeve?.sleeve ?? null], ['Sleeve', step.finishSleeve?.sleeve ?? null]]
    case 'tape':
      return [['Tape', step.tape]]
    case 'margin':
      return [['Margin tape', step.tape]]
    case 'core-tape':
      return [['Core tape', step.tape]]
    case 'sleeve':
      return [['Sleeve', step.sleeve]]
    case 'shield':
    case 'varnish':
      return []
  }
}

function materialRow(input: DrawingInput, use: string, reference: LibraryReference, rule: string): Row {
  const row = findRow(input.library, reference.kind, reference)
  return {
    cells: {
      use,
      name: rowName(input.library, reference),
      data: row ? describe(input, reference) : 'not in the parts library',
      equivalents: reference.kind === 'material' ? rule : '',
      confidence: joined([`version ${plain(reference.version)}`, row?.confidence === 'generic' ? 'generic, unverified: replace before release' : '']),
    },
  }
}

function describe({ library }: DrawingInput, reference: LibraryReference): string {
  const core = findRow(library, 'core', reference)
  if (core) return joined([core.standard, `Ae ${plain(core.effectiveAreaMm2)} mm²`, `le ${millimetres(core.effectiveLengthMm)}`])
  const former = findRow(library, 'former', reference)
  if (former) return joined([`window ${plain(former.windingWidthMm)} × ${millimetres(former.windingHeightMm)}`, `${plain(former.sections)} section${former.sections === 1 ? '' : 's'}`])
  const material = findRow(library, 'material', reference)
  if (material) return `initial permeability ${plain(material.initialPermeability)}`
  const wire = findRow(library, 'wire', reference)
  if (wire) return joined([wire.standard, `conductor ${millimetres(wire.conductorMm)}`, wire.strands > 1 ? `${plain(wire.strands)} strands` : ''])
  const tape = findRow(library, 'tape', reference)
  if (tape) return joined([tape.material, `thickness ${millimetres(tape.thicknessMm)}`, `class ${celsius(tape.thermalClassC)}`])
  const sleeve = findRow(library, 'sleeve', reference)
  return sleeve ? joined([sleeve.material, `bore ${millimetres(sleeve.boreMm)}`, `wall ${millimetres(sleeve.wallMm)}`, `class ${celsius(sleeve.thermalClassC)}`]) : ''
}
