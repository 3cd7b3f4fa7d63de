import type { WindingSpecification } from '../../engine/specification'
import type { BoxMm, Picture, PointMm, Shape } from '../model'
import { box, circle, label, LETTERING, line, moved, polyline, rectangle } from '../shapes'
import { terminals, type Terminal } from '../sheets/terminals'
import { shortenedText, textWidthMm } from '../text-metrics'

export type View = 'top' | 'bottom'

interface Placed {
  terminal: Terminal
  at: PointMm
  /** Unit vector away from the middle of the part, along which the pin's use is written. */
  outward: PointMm
}

const NUMBER_MM = LETTERING.body
const USE_MM = LETTERING.small
const TITLE_MM = 5.5
const STRETCH = 1.5
/** Longer uses are shortened; the table of terminals has them whole. */
const USE_LIMIT_MM = 12

/** Pin-out seen from above the board or from below it, from the one pin model: the bottom view is its mirror image. */
export function pinView(specification: WindingSpecification, view: View, widthMm: number, heightMm: number): Picture {
  const all = terminals(specification).filter(({ pin }) => pin !== null)
  const body = bodySize(specification, all)
  const rows = rowDirection(all)
  const margin = labelMarginMm(all)
  const room = rows === 'horizontal' ? { x: widthMm - 4, y: heightMm - TITLE_MM - 2 * margin } : { x: widthMm - 2 * margin, y: heightMm - TITLE_MM - 4 }
  const scale = viewScale(room, body)
  const placed = all.map((terminal) => place(terminal, view, scale, rows))
  const half = { x: (body.xMm * scale.x) / 2, y: (body.yMm * scale.y) / 2 }
  const outline = box(-half.x, -half.y, 2 * half.x, 2 * half.y)
  const shapes: Shape[] = [
    rectangle(outline, { layer: 'outline' }),
    ...placed.flatMap((each) => pinShapes(each, outline, specification)),
    ...pinOneMark(placed, outline),
    label([0, 1 - (heightMm - TITLE_MM) / 2 - TITLE_MM], viewText(specification, view), { align: 'middle', font: 'sans-bold', heightMm: USE_MM }),
  ]
  return { widthMm, heightMm, shapes: moved(shapes, widthMm / 2, (heightMm - TITLE_MM) / 2 + TITLE_MM) }
}

interface Scale {
  x: number
  y: number
}

/** The view is not to scale: either way it may be stretched by half, so that the numbers have room. */
function viewScale(room: Scale, body: { xMm: number; yMm: number }): Scale {
  const [x, y] = [room.x / body.xMm, room.y / body.yMm]
  return { x: Math.min(x, y * STRETCH), y: Math.min(y, x * STRETCH) }
}

function viewText({ former }: WindingSpecification, view: View): string {
  const text = view === 'top' ? 'TOP VIEW' : 'BOTTOM VIEW'
  return former.pinView.value === view ? `${text}, governs` : text
}

function bodySize(specification: WindingSpecification, all: readonly Terminal[]): { xMm: number; yMm: number } {
  const envelope = specification.former.envelope.value
  const span = (values: number[]) => 2 * Math.max(1, ...values.map(Math.abs))
  const x = span(all.map(({ pin }) => pin!.xMm)) + 5
  const y = span(all.map(({ pin }) => pin!.yMm)) + 5
  return { xMm: Math.max(x, envelope?.lengthMm ?? 0), yMm: Math.max(y, envelope?.widthMm ?? 0) }
}

function rowDirection(all: readonly Terminal[]): 'horizontal' | 'vertical' {
  const distinct = (values: number[]) => new Set(values.map((value) => value.toFixed(1))).size
  return distinct(all.map(({ pin }) => pin!.yMm)) <= distinct(all.map(({ pin }) => pin!.xMm)) ? 'horizontal' : 'vertical'
}

function place(terminal: Terminal, view: View, scale: Scale, rows: 'horizontal' | 'vertical'): Placed {
  const mirror = view === 'bottom' ? -1 : 1
  const at: PointMm = [mirror * terminal.pin!.xMm * scale.x, terminal.pin!.yMm * scale.y]
  const outward: PointMm = rows === 'horizontal' ? [0, at[1] < 0 ? -1 : 1] : [at[0] < 0 ? -1 : 1, 0]
  return { terminal, at, outward }
}

/** `P`, `S1 + S2`, `NC`, `missing`. */
export function useText({ pin, uses, core }: Terminal): string {
  if (pin?.state === 'missing') return 'missing'
  const names = uses.map(({ winding, end }) => (end === 'tap' ? `${winding.name} tap` : winding.name))
  if (core) names.push('core')
  if (names.length > 0) return names.join(' + ')
  return pin?.state === 'no-connection' ? 'NC' : 'free'
}

const labelMarginMm = (all: readonly Terminal[]) => 4 + Math.min(USE_LIMIT_MM, Math.max(4, ...all.map((each) => textWidthMm(useText(each), 'sans', USE_MM))))

function pinShapes({ terminal, at, outward }: Placed, outline: BoxMm, specification: WindingSpecification): Shape[] {
  const tag = `pin:${terminal.name}`
  const edge: PointMm = outward[0] === 0 ? [at[0], outward[1] > 0 ? outline.topMm : outline.bottomMm] : [outward[0] > 0 ? outline.rightMm : outline.leftMm, at[1]]
  const start: PointMm = [edge[0] + outward[0] * 1.2, edge[1] + outward[1] * 1.2]
  const dotted = terminal.uses.some(({ end, winding }) => end === 'start' && winding.role !== 'shield')
  return [
    ...pinSymbol(terminal, at, specification, tag),
    numberLabel(terminal.name, at, outward, tag),
    ...(dotted ? [circle([start[0] + outward[0] * 0.5, start[1] + outward[1] * 0.5], 0.7, { layer: 'symbol', fill: 'ink', tag })] : []),
    useLabel(shortenedText(useText(terminal), 'sans', USE_MM, USE_LIMIT_MM), start, outward, tag),
  ]
}

function pinSymbol({ pin }: Terminal, at: PointMm, specification: WindingSpecification, tag: string): Shape[] {
  const [x, y] = at
  if (pin!.state === 'missing') {
    const arm = 0.9
    return [
      circle(at, 1.1, { layer: 'thin', tag }),
      line([x - arm, y - arm], [x + arm, y + arm], 'thin', tag),
      line([x - arm, y + arm], [x + arm, y - arm], 'thin', tag),
    ]
  }
  const layer = pin!.state === 'fitted' ? 'outline' : 'thin'
  const square = specification.former.pinSection.value?.shape === 'square'
  return [square ? rectangle(box(x - 0.9, y - 0.9, 1.8, 1.8), { layer, tag, fill: 'paper' }) : circle(at, 1, { layer, tag, fill: 'paper' })]
}

function numberLabel(name: string, [x, y]: PointMm, outward: PointMm, tag: string): Shape {
  const options = { heightMm: NUMBER_MM, font: 'sans-bold', tag } as const
  if (outward[0] === 0) return label([x, outward[1] > 0 ? y - 2 - NUMBER_MM : y + 2], name, { ...options, align: 'middle' })
  return label([x - outward[0] * 2, y - NUMBER_MM / 2], name, { ...options, align: outward[0] > 0 ? 'end' : 'start' })
}

function useLabel(text: string, [x, y]: PointMm, outward: PointMm, tag: string): Shape {
  const align = outward[0] + outward[1] > 0 ? 'start' : 'end'
  const place: PointMm = [x + outward[0] * 2, y + outward[1] * 2]
  if (outward[0] === 0) return label([place[0] + USE_MM / 2, place[1]], text, { align, heightMm: USE_MM, rotationDeg: 90, tag })
  return label([place[0], place[1] - USE_MM / 2], text, { align, heightMm: USE_MM, tag })
}

/** A filled corner of the body next to pin 1. */
function pinOneMark(placed: readonly Placed[], outline: BoxMm): Shape[] {
  const one = placed.find(({ terminal }) => terminal.name === '1') ?? placed[0]
  if (!one) return []
  const size = 2.2
  const [x, dx] = one.at[0] < 0 ? [outline.leftMm, size] : [outline.rightMm, -size]
  const [y, dy] = one.at[1] < 0 ? [outline.bottomMm, size] : [outline.topMm, -size]
  return [polyline([[x, y], [x + dx, y], [x, y + dy]], { layer: 'thin', fill: 'ink', closed: true, tag: 'pin-one' })]
}

/** The pin-out in words, for readers who do not see it. */
export const pinsInWords = (specification: WindingSpecification): string =>
  terminals(specification)
    .map((terminal) => `${terminal.name}: ${useText(terminal)}`)
    .join('; ')
