import { proposeTests } from '#shared/engine/index'
import type { Library } from '#shared/engine/library'
import type { SequenceStep, SpecificationDocument, WindingStep } from '#shared/engine/specification'
import { firstReference } from '../entries/choice-sources'
import { enteredRow } from './origins'

/** What a table can be begun with, so that a plain part takes minutes. */
export interface Beginning {
  label: string
  /** The place with its new rows; null when something must be entered first. */
  changes: (document: SpecificationDocument, library: Library) => Readonly<Record<string, unknown>> | null
  /** Offered only while the table is empty. */
  onlyEmpty: boolean
  missing: string
}

/** One step per winding in their order, from the former outward, tape between them and two layers outside. */
export function plainSequence({ specification }: SpecificationDocument, library: Library): SequenceStep[] | null {
  const tape = firstReference(library, 'tape')
  const windings = specification.windings.filter(({ role }) => role !== 'shield')
  if (!tape || windings.length === 0) return null
  let number = 0
  const base = () => ({ ...enteredRow(`s${++number}`), remark: '' })
  return windings.flatMap(({ id, startTerminal, finishTerminal, turns }, index): SequenceStep[] => {
    const step: WindingStep = {
      ...base(), kind: 'winding', windingId: id, startTerminal, finishTerminal, turns, section: 1, direction: 'clockwise', lay: 'close-wound', layers: null,
      marginLeftMm: 0, marginRightMm: 0, interlayerTape: null, leadExitStart: 'left', leadExitFinish: 'right', startSleeve: null, finishSleeve: null,
    }
    const outside = index === windings.length - 1
    return [step, { ...base(), kind: 'tape', tape, layers: outside ? 2 : 1, widthMm: null, purpose: outside ? 'outer' : 'interwinding' }]
  })
}

export const BEGINNINGS: Readonly<Record<string, Beginning>> = {
  sequence: {
    label: 'Lay out the windings in their order, with tape between',
    changes: (document, library) => {
      const sequence = plainSequence(document, library)
      return sequence && { sequence }
    },
    onlyEmpty: true,
    missing: 'Enter the windings first.',
  },
  tests: {
    label: 'Propose rows from the limits stated',
    changes: (document) => ({ tests: proposeTests(document, document.specification.tests) }),
    onlyEmpty: false,
    missing: '',
  },
}
