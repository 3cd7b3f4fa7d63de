import { z } from 'zod'
import { converterOutput, currentLimit, efficiency, notNegative, outputs, positive, supply } from './fields'

/** What converters with a switch and rectified outputs share. */
export const converter = {
  supply,
  efficiency,
  switchDropV: notNegative,
  currentLimit: currentLimit.nullable(),
  clampSpikeV: notNegative.nullable(),
  switchRatingV: positive.nullable(),
}

const forced = { ...converter, switchingFrequencyHz: positive }
const filteredOutput = { ...converterOutput, filterInductanceH: positive.nullable(), rippleRatio: z.number().gt(0.001).max(2) }
export const rectifier = z.enum(['centre-tapped', 'full-wave'])
const bridgeOutputs = outputs(z.strictObject({ ...filteredOutput, rectifier }))

const oneSided = z.number().gt(0.02).lt(0.98)
/** Two sides take turns: neither conducts for more than half the period. */
const twoSided = z.number().gt(0.02).max(0.5, 'Two switches take turns: neither conducts for more than half the period.')

export const forwardDuty = z.strictObject({ topology: z.literal('forward'), ...forced, maximumDutyRatio: oneSided, reset: z.enum(['reset-winding', 'two-switch', 'active-clamp']), outputs: outputs(z.strictObject(filteredOutput)) })
export const halfBridgeDuty = z.strictObject({ topology: z.literal('half-bridge'), ...forced, maximumDutyRatio: twoSided, outputs: bridgeOutputs })
export const fullBridgeDuty = z.strictObject({ topology: z.literal('full-bridge'), ...forced, maximumDutyRatio: twoSided, control: z.enum(['pulse-width', 'phase-shift']), outputs: bridgeOutputs })
export const pushPullDuty = z.strictObject({ topology: z.literal('push-pull'), ...forced, maximumDutyRatio: twoSided, outputs: bridgeOutputs })
