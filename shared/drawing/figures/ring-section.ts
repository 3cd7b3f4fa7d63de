import type { RingLayout, RingPass } from '../../engine/evaluation'
import type { WindingSpecification } from '../../engine/specification'
import type { Picture, PointMm, Shape } from '../model'
import { circle, label, LETTERING, line, moved } from '../shapes'
import { balloons, type Balloon } from './balloons'
import { scaleBar, scaleBarWidthMm } from './scale-bar'
import { scaleText, standardScale } from './scales'
import { turnMark } from './turn-marks'

export interface RingSectionInput {
  specification: WindingSpecification
  ring: RingLayout
  maximumWidthMm: number
  maximumHeightMm: number
  /** Numbered balloons that name the steps of the winding sequence. */
  balloons: boolean
  /** Any scale that fills the room, and no scale bar, for a screen. */
  anyScale?: boolean
}

export interface RingPicture extends Picture {
  scale: number
  coreDrawn: boolean
}

const SIDE_MM = 24
const FOOT_MM = 9

/**
 * A wound ring core as seen along its axis, to scale: the ring, tapes as circles, each wire where it runs through the hole and
 * outside, with the line on which it crosses the face.
 */
export function ringSection(input: RingSectionInput): RingPicture {
  const { ring } = input
  const acrossMm = Math.max(ring.overallOutsideMm, ring.outsideMm) + 0.5
  const frame = { side: input.balloons ? SIDE_MM : 5, foot: input.anyScale ? 1 : FOOT_MM }
  const room = { width: input.maximumWidthMm - 2 * frame.side, height: input.maximumHeightMm - frame.foot - 2 }
  const scale = input.anyScale ? Math.min(room.width, room.height) / acrossMm : standardScale({ width: acrossMm, height: acrossMm }, room)
  const place = (x: number, y: number): PointMm => [(x + acrossMm / 2) * scale, (y + acrossMm / 2) * scale]
  const marks = input.balloons ? stepBalloons(input, place, acrossMm * scale) : []
  const low = Math.min(0, ...marks.map(({ at }) => at[1] - 4))
  const high = Math.max(acrossMm * scale, ...marks.map(({ at }) => at[1] + 4))
  const shapes = [...ringShapes(input, place, scale), ...marks.flatMap(({ shapes: own }) => own)]
  return {
    widthMm: acrossMm * scale + 2 * frame.side,
    heightMm: high - low + frame.foot + 2,
    shapes: [...moved(shapes, frame.side, frame.foot + 1 - low), ...(input.anyScale ? [] : scaleBarShapes(scale, frame.side))],
    scale,
    coreDrawn: true,
  }
}

function scaleBarShapes(scale: number, leftMm: number): Shape[] {
  return [...scaleBar([leftMm, 1], scale), label([leftMm + scaleBarWidthMm(scale) + 3, 1], `Scale ${scaleText(scale)}`, { heightMm: LETTERING.small })]
}

function ringShapes({ ring, specification }: RingSectionInput, place: (x: number, y: number) => PointMm, scale: number): Shape[] {
  const middle = place(0, 0)
  const round = (diameterMm: number, fill: 'tint' | 'paper' | 'none', layer: 'outline' | 'fine', tag: string) => circle(middle, (diameterMm / 2) * scale, { layer, fill, tag })
  return [
    round(ring.outsideMm, 'tint', 'outline', 'core'),
    round(ring.holeMm, 'paper', 'outline', 'core'),
    ...ring.tapes.flatMap(({ stepId, holeMm, outsideMm }) => [round(outsideMm, 'none', 'fine', `step:${stepId}`), ...(holeMm > 0 ? [round(holeMm, 'none', 'fine', `step:${stepId}`)] : [])]),
    ...ring.passes.flatMap((pass) => passShapes(specification, pass, place, scale)),
    ...axes(place, ring.outsideMm / 2),
  ]
}

/** The crossing on the face first, so that the wires' circles cover its ends. */
function passShapes(specification: WindingSpecification, pass: RingPass, place: (x: number, y: number) => PointMm, scale: number): Shape[] {
  const index = specification.windings.findIndex(({ id }) => id === pass.windingId)
  const tag = `winding:${pass.windingId} step:${pass.stepId}`
  const mark = (x: number, y: number) => turnMark(index, place(x, y), (pass.overallMm / 2) * scale, (pass.conductorMm / 2) * scale, tag)
  return [line(place(pass.innerXMm, pass.innerYMm), place(pass.outerXMm, pass.outerYMm), 'fine', tag), ...mark(pass.innerXMm, pass.innerYMm), ...mark(pass.outerXMm, pass.outerYMm)]
}

const axes = (place: (x: number, y: number) => PointMm, radiusMm: number): Shape[] => [
  line(place(-radiusMm - 1, 0), place(radiusMm + 1, 0), 'centre'),
  line(place(0, -radiusMm - 1), place(0, radiusMm + 1), 'centre'),
]

function stepBalloons({ ring, specification }: RingSectionInput, place: (x: number, y: number) => PointMm, widthMm: number): Balloon[] {
  const targets = specification.sequence.flatMap((step, index) => {
    const own = ring.passes.filter(({ stepId }) => stepId === step.id)
    const middle = own[Math.floor(own.length / 2)]
    if (!middle) return []
    const at = place(middle.outerXMm, middle.outerYMm)
    return [{ text: String(index + 1), tag: `step:${step.id}`, leftEnd: at, rightEnd: at }]
  })
  return balloons(targets, -5, widthMm + 5)
}
