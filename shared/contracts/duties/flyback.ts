import { z } from 'zod'
import { converterOutput, currentLimit, efficiency, notNegative, outputs, positive, rowId, supply } from './fields'

export const flybackDuty = z.strictObject({
  topology: z.literal('flyback'),
  supply,
  outputs: outputs(z.strictObject({ ...converterOutput, stackedOn: z.strictObject({ outputId: rowId, at: z.enum(['winding', 'output']) }).nullable().optional() })),
  switchingFrequencyHz: positive,
  conduction: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('discontinuous'), idleShare: z.number().min(0).max(0.9) }),
    z.strictObject({ kind: z.literal('boundary') }),
    z.strictObject({ kind: z.literal('continuous'), rippleRatio: z.number().gt(0).max(2) }),
    z.strictObject({ kind: z.literal('quasi-resonant'), maximumFrequencyHz: positive, nodeCapacitanceF: positive }),
  ]),
  efficiency,
  maximumDutyRatio: z.number().gt(0.02).lt(0.98),
  reflectedVoltageV: positive.nullable(),
  switchDropV: notNegative,
  currentLimit: currentLimit.nullable(),
  clampSpikeV: notNegative.nullable(),
  switchRatingV: positive.nullable(),
  sharing: z.enum(['in-proportion-to-load', 'from-leakages']).optional(),
})
