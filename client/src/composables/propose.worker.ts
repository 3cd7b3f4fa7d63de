import { propose, type Proposal, type ProposalPreferences } from '#shared/engine/index'
import type { Library } from '#shared/engine/library'
import type { RequirementSheet } from '#shared/engine/specification'

export interface ProposalRequest {
  requirement: RequirementSheet
  library: Library
  preferences: Partial<ProposalPreferences>
}

export type ProposalAnswer = { proposal: Proposal } | { failure: string }

addEventListener('message', ({ data }: MessageEvent<ProposalRequest>) => {
  let answer: ProposalAnswer
  try {
    answer = { proposal: propose(data.requirement, data.library, data.preferences) }
  } catch (error) {
    answer = { failure: error instanceof Error ? error.message : String(error) }
  }
  postMessage(answer)
})
