import type { Finding } from '../findings'
import type { RejectedCore, SearchCandidate } from './candidates'

export interface SearchProgress {
  stage: 'screening' | 'evaluating'
  done: number
  total: number
  /** Candidates found so far. */
  found: number
}

export interface SearchOutcome {
  /** The best first: those on the front before the others, then by loss, volume and copper together; ties by id. */
  candidates: SearchCandidate[]
  rejected: RejectedCore[]
  findings: Finding[]
  /** Variants looked at by closed forms, and designs evaluated in full. */
  screened: number
  evaluated: number
  stopped: boolean
}
