import type { CoreRow, FormerRow, Library } from '../library'
import type { RequirementSheet } from '../specification'
import type { Candidate, SearchInput } from './candidate'
import type { ProposalPreferences } from './preferences'
import type { Rejection } from './reasons'
import { goodCandidate, tryCore } from './try-core'

export type { Candidate, SearchInput } from './candidate'

/** How much larger a core may be that answers a question which the smallest leaves open, e.g. of the current per pin. */
const WORTH_VOLUME = 1.6

export interface SearchResult {
  chosen: Candidate | null
  /** Why each smaller core fell out. */
  rejected: { core: string; rejection: Rejection }[]
}

/**
 * The smallest core, in the order of volume, whose best design meets flux, build, temperature and insulation; a little larger
 * where this leaves fewer questions. Coil formers that somebody sells are tried before those that are only derived from geometry.
 */
export function searchCore(input: SearchInput): SearchResult {
  const all = sizesOf(input.library, input.preferences).filter((size) => !isTooHigh(size, input.requirement))
  const sold = trySizes(input, all.filter(({ former }) => former.confidence !== 'generic'))
  if (sold.chosen?.rejection === null) return sold
  const derived = trySizes(input, all.filter(({ former }) => former.confidence === 'generic'))
  return { chosen: derived.chosen?.rejection === null ? derived.chosen : (sold.chosen ?? derived.chosen), rejected: [...sold.rejected, ...derived.rejected] }
}

/** The best core so far, how large a better one may be, and what fell out before it. */
interface Best {
  candidate: Candidate
  mostVolumeMm3: number
  rejected: SearchResult['rejected']
}

function trySizes(input: SearchInput, sizes: readonly Size[]): SearchResult {
  const rejected: SearchResult['rejected'] = []
  let fallback: (() => Candidate) | null = null
  let best: Best | null = null
  for (const { core, former } of sizes) {
    if (best && core.effectiveVolumeMm3 > best.mostVolumeMm3) break
    const tried = tryCore(input, core, former)
    const candidate = goodCandidate(tried)
    if (candidate) {
      if (!best || candidate.compromises < best.candidate.compromises) {
        const mostVolumeMm3: number = best?.mostVolumeMm3 ?? core.effectiveVolumeMm3 * WORTH_VOLUME
        best = { candidate, mostVolumeMm3, rejected: [...rejected] }
      }
      if (candidate.compromises === 0) break
      continue
    }
    fallback = (tried.state === 'built' ? () => tried.candidate : tried.show) ?? fallback
    rejected.push({ core: former.name, rejection: tried.state === 'built' ? tried.candidate.rejection! : tried.rejection })
  }
  return best ? { chosen: best.candidate, rejected: best.rejected } : { chosen: fallback?.() ?? null, rejected }
}

/** A core with one of its coil formers. */
export interface Size {
  core: CoreRow
  former: FormerRow
}

/** A centre leg with a hole for a tuning screw, which a gapped power part has no use for. */
const isHollow = ({ shape, centreLeg, minimumAreaMm2 }: CoreRow) => shape === 'RM' && centreLeg?.shape === 'round' && minimumAreaMm2 < 0.85 * (Math.PI / 4) * centreLeg.diameterMm ** 2

/** Cores of the wished shapes, or the named one, with each of their formers that the windings can be planned on, the smallest first. */
export function sizesOf({ cores, formers }: Library, { shapes, coreId }: Pick<ProposalPreferences, 'shapes' | 'coreId'>): Size[] {
  return formers
    .flatMap((former): Size[] => {
      const core = cores.find(({ id }) => id === former.coreId)
      // Windings are planned one over the other, which takes one section.
      if (!core || former.sections > 1 || (coreId !== null ? core.id !== coreId : !shapes.includes(core.shape) || isHollow(core))) return []
      return [{ core, former }]
    })
    .sort((a, b) => a.core.effectiveVolumeMm3 - b.core.effectiveVolumeMm3 || shapes.indexOf(a.core.shape) - shapes.indexOf(b.core.shape) || (a.former.id < b.former.id ? -1 : 1))
}

/** Room over the board that seating and tolerance of the part take. Source: common practice. */
const SEATING_MM = 0.5

export const isTooHigh = ({ former }: Size, { maximumHeightMm }: Pick<RequirementSheet, 'maximumHeightMm'>): boolean =>
  maximumHeightMm !== null && former.envelopeMm.height + SEATING_MM > maximumHeightMm
