import { describe, expect, it } from 'vitest'
import { children } from '../../server/seeds/demo/children.ts'
import { demoMoment, demoWorkday } from '../../server/seeds/demo/demoDays.ts'
import { demoTimeline } from '../../server/seeds/demo/timeline.ts'
import type { DemoEvent } from '../../server/seeds/demo/timelineTypes.ts'
import { addDays, dayOf, formatMoment } from '../../shared/days.ts'

const zone = 'Europe/London'
const aWeek = Array.from({ length: 7 }, (_, shift) => addDays('2026-11-30', shift))
// Around the changes of the clocks in March and October, a leap day and New Year.
const oddDays = ['2026-03-30', '2026-10-26', '2028-02-29', '2027-01-01']

const first = (events: DemoEvent[], matches: (event: DemoEvent) => boolean) => events.findIndex(matches)

describe('demoWorkday', () => {
  it.each([
    ['2026-11-27', '2026-11-27'],
    ['2026-11-28', '2026-11-27'],
    ['2026-11-29', '2026-11-27'],
    ['2026-11-30', '2026-11-30'],
  ])('%s is worked on %s', (day, worked) => {
    expect(demoWorkday(day, 0)).toBe(worked)
  })
})

describe('demoMoment', () => {
  it.each([
    ['2026-12-01', '14:05', '2026-12-01T14:05:00.000Z'],
    ['2026-07-01', '14:05', '2026-07-01T13:05:00.000Z'],
  ])('%s at %s in London is %s', (day, time, iso) => {
    expect(demoMoment(day, time, zone).toISOString()).toBe(iso)
  })
})

describe.each([...aWeek, ...oddDays])('the demo seeded on %s', (today) => {
  const events = demoTimeline(today, zone)
  const ofChild = (number: number) => events.filter(({ child }) => child === number)

  it('lies in the past, in order, with no two events of one child at the same moment', () => {
    expect(events.filter(({ at }) => dayOf(at, zone) >= today)).toEqual([])
    const times = events.map(({ at }) => at.getTime())
    expect(times).toEqual(times.toSorted((a, b) => a - b))
    for (const { number } of children) {
      const own = ofChild(number).map(({ at }) => at.getTime())
      expect(new Set(own).size).toBe(own.length)
    }
  })

  it('leaves no event out', () => {
    const counts = events.reduce<Record<string, number>>(
      (all, { kind }) => ({ ...all, [kind]: (all[kind] ?? 0) + 1 }),
      {},
    )
    expect(counts).toMatchObject({ referral: 42, accept: 40, allocate: 34, withdraw: 4, letter: 15 })
    expect(counts.step).toBe(children.reduce((sum, { steps }) => sum + steps.length - 1, 0))
  })

  it('dates events on the day that they say', () => {
    for (const event of events) expect([event.kind, dayOf(event.at, zone)]).toEqual([event.kind, event.on])
  })

  it('accepts a child after the referral and before anything else', () => {
    for (const { number } of children) {
      const kinds = ofChild(number).map(({ kind }) => kind)
      expect([number, kinds[0], kinds[1]]).toEqual([number, 'referral', 'accept'])
    }
  })

  it('signs after writing, rates after setting, ends after rating', () => {
    for (const { number } of children) {
      const own = ofChild(number)
      for (const [index, event] of own.entries()) {
        if (event.kind === 'sign' || event.kind === 'countersign' || event.kind === 'addendum') {
          const before = event.kind === 'sign' ? 'note' : 'sign'
          const earlier = first(own, (other) => other.kind === before && other.index === event.index)
          expect([number, event.kind, earlier >= 0 && earlier < index]).toEqual([number, event.kind, true])
        }
        if (event.kind === 'rating' || event.kind === 'end_goal') {
          const set = first(own, (other) => other.kind === 'goal' && other.index === event.index)
          expect([number, set >= 0 && set < index]).toEqual([number, true])
        }
      }
    }
  })

  it('queues the letter of child 16 before consent is withdrawn, and closes the episode after', () => {
    const own = ofChild(16)
    const sent = first(own, (event) => event.kind === 'letter_act' && event.act.act === 'send')
    const withdrawn = first(own, ({ kind }) => kind === 'withdraw')
    const closed = first(own, (event) => event.kind === 'step' && event.step.to === 'consent_withdrawn')
    expect(sent).toBeGreaterThan(0)
    expect(withdrawn).toBeGreaterThan(sent)
    expect(closed).toBeGreaterThan(withdrawn)
    expect(own[withdrawn]!.on).toBe(own[sent]!.on)
  })

  it('acts for child 39 on the day of the referral', () => {
    const own = ofChild(39)
    const acted = own.find(({ kind }) => kind === 'act_on_alert')!
    expect(acted.on).toBe(addDays(today, -27))
    expect(formatMoment(acted.at.toISOString(), zone)).toMatch(/, (09|10):\d\d$/)
  })
})
