import { flushPromises } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { measureHeadline } from '../../src/components/measures/measureWords.ts'
import { answerStep, askedStep } from '../../src/composables/useConfirmStep.ts'
import { emptyDetails } from '../../shared/measureScores.ts'
import type { MeasureOptions } from '../../shared/measureSchemas.ts'
import type { MeasureView, SkillDetails, SkillKind, SkillTrial } from '../../shared/measures.ts'
import { measureDraft, measureServer, openMeasure } from '../support/measurePages.ts'
import { fakeWire } from '../support/wire.ts'

// The clock of the stopwatch, `performance.now`, is faked with the timers.
beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  answerStep(false)
  vi.useRealTimers()
})

const trialsOf = ({ details }: MeasureView) => (details as SkillDetails).trials
const pass = async (ms: number) => {
  await vi.advanceTimersByTimeAsync(ms)
  await flushPromises()
}
const trial = (hand: 'left' | 'right', value: number, more: Partial<SkillTrial> = {}): SkillTrial => ({
  hand,
  value,
  interrupted: false,
  confirmed: false,
  ...more,
})

async function open(kind: SkillKind, options: Partial<MeasureOptions> = {}, trials: SkillTrial[] = []) {
  const empty = emptyDetails(kind, { startHand: 'left', ...options }, 1) as SkillDetails
  const measure = measureDraft(kind, options, { ...empty, trials })
  const { stored, reply } = measureServer(measure)
  const { sent } = fakeWire(reply)
  return { ...(await openMeasure(measure)), stored, sent }
}
const run = async (page: Awaited<ReturnType<typeof open>>, ms: number) => {
  await page.key(' ')
  await pass(ms)
  await page.key(' ')
  await pass(0)
}

describe('timing pegs', () => {
  it('starts and stops by the space bar, shows tenths, keeps the time and saves it', async () => {
    const page = await open('pegs')
    await page.key(' ')
    await pass(12_000)
    expect(page.wrapper.get('.clock').text()).toBe('12.0 s')
    await pass(340)
    await page.key(' ')
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 12.3)])
  })

  it('does the same by its button', async () => {
    const page = await open('pegs')
    await page.button('Start').trigger('click')
    await pass(15_060)
    await page.button('Stop').trigger('click')
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 15.1)])
  })

  it('counts from the touch, not from when the finger leaves, and counts a touch once', async () => {
    const page = await open('pegs')
    await page.button('Start').trigger('pointerdown', { button: 0 })
    await pass(200)
    await page.button('Stop').trigger('click', { detail: 1 })
    await pass(11_800)
    await page.button('Stop').trigger('pointerdown', { button: 0 })
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 12)])
  })

  it('lets the hands take turns, the start changing from round to round, up to five a hand', async () => {
    const page = await open('pegs')
    for (let number = 0; number < 11; number += 1) await run(page, 14_000)
    expect(trialsOf(page.stored).map(({ hand }) => hand)).toEqual([
      ...['left', 'right', 'right', 'left', 'left', 'right', 'right', 'left', 'left', 'right'],
    ])
    expect(page.wrapper.text()).toContain('Five trials of each hand are done')
  })

  it('asks before it keeps 0.0 s, and keeps it as confirmed when told to', async () => {
    const page = await open('pegs')
    await run(page, 20)
    expect(askedStep.value?.title).toBe('Keep 0.0 s?')
    expect(trialsOf(page.stored)).toEqual([])
    answerStep(true)
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 0, { confirmed: true })])
  })

  it('keeps nothing when told not to, and leaves the value in the field to be corrected', async () => {
    const page = await open('pegs')
    await run(page, 400_000)
    expect(askedStep.value?.title).toBe('Keep 400.0 s?')
    answerStep(false)
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([])
    const field = page.wrapper.get<HTMLInputElement>('.typed input')
    expect(field.element.value).toBe('400')
    const leaving = new Event('beforeunload', { cancelable: true })
    window.dispatchEvent(leaving)
    expect(leaving.defaultPrevented).toBe(true)
  })

  it('keeps an interrupted trial in sight and out of the figures, and takes it again with the same hand', async () => {
    const page = await open('pegs')
    await page.key(' ')
    await pass(8_000)
    await page.key('i')
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 8, { interrupted: true })])
    expect(page.wrapper.get('.turn').text()).toContain('Left hand')
    expect(page.wrapper.text()).toContain('1 interrupted trial is left out.')
  })

  it('asks before a trial with an odd value counts again', async () => {
    const page = await open('pegs', {}, [trial('left', 1, { interrupted: true })])
    await page.key('i')
    expect(askedStep.value?.title).toBe('Keep 1.0 s?')
    answerStep(false)
    await pass(0)
    expect(page.wrapper.text()).toContain('1 interrupted trial is left out.')
    await page.key('i')
    answerStep(true)
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 1, { confirmed: true })])
  })

  it('takes the last trial back', async () => {
    const page = await open('pegs', {}, [trial('left', 12), trial('right', 14)])
    await page.key('u')
    expect(trialsOf(page.stored)).toEqual([trial('left', 12)])
    expect(page.wrapper.get('.turn').text()).toContain('Right hand')
  })

  it('lets the other hand go now when the therapist wants it', async () => {
    const page = await open('pegs')
    await page.key('o')
    await run(page, 14_000)
    expect(trialsOf(page.stored)).toEqual([trial('right', 14)])
  })

  // Means 12.2 s left, 15.2 s right: 100 (12.2 − 15.2)/(12.2 + 15.2) = −10.948…, minus is left faster (methods C).
  it('shows the index with its sign in words', async () => {
    const page = await open('pegs', {}, [
      ...[12, 12.2, 12.4].map((value) => trial('left', value)),
      ...[15, 15.2, 15.4].map((value) => trial('right', value)),
    ])
    expect(page.wrapper.text()).toContain('−10.9, left faster')
    expect(page.wrapper.text()).toContain('Compared with the child only')
  })

  // 12 and 14 s left, 15 and 15 s right: 100 (13 − 15)/(13 + 15) = −7.142…, but one degree of freedom (t 12.7) makes the
  // interval reach far over zero.
  it('names no hand where the interval of the index reaches zero', async () => {
    const page = await open('pegs', {}, [
      ...[12, 14].map((value) => trial('left', value)),
      ...[15, 15].map((value) => trial('right', value)),
    ])
    expect(page.wrapper.text()).toContain('−7.1, no clear difference, 95% interval about')
    expect(page.wrapper.text()).not.toContain('left faster')
  })

  // Signs by methods C. Each row: seconds or counts of the left and of the right hand.
  it.each<[SkillKind, number[], number[], string]>([
    ['pegs', [20, 22, 24], [21.9, 22, 21.9], 'no clear difference (+0.2)'],
    ['pegs', [12, 12.2, 12.4], [15, 15.2, 15.4], 'left faster, −10.9'],
    ['tapping', [60, 61, 62], [90, 91, 92], 'right did more, +19.7'],
    ['dots', [40, 50], [44, 46], 'no clear difference (0.0)'],
    ['dots', [40], [40], 'both hands alike, 0.0'],
    ['pegs', [12], [15], 'left faster, −11.1'],
    ['pegs', [12], [], '1 trial left, 0 right'],
  ])('lists %s of %j left and %j right as “%s”', (kind, left, right, words) => {
    const empty = emptyDetails(kind, {}, 1) as SkillDetails
    const trials = [
      ...left.map((value) => trial('left', value)),
      ...right.map((value) => trial('right', value)),
    ]
    expect(measureHeadline(measureDraft(kind, {}, { ...empty, trials }))).toBe(words)
  })

  it('warns before leaving while the watch runs', async () => {
    const page = await open('pegs')
    await page.key(' ')
    const leaving = new Event('beforeunload', { cancelable: true })
    window.dispatchEvent(leaving)
    expect(leaving.defaultPrevented).toBe(true)
  })

  it('keeps a typed time for the hand under test', async () => {
    const page = await open('pegs')
    const field = page.wrapper.get('.typed input')
    await field.setValue('16.2')
    await field.trigger('blur')
    await page.wrapper.get('.typed').trigger('submit')
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 16.2)])
  })

  it('loses no trial when saving fails and works again later', async () => {
    const measure = measureDraft('pegs', { startHand: 'left' })
    const { stored, reply } = measureServer(measure)
    const gone = { now: true }
    fakeWire((request) => (gone.now ? 'cut' : reply(request)))
    const page = await openMeasure(measure)
    for (const ms of [12_000, 14_000]) {
      await page.key(' ')
      await pass(ms)
      await page.key(' ')
    }
    expect(trialsOf(stored)).toEqual([])
    gone.now = false
    window.dispatchEvent(new Event('online'))
    await pass(0)
    expect(trialsOf(stored)).toHaveLength(2)
  })
})

describe('counting taps', () => {
  const tap = async (page: Awaited<ReturnType<typeof open>>, times: number, everyMs: number) => {
    for (let count = 0; count < times; count += 1) {
      await page.wrapper.get('.pad').trigger('pointerdown', { button: 0 })
      await pass(everyMs)
    }
  }

  it('starts the time with the first tap and keeps the count when the time is over', async () => {
    const page = await open('tapping', { seconds: 10 })
    await page.button('Ready').trigger('click')
    await tap(page, 50, 200)
    await pass(100)
    expect(trialsOf(page.stored)).toEqual([trial('left', 50)])
  })

  it('counts no tap after the end, and starts no new trial when the child goes on tapping', async () => {
    const page = await open('tapping', { seconds: 10 })
    await page.key('n')
    await tap(page, 60, 200)
    await pass(60_000)
    expect(trialsOf(page.stored)).toEqual([trial('left', 50)])
  })

  it('counts nothing before it is readied', async () => {
    const page = await open('tapping', { seconds: 10 })
    await tap(page, 5, 200)
    await pass(20_000)
    expect(trialsOf(page.stored)).toEqual([])
    expect(page.sent).toEqual([])
  })

  it('asks about a count nobody taps', async () => {
    const page = await open('tapping', { seconds: 10 })
    await page.key('n')
    await tap(page, 1, 10_200)
    expect(askedStep.value?.title).toBe('Keep 1 tap?')
  })
})

describe('counting dots', () => {
  it('counts down and then takes the typed count', async () => {
    const page = await open('dots', { seconds: 20 })
    await page.key(' ')
    await pass(5_000)
    expect(page.wrapper.get('.clock').text()).toBe('15.0 s left')
    await pass(15_100)
    expect(page.wrapper.text()).toContain('Time is up')
    const field = page.wrapper.get<HTMLInputElement>('.typed input')
    expect(document.activeElement).toBe(field.element)
    await field.setValue('31')
    await field.trigger('blur')
    await page.wrapper.get('.typed').trigger('submit')
    await pass(0)
    expect(trialsOf(page.stored)).toEqual([trial('left', 31)])
  })
})
