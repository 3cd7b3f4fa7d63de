import { boundaryEndWords, SIDE_WORDS } from '#shared/drawing/sheets/words'
import type { AnyLibraryRow, Library, LibraryKind } from '#shared/engine/library'
import type { BoundaryEnd, LibraryReference, RequirementSheet, WindingSpecification } from '#shared/engine/specification'
import type { Choice, FieldSpec } from '../field-types'
import type { ChoiceGroup } from './ChoiceEntry.vue'

/** What choices depend on. */
export interface ChoiceSource {
  specification: WindingSpecification | undefined
  requirement: RequirementSheet | null
  library: Library
}

const KINDS: Readonly<Record<LibraryKind, keyof Library>> = { core: 'cores', former: 'formers', material: 'materials', wire: 'wires', tape: 'tapes', sleeve: 'sleeves' }

export const rowsOf = (library: Library, kind: LibraryKind): readonly AnyLibraryRow[] => library[KINDS[kind]]

export const referenceKey = (reference: LibraryReference | null): string => (reference ? `${reference.id}@${reference.version}` : '')

export function referenceOf(kind: LibraryKind, key: string): LibraryReference | null {
  const cut = key.lastIndexOf('@')
  return cut < 0 ? null : { kind, id: key.slice(0, cut), version: Number(key.slice(cut + 1)) }
}

export const firstReference = (library: Library, kind: LibraryKind): LibraryReference | null => {
  const row = rowsOf(library, kind)[0]
  return row ? { kind, id: row.id, version: row.version } : null
}

function familyOf(row: AnyLibraryRow, { specification, library }: ChoiceSource): string {
  switch (row.kind) {
    case 'core':
      return row.shape
    case 'former':
      return row.coreId === specification?.core.core.value?.id ? 'For the chosen core' : `For ${library.cores.find(({ id }) => id === row.coreId)?.name ?? row.coreId}`
    case 'material':
      return row.use
    case 'wire':
      return row.form === 'round' ? (row.size.startsWith('AWG') ? 'Round, AWG' : 'Round, IEC 60317') : row.form
    case 'tape':
      return row.use
    case 'sleeve':
      return row.material
  }
}

/** The newest version of each row, and the one in use where that is an older one. */
function references(kind: LibraryKind, current: string, source: ChoiceSource): ChoiceGroup[] {
  const newest = new Map<string, AnyLibraryRow>()
  for (const row of rowsOf(source.library, kind)) if (!newest.has(row.id)) newest.set(row.id, row)
  const used = rowsOf(source.library, kind).find((row) => referenceKey(row) === current)
  const groups = new Map<string, (Choice & { key: string })[]>()
  for (const row of new Set([...newest.values(), ...(used ? [used] : [])])) {
    const family = familyOf(row, source)
    const older = newest.get(row.id)!.version !== row.version
    const label = `${row.name}${row.confidence === 'generic' ? ', unverified' : ''}${older ? `, version ${row.version}` : ''}`
    groups.set(family, [...(groups.get(family) ?? []), { key: referenceKey(row), value: referenceKey(row), label }])
  }
  const entries = [...groups].map(([label, choices]): ChoiceGroup => ({ label, choices }))
  return entries.sort((a, b) => Number(b.label === 'For the chosen core') - Number(a.label === 'For the chosen core'))
}

const plain = (choices: readonly Choice[]): ChoiceGroup[] => [{ label: '', choices: choices.map((one) => ({ ...one, key: String(one.value) })) }]

const terminalChoices = ({ specification }: ChoiceSource): Choice[] =>
  [...(specification?.former.pins ?? []).filter(({ state }) => state !== 'missing').map(({ number }) => number), ...(specification?.former.flyingLeads ?? []).map(({ name }) => name)].map((value) => ({ value, label: value }))

export const endKey = (end: BoundaryEnd): string => (end.kind === 'side' ? `side:${end.side}` : end.kind === 'winding' ? `winding:${end.windingId}` : 'core')

export function endOf(key: string): BoundaryEnd {
  const [kind, name = ''] = key.split(':')
  if (kind === 'side') return { kind: 'side', side: name as Extract<BoundaryEnd, { kind: 'side' }>['side'] }
  return kind === 'winding' ? { kind: 'winding', windingId: name } : { kind: 'core' }
}

function ends({ specification }: ChoiceSource): ChoiceGroup[] {
  const choice = (end: BoundaryEnd) => ({ key: endKey(end), value: endKey(end), label: specification ? boundaryEndWords(specification, end) : endKey(end) })
  return [
    { label: 'Sides', choices: (Object.keys(SIDE_WORDS) as (keyof typeof SIDE_WORDS)[]).map((side) => choice({ kind: 'side', side })) },
    { label: 'Core', choices: [choice({ kind: 'core' })] },
    { label: 'Windings', choices: (specification?.windings ?? []).map(({ id }) => choice({ kind: 'winding', windingId: id })) },
  ]
}

/** The choices of a field, whatever they depend on. */
export function choicesOf(field: FieldSpec, current: string, source: ChoiceSource): ChoiceGroup[] {
  const { specification, requirement } = source
  switch (field.type) {
    case 'choice':
      return plain(field.choices)
    case 'yes-no':
      return plain([{ value: true, label: 'yes' }, { value: false, label: 'no' }])
    case 'reference':
      return references(field.kind, current, source)
    case 'terminal':
      return plain(terminalChoices(source))
    case 'winding':
      return plain((specification?.windings ?? []).map(({ id, name }) => ({ value: id, label: name })))
    case 'boundary':
      return plain((specification?.insulation.boundaries ?? []).map(({ id, name }) => ({ value: id, label: name })))
    case 'output':
      return plain(requirement && 'outputs' in requirement.duty ? requirement.duty.outputs.map(({ id, name }) => ({ value: id, label: name })) : [])
    case 'end':
      return ends(source)
    default:
      return []
  }
}
