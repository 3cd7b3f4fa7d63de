import type { Stated } from '../specification'
import { notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const isFilled = ({ value }: Pick<Stated<string>, 'value'>) => (value ?? '').trim() !== ''

/** A revision says of each change what stood there before, what stands there now, and why. */
function revisionBlock({ document }: CheckInput): Outcome[] {
  const { revisions } = document.specification
  const wrong = revisions.flatMap(({ changes, reason, date }, index) => {
    const complete = date !== '' && reason.trim() !== '' && (index === 0 || changes.length > 0) && changes.every(({ field, before, after }) => field !== '' && before !== after)
    return complete ? [] : [yesNo(false, `revisions.${index}`, { row: revisions[index]!.revision })]
  })
  return wrong.length > 0 ? wrong : [yesNo(true, 'revisions')]
}

/** Free text with the pieces that readers of two languages read differently. */
const DECIMAL_COMMA = /\d,\d{1,2}(?!\d)/
const DECIMAL_POINT = /\d\.\d/
const KELVIN_OHM = /\d\s*K(?:Ω|ohm|\b(?=\s*Ω))/i

/** Notes, cautions and marking keep to one decimal sign, and to SI prefixes. */
function oneNotation({ document }: CheckInput): Outcome[] {
  const { notes, insulation, tolerances } = document.specification
  const texts = [
    ...notes.map(({ text }, index) => ({ text, path: `notes.${index}.text` })),
    ...(insulation.cautions.value ?? []).map((text) => ({ text, path: 'insulation.cautions' })),
    ...(['general', 'angular', 'pins', 'electrical'] as const).map((field) => ({ text: tolerances[field].value ?? '', path: `tolerances.${field}` })),
  ]
  const capital = texts.filter(({ text }) => KELVIN_OHM.test(text) && !/k(?:Ω|ohm)/.test(text))
  const points = texts.filter(({ text }) => DECIMAL_POINT.test(text))
  const commas = points.length > 0 ? texts.filter(({ text }) => DECIMAL_COMMA.test(text)) : []
  const wrong = [...capital, ...commas]
  return wrong.length > 0 ? wrong.map(({ path }) => yesNo(false, path)) : [yesNo(true, 'notes')]
}

/** Statements on substances hold on a day: the date of the list, the end of an exemption. */
function datedStatements({ document }: CheckInput): Outcome[] {
  const { rohs, rohsExemption, reachListDate } = document.specification.compliance
  const date = (text: string) => !Number.isNaN(Date.parse(text))
  const listed = reachListDate.value === null ? (reachListDate.status === 'vendor-choice' ? notCheckable('compliance.reachListDate') : yesNo(false, 'compliance.reachListDate')) : yesNo(date(reachListDate.value), 'compliance.reachListDate')
  const exempted = rohsExemption.value === null ? [] : [yesNo(rohsExemption.value.exemption.trim() !== '' && date(rohsExemption.value.expiresOn), 'compliance.rohsExemption')]
  return [yesNo(isFilled(rohs), 'compliance.rohs'), listed, ...exempted]
}

const purposeStated = ({ document }: CheckInput): Outcome[] => [yesNo(document.specification.title.documentStatus.value !== null, 'title.documentStatus')]

/** Every document that goes with the drawing is listed by number and title. */
function attachmentsListed({ document }: CheckInput): Outcome[] {
  const { relatedDocuments } = document.specification.title
  const wrong = relatedDocuments.flatMap(({ number, title }, index) => (number.trim() === '' || title.trim() === '' ? [yesNo(false, `title.relatedDocuments.${index}`)] : []))
  return wrong.length > 0 ? wrong : [yesNo(true, 'title.relatedDocuments')]
}

export const PAPER_CHECKS: Readonly<Record<string, Check>> = {
  D06: { severity: 'S', source: 'ISO 7200, ISO 10007', run: revisionBlock },
  D09: { severity: 'N', source: 'ISO 80000-1', run: oneNotation },
  D10: { severity: 'M', source: '2011/65/EU; (EC) 1907/2006', run: datedStatements },
  D12: { severity: 'M', source: 'common practice', run: purposeStated },
  D13: { severity: 'M', source: 'common practice', run: attachmentsListed },
}
