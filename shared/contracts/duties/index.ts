import { z } from 'zod'
import { coupledInductorDuty } from './coupled-inductor'
import { flybackDuty } from './flyback'
import { forwardDuty, fullBridgeDuty, halfBridgeDuty, pushPullDuty } from './forced'
import { llcDuty } from './llc'

/** One schema per topology: a new one is one file and one line. */
export const dutySchema = z.discriminatedUnion('topology', [flybackDuty, coupledInductorDuty, forwardDuty, halfBridgeDuty, fullBridgeDuty, pushPullDuty, llcDuty])
