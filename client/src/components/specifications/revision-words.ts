import { TOPOLOGY_WORDS } from '#shared/drawing/sheets/words'
import type { RevisionSummary } from '#shared/contracts/specifications'
import type { Topology } from '#shared/engine/specification'

export const STATE_WORDS: Readonly<Record<RevisionSummary['state'], string>> = {
  draft: 'Draft',
  'in-check': 'In check',
  released: 'Released',
  superseded: 'Superseded',
  withdrawn: 'Withdrawn',
}

/** Done is what nobody has to work on. */
export const isDone = (state: RevisionSummary['state']) => state !== 'draft' && state !== 'in-check'

export const topologyWord = (topology: string | null) => (topology === null ? '–' : (TOPOLOGY_WORDS[topology as Topology] ?? topology))
