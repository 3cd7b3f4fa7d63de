import { z } from 'zod'
import { notNegative, positive } from './fields'

export const commonModeChokeDuty = z.strictObject({
  topology: z.literal('common-mode-choke'),
  ratedVoltageV: positive,
  lineCurrentA: positive,
  linePeakA: positive,
  lineFrequencyHz: notNegative,
  switchingFrequencyHz: positive,
  impedance: z.array(z.strictObject({ frequencyHz: positive, minimumOhm: positive })).max(12, 'At most 12 points.'),
})
