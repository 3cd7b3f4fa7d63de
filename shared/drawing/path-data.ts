import type { ModulesShape, PathShape, PathStep, PointMm } from './model'

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

/** One closed path around each run of dark modules, y downwards. */
export function modulesPathData({ corner, moduleMm, rows }: ModulesShape, heightMm: number): string {
  const top = heightMm - corner[1] - rows.length * moduleMm
  return rows
    .flatMap((row, index) =>
      [...row.matchAll(/1+/g)].map(({ index: start, 0: run }) => {
        const place = `${formatMm(corner[0] + start * moduleMm)} ${formatMm(top + index * moduleMm)}`
        const width = formatMm(run.length * moduleMm)
        return `M${place}h${width}v${formatMm(moduleMm)}h-${width}Z`
      }),
    )
    .join('')
}
