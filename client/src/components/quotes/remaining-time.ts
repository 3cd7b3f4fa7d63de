const SECOND_MS = 1000
const MINUTE_MS = 60 * SECOND_MS
const HOUR_MS = 60 * MINUTE_MS
const DAY_MS = 24 * HOUR_MS

/** What is left until a moment in the two largest units, cut and never rounded up; seconds only in the last hour. */
export function remainingText(leftMs: number): string {
  if (leftMs <= 0) return 'none'
  const days = Math.floor(leftMs / DAY_MS)
  const hours = Math.floor((leftMs % DAY_MS) / HOUR_MS)
  const minutes = Math.floor((leftMs % HOUR_MS) / MINUTE_MS)
  const seconds = Math.floor((leftMs % MINUTE_MS) / SECOND_MS)
  if (days > 0) return `${days} d ${hours} h`
  return hours > 0 ? `${hours} h ${minutes} min` : `${minutes} min ${seconds} s`
}
