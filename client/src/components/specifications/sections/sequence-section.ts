import { LAY_WORDS } from '#shared/drawing/sheets/words'
import { choice, count, figure, group, plainly, reference, text, words, type FieldSpec, type Row, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

const OPERATIONS: Readonly<Record<string, string>> = { winding: 'Winding', tape: 'Tape', margin: 'Margin tape', shield: 'Shield', sleeve: 'Sleeve', 'core-tape': 'Core tape', varnish: 'Varnish' }
const EXTENTS = [{ value: 'coil-only', label: 'coil only' }, { value: 'coil-and-core', label: 'coil and core' }]

export const operationWord = (row: Row) => OPERATIONS[String(row.kind)] ?? String(row.kind)

function what({ kind }: Row): FieldSpec | null {
  if (kind === 'winding' || kind === 'shield') return { type: 'winding', path: 'windingId', label: 'Winding' }
  if (kind === 'tape' || kind === 'margin' || kind === 'core-tape') return reference('tape', 'Tape', 'tape')
  if (kind === 'sleeve') return reference('sleeve', 'Sleeve', 'sleeve')
  return choice('extent', 'Extent', EXTENTS)
}

function howMany({ kind }: Row): FieldSpec | null {
  if (kind === 'winding') return figure('turns', 'Turns', 'turns', { min: 0.5, max: 20_000 })
  if (kind === 'tape' || kind === 'core-tape') return count('layers', 'Layers', { min: 1, max: 100 })
  if (kind === 'margin') return figure('leftMm', 'Left', 'mm', { min: 0 })
  if (kind === 'shield') return figure('widthMm', 'Width', 'mm')
  return kind === 'sleeve' ? figure('lengthMm', 'Length', 'mm') : null
}

function how({ kind }: Row): FieldSpec | null {
  if (kind === 'winding') return choice('lay', 'Lay', words(LAY_WORDS))
  if (kind === 'tape') return choice('purpose', 'Purpose', plainly('base', 'interlayer', 'interwinding', 'outer'))
  if (kind === 'core-tape') return choice('purpose', 'Purpose', plainly('insulation', 'banding', 'flux-band'))
  if (kind === 'margin') return figure('rightMm', 'Right', 'mm', { min: 0 })
  if (kind === 'shield') return { type: 'terminal', path: 'connectedTerminal', label: 'Connected to' }
  return kind === 'sleeve' ? text('lead', 'Lead') : null
}

const sleeve = (path: string, label: string) =>
  group(path, label, [reference('sleeve', 'sleeve', 'sleeve'), figure('lengthMm', 'length', 'mm'), figure('intoWindingMm', 'into the winding', 'mm', { min: 0 })], () => ({ sleeve: null, lengthMm: 15, intoWindingMm: 3 }), { optional: true })

const exits = [{ value: 'left', label: 'left (pin-1 end)' }, { value: 'right', label: 'right' }]
const MORE: Readonly<Record<string, readonly FieldSpec[]>> = {
  winding: [
    { type: 'terminal', path: 'startTerminal', label: 'start terminal' },
    { type: 'terminal', path: 'finishTerminal', label: 'finish terminal' },
    choice('direction', 'direction, from the pin side', [{ value: 'clockwise', label: 'clockwise' }, { value: 'counter-clockwise', label: 'counter-clockwise' }]),
    choice('withPrevious', 'wound', [{ value: false, label: 'by itself' }, { value: true, label: 'together with the step before, turn beside turn' }], { optional: true }),
    count('layers', 'layers asked for', { min: 1, max: 200, optional: true }),
    figure('marginLeftMm', 'margin left', 'mm', { min: 0 }),
    figure('marginRightMm', 'margin right', 'mm', { min: 0 }),
    count('section', 'section of the former', { min: 1, max: 20 }),
    reference('interlayerTape', 'interlayer tape', 'tape', { optional: true }),
    choice('leadExitStart', 'start leaves', exits),
    choice('leadExitFinish', 'finish leaves', exits),
    sleeve('startSleeve', 'Sleeve on the start'),
    sleeve('finishSleeve', 'Sleeve on the finish'),
  ],
  tape: [figure('widthMm', 'width, empty for the full width', 'mm', { optional: true })],
  margin: [figure('heightMm', 'height, empty for that of the winding', 'mm', { optional: true })],
  shield: [choice('form', 'form', plainly('foil', 'wire')), figure('thicknessMm', 'thickness', 'mm'), figure('overlapMm', 'overlap, insulated', 'mm', { min: 0 }), text('overlapInsulation', 'overlap insulation')],
  sleeve: [],
  'core-tape': [],
  varnish: [],
}

const base = (freeId: (prefix: string) => string, kind: string) => ({ ...enteredRow(freeId('s')), kind, remark: '' })

export const sequenceSection: SectionSpec = {
  key: 'sequence',
  title: 'Sequence',
  places: ['sequence'],
  parts: [
    {
      kind: 'rows',
      rows: {
        path: 'sequence',
        title: 'Winding sequence, from the former outward',
        one: 'step',
        stated: true,
        ordered: true,
        empty: 'No step yet.',
        columns: [
          { header: 'Operation', field: () => null },
          { header: 'What', field: what, wide: true },
          { header: 'Turns / layers', field: howMany, figure: true },
          { header: 'How', field: how },
        ],
        more: (row) => [...(MORE[String(row.kind)] ?? []), text('remark', 'remark')],
        add: [
          {
            label: 'Winding',
            row: ({ freeId, windingIds: [first] }) => (first === undefined ? null : {
              ...base(freeId, 'winding'), windingId: first, startTerminal: '', finishTerminal: '', turns: 10, section: 1, direction: 'clockwise', lay: 'close-wound', layers: null,
              marginLeftMm: 0, marginRightMm: 0, interlayerTape: null, leadExitStart: 'left', leadExitFinish: 'right', startSleeve: null, finishSleeve: null,
            }),
          },
          { label: 'Tape', row: ({ freeId, first }) => first('tape') && { ...base(freeId, 'tape'), tape: first('tape'), layers: 1, widthMm: null, purpose: 'interwinding' } },
          { label: 'Margin tape', row: ({ freeId, first }) => first('tape') && { ...base(freeId, 'margin'), tape: first('tape'), leftMm: 3.2, rightMm: 3.2, heightMm: null } },
          { label: 'Shield', row: ({ freeId, windingIds }) => (windingIds.length === 0 ? null : { ...base(freeId, 'shield'), windingId: windingIds.at(-1), form: 'foil', thicknessMm: 0.05, widthMm: 10, overlapMm: 3, overlapInsulation: '', connectedTerminal: '' }) },
          { label: 'Sleeve', row: ({ freeId, first }) => first('sleeve') && { ...base(freeId, 'sleeve'), sleeve: first('sleeve'), lead: '', lengthMm: 15 } },
          { label: 'Core tape', row: ({ freeId, first }) => first('tape') && { ...base(freeId, 'core-tape'), tape: first('tape'), layers: 2, purpose: 'banding' } },
          { label: 'Varnish', row: ({ freeId }) => ({ ...base(freeId, 'varnish'), extent: 'coil-and-core' }) },
        ],
      },
    },
  ],
}
