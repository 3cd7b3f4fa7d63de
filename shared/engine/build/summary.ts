import { outlines, reportCrossings } from './outlines'
import { finding } from './progress'
import type { Progress } from './progress'
import { bulgeFactor } from './tube'
import type { Coil, StepPlacement, WindingBuild } from './types'

/** The laid coil with its build, fill and what each winding became. */
export function summary(progress: Progress): Coil {
  const { former, windings } = progress.input
  const { sections } = progress
  const plainBuildMm = Math.max(...sections.map(({ yMm }) => yMm))
  const bulge = bulgeFactor(former.tube)
  const buildMm = plainBuildMm * bulge
  const areaMm2 = former.windingWidthMm * former.windingHeightMm * sections.length
  if (buildMm > former.windingHeightMm) {
    progress.findings.push(finding('window-overfilled', 'error', 'sequence', { buildMm, windowHeightMm: former.windingHeightMm, overMm: buildMm - former.windingHeightMm, fillRatio: buildMm / former.windingHeightMm }))
  }
  reportCrossings(progress, plainBuildMm)
  return {
    sectionLeftsMm: sections.map(({ xMm }) => xMm),
    layout: {
      form: 'window',
      windowWidthMm: sections.length * former.windingWidthMm + (sections.length - 1) * former.flangeThicknessMm,
      windowHeightMm: former.windingHeightMm,
      items: progress.items,
      outlines: outlines(progress),
      buildMm,
      buildRatio: former.windingHeightMm > 0 ? buildMm / former.windingHeightMm : 0,
      copperFill: areaMm2 > 0 ? progress.copperAreaMm2 / areaMm2 : 0,
      windowFill: areaMm2 > 0 ? progress.squaresAreaMm2 / areaMm2 : 0,
    },
    placements: progress.placements,
    tapes: progress.tapes,
    margins: progress.margins,
    shields: progress.shields,
    windings: new Map(windings.flatMap(({ id }) => windingBuild(id, progress.placements))),
    plainBuildMm,
    bulge,
    findings: progress.findings,
  }
}

export function windingBuild(windingId: string, all: readonly StepPlacement[]): [string, WindingBuild][] {
  const placements = all.filter((placement) => placement.windingId === windingId)
  if (placements.length === 0) return []
  const turnsPerLayer = placements.flatMap((placement) => placement.turnsPerLayer)
  const lengths = placements.flatMap((placement) => placement.turnLengthsMm)
  const laid = turnsPerLayer.reduce((sum, turns) => sum + turns, 0)
  const meanTurnLengthMm = turnsPerLayer.reduce((sum, turns, layer) => sum + turns * lengths[layer]!, 0) / laid
  const turns = placements.reduce((sum, placement) => sum + placement.turns, 0)
  return [[windingId, { windingId, turns, layers: turnsPerLayer.length, turnsPerLayer, meanTurnLengthMm, turnsLengthM: (turns * meanTurnLengthMm) / 1000 }]]
}
