import { formatQuantity } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'
import type { PlainField } from './field-types'

/** Library figures are shown as they are published, so with more digits than a result has. */
const DIGITS = { significant: 6 }

/** What a field reads; an en dash where the row has no value. */
export function fieldText(field: PlainField, value: unknown): string {
  switch (field.type) {
    case 'figure':
      return formatQuantity(typeof value === 'number' ? value : null, shownUnit(field.unit), DIGITS)
    case 'text':
      return typeof value === 'string' && value !== '' ? value : '–'
    case 'choice':
      return field.choices.find((choice) => choice.value === value)?.label ?? '–'
  }
}
