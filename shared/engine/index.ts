/**
 * The only way into the engine for the rest of the product. Lengths in mm, temperatures in °C, everything else SI.
 */

export { evaluate } from './evaluate'
export type { EvaluateOptions } from './evaluate'
export { blankSpecification, DEFAULT_PREFERENCES, propose, refresh, reproposeTests } from './propose'
export type { Proposal, ProposalPreferences, ProposalReason, ReasonCode } from './propose'
export { proposeTests } from './limits'
export { testCoverage } from './limits/fault-coverage'
export type { Detection, FaultCoverage, RowForecast, TestCoverage } from './limits/fault-coverage'
export { search, searchSteps } from './search'
export type { CandidateFigures, RejectedCore, SearchCandidate, SearchOutcome, SearchPreferences, SearchProgress } from './search'
export { CHECK_CATALOGUE } from './checks/catalogue'
export type { CatalogueEntry, CheckTopic } from './checks/catalogue'
export { releaseRecordChecks } from './checks/documentation'
export { ENGINE_VERSION } from './version'
export { foilResistanceOhmPerM } from './wires/foil'
export { LITZ_LENGTH_FACTOR } from './wires/insulated-diameter'
export { litzFigures } from './wires/litz'
export { toroidEffectiveParameters } from './magnetics/effective-parameters'
