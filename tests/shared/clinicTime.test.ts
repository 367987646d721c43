import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isLateEntry, momentOf, sessionEnd } from '../../shared/clinicTime.ts'
import { addDays, dayOf, formatMoment } from '../../shared/days.ts'

// Changes of clock as the IANA time zone database has them: Europe/London 29 Mar 2026 01:00 UTC forward and 25 Oct 2026
// 01:00 UTC back; Lord Howe Island moves by half an hour; Kathmandu is 5 h 45 min ahead of UTC all year.
describe('momentOf', () => {
  it.each([
    ['winter', '2026-01-15', '14:05', 'Europe/London', '2026-01-15T14:05:00.000Z'],
    ['summer time', '2026-07-15', '14:05', 'Europe/London', '2026-07-15T13:05:00.000Z'],
    [
      'the minute before clocks go forward',
      '2026-03-29',
      '00:59',
      'Europe/London',
      '2026-03-29T00:59:00.000Z',
    ],
    ['a time that is skipped', '2026-03-29', '01:30', 'Europe/London', '2026-03-29T01:30:00.000Z'],
    ['the first time after the skip', '2026-03-29', '02:00', 'Europe/London', '2026-03-29T01:00:00.000Z'],
    ['a time that happens twice', '2026-10-25', '01:30', 'Europe/London', '2026-10-25T00:30:00.000Z'],
    [
      'the first time that is single again',
      '2026-10-25',
      '02:00',
      'Europe/London',
      '2026-10-25T02:00:00.000Z',
    ],
    ['west of Greenwich in summer', '2026-06-01', '20:30', 'America/Toronto', '2026-06-02T00:30:00.000Z'],
    ['no change of clock at all', '2026-06-01', '09:00', 'Asia/Kathmandu', '2026-06-01T03:15:00.000Z'],
    ['half an hour skipped', '2026-10-04', '02:15', 'Australia/Lord_Howe', '2026-10-03T15:45:00.000Z'],
    ['half an hour twice', '2026-04-05', '01:45', 'Australia/Lord_Howe', '2026-04-04T14:45:00.000Z'],
    ['midnight', '2026-12-31', '00:00', 'Pacific/Auckland', '2026-12-30T11:00:00.000Z'],
  ])('%s: %s %s in %s is %s', (_what, day, time, zone, expected) => {
    expect(momentOf(day, time, zone).toISOString()).toBe(expected)
  })

  it.each([
    ['2026-02-30', '10:00'],
    ['2026-03-01', '24:00'],
    ['2026-03-01', '9:00'],
  ])('refuses %s %s', (day, time) => {
    expect(() => momentOf(day, time, 'Europe/London')).toThrow(RangeError)
  })

  it('is shown again as the same day and time on every day without a change of clock', () => {
    const pad = (value: number) => String(value).padStart(2, '0')
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 3650 }),
        fc.integer({ min: 4, max: 23 }),
        fc.integer({ min: 0, max: 59 }),
        fc.constantFrom('Europe/London', 'America/St_Johns', 'Australia/Lord_Howe', 'Pacific/Chatham', 'UTC'),
        (days, hour, minute, zone) => {
          const day = addDays('2024-01-01', days)
          const moment = momentOf(day, `${pad(hour)}:${pad(minute)}`, zone)
          expect(dayOf(moment, zone)).toBe(day)
          expect(formatMoment(moment.toISOString(), zone)).toMatch(
            new RegExp(`, ${pad(hour)}:${pad(minute)}$`),
          )
        },
      ),
    )
  })
})

describe('sessionEnd', () => {
  it.each([
    ['an ordinary hour', '2026-06-10', '09:30', 60, '2026-06-10T09:30:00.000Z'],
    ['over midnight', '2026-06-10', '23:30', 60, '2026-06-10T23:30:00.000Z'],
    ['across clocks going forward', '2026-03-29', '00:30', 60, '2026-03-29T01:30:00.000Z'],
    ['across clocks going back', '2026-10-25', '00:30', 120, '2026-10-25T01:30:00.000Z'],
  ])('%s', (_what, heldOn, startTime, minutes, expected) => {
    expect(sessionEnd({ heldOn, startTime, minutes }, 'Europe/London').toISOString()).toBe(expected)
  })
})

describe('isLateEntry', () => {
  it.each([
    ['written the same evening', '2026-06-10', '2026-06-10T22:59:00Z', false],
    ['written after midnight by the clinic’s clock', '2026-06-10', '2026-06-10T23:00:00Z', true],
    ['written days later', '2026-06-10', '2026-06-13T09:00:00Z', true],
  ])('%s', (_what, heldOn, at, expected) => {
    expect(isLateEntry(heldOn, new Date(at), 'Europe/London')).toBe(expected)
  })
})
