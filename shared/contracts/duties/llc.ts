import { z } from 'zod'
import { converterOutput, notNegative, outputs, positive } from './fields'
import { converter, rectifier } from './forced'

export const llcDuty = z.strictObject({
  topology: z.literal('llc'),
  ...converter,
  outputs: outputs(z.strictObject({ ...converterOutput, rectifier })),
  resonantInductanceH: positive,
  resonantCapacitanceF: positive,
  resonantInductor: z.enum(['leakage', 'separate']),
  minimumFrequencyHz: positive,
  maximumFrequencyHz: positive,
  deadTimeS: notNegative.nullable(),
  bridgeCapacitanceF: positive.nullable(),
})
