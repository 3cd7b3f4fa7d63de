import type { PointMm, Shape } from '../model'
import { circle, label, LETTERING, line } from '../shapes'

export interface BalloonTarget {
  text: string
  tag: string
  leftEnd: PointMm
  rightEnd: PointMm
}

export interface Balloon {
  at: PointMm
  shapes: Shape[]
}

const RADIUS_MM = 2.7
const PITCH_MM = 6.2

/** Numbered balloons in two columns, in turns left and right, with leaders that end in a dot on their target. */
export function balloons(targets: readonly BalloonTarget[], leftMm: number, rightMm: number): Balloon[] {
  const sorted = [...targets].sort((a, b) => a.rightEnd[1] - b.rightEnd[1])
  const column = (side: 'left' | 'right') => sorted.filter((_, index) => (index % 2 === 0) === (side === 'right'))
  return (['left', 'right'] as const).flatMap((side) => {
    const ends = column(side).map((target) => ({ target, end: side === 'left' ? target.leftEnd : target.rightEnd }))
    const heights = spread(ends.map(({ end }) => end[1]))
    const hand = side === 'left' ? -1 : 1
    const x = (side === 'left' ? leftMm : rightMm) + hand * (RADIUS_MM + 5)
    return ends.map(({ target, end }, index) => balloon(target, end, [x, heights[index]!], hand))
  })
}

/** Moves ascending heights apart to the pitch, as a whole centred on where they were. */
function spread(wanted: readonly number[]): number[] {
  const placed: number[] = []
  for (const height of wanted) placed.push(Math.max(height, (placed.at(-1) ?? -Infinity) + PITCH_MM))
  const pushed = placed.map((height, index) => height - wanted[index]!)
  const shift = pushed.length === 0 ? 0 : (Math.max(...pushed) + Math.min(...pushed)) / 2
  return placed.map((height) => height - shift)
}

function balloon({ text, tag }: BalloonTarget, end: PointMm, at: PointMm, hand: number): Balloon {
  const edge: PointMm = [at[0] - hand * RADIUS_MM, at[1]]
  const knee: PointMm = [edge[0] - hand * 2, at[1]]
  const heightMm = text.length > 2 ? LETTERING.small : LETTERING.body
  return {
    at,
    shapes: [
      line(edge, knee, 'dimension', tag),
      line(knee, end, 'dimension', tag),
      circle(end, 0.35, { layer: 'dimension', fill: 'ink', tag }),
      circle(at, RADIUS_MM, { layer: 'thin', fill: 'paper', tag }),
      label([at[0], at[1] - heightMm / 2], text, { align: 'middle', heightMm, tag }),
    ],
  }
}
