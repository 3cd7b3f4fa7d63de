export interface ZonedEntry {
  /** Calendar date, `2026-03-29`. */
  date: string
  /** Time of day, `14:30`. */
  time: string
  /** Zone of the IANA time zone database, `Europe/Berlin`. */
  zone: string
}

export type ZonedReading =
  | { kind: 'incomplete' }
  /** `at` is the moment in UTC, `offset` what the zone adds to it, `+01:00`. */
  | { kind: 'moment'; at: string; offset: string }
  /** The clock is set back and shows this time twice. */
  | { kind: 'ambiguous'; moments: readonly { at: string; offset: string }[] }
  /** The clock is set forward and never shows this time, or the date does not exist. */
  | { kind: 'no-such-time' }
  | { kind: 'unknown-zone' }

const MINUTE_MS = 60_000

function wallClockMs(instantMs: number, zone: string): number {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    hourCycle: 'h23',
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
  }).formatToParts(instantMs)
  const part = (type: Intl.DateTimeFormatPartTypes) => Number(parts.find((found) => found.type === type)!.value)
  return Date.UTC(part('year'), part('month') - 1, part('day'), part('hour'), part('minute'), part('second'))
}

function isKnownZone(zone: string): boolean {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: zone })
    return true
  } catch {
    return false
  }
}

const pad = (value: number) => String(value).padStart(2, '0')

function offsetText(minutes: number): string {
  const size = Math.abs(minutes)
  return `${minutes < 0 ? '-' : '+'}${pad(Math.floor(size / 60))}:${pad(size % 60)}`
}

/** What a zone adds to UTC at a moment, `+01:00` (ISO 8601). `instant` is any text that `Date` reads. */
export function zoneOffset(instant: string, zone: string): string {
  const ms = Math.floor(Date.parse(instant) / 1000) * 1000
  return offsetText(Math.round((wallClockMs(ms, zone) - ms) / MINUTE_MS))
}

/**
 * Reads date and time of day in a zone as a moment. Times that the change to or from summer time skips or
 * repeats are not guessed: the first has no moment, the second has two.
 */
export function readZonedTime({ date, time, zone }: ZonedEntry): ZonedReading {
  if (date === '' || time === '' || zone === '') return { kind: 'incomplete' }
  if (!isKnownZone(zone)) return { kind: 'unknown-zone' }

  const wallMs = Date.parse(`${date}T${time.slice(0, 5)}:00Z`)
  if (Number.isNaN(wallMs) || new Date(wallMs).toISOString().slice(0, 10) !== date) return { kind: 'no-such-time' }

  // The offsets a day before and after are the only ones that can hold at this time.
  const DAY_MS = 24 * 60 * MINUTE_MS
  const offsetsMs = new Set([wallMs - DAY_MS, wallMs + DAY_MS].map((ms) => wallClockMs(ms, zone) - ms))
  const moments = [...offsetsMs]
    .map((offsetMs) => ({ ms: wallMs - offsetMs, offset: offsetText(Math.round(offsetMs / MINUTE_MS)) }))
    .filter(({ ms }) => wallClockMs(ms, zone) === wallMs)
    .sort((a, b) => a.ms - b.ms)
    .map(({ ms, offset }) => ({ at: new Date(ms).toISOString(), offset }))

  if (moments.length === 0) return { kind: 'no-such-time' }
  return moments.length === 1 ? { kind: 'moment', ...moments[0]! } : { kind: 'ambiguous', moments }
}

/** Date and time of day of a moment in a zone, as entry fields hold them. */
export function zonedEntry(instant: string, zone: string): ZonedEntry {
  const text = new Date(wallClockMs(Math.floor(Date.parse(instant) / 1000) * 1000, zone)).toISOString()
  return { date: text.slice(0, 10), time: text.slice(11, 16), zone }
}

/** A moment for reading, with its offset: `2026-03-27 14:30 +01:00`. */
export function formatMoment(instant: string, zone: string): string {
  const { date, time } = zonedEntry(instant, zone)
  return `${date} ${time} ${zoneOffset(instant, zone)}`
}

/** The same with the zone's name, for a date that binds: `2026-03-27 14:30 +01:00 (Europe/Berlin)`. */
export function formatMomentInZone(instant: string, zone: string): string {
  return `${formatMoment(instant, zone)} (${zone})`
}

/** The calendar date of a moment in a zone, `2026-03-27` (ISO 8601). */
export function formatDate(instant: string, zone: string): string {
  return zonedEntry(instant, zone).date
}
