import type { SampleRequestSummary, SampleSet } from '#shared/contracts/samples'
import { formatFigure, formatNumber, formatQuantity } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'
import type { SampleKind } from '#shared/measurement/capability'
import type { VerdictReason } from '#shared/measurement/judge'
import type { ExpectedRow, Reading } from '#shared/measurement/model'
import { unitForRow } from '#shared/measurement/report-template'
import type { Disposition } from '#shared/workflow/sample-state'
import type { Verdict } from '@/components/base/VerdictTag.vue'

export const REQUEST_STATE_WORDS: Record<SampleRequestSummary['state'], string> = {
  requested: 'Report awaited',
  reported: 'Disposition awaited',
  disposed: 'Decided',
  cancelled: 'Taken back',
}

export const SET_PHASE_WORDS: Record<SampleSet['phase'], string> = {
  read: 'Not sent yet',
  judged: 'Disposition awaited',
  disposed: 'Decided',
  superseded: 'Replaced by a later report',
}

export const SAMPLE_KIND_WORDS: Record<SampleKind, string> = {
  'hand-made': 'Hand-made engineering sample',
  'off-tool': 'Off-tool sample',
  'pilot-lot': 'Pilot lot',
  'first-article': 'First article',
  retained: 'Retained part',
  destructive: 'Cut-open part',
  agency: 'Sample for a safety agency',
}

export const DISPOSITION_WORDS: Record<Disposition, string> = {
  accepted: 'Accept',
  'accepted-with-concession': 'Accept with a concession',
  'change-drawing': 'Accept and change the drawing',
  rework: 'Rework or sort at the vendor',
  rejected: 'Reject; new samples',
  'on-hold': 'Hold; data incomplete',
}

export const VERDICTS: Record<'met' | 'not-met' | 'not-evidenced', { verdict: Verdict; word: string }> = {
  met: { verdict: 'met', word: 'met' },
  'not-met': { verdict: 'not-met', word: 'not met' },
  'not-evidenced': { verdict: 'not-checkable', word: 'not evidenced' },
}

export const REASON_WORDS: Record<VerdictReason, string> = {
  'within-limits': 'within the limits',
  'below-minimum': 'below the minimum',
  'above-maximum': 'above the maximum',
  passed: 'passed',
  failed: 'failed',
  'no-reading': 'no reading',
  'no-number': 'the instrument had no number',
  'beyond-range': 'beyond the instrument’s range',
  'word-for-reading': 'a word where a reading is asked for',
  'test-voltage-too-low': 'tested below the voltage of the drawing',
  'no-limits': 'no limits to judge by',
}

/** A value of a test row in the unit its limits are written in; without the unit, which stands in the heading. */
export const rowFigure = (value: number | null, row: ExpectedRow, significant = 5): string => formatFigure(value, unitForRow(row), { significant })

export const rowUnit = (row: ExpectedRow): string => unitForRow(row).symbol

export function limitsText(row: ExpectedRow): string {
  if (row.minimum === null && row.maximum === null) return row.record === 'pass-fail' || row.levelV !== null ? 'pass or fail' : 'no limits'
  const [minimum, maximum] = [rowFigure(row.minimum, row, 9), rowFigure(row.maximum, row, 9)]
  const unit = rowUnit(row) === '' ? '' : `\u00a0${rowUnit(row)}`
  if (row.minimum === null) return `≤ ${maximum}${unit}`
  if (row.maximum === null) return `≥ ${minimum}${unit}`
  return `${minimum} … ${maximum}${unit}`
}

export function readingText(reading: Reading | null, judged: number | null, row: ExpectedRow): string {
  if (reading === null) return '–'
  switch (reading.kind) {
    case 'value':
      return rowFigure(judged ?? reading.value, row)
    case 'censored':
      if (reading.bound === null) return reading.side === 'above' ? 'over range' : 'under range'
      return `${reading.side === 'above' ? '>' : '<'} ${rowFigure(reading.bound, row)}`
    case 'attribute':
      return reading.passed ? 'pass' : 'fail'
    case 'withstand':
      return withstandText(reading)
    case 'no-number':
      return 'no number'
  }
}

function withstandText({ voltageV, timeS, currentA, passed }: Extract<Reading, { kind: 'withstand' }>): string {
  const parts = [
    passed ? 'pass' : 'fail',
    voltageV === null ? '' : formatQuantity(voltageV, shownUnit('V')),
    timeS === null ? '' : formatQuantity(timeS, shownUnit('s')),
    currentA === null ? '' : formatQuantity(currentA, shownUnit('mA')),
  ]
  return parts.filter(Boolean).join(', ')
}

export const percentText = (share: number): string => `${formatNumber(share * 100, { significant: 2 })}\u00a0%`
