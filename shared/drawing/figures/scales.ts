/** Enlargement and reduction scales of ISO 5455, largest first. */
const SCALES = [50, 20, 10, 5, 2, 1, 1 / 2, 1 / 5, 1 / 10] as const

/** The largest standard scale at which a size fits. */
export function standardScale(sizeMm: { width: number; height: number }, roomMm: { width: number; height: number }): number {
  return SCALES.find((scale) => sizeMm.width * scale <= roomMm.width && sizeMm.height * scale <= roomMm.height) ?? SCALES.at(-1)!
}

/** `10:1` or `1:2`. */
export const scaleText = (scale: number): string => (scale >= 1 ? `${scale}:1` : `1:${Math.round(1 / scale)}`)
