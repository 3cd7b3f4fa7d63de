import type { PathShape, PathStep, PointMm } from './model'

/** Decimal text of a length, micrometres at the finest. */
export const formatMm = (mm: number): string => String(Number(mm.toFixed(3)) || 0)

/** SVG path text, y downwards from `heightMm`. pdfkit's `path()` reads the same text, so both outputs share this. */
export function pathData(shape: PathShape, heightMm: number): string {
  const place = ([xMm, yMm]: PointMm) => `${formatMm(xMm)} ${formatMm(heightMm - yMm)}`
  const step = (part: PathStep) => {
    if (!('radiusMm' in part)) return `L${place(part.to)}`
    const radius = formatMm(part.radiusMm)
    return `A${radius} ${radius} 0 0 ${part.turn === 'right' ? 1 : 0} ${place(part.to)}`
  }
  return `M${place(shape.from)}${shape.steps.map(step).join('')}${shape.closed ? 'Z' : ''}`
}
