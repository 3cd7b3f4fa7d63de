import { z } from 'zod'
import { dcSupply, name, notNegative, outputs, positive, rowId, side } from './fields'

const rising = ({ minimum, maximum }: { minimum: number; maximum: number }) => minimum <= maximum

export const gateDriveDuty = z.strictObject({
  topology: z.literal('gate-drive'),
  drive: z.enum(['bipolar', 'unipolar-dc-restored']),
  supply: dcSupply,
  switchingFrequencyHz: positive,
  dutyRatio: z.strictObject({ minimum: z.number().gt(0).lt(1), maximum: z.number().gt(0).lt(1) }).refine(rising, { error: 'The least duty ratio must not exceed the greatest.', path: ['minimum'] }),
  outputs: outputs(z.strictObject({ id: rowId, name, side, gateVoltageV: positive, gateChargeC: notNegative })),
  driverResistanceOhm: notNegative,
  couplingCapacitanceF: positive.nullable(),
  transitionS: positive,
  magnetisingCurrentA: positive,
})
