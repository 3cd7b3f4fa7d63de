import { z } from 'zod'
import { commonModeChokeDuty } from './common-mode-choke'
import { coupledInductorDuty } from './coupled-inductor'
import { currentSenseDuty } from './current-sense'
import { flybackDuty } from './flyback'
import { forwardDuty, fullBridgeDuty, halfBridgeDuty, pushPullDuty } from './forced'
import { llcDuty } from './llc'
import { gateDriveDuty } from './gate-drive'
import { inductorDuty } from './inductor'

/** One schema per topology: a new one is one file and one line. */
export const dutySchema = z.discriminatedUnion('topology', [flybackDuty, forwardDuty, halfBridgeDuty, fullBridgeDuty, pushPullDuty, llcDuty, coupledInductorDuty, inductorDuty, commonModeChokeDuty, gateDriveDuty, currentSenseDuty])
