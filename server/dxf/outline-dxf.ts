import { point2d, point3d, DxfWriter, LWPolylineFlags, TextHorizontalAlignment, TextVerticalAlignment, Units } from '@tarikjabiri/dxf'
import { useText } from '#shared/drawing/figures/pin-view'
import { bounds } from '#shared/drawing/figures/outline/project'
import { partSolids, type Solid } from '#shared/drawing/figures/outline/solids'
import { terminals } from '#shared/drawing/sheets/terminals'
import type { Layout } from '#shared/engine/evaluation'
import type { Library } from '#shared/engine/library'
import type { WindingSpecification } from '#shared/engine/specification'

export interface OutlineDxf {
  specification: WindingSpecification
  library: Library
  layout: Layout | null
  revision: string
  /** SHA-256 of the released specification; null for a draft. */
  specificationHash: string | null
}

/** Layers with their colour numbers of the DXF palette; 7 is black or white, whichever the ground needs. */
const LAYERS = { ENVELOPE: 8, BODY: 7, PINS: 1, HOLES: 5, PIN_NUMBER: 3, PIN_USE: 4, INFO: 7 } as const
type Layer = keyof typeof LAYERS

const NUMBER_MM = 1.2
const INFO_MM = 1.8

type Writer = InstanceType<typeof DxfWriter>

/**
 * Outline and pin-out for the layout of a board as DXF text: seen from the component side, 1:1 in mm, origin in the
 * middle of the pins, x and y as the pins of the specification have them. Equal input gives equal text.
 */
export function outlineDxf(input: OutlineDxf): string {
  const dxf = new DxfWriter()
  dxf.setUnits(Units.Millimeters)
  for (const [name, colour] of Object.entries(LAYERS)) dxf.addLayer(name, colour, 'Continuous')
  bodies(dxf, input)
  pins(dxf, input)
  info(dxf, input)
  return dxf.stringify()
}

const closed = (dxf: Writer, layerName: Layer, points: readonly (readonly [number, number])[]) =>
  dxf.addLWPolyline(points.map(([x, y]) => ({ point: point2d(x, y) })), { layerName, flags: LWPolylineFlags.Closed })

function rectangle(dxf: Writer, layer: Layer, left: number, bottom: number, right: number, top: number): void {
  closed(dxf, layer, [[left, bottom], [right, bottom], [right, top], [left, top]])
}

function text(dxf: Writer, layerName: Layer, x: number, y: number, heightMm: number, value: string, horizontalAlignment = TextHorizontalAlignment.Left): void {
  const at = point3d(x, y)
  dxf.addText(at, heightMm, value, { layerName, horizontalAlignment, verticalAlignment: TextVerticalAlignment.BaseLine, secondAlignmentPoint: at })
}

function bodies(dxf: Writer, { specification, library, layout }: OutlineDxf): void {
  const envelope = specification.former.envelope.value
  if (envelope) rectangle(dxf, 'ENVELOPE', -envelope.lengthMm / 2, -envelope.widthMm / 2, envelope.lengthMm / 2, envelope.widthMm / 2)
  for (const solid of partSolids(specification, library, layout).solids) if (solid.part !== 'pin') body(dxf, solid)
}

function body(dxf: Writer, solid: Solid): void {
  if (solid.shape === 'prism' && solid.along === 2) return void closed(dxf, 'BODY', solid.profile)
  if (solid.shape === 'ring') {
    for (const diameter of [solid.outsideMm, solid.insideMm]) dxf.addCircle(point3d(0, 0), diameter / 2, { layerName: 'BODY' })
    return
  }
  const [low, high] = bounds(solid)
  rectangle(dxf, 'BODY', low[0], low[1], high[0], high[1])
}

function pins(dxf: Writer, { specification }: OutlineDxf): void {
  const section = specification.former.pinSection.value
  const hole = specification.former.recommendedHoleMm.value
  for (const terminal of terminals(specification)) {
    const { pin, name } = terminal
    if (!pin || pin.state === 'missing') continue
    const { xMm: x, yMm: y } = pin
    const half = (section?.sizeMm ?? 0) / 2
    if (section?.shape === 'square') rectangle(dxf, 'PINS', x - half, y - half, x + half, y + half)
    else if (section) dxf.addCircle(point3d(x, y), half, { layerName: 'PINS' })
    if (hole !== null) dxf.addCircle(point3d(x, y), hole / 2, { layerName: 'HOLES' })
    const inward = x > 0 ? -1 : 1
    const gap = Math.max(half, (hole ?? 0) / 2) + 0.4
    text(dxf, 'PIN_NUMBER', x + inward * gap, y - NUMBER_MM / 2, NUMBER_MM, name, inward > 0 ? TextHorizontalAlignment.Left : TextHorizontalAlignment.Right)
    text(dxf, 'PIN_USE', x - inward * gap, y - NUMBER_MM / 2, NUMBER_MM, escaped(useText(terminal)), inward > 0 ? TextHorizontalAlignment.Right : TextHorizontalAlignment.Left)
  }
}

function info(dxf: Writer, { specification, revision, specificationHash }: OutlineDxf): void {
  const { title, former } = specification
  const envelope = former.envelope.value
  const lowest = Math.min(-(envelope?.widthMm ?? 0) / 2, ...former.pins.map(({ yMm }) => yMm))
  const left = Math.min(-(envelope?.lengthMm ?? 0) / 2, ...former.pins.map(({ xMm }) => xMm))
  const lines = [
    `${title.partNumber.value ?? 'part number not stated'}, revision ${revision}${specificationHash === null ? ', DRAFT - NOT RELEASED' : ''}`,
    'Seen from the component side, 1:1, mm',
    ...(former.recommendedHoleMm.value === null ? ['Hole diameter not stated'] : [`Holes ${former.recommendedHoleMm.value} mm`]),
    ...(specificationHash === null ? [] : [`SHA-256 ${specificationHash}`]),
  ]
  lines.forEach((line, index) => text(dxf, 'INFO', left, lowest - 5 - index * INFO_MM * 1.6, INFO_MM, escaped(line)))
}

/** Characters beyond ASCII as DXF writes them in a file of any code page. */
const escaped = (value: string): string =>
  [...value.normalize('NFC')].map((character) => (character <= '~' && character >= ' ' ? character : `\\U+${character.codePointAt(0)!.toString(16).toUpperCase().padStart(4, '0')}`)).join('')
