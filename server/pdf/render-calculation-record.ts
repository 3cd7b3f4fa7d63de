import type { TableContent } from '#shared/drawing/table'
import type { CheckResult, Evaluation, Working } from '#shared/engine/evaluation'
import type { SpecificationDocument } from '#shared/engine/specification'
import { formatEngineering, formatNumber } from '#shared/number-format'
import { layOutDocument, type Part } from './document'
import { renderPages } from './render-sheets'

export interface CalculationRecord {
  partNumber: string
  title: string
  revision: string
  company: string
  /** ISO 8601 date of the revision's last change, which stands in the file instead of the time of making. */
  date: string
  document: SpecificationDocument
  /** With its working. */
  evaluation: Evaluation
  /** Engine that sealed the release; null while nothing is sealed. */
  sealedEngine: string | null
  /** The canonical bytes of the evaluation, attached so that a program can read what a person sees. */
  bytes: Uint8Array
}

/** Everything that was calculated for one revision, and how: a record for the company itself, since it holds circuit know-how. */
export function renderCalculationRecordPdf(record: CalculationRecord): Promise<Buffer> {
  const { partNumber, title, revision, company, date, evaluation } = record
  const pages = layOutDocument({
    title: 'Calculation record',
    reference: `${partNumber} ${revision}`,
    sender: company,
    footer: `${partNumber} ${revision}, engine ${evaluation.engine}. For use inside the company: it holds the requirement sheet.`,
    parts: recordParts(record),
  })
  return renderPages({
    pages,
    info: { title: `Calculation record ${partNumber} ${revision}`, subject: title, author: company, language: 'en', date: new Date(`${date}T00:00:00Z`) },
    attachment: { name: 'evaluation.json', bytes: record.bytes, description: 'The evaluation as canonical JSON (RFC 8785)' },
  })
}

function recordParts(record: CalculationRecord): Part[] {
  const { title, document, evaluation, sealedEngine } = record
  return [
    { kind: 'paragraph', text: `${title}. Predicted values: neither limits of the drawing nor readings. ${sealedText(evaluation, sealedEngine)}` },
    ...requirementParts(document),
    { kind: 'heading', text: 'Working points' },
    { kind: 'table', content: cornerTable(evaluation) },
    { kind: 'heading', text: 'Windings' },
    { kind: 'table', content: windingTable(evaluation, document) },
    { kind: 'heading', text: 'Figures with their working' },
    ...workingParts(record),
    { kind: 'heading', text: 'Checks' },
    { kind: 'table', content: checkTable(evaluation.checks) },
    ...findingParts(evaluation),
  ]
}

function sealedText({ engine }: Evaluation, sealedEngine: string | null): string {
  if (sealedEngine === null) return `Calculated by engine ${engine}; this revision is not released.`
  if (sealedEngine === engine) return `Calculated by engine ${engine}, the one that sealed the release.`
  return `The release was sealed with engine ${sealedEngine}; its figures are kept with it. The working below was calculated again by engine ${engine} and may differ.`
}

const PREFIXED = new Set(['H', 'A', 'T', 'V', 'Hz', 'Ω', 'W', 'F', 's', 'm', 'Vs', 'C'])

function figure(value: number | string | null, unit: string): string {
  if (typeof value === 'string') return value
  if (PREFIXED.has(unit)) return formatEngineering(value, unit, { significant: 5 })
  const text = formatNumber(value, { significant: 5 })
  return unit === '' || unit === '1' || text === '–' ? text : `${text}\u00a0${unit}`
}

/** Places and values of a tree of plain data, one line each. */
function leaves(value: unknown, path: string): [string, string][] {
  if (Array.isArray(value)) return value.flatMap((entry: unknown, index) => leaves(entry, `${path} ${index + 1}`))
  if (typeof value === 'object' && value !== null) return Object.entries(value).flatMap(([key, inner]) => leaves(inner, path === '' ? key : `${path} › ${key}`))
  return [[path, value === null ? 'not stated' : typeof value === 'number' ? formatNumber(value, { significant: 12 }) : String(value)]]
}

function requirementParts({ requirement }: SpecificationDocument): Part[] {
  if (!requirement) return [{ kind: 'paragraph', text: 'Entered directly, without a duty: currents are those of the winding table.' }]
  const rows = leaves(requirement, '').map(([name, value]) => ({ cells: { name, value } }))
  return [
    { kind: 'heading', text: 'Requirement sheet, in SI units, °C and mm' },
    { kind: 'table', content: { title: 'Requirement', columns: [{ key: 'name', header: 'Field' }, { key: 'value', header: 'Value', font: 'mono', align: 'end' }], rows } },
  ]
}

const cornerTable = ({ corners }: Evaluation): TableContent => ({
  title: 'Working points',
  columns: [
    { key: 'name', header: 'Point' },
    { key: 'input', header: 'Input', align: 'end', font: 'mono' },
    { key: 'mode', header: 'Conduction' },
    { key: 'duty', header: 'Duty ratio', align: 'end', font: 'mono' },
    { key: 'flux', header: 'Flux swing', align: 'end', font: 'mono' },
    { key: 'peak', header: 'Flux peak', align: 'end', font: 'mono' },
    { key: 'power', header: 'Input power', align: 'end', font: 'mono' },
  ],
  rows: corners.map((corner) => ({
    cells: {
      name: corner.name.replaceAll('-', ' '),
      input: figure(corner.inputV, 'V'),
      mode: corner.mode,
      duty: figure(corner.dutyRatio, '1'),
      flux: figure(corner.fluxSwingT, 'T'),
      peak: figure(corner.fluxPeakT, 'T'),
      power: figure(corner.inputPowerW, 'W'),
    },
  })),
})

const windingTable = ({ windings }: Evaluation, { specification }: SpecificationDocument): TableContent => ({
  title: 'Windings',
  columns: [
    { key: 'name', header: 'Winding', font: 'sans-bold' },
    { key: 'rms', header: 'Rms', align: 'end', font: 'mono' },
    { key: 'peak', header: 'Peak', align: 'end', font: 'mono' },
    { key: 'dcr', header: 'R 20 °C', align: 'end', font: 'mono' },
    { key: 'hot', header: 'R hot', align: 'end', font: 'mono' },
    { key: 'factor', header: 'AC factor', align: 'end', font: 'mono' },
    { key: 'density', header: 'A/mm²', align: 'end', font: 'mono' },
    { key: 'loss', header: 'Loss', align: 'end', font: 'mono' },
  ],
  rows: windings.map((winding) => ({
    cells: {
      name: specification.windings.find(({ id }) => id === winding.windingId)?.name ?? winding.windingId,
      rms: figure(winding.rmsA, 'A'),
      peak: figure(winding.peakA, 'A'),
      dcr: figure(winding.dcResistance20Ohm, 'Ω'),
      hot: figure(winding.dcResistanceHotOhm, 'Ω'),
      factor: figure(winding.acFactor, '1'),
      density: figure(winding.currentDensityAPerMm2, '1'),
      loss: figure(winding.copperLossW, 'W'),
    },
  })),
})

/** Long texts that return in many rows are printed once and named by their number. */
interface Notes {
  numbers: Map<string, number>
}
const note = ({ numbers }: Notes, text: string): string => {
  if (!numbers.has(text)) numbers.set(text, numbers.size + 1)
  return `[${numbers.get(text)}]`
}

/** One table per stage, in the order in which they were worked out, and the sources that they name by number. */
function workingParts({ evaluation, document }: CalculationRecord): Part[] {
  const notes: Notes = { numbers: new Map() }
  const entries = Object.entries(evaluation.working)
  const stages = [...new Set(entries.map(([path]) => path.split('.')[0]!))]
  const tables = stages.map((stage): Part => ({ kind: 'table', content: workingTable(stage, entries.filter(([path]) => path.split('.')[0] === stage), evaluation, document, notes) }))
  const sources = [...notes.numbers].map(([text, number]) => ({ cells: { number: `[${number}]`, text } }))
  return [
    ...tables,
    { kind: 'heading', text: 'Sources and origins, by their number' },
    { kind: 'table', content: { title: 'Sources and origins', heightMm: SMALL_MM, columns: [{ key: 'number', header: 'No.', font: 'mono' }, { key: 'text', header: 'Source or origin' }], rows: sources } },
  ]
}

const SMALL_MM = 1.8

function workingTable(stage: string, entries: readonly (readonly [string, Working])[], evaluation: Evaluation, document: SpecificationDocument, notes: Notes): TableContent {
  let above = ''
  const rows = entries.map(([path, { symbol, value, unit, formula, inputs, source }]) => {
    const from = inputs.map((input) => `${input.name} = ${figure(input.value, input.unit)} ${input.origin.length > 24 ? note(notes, input.origin) : `(${input.origin})`}`).join('; ')
    const shown = from !== '' && from === above ? 'as above' : from
    above = from
    return { cells: { figure: figureName(path, symbol, evaluation, document), value: figure(value, unit), formula: `${formula} ${note(notes, source)}`, inputs: shown } }
  })
  return {
    title: stage,
    heightMm: SMALL_MM,
    columns: [
      { key: 'figure', header: 'Figure' },
      { key: 'value', header: 'Value', align: 'end', font: 'mono' },
      { key: 'formula', header: 'Formula and its source', font: 'mono' },
      { key: 'inputs', header: 'Inputs, and where they come from' },
    ],
    rows,
  }
}

/** `windings.0.acFactor` by the names of winding and working point. */
function figureName(path: string, symbol: string, { corners, windings }: Evaluation, { specification }: SpecificationDocument): string {
  const nameOf = (id: string | undefined) => specification.windings.find((winding) => winding.id === id)?.name
  const [stage, ...rest] = path.split('.')
  const words = rest.map((part, index) => {
    if (!/^\d+$/.test(part)) return part
    if (stage === 'corners' && index === 0) return corners[Number(part)]?.name.replaceAll('-', ' ') ?? part
    if (stage === 'windings' && index === 0) return nameOf(windings[Number(part)]?.windingId) ?? part
    if (stage === 'corners' && rest[index - 1] === 'windings') return nameOf(corners[Number(rest[0])]?.windings[Number(part)]?.windingId) ?? part
    return String(Number(part) + 1)
  })
  return `${words.filter((word) => word !== 'windings').join(' ')} (${symbol})`
}

const STATE_WORDS: Readonly<Record<CheckResult['state'], string>> = { met: 'met', 'not-met': 'NOT MET', 'not-checkable': 'not checkable' }
const SEVERITY_WORDS: Readonly<Record<CheckResult['severity'], string>> = { S: 'stops release', M: 'wants an answer', N: 'note' }

const checkTable = (checks: readonly CheckResult[]): TableContent => ({
  title: 'Checks',
  heightMm: SMALL_MM,
  columns: [
    { key: 'code', header: 'Code', font: 'mono' },
    { key: 'severity', header: 'Weight' },
    { key: 'state', header: 'Result' },
    { key: 'value', header: 'Value', align: 'end', font: 'mono' },
    { key: 'limit', header: 'Limit', align: 'end', font: 'mono' },
    { key: 'path', header: 'Place' },
    { key: 'source', header: 'Source' },
  ],
  rows: checks.map(({ code, severity, state, value, limit, unit, path, source }) => ({
    cells: { code, severity: SEVERITY_WORDS[severity], state: STATE_WORDS[state], value: value === null ? '' : figure(value, unit), limit: limit === null ? '' : figure(limit, unit), path, source },
  })),
})

function findingParts({ findings }: Evaluation): Part[] {
  if (findings.length === 0) return []
  const rows = findings.map(({ code, severity, path, values }) => ({ cells: { code: code.replaceAll('-', ' '), severity, path, values: Object.entries(values).map(([key, value]) => `${key} ${typeof value === 'number' ? formatNumber(value, { significant: 5 }) : String(value)}`).join(', ') } }))
  return [
    { kind: 'heading', text: 'Findings' },
    { kind: 'table', content: { title: 'Findings', columns: [{ key: 'code', header: 'Finding' }, { key: 'severity', header: 'Weight' }, { key: 'path', header: 'Place' }, { key: 'values', header: 'Figures' }], rows } },
  ]
}
