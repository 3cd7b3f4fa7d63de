import type { PointMm, Shape } from '../model'
import { box, label, LETTERING, rectangle } from '../shapes'

const STEPS_MM = [0.5, 1, 2, 5, 10, 20, 50]

/** Five divisions in real millimetres, so that a copy of another size can still be judged. */
export function scaleBar([x, y]: PointMm, scale: number): Shape[] {
  const step = STEPS_MM.find((each) => each * scale >= 7) ?? 50
  const width = step * scale
  return [
    ...Array.from({ length: 5 }, (_, index) => rectangle(box(x + index * width, y, width, 1.2), { layer: 'rule', fill: index % 2 === 0 ? 'ink' : 'paper' })),
    ...Array.from({ length: 6 }, (_, index) =>
      label([x + index * width, y + 2], index === 5 ? `${5 * step} mm` : String(Number((index * step).toFixed(1))), { align: index === 5 ? 'start' : 'middle', heightMm: LETTERING.small }),
    ),
  ]
}

/** Room that a scale bar takes, mm. */
export const scaleBarWidthMm = (scale: number): number => 5 * (STEPS_MM.find((each) => each * scale >= 7) ?? 50) * scale + 12
