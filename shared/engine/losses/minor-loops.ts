import { waveformSegments } from '../waveforms/waveform'
import type { Waveform } from '../waveforms/waveform'

/** A straight piece of a flux density over time. */
export interface LoopPiece {
  durationS: number
  from: number
  to: number
}

/** One closed hysteresis loop: its swing and the pieces of the period that run on it. */
export interface HysteresisLoop {
  swingT: number
  pieces: LoopPiece[]
}

/**
 * The loops that a periodic flux density runs through: the major one from its least to its greatest value and back, and a minor one
 * for every excursion that turns back on the way and returns to where it left; a minor loop may hold smaller ones.
 *
 * Source: K. Venkatachalam et al., IEEE COMPEL 2002 (splitting of minor loops).
 */
export function hysteresisLoops(fluxDensityT: Waveform): HysteresisLoop[] {
  const pieces = fromItsLeast(closed(waveformSegments(fluxDensityT)))
  return pieces.length === 0 ? [] : loopsOf(pieces)
}

/** Each piece begun where the one before it ended, round the period: a last digit between them would be a loop that never closes. */
const closed = (segments: readonly LoopPiece[]): LoopPiece[] =>
  segments.map(({ durationS, to }, index) => ({ durationS, from: segments[(index + segments.length - 1) % segments.length]!.to, to }))

/** The period begun at its least value. */
function fromItsLeast(pieces: readonly LoopPiece[]): LoopPiece[] {
  const start = pieces.reduce((least, { from }, index) => (from < pieces[least]!.from ? index : least), 0)
  return [...pieces.slice(start), ...pieces.slice(0, start)]
}

const turned = ({ durationS, from, to }: LoopPiece): LoopPiece => ({ durationS, from: -from, to: -to })

/** A closed path from its least value: up to the greatest, and down again as a climb seen upside down. */
function loopsOf(pieces: readonly LoopPiece[]): HysteresisLoop[] {
  const top = Math.max(...pieces.map(({ from, to }) => Math.max(from, to)))
  const summit = pieces.findLastIndex(({ to }) => to === top)
  const up = climb(pieces.slice(0, summit + 1))
  const down = climb(pieces.slice(summit + 1).map(turned))
  const major: HysteresisLoop = { swingT: top - pieces[0]!.from, pieces: [...up.own, ...down.own.map(turned)] }
  return [major, ...up.minor, ...down.minor]
}

/** The pieces that rise over all before them, and the loops of the excursions between. */
function climb(pieces: readonly LoopPiece[]): { own: LoopPiece[]; minor: HysteresisLoop[] } {
  const own: LoopPiece[] = []
  const minor: HysteresisLoop[] = []
  const rest = [...pieces]
  while (rest.length > 0) {
    const piece = rest.shift()!
    if (piece.to >= piece.from) own.push(piece)
    else minor.push(...loopsOf(excursion(piece, rest).map(turned)))
  }
  return { own, minor }
}

/** The way from a level down and back to it; what goes on beyond the level is put back. */
function excursion(first: LoopPiece, rest: LoopPiece[]): LoopPiece[] {
  const level = first.from
  const way = [first]
  while (rest.length > 0) {
    const piece = rest.shift()!
    if (piece.to < level) {
      way.push(piece)
      continue
    }
    const share = piece.to === piece.from ? 1 : (level - piece.from) / (piece.to - piece.from)
    way.push({ durationS: piece.durationS * share, from: piece.from, to: level })
    if (share < 1) rest.unshift({ durationS: piece.durationS * (1 - share), from: level, to: piece.to })
    break
  }
  return way
}
