/** What the duties of the requirement sheet are made of. */

import { z } from 'zod'

export const rowId = z.string().regex(/^[A-Za-z0-9._-]{1,40}$/, 'A row id has letters, digits, dot, dash or underscore.')
export const name = z.string().trim().min(1, 'Give a name.').max(60, 'Use at most 60 characters.')
export const finite = z.number().refine((value) => Math.abs(value) < 1e15, 'The number is out of range.')
export const positive = finite.positive('Enter a number above zero.')
export const notNegative = finite.nonnegative('Enter zero or more.')
export const share = z.number().min(0, 'Enter a share from 0 to 1.').max(1, 'Enter a share from 0 to 1.')
export const side = z.enum(['primary', 'secondary', 'secondary-2', 'secondary-3', 'floating'])

export const efficiency = z.number().gt(0.05, 'Enter the efficiency as a share above 0.05.').max(1, 'Enter the efficiency as a share up to 1.')

const inOrder = (supply: { minimumV: number; nominalV: number; maximumV: number }) =>
  supply.minimumV <= supply.nominalV && supply.nominalV <= supply.maximumV
const IN_ORDER = { error: 'Minimum, nominal and maximum voltage must rise in this order.', path: ['minimumV'] }

const dcOnly = z.strictObject({ kind: z.literal('dc'), minimumV: positive, nominalV: positive, maximumV: positive })
const mainsOnly = z.strictObject({
  kind: z.literal('mains'),
  minimumV: positive,
  nominalV: positive,
  maximumV: positive,
  lineFrequencyHz: positive,
  bulkCapacitanceF: positive,
  conductionTimeS: notNegative,
})

const lineOnly = z.strictObject({ kind: z.literal('line'), minimumV: positive, nominalV: positive, maximumV: positive, lineFrequencyHz: positive })

export const dcSupply = dcOnly.refine(inOrder, IN_ORDER)
export const lineSupply = lineOnly.refine(inOrder, IN_ORDER)
export const supply = z.discriminatedUnion('kind', [dcOnly, mainsOnly]).refine(inOrder, IN_ORDER)

export const currentLimit = z.strictObject({ nominalA: positive, tolerance: share, delayS: notNegative })

export const converterOutput = {
  id: rowId,
  name,
  role: z.enum(['main', 'auxiliary']),
  voltageV: finite.refine((value) => value !== 0, 'An output needs a voltage other than zero.'),
  rectifierDropV: notNegative,
  fullLoadCurrentA: positive,
  lightLoadCurrentA: notNegative,
  side,
}

export const outputs = <T extends z.ZodType>(output: T) => z.array(output).min(1, 'Add at least one output.').max(12, 'At most 12 outputs.')
