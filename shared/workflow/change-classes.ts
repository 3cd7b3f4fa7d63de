import type { DocumentChange } from './compare-documents'
import { isTree, same } from './document-rows'

/** Kinds of change of a released specification that ask different things of vendors, samples and certificates. */
export const CHANGE_CLASSES = [
  'clarification',
  'limit-widened',
  'limit-tightened',
  'turns-gap',
  'wire',
  'construction',
  'core',
  'former-pins',
  'process-material',
  'insulation-demand',
  'test-method',
  'marking-packing',
  'declaration',
] as const
export type ChangeClass = (typeof CHANGE_CLASSES)[number]

type Decide = (change: DocumentChange, field: string) => ChangeClass | null

const always = (kind: ChangeClass): Decide => () => kind

/** True when what was accepted before is accepted still; null means no limit on that side. */
function contains([lower, upper]: Limits, [innerLower, innerUpper]: Limits): boolean {
  const below = lower === null || (innerLower !== null && lower <= innerLower)
  const above = upper === null || (innerUpper !== null && upper >= innerUpper)
  return below && above
}

type Limits = readonly [lower: number | null, upper: number | null]
const number = (value: unknown): number | null => (typeof value === 'number' ? value : null)

/** Widened only when nothing that passed before fails now. */
export const limitChange = (before: Limits, after: Limits): ChangeClass => (contains(after, before) ? 'limit-widened' : 'limit-tightened')

/** A single limit: a larger value of a maximum, or a smaller one of a minimum, lets more pass. */
const maximum: Decide = ({ before, after }) => limitChange([null, number(before)], [null, number(after)])
const minimum: Decide = ({ before, after }) => limitChange([number(before), null], [number(after), null])

function inductance({ before, after }: DocumentChange): ChangeClass {
  const [older, newer] = [valueOf(before), valueOf(after)]
  if (!isTree(older) || !isTree(newer)) return older === null ? 'limit-tightened' : 'limit-widened'
  const limits = ({ nominalH, lowerTolerance, upperTolerance }: Readonly<Record<string, unknown>>): Limits => {
    const end = (tolerance: unknown) => (typeof tolerance === 'number' ? Number(nominalH) * (1 + tolerance) : null)
    return [end(lowerTolerance), end(upperTolerance)]
  }
  return same(limits(older), limits(newer)) ? 'test-method' : limitChange(limits(older), limits(newer))
}

const valueOf = (stated: unknown): unknown => (isTree(stated) && 'value' in stated ? stated.value : (stated ?? null))

/** A whole of several demands: what is new or removed says its direction; in between the stricter is assumed. */
const demand: Decide = ({ before, after }) => (valueOf(after) === null && valueOf(before) !== null ? 'limit-widened' : 'limit-tightened')

// Fields of rows, by the last part of the place.
const CONDITIONS = new Set(['frequencyHz', 'levelV', 'temperatureC', 'model', 'method', 'instrumentClass', 'biasA', 'windingId', 'windingIds', 'shortedWindingIds', 'boundaryId', 'numeratorWindingId', 'denominatorWindingId', 'terminalsTied', 'drivenTerminals', 'shortedTerminals', 'openTerminals', 'extent', 'acceptableQualityLimit', 'criticalToQuality', 'reaction', 'record', 'unit', 'characteristic'])
const LIMIT_FIELDS: Readonly<Record<string, Decide>> = {
  maximumH: maximum, minimumH: minimum, maximumF: maximum, maximumOhm: maximum, minimumOhm: minimum, maximum, minimum, tolerance: maximum,
  currentA: ({ before, after }) => ((number(after) ?? 0) > (number(before) ?? 0) ? 'limit-tightened' : 'limit-widened'),
  remainingShare: minimum,
  nominal: always('clarification'), nominalOhm: always('clarification'), symbol: always('clarification'), number: always('clarification'),
}

function limitRow(change: DocumentChange, field: string): ChangeClass {
  if (change.kind === 'added') return 'limit-tightened'
  if (change.kind === 'removed') return 'limit-widened'
  if (change.kind === 'moved') return 'clarification'
  return LIMIT_FIELDS[field]?.(change, field) ?? (CONDITIONS.has(field) ? 'test-method' : 'limit-tightened')
}

function winding(change: DocumentChange, field: string): ChangeClass {
  if (change.kind === 'added' || change.kind === 'removed') return 'turns-gap'
  if (change.kind === 'moved' || /^(name|role|outputId|rmsCurrentA|peakCurrentA|dcCurrentA)$/.test(field)) return 'clarification'
  if (field === 'turns') return 'turns-gap'
  if (field === 'startTerminal' || field === 'finishTerminal') return 'former-pins'
  if (field === 'side') return 'insulation-demand'
  if (change.key.includes('.dcResistance')) return field === 'dcResistance' ? demand(change, field)! : limitRow(change, field)
  return 'wire'
}

function step(change: DocumentChange, field: string): ChangeClass {
  if (field === 'remark') return 'clarification'
  if (field === 'turns') return 'turns-gap'
  const row = change.after ?? change.before
  return isTree(row) && row.kind === 'varnish' ? 'process-material' : 'construction'
}

/** The first entry whose beginning fits decides; finer ones stand before coarser ones. */
const RULES: readonly (readonly [beginning: string, decide: Decide])[] = [
  ['title', always('clarification')],
  ['contract', always('construction')],
  ['electrical.inductance', inductance],
  ['electrical.topology', always('clarification')],
  ['electrical.switchingFrequencyHz', always('clarification')],
  ['electrical.dutyRatio', always('clarification')],
  ['electrical.leakage', limitRow],
  ['electrical.saturation', limitRow],
  ['electrical.turnsRatios', limitRow],
  ['electrical.interwindingCapacitance', limitRow],
  ['electrical.windingCapacitance', limitRow],
  ['electrical', demand],
  ['core.gap', always('turns-gap')],
  ['core.assembly.adhesive', always('process-material')],
  ['core.assembly.adhesivePosition', always('process-material')],
  ['core.assembly', always('construction')],
  ['core.potential', always('insulation-demand')],
  ['core.fluxBand', always('construction')],
  ['core.insulationOverCore', always('construction')],
  ['core', always('core')],
  ['former.massG', demand],
  ['former', always('former-pins')],
  ['windings', winding],
  ['sequence', step],
  ['impregnation', always('process-material')],
  ['insulation.cautions', always('clarification')],
  ['insulation.polymers', always('process-material')],
  ['insulation.criticalMaterials', always('process-material')],
  ['insulation', always('insulation-demand')],
  ['marking', always('marking-packing')],
  ['packing', always('marking-packing')],
  ['compliance', always('declaration')],
  ['tests', limitRow],
  ['notes', always('clarification')],
  ['tolerances', demand],
  ['revisions', () => null],
]

/** Lifting a field to mandatory tightens it, releasing it from that widens it. */
function statusChange(older: unknown, newer: unknown): ChangeClass | null {
  if (older === newer || typeof newer !== 'string') return null
  return newer === 'mandatory' ? 'limit-tightened' : 'limit-widened'
}

const isStated = (value: unknown): value is { value: unknown; status: unknown } => isTree(value) && 'value' in value && 'status' in value

/**
 * What kinds of change one difference is; `change.path` counts from the specification. Empty for what asks nothing of
 * anybody, such as the revision block itself.
 */
export function classesOf(change: DocumentChange): ChangeClass[] {
  const field = change.path.split('.').at(-1)!
  const rule = RULES.find(([beginning]) => change.path === beginning || change.path.startsWith(`${beginning}.`))
  const { kind, before, after } = change
  if (kind === 'changed' && field === 'status') return unique([statusChange(before, after)])
  const binds = kind === 'changed' && isStated(before) && isStated(after) && !change.path.startsWith('title')
  const onlyStatus = binds && same(before.value, after.value)
  return unique([onlyStatus ? null : (rule?.[1](change, field) ?? null), binds ? statusChange(before.status, after.status) : null])
}

const unique = (found: readonly (ChangeClass | null)[]) => [...new Set(found.filter((one): one is ChangeClass => one !== null))]
