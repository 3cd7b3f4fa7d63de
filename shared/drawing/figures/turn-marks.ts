import type { CircleShape, PointMm, Shape } from '../model'
import { circle, line } from '../shapes'

type Mark = (center: PointMm, radiusMm: number, tag: string) => Shape[]

const chord = ([x, y]: PointMm, radius: number, angleDeg: number, offset: number, tag: string): Shape => {
  const angle = (angleDeg * Math.PI) / 180
  const [ux, uy] = [Math.cos(angle), Math.sin(angle)]
  const half = Math.sqrt(Math.max(radius ** 2 - offset ** 2, 0))
  const [mx, my] = [x - uy * offset, y + ux * offset]
  return line([mx - ux * half, my - uy * half], [mx + ux * half, my + uy * half], 'fine', tag)
}

const chords = (angleDeg: number): Mark => (center, radius, tag) =>
  [-0.5, 0, 0.5].map((share) => chord(center, radius, angleDeg, share * radius, tag))

const inner = (fill: 'ink' | 'none', share: number): Mark => (center, radius, tag) => [circle(center, radius * share, { layer: 'fine', fill, tag })]

/** Told apart without colour: plain, filled, cross, dot, chords in four directions, ring, plus, grey. */
const MARKS: readonly Mark[] = [
  () => [],
  (center, radius, tag) => [circle(center, radius, { layer: 'fine', fill: 'ink', tag })],
  (center, radius, tag) => [chord(center, radius, 45, 0, tag), chord(center, radius, 135, 0, tag)],
  inner('ink', 0.42),
  chords(45),
  chords(0),
  chords(90),
  chords(135),
  inner('none', 0.55),
  (center, radius, tag) => [chord(center, radius, 0, 0, tag), chord(center, radius, 90, 0, tag)],
  (center, radius, tag) => [circle(center, radius, { layer: 'fine', fill: 'dark-tint', tag })],
  (center, radius, tag) => [circle(center, radius, { layer: 'fine', fill: 'dark-tint', tag }), ...inner('ink', 0.42)(center, radius, tag)],
]

/** One wire of one turn in section: its insulation as a circle, its conductor with the mark of the winding. */
export function turnMark(windingIndex: number, center: PointMm, overallMm: number, conductorMm: number, tag: string): Shape[] {
  const insulation: CircleShape = circle(center, overallMm, { layer: 'fine', fill: 'paper', tag })
  const mark = MARKS[Math.max(windingIndex, 0) % MARKS.length]!
  return [insulation, ...mark(center, Math.min(conductorMm, overallMm), tag)]
}
