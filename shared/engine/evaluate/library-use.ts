import type { LibraryRow, SleeveRow, TapeRow } from '../library'
import type { Origin, SequenceStep, WindingSpecification } from '../specification'
import type { Context } from './context'

/** One library row that the evaluation rests on, the place of the document that names it, and the fields it takes from it. */
export interface RowUse {
  row: LibraryRow
  path: string
  fields: readonly string[]
}

/** Whether a person stands behind a value with a reason, such as the source it was taken from. */
export const isVouched = ({ value, origin }: { value: unknown; origin: Origin }): boolean => value !== null && origin.kind === 'entered' && (origin.reason ?? '').trim() !== ''

/** Every row in use with the fields that the evaluation takes from it; each row once, at the first place that names it. */
export function rowUses(context: Context): RowUse[] {
  const { core, former, material, specification } = context
  const uses: RowUse[] = [
    ...(core ? [{ row: core, path: 'core.core', fields: CORE_FIELDS }] : []),
    ...(former ? [{ row: former, path: 'former.former', fields: formerFields(specification) }] : []),
    ...(material ? [{ row: material, path: 'core.material', fields: materialFields(specification) }] : []),
    ...wireUses(context),
    ...specification.sequence.flatMap((step, index) => stepUses(context, step, index)),
  ]
  return uses.filter(({ row, fields }, index) => uses.findIndex((other) => other.row === row && other.fields.join() === fields.join()) === index)
}

/** Fields of the use that no source gives, by their names in the row. */
export const unverifiedFields = ({ row, fields }: RowUse): string[] => row.unverified.filter((name) => fields.some((field) => field === name || name.startsWith(`${field}.`) || field.startsWith(`${name}.`)))

const CORE_FIELDS = ['effectiveAreaMm2', 'minimumAreaMm2', 'effectiveLengthMm', 'effectiveVolumeMm3', 'centreLeg', 'dimensionsMm.d']

/** All that decides build, insulation and temperature; a value that a person states with its source takes the row's place. */
function formerFields({ former, insulation }: WindingSpecification): string[] {
  const replaced: [field: string, stated: { value: unknown; origin: Origin }][] = [
    ['materialGroup', insulation.materialGroup],
    ['flammability', former.flammability],
    ['pinSection', former.pinSection],
    ['pinRowSpacingMm', former.rowSpacingMm],
    ['envelopeMm', former.envelope],
  ]
  const open = replaced.filter(([, stated]) => !isVouched(stated)).map(([field]) => field)
  return ['windingWidthMm', 'windingHeightMm', 'meanTurnLengthMm', 'tube', 'tubeWallMm', 'flangeThicknessMm', 'pins', 'thermalClassC', ...open]
}

function materialFields({ core: { gap } }: WindingSpecification): string[] {
  const spread = gap.control.value === 'none' && gap.alTolerance.value === null ? ['permeabilityTolerance'] : []
  return ['saturation', 'lossFits', 'initialPermeability', 'biasPoints', ...spread]
}

const wireUses = ({ specification, index }: Context): RowUse[] =>
  specification.windings.flatMap(({ wire }, position) => {
    const row = index.find('wire', wire.wire)
    return row ? [{ row, path: `windings.${position}.wire`, fields: ['conductorMm', 'copperAreaMm2', 'resistance20', `overallMm.${wire.insulation}`] }] : []
  })

function stepUses({ index }: Context, step: SequenceStep, position: number): RowUse[] {
  const at = (name: string) => `sequence.${position}.${name}`
  const tape = (row: TapeRow | null, name: string): RowUse[] => (row ? [{ row, path: at(name), fields: ['thicknessMm', 'thermalClassC'] }] : [])
  const sleeve = (row: SleeveRow | null, name: string): RowUse[] => (row ? [{ row, path: at(name), fields: ['boreMm', 'wallMm', 'thermalClassC'] }] : [])
  switch (step.kind) {
    case 'tape':
    case 'margin':
    case 'core-tape':
      return tape(index.find('tape', step.tape), 'tape')
    case 'sleeve':
      return sleeve(index.find('sleeve', step.sleeve), 'sleeve')
    case 'winding':
      return [
        ...tape(index.find('tape', step.interlayerTape), 'interlayerTape'),
        ...sleeve(index.find('sleeve', step.startSleeve?.sleeve ?? null), 'startSleeve'),
        ...sleeve(index.find('sleeve', step.finishSleeve?.sleeve ?? null), 'finishSleeve'),
      ]
    default:
      return []
  }
}
