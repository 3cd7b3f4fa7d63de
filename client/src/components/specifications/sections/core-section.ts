import { SIDE_WORDS } from '#shared/drawing/sheets/words'
import { choice, count, figure, group, plainly, reference, text, words, type SectionSpec } from '../field-types'

export const coreSection: SectionSpec = {
  key: 'core',
  title: 'Core & gap',
  places: ['core'],
  parts: [
    {
      kind: 'stated',
      title: 'Core',
      fields: [
        reference('core.core', 'Core', 'core'),
        reference('core.material', 'Material', 'material'),
        { type: 'lines', path: 'core.approvedEquivalents', label: 'Approved equivalents', help: 'One grade per line.' },
        choice('core.equivalenceRule', 'Equivalence rule', plainly('listed-alternates-only', 'subject-to-written-approval')),
        count('core.numberOfSets', 'Number of core sets', { min: 1, max: 20 }),
        text('core.orientation', 'Orientation'),
      ],
    },
    {
      kind: 'stated',
      title: 'Gap: one of AL and length controls, the other is for reference',
      fields: [
        choice('core.gap.control', 'What controls', [{ value: 'al', label: 'AL' }, { value: 'length', label: 'gap length' }, { value: 'none', label: 'no gap' }]),
        figure('core.gap.alH', 'AL', 'nH'),
        figure('core.gap.alTolerance', 'AL tolerance ±', '%', { min: 0, max: 1 }),
        figure('core.gap.lengthMm', 'Gap length', 'mm', { min: 0, help: 'Total in the centre leg; of a spacer the sheet’s thickness, which is in the path twice.' }),
        figure('core.gap.lengthToleranceMm', 'Length tolerance ±', 'mm', { min: 0 }),
        choice('core.gap.position', 'Position', [{ value: 'centre-leg', label: 'centre leg' }, { value: 'all-legs-spacer', label: 'spacer under all legs' }, { value: 'distributed', label: 'distributed' }, { value: 'none', label: 'none' }]),
        choice('core.gap.grinding', 'Ground into', [{ value: 'one-half', label: 'one half' }, { value: 'both-halves', label: 'both halves' }]),
      ],
    },
    {
      kind: 'stated',
      title: 'Assembly',
      fields: [
        text('core.assembly.adhesive', 'Adhesive'),
        text('core.assembly.adhesivePosition', 'Adhesive position'),
        text('core.assembly.clip', 'Clip'),
        count('core.assembly.tapeLayers', 'Tape layers around the core'),
        figure('core.assembly.bandingTensionN', 'Banding tension', 'N', { min: 0 }),
      ],
    },
    {
      kind: 'stated',
      title: 'The core as a conductor',
      fields: [
        group('core.potential', 'Core potential', [choice('connection', 'connection', plainly('floating', 'pin')), { type: 'terminal', path: 'pin', label: 'pin', optional: true }, choice('side', 'counts to side', words(SIDE_WORDS))], () => ({ connection: 'floating', pin: null, side: 'primary' })),
        text('core.fluxBand', 'Flux band'),
        text('core.insulationOverCore', 'Insulation over core'),
        group('core.coating', 'Coating', [text('material', 'material'), figure('withstandVRms', 'withstands, rms', 'V', { optional: true })], () => ({ material: '', withstandVRms: null })),
        text('core.surfaceIrregularities', 'Surface irregularities'),
      ],
    },
  ],
}
