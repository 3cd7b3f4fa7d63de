import { z } from 'zod'
import { currentLimit, dcSupply, efficiency, lineSupply, notNegative, positive } from './fields'

export const inductorDuty = z.strictObject({
  topology: z.literal('inductor'),
  use: z.enum(['buck', 'boost', 'line-boost']),
  supply: z.union([dcSupply, lineSupply]),
  outputVoltageV: positive,
  outputDropV: notNegative,
  outputCurrentA: positive,
  lightLoadCurrentA: notNegative,
  switchingFrequencyHz: positive,
  rippleRatio: z.number().gt(0).max(2),
  efficiency,
  switchDropV: notNegative,
  currentLimit: currentLimit.nullable(),
})
