import { describe, expect, it } from 'vitest'
import { formatDate, formatMoment, formatMomentInZone, readZonedTime, zonedEntry, zoneOffset } from './zoned-time'

describe('readZonedTime', () => {
  it.each([
    ['2026-01-15', '14:30', 'Europe/Berlin', '2026-01-15T13:30:00.000Z', '+01:00'],
    ['2026-07-15', '14:30', 'Europe/Berlin', '2026-07-15T12:30:00.000Z', '+02:00'],
    ['2026-01-15', '00:00', 'America/New_York', '2026-01-15T05:00:00.000Z', '-05:00'],
    ['2026-06-01', '09:00', 'Asia/Kolkata', '2026-06-01T03:30:00.000Z', '+05:30'],
    ['2028-02-29', '12:00', 'UTC', '2028-02-29T12:00:00.000Z', '+00:00'],
  ])('reads %s %s in %s', (date, time, zone, at, offset) => {
    expect(readZonedTime({ date, time, zone })).toEqual({ kind: 'moment', at, offset })
  })

  it('finds no moment for a time that summer time skips', () => {
    expect(readZonedTime({ date: '2026-03-29', time: '02:30', zone: 'Europe/Berlin' })).toEqual({ kind: 'no-such-time' })
  })

  it('finds two moments for a time that occurs twice, the earlier first', () => {
    expect(readZonedTime({ date: '2026-10-25', time: '02:30', zone: 'Europe/Berlin' })).toEqual({
      kind: 'ambiguous',
      moments: [
        { at: '2026-10-25T00:30:00.000Z', offset: '+02:00' },
        { at: '2026-10-25T01:30:00.000Z', offset: '+01:00' },
      ],
    })
  })

  it('refuses a date that does not exist and a zone that nobody knows', () => {
    expect(readZonedTime({ date: '2026-02-30', time: '12:00', zone: 'UTC' })).toEqual({ kind: 'no-such-time' })
    expect(readZonedTime({ date: '2026-02-03', time: '12:00', zone: 'Mars/Base' })).toEqual({ kind: 'unknown-zone' })
    expect(readZonedTime({ date: '', time: '12:00', zone: 'UTC' })).toEqual({ kind: 'incomplete' })
  })
})

describe('showing a moment', () => {
  it('names time, offset and zone', () => {
    expect(formatMoment('2026-03-27T13:30:00Z', 'Europe/Berlin')).toBe('2026-03-27 14:30 +01:00')
    expect(formatMomentInZone('2026-03-27T13:30:00Z', 'Europe/Berlin')).toBe('2026-03-27 14:30 +01:00 (Europe/Berlin)')
    expect(formatDate('2026-03-27T23:30:00Z', 'Europe/Berlin')).toBe('2026-03-28')
    expect(zoneOffset('2026-07-01T00:00:00Z', 'America/St_Johns')).toBe('-02:30')
  })

  it('gives back the entry it was read from', () => {
    const entry = { date: '2026-10-25', time: '03:30', zone: 'Europe/Berlin' }
    const reading = readZonedTime(entry)
    expect(reading.kind === 'moment' && zonedEntry(reading.at, entry.zone)).toEqual(entry)
  })
})
