import { z } from 'zod'
import { notNegative, positive } from './fields'

const permitted = z.number().gt(0, 'Enter a share above 0.').lt(1, 'Enter a share below 1.')

export const currentSenseDuty = z.strictObject({
  topology: z.literal('current-sense'),
  waveform: z.enum(['unipolar-pulse', 'bipolar-pulse', 'sine']),
  switchingFrequencyHz: positive,
  nominalCurrentA: positive,
  maximumCurrentA: positive,
  dutyRatio: z.number().gt(0).lt(1),
  ratio: positive,
  burdenOhm: positive,
  rectifierDropV: notNegative,
  resetVoltageV: positive.nullable(),
  directCurrentA: notNegative,
  permittedDroop: permitted,
  permittedError: permitted,
})
