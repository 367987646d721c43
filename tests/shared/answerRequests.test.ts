import { describe, expect, it } from 'vitest'
import { dueReminder } from '../../shared/answerRequests.ts'

// Days 7 and 14: the clinic's own rule (common practice, no source). Times are in UTC.
const at = (day: number, hour = 9) => new Date(Date.UTC(2026, 2, 1 + day, hour))
const request = (given: { remindedAt?: Date; savedAt?: Date } = {}) => ({
  askedAt: at(0),
  remindedAt: null,
  savedAt: null,
  ...given,
})

describe('dueReminder', () => {
  it.each([
    ['on day 6', request(), at(6, 23), null],
    ['one minute before day 7 is full', request(), new Date(at(7).getTime() - 60_000), null],
    ['when day 7 is full', request(), at(7), 7],
    ['later that week, when none went out', request(), at(11), 7],
    ['after the one of day 7', request({ remindedAt: at(7) }), at(13), null],
    ['when day 14 is full', request({ remindedAt: at(7) }), at(14), 14],
    ['once for both, when the first was missed', request(), at(15), 14],
    ['after the one of day 14', request({ remindedAt: at(14) }), at(27), null],
    ['when one was sent by hand the day before', request({ remindedAt: at(6) }), at(7), null],
    ['when one was sent by hand on day 3', request({ remindedAt: at(3) }), at(7), 7],
    ['while somebody is answering', request({ savedAt: at(7, 8) }), at(7), null],
    ['a day after the last save', request({ savedAt: at(6) }), at(7), 7],
  ])('%s', (_when, given, moment, expected) => {
    expect(dueReminder(given, moment)).toBe(expected)
  })
})
