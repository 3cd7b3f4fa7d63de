import type { CheckResult } from '../evaluation'
import { namedTerminals, sequenceTurns } from '../evaluate/document-findings'
import type { ReleaseRecord } from '../specification'
import { notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const filled = (value: string | null) => value !== null && value.trim() !== ''

function titleBlock({ document }: CheckInput): Outcome[] {
  const { title } = document.specification
  return (['legalOwner', 'partNumber', 'title', 'documentType'] as const).map((field) => yesNo(filled(title[field].value), `title.${field}`))
}

function drawingConventions({ document }: CheckInput): Outcome[] {
  const { title, tolerances } = document.specification
  const withdrawn = (tolerances.general.value ?? '').includes('2768-2')
  return [yesNo(title.projection.value !== null, 'title.projection'), yesNo(filled(tolerances.general.value) && !withdrawn, 'tolerances.general')]
}

function equivalents({ document }: CheckInput): Outcome[] {
  return [yesNo(document.specification.core.equivalenceRule.value !== null, 'core.equivalenceRule')]
}

/** Schematic, winding table, sequence, pin-out and test table speak of the same windings and the same pins. */
function crossMatch({ document }: CheckInput): Outcome[] {
  const { specification } = document
  const terminals = namedTerminals(specification)
  const windings = new Map(specification.windings.map((winding) => [winding.id, winding]))
  const laid = sequenceTurns(specification)
  const wrong: Outcome[] = []
  specification.windings.forEach(({ id, name, turns, startTerminal, finishTerminal }, index) => {
    const shielded = specification.sequence.some((step) => step.kind === 'shield' && step.windingId === id)
    if (!laid.has(id) && !shielded) wrong.push(yesNo(false, `windings.${index}`, { winding: name, other: 'sequence' }))
    else if (laid.has(id) && laid.get(id) !== turns) wrong.push(yesNo(false, `windings.${index}.turns`, { winding: name, turns, sequenceTurns: laid.get(id)!, other: 'sequence' }))
    for (const terminal of [startTerminal, finishTerminal]) if (terminal !== '' && !terminals.has(terminal)) wrong.push(yesNo(false, `windings.${index}.startTerminal`, { winding: name, terminal, other: 'former.pins' }))
  })
  specification.sequence.forEach((step, index) => {
    if ((step.kind === 'winding' || step.kind === 'shield') && !windings.has(step.windingId)) wrong.push(yesNo(false, `sequence.${index}.windingId`, { winding: step.windingId, other: 'windings' }))
    const ends = step.kind === 'winding' ? [step.startTerminal, step.finishTerminal] : []
    for (const terminal of ends) if (terminal !== '' && !terminals.has(terminal)) wrong.push(yesNo(false, `sequence.${index}`, { terminal, other: 'former.pins' }))
  })
  specification.tests.forEach((row, index) => {
    const named = [...row.drivenTerminals, ...row.shortedTerminals.flat(), ...row.openTerminals]
    const unknown = named.filter((terminal) => !terminals.has(terminal) && terminal !== CORE_TERMINAL)
    if (unknown.length > 0) wrong.push(yesNo(false, `tests.${index}`, { row: row.symbol, terminal: unknown.join(', '), other: 'former.pins' }))
    if (row.windingId !== null && !windings.has(row.windingId)) wrong.push(yesNo(false, `tests.${index}.windingId`, { row: row.symbol, winding: row.windingId, other: 'windings' }))
  })
  const drawn = specification.electrical.topology.value
  const asked = document.requirement?.duty.topology ?? null
  if (drawn !== null && asked !== null && drawn !== asked) wrong.push(yesNo(false, 'electrical.topology', { topology: drawn, other: 'requirement.duty' }))
  return wrong.length > 0 ? wrong : [yesNo(true, 'windings')]
}

/** Doubts that are no errors of their own but leave the calculation without its ground. */
const STOPPING_FINDINGS: ReadonlySet<string> = new Set(['several-primary-windings', 'output-has-several-windings', 'value-out-of-range'])

/** A document about which the calculation reports an error is not the part that was calculated. */
function withoutErrors({ context }: CheckInput): Outcome[] {
  const errors = context.findings.filter(({ code, severity }) => severity === 'error' || STOPPING_FINDINGS.has(code))
  return errors.length > 0 ? errors.map(({ code, path }) => yesNo(false, path || 'windings', { reason: code })) : [yesNo(true, 'windings')]
}

/** Name under which test rows speak of the core. */
export const CORE_TERMINAL = 'core'

function toleranced({ document }: CheckInput): Outcome[] {
  const { electrical, tests } = document.specification
  const { value: inductance, status } = electrical.inductance
  const wrong = [
    ...(inductance && status === 'mandatory' && inductance.lowerTolerance === null && inductance.upperTolerance === null ? [yesNo(false, 'electrical.inductance')] : []),
    ...tests.flatMap((row, index) => (row.nominal !== null && row.minimum === null && row.maximum === null && row.extent !== 'reference' ? [yesNo(false, `tests.${index}`, { row: row.symbol })] : [])),
  ]
  return wrong.length > 0 ? wrong : [yesNo(true, 'tests')]
}

/** Statuses are part of every field; what builds the part is mandatory or the vendor's choice. */
const statuses = ({ document }: CheckInput): Outcome[] => {
  const rows = [...document.specification.windings, ...document.specification.sequence, ...document.specification.tests]
  const open = [
    ...document.specification.windings.flatMap(({ status, name }, index) => (status === 'reference' ? [yesNo(false, `windings.${index}`, { winding: name })] : [])),
    ...document.specification.sequence.flatMap((step, index) => (step.status === 'reference' && step.kind !== 'varnish' ? [yesNo(false, `sequence.${index}`)] : [])),
  ]
  // A construction for information only binds nobody.
  if (open.length > 0) return open.map((outcome) => ({ ...outcome, severity: 'S' as const }))
  return [yesNo(true, 'windings', { rows: rows.length, vendorChoice: rows.filter(({ status }) => status === 'vendor-choice').length })]
}

function packing({ document }: CheckInput): Outcome[] {
  const { packing: pack, marking } = document.specification
  const complete = pack.form.value !== null && (pack.piecesPerPack.value !== null || pack.piecesPerPack.status === 'vendor-choice') && (marking.content.value?.length ?? 0) > 0
  return [yesNo(complete, 'packing.form')]
}

export const DOCUMENT_CHECKS: Readonly<Record<string, Check>> = {
  D01: { severity: 'S', source: 'ISO 7200:2004', run: titleBlock },
  D03: { severity: 'M', source: 'ISO 5456-2, ISO 2768-1', run: drawingConventions },
  D04: { severity: 'M', source: 'common practice', run: statuses },
  D05: { severity: 'M', source: 'common practice', run: equivalents },
  D07: { severity: 'S', source: 'common practice', run: crossMatch },
  D08: { severity: 'S', source: 'ISO 8015', run: toleranced },
  D14: { severity: 'S', source: 'the calculation’s own findings', run: withoutErrors },
  D11: { severity: 'M', source: 'common practice', run: packing },
}

/**
 * The check that needs the release record: who made a revision does not check it, and neither approves it.
 *
 * Source: ISO 9001:2015, 8.3.4; common practice.
 */
export function releaseRecordChecks({ createdBy, checkedBy, approvedBy }: Pick<ReleaseRecord, 'createdBy' | 'checkedBy' | 'approvedBy'>): CheckResult[] {
  const named = filled(createdBy) && filled(checkedBy) && filled(approvedBy)
  const { state } = named ? yesNo(createdBy !== checkedBy && createdBy !== approvedBy, '') : notCheckable('')
  return [{ code: 'D02', severity: 'S', state, value: null, limit: null, unit: '', margin: null, source: 'ISO 9001:2015, 8.3.4', path: 'title', values: { createdBy, checkedBy, approvedBy } }]
}
