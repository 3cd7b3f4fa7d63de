import type { CheckResult } from '../evaluation'
import { CHECKS } from './run'

export type CheckTopic = 'electrical' | 'thermal' | 'insulation' | 'windability' | 'terminations' | 'documents' | 'tests' | 'library'

export interface CatalogueEntry {
  code: string
  severity: CheckResult['severity']
  topic: CheckTopic
  /** By the document, the library and the calculation, or by somebody who looks at the part. */
  decidedBy: 'data' | 'person'
}

const TOPICS: Readonly<Record<string, CheckTopic>> = { E: 'electrical', T: 'thermal', I: 'insulation', W: 'windability', P: 'terminations', D: 'documents', Q: 'tests', L: 'library' }

/** Who made a revision is known at release only. */
const AT_RELEASE: readonly CatalogueEntry[] = [{ code: 'D02', severity: 'S', topic: 'documents', decidedBy: 'data' }]

/** Every release check with its usual severity, ordered by topic and code. */
export const CHECK_CATALOGUE: readonly CatalogueEntry[] = [
  ...Object.entries(CHECKS).map(([code, { severity, decidedBy }]): CatalogueEntry => ({ code, severity, topic: TOPICS[code[0]!]!, decidedBy: decidedBy ?? 'data' })),
  ...AT_RELEASE,
].sort((a, b) => Object.values(TOPICS).indexOf(a.topic) - Object.values(TOPICS).indexOf(b.topic) || (a.code < b.code ? -1 : 1))
