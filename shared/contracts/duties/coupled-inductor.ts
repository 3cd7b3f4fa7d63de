import { z } from 'zod'
import { currentLimit, dcSupply, efficiency, notNegative, positive } from './fields'

export const coupledInductorDuty = z.strictObject({
  topology: z.literal('coupled-inductor'),
  supply: dcSupply,
  outputVoltageV: positive,
  outputDropV: notNegative,
  outputCurrentA: positive,
  ratio: positive,
  switchingFrequencyHz: positive,
  rippleRatio: z.number().gt(0).max(2),
  efficiency,
  switchDropV: notNegative,
  currentLimit: currentLimit.nullable(),
})
