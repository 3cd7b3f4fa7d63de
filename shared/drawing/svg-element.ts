import { fontSizeMm, alignmentShiftMm, textRuns } from './text-metrics'
import { FILL_COLOURS, INK_COLOURS, LINES, type CircleShape, type FontRole, type LabelShape, type PathShape, type Shape } from './model'
import { formatMm, modulesPathData, pathData } from './path-data'

/** An SVG element as plain data, for a text of markup and for a component alike. */
export interface SvgElement {
  name: 'path' | 'circle' | 'text'
  attributes: Record<string, string>
  text: string
}

/** Families under which the shipped fonts are declared for drawings; their files are complete, unlike the page's. */
export const FONT_FAMILIES: Record<FontRole, { family: string; weight: string }> = {
  sans: { family: 'Sheet Sans', weight: '400' },
  'sans-bold': { family: 'Sheet Sans', weight: '600' },
  mono: { family: 'Sheet Mono', weight: '400' },
}

const tagOf = (shape: Shape): Record<string, string> => (shape.tag === undefined ? {} : { 'data-tag': shape.tag })

function stroke(shape: PathShape | CircleShape): Record<string, string> {
  const { widthMm, dashMm } = LINES[shape.layer]
  if (shape.kind === 'path' && !shape.stroked) return { stroke: 'none' }
  return { stroke: '#000000', 'stroke-width': String(widthMm), 'stroke-linejoin': 'round', ...(dashMm.length > 0 && { 'stroke-dasharray': dashMm.join(' ') }) }
}

const fillColour = (shape: PathShape | CircleShape) => (shape.fill === 'none' ? 'none' : FILL_COLOURS[shape.fill])

function labelElements(shape: LabelShape, heightMm: number): SvgElement[] {
  const [x, y] = [shape.anchor[0], heightMm - shape.anchor[1]]
  const rotation: Record<string, string> =
    shape.rotationDeg === 0 ? {} : { transform: `rotate(${formatMm(-shape.rotationDeg)} ${formatMm(x)} ${formatMm(y)})` }
  let start = x + alignmentShiftMm(shape)
  return textRuns(shape.text, shape.font, shape.heightMm).map((run) => {
    const { family, weight } = FONT_FAMILIES[run.font]
    const element: SvgElement = {
      name: 'text',
      attributes: {
        x: formatMm(start),
        y: formatMm(y),
        'font-family': family,
        'font-weight': weight,
        'font-size': formatMm(fontSizeMm(shape.heightMm)),
        fill: INK_COLOURS[shape.ink],
        // Browsers round advances to their own grid, and collapse blanks unless each text says otherwise.
        textLength: formatMm(run.widthMm),
        style: 'white-space:pre',
        ...rotation,
        ...tagOf(shape),
      },
      text: run.text,
    }
    start += run.widthMm
    return element
  })
}

/** The SVG elements of one shape, y downwards from `heightMm`. Labels make one element per font. */
export function svgElements(shape: Shape, heightMm: number): SvgElement[] {
  switch (shape.kind) {
    case 'path':
      return [{ name: 'path', attributes: { d: pathData(shape, heightMm), fill: fillColour(shape), ...stroke(shape), ...tagOf(shape) }, text: '' }]
    case 'circle': {
      const place = { cx: formatMm(shape.center[0]), cy: formatMm(heightMm - shape.center[1]), r: formatMm(shape.radiusMm) }
      return [{ name: 'circle', attributes: { ...place, fill: fillColour(shape), ...stroke(shape), ...tagOf(shape) }, text: '' }]
    }
    case 'label':
      return labelElements(shape, heightMm)
    case 'modules':
      // Without smoothing the runs meet each other without a seam.
      return [{ name: 'path', attributes: { d: modulesPathData(shape, heightMm), fill: INK_COLOURS.ink, stroke: 'none', 'shape-rendering': 'crispEdges', ...tagOf(shape) }, text: '' }]
  }
}
