import { flushPromises } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { answerStep, askedStep } from '../../src/composables/useConfirmStep.ts'
import type { MeasureView, ReachingDetails } from '../../shared/measures.ts'
import { reachOrder } from '../../shared/reaching.ts'
import { measureDraft, measureServer, openMeasure } from '../support/measurePages.ts'
import { fakeWire, refusal } from '../support/wire.ts'

beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
  answerStep(false)
  delete document.documentElement.dataset.hand
})

const reachesOf = ({ details }: MeasureView) => (details as ReachingDetails).reaches
const pass = async (ms: number) => {
  await vi.advanceTimersByTimeAsync(ms)
  await flushPromises()
}

async function open() {
  const measure = measureDraft('reaching')
  const { stored, reply } = measureServer(measure)
  const { sent } = fakeWire(reply)
  const page = await openMeasure(measure)
  const { seed, cardsPerPlace } = measure.details as ReachingDetails
  return { ...page, sent, stored, order: reachOrder(seed, cardsPerPlace) }
}
const counts = ({ wrapper }: Awaited<ReturnType<typeof open>>) => wrapper.get('.counts').text()

describe('recording reaches', () => {
  it('records left, right and lost by one key each, at the places of the seeded order, and saves each at once', async () => {
    const page = await open()
    await page.keys('l', 'r', 'x')
    expect(reachesOf(page.stored)).toEqual([
      { place: page.order[0], hand: 'left', swapped: false },
      { place: page.order[1], hand: 'right', swapped: false },
      { place: page.order[2], hand: null, swapped: false },
    ])
    expect(page.sent).toHaveLength(3)
    expect(page.wrapper.text()).toContain('3 of 21')
    expect(counts(page)).toMatch(/^1 left1 right1 lost0 swapped/)
  })

  it.each(['left', 'right'] as const)(
    'has its buttons in the working edge, in the same order, for the %s hand',
    async (hand) => {
      document.documentElement.dataset.hand = hand
      const page = await open()
      const tools = page.wrapper.findAll('section.edge .tool').map((tool) => tool.text())
      expect(tools).toEqual(['LeftL', 'RightR', 'LostX', 'SwappedS', 'UndoU'])
      await page.button('Left').trigger('click')
      await page.button('Right').trigger('click')
      await pass(0)
      expect(reachesOf(page.stored).map((reach) => reach.hand)).toEqual(['left', 'right'])
    },
  )

  it('marks the last reach as swapped and takes the mark away again; a lost reach cannot be swapped', async () => {
    const page = await open()
    await page.keys('l', 's')
    expect(reachesOf(page.stored)[0]?.swapped).toBe(true)
    await page.keys('s')
    expect(reachesOf(page.stored)[0]?.swapped).toBe(false)
    await page.keys('x', 's')
    expect(reachesOf(page.stored)[1]).toMatchObject({ hand: null, swapped: false })
    expect(page.button('Swapped').attributes('disabled')).toBeDefined()
  })

  it('undoes one reach after the other, with its mark, and then goes on at the same place', async () => {
    const page = await open()
    await page.keys('l', 'r', 's', 'u')
    expect(reachesOf(page.stored)).toEqual([{ place: page.order[0], hand: 'left', swapped: false }])
    await page.keys('u', 'u', 'r')
    expect(reachesOf(page.stored)).toEqual([{ place: page.order[0], hand: 'right', swapped: false }])
  })

  it('stops at 21 reaches, whatever is pressed', async () => {
    const page = await open()
    await page.keys(...Array<string>(23).fill('l'))
    expect(reachesOf(page.stored)).toHaveLength(21)
    expect(page.wrapper.text()).toContain('All 21 reaches are recorded')
    expect(page.button('Left').attributes('disabled')).toBeDefined()
  })

  it('leaves keys alone in a field, with a modifier, and all keys it does not use', async () => {
    const page = await open()
    const comment = page.wrapper.get('textarea').element
    expect(await page.key('l', {}, comment)).toBe(false)
    expect(await page.key('l', { ctrlKey: true })).toBe(false)
    expect(await page.key('Tab')).toBe(false)
    expect(await page.key('k')).toBe(false)
    expect(reachesOf(page.stored)).toEqual([])
    expect(await page.key('L', { shiftKey: true })).toBe(true)
    expect(reachesOf(page.stored)).toHaveLength(1)
  })

  it('counts a key held down once, and none once the keys are switched off', async () => {
    const page = await open()
    await page.key('l')
    await page.key('l', { repeat: true })
    expect(reachesOf(page.stored)).toHaveLength(1)
    await page.wrapper.get('.keys input').setValue(false)
    expect(await page.key('l')).toBe(false)
    expect(reachesOf(page.stored)).toHaveLength(1)
  })
})

describe('reaches when saving fails', () => {
  it('keeps every tap while the network is gone, warns before leaving, and saves all when it is back', async () => {
    const measure = measureDraft('reaching')
    const { stored, reply } = measureServer(measure)
    const gone = { now: true }
    fakeWire((request) => (gone.now ? 'cut' : reply(request)))
    const page = await openMeasure(measure)
    await page.keys('l', 'l', 'r', 's')
    expect(reachesOf(stored)).toEqual([])
    expect(page.saveState()).toContain('Not saved')
    expect(page.wrapper.text()).toContain('3 of 21')
    const leaving = new Event('beforeunload', { cancelable: true })
    window.dispatchEvent(leaving)
    expect(leaving.defaultPrevented).toBe(true)

    gone.now = false
    await pass(5_000)
    expect(reachesOf(stored).map(({ hand, swapped }) => `${hand} ${swapped}`)).toEqual([
      'left false',
      'left false',
      'right true',
    ])
    expect(page.saveState()).toContain('Saved')
    const free = new Event('beforeunload', { cancelable: true })
    window.dispatchEvent(free)
    expect(free.defaultPrevented).toBe(false)
  })

  it('keeps what is tapped while a slow save is under way, in order', async () => {
    const measure = measureDraft('reaching')
    const { stored, reply } = measureServer(measure)
    let letGo = () => {}
    const held = new Promise<void>((resolve) => {
      letGo = resolve
    })
    fakeWire(async (request) => {
      await held
      return reply(request)
    }, reply)
    const page = await openMeasure(measure)
    await page.keys('l', 'r', 'r')
    expect(page.wrapper.text()).toContain('3 of 21')
    letGo()
    await pass(1_000)
    expect(reachesOf(stored).map(({ hand }) => hand)).toEqual(['left', 'right', 'right'])
  })

  it('shows both records when somebody else recorded the same occasion, and overwrites neither unasked', async () => {
    const page = await open()
    await page.keys('l')
    const theirs = [
      { place: page.order[0]!, hand: 'right' as const, swapped: false },
      { place: page.order[1]!, hand: 'right' as const, swapped: false },
    ]
    Object.assign(page.stored, {
      details: { ...(page.stored.details as ReachingDetails), reaches: theirs },
      version: page.stored.version + 1,
    })
    await page.keys('l')
    expect(page.wrapper.get('.conflict').text()).toContain('while you were recording')
    expect(reachesOf(page.stored)).toEqual(theirs)
    // A tap during the conflict belongs to this page's record and is shown with it.
    await page.keys('x')
    const texts = page.wrapper.findAll('.conflict-text').map((text) => text.text())
    expect(texts[0]).toMatch(/1\. .*left hand\n2\. .*left hand\n3\. .*lost/)
    expect(texts[1]).toMatch(/1\. .*right hand\n2\. .*right hand$/)
    await page.button('Keep mine').trigger('click')
    await pass(1_000)
    expect(reachesOf(page.stored).map(({ hand }) => hand)).toEqual(['left', 'left', null])
  })

  it('takes the other record when that is chosen, and goes on from there', async () => {
    const page = await open()
    await page.keys('l')
    const theirs = [{ place: page.order[0]!, hand: 'right' as const, swapped: false }]
    Object.assign(page.stored, {
      details: { ...(page.stored.details as ReachingDetails), reaches: theirs },
      version: page.stored.version + 1,
    })
    await page.keys('l')
    await page.button('Take the saved one').trigger('click')
    await pass(1_000)
    await page.keys('x')
    expect(reachesOf(page.stored).map(({ hand }) => hand)).toEqual(['right', null])
  })
})

describe('a measure that somebody else locked meanwhile', () => {
  it('says so, keeps what was tapped on the page, and opens the locked one only when told to', async () => {
    fakeWire(refusal(409, 'closed'))
    const page = await openMeasure(measureDraft('reaching'))
    await page.keys('l')
    expect(page.wrapper.text()).toContain('Somebody signed this measure while you were recording')
    expect(page.wrapper.text()).toContain('1 of 21')
    await page.button('Open the signed measure').trigger('click')
    answerStep(false)
    await pass(0)
    expect(page.wrapper.emitted('reload')).toBeUndefined()
    await page.button('Open the signed measure').trigger('click')
    answerStep(true)
    await pass(0)
    expect(page.wrapper.emitted('reload')).toHaveLength(1)
  })
})

describe('signing a measure', () => {
  it('lists what is incomplete before it is signed', async () => {
    const page = await open()
    await page.keys('l', 'x')
    await page.wrapper.get('.sign-edge').trigger('click')
    await flushPromises()
    expect(askedStep.value?.text).toContain('19 of 21 reaches are not recorded.')
    expect(askedStep.value?.text).toContain('1 reach was lost and stays out.')
    answerStep(true)
    await flushPromises()
    expect(page.sent.at(-1)).toMatchObject({ method: 'POST', path: '/api/measures/measure/lock' })
  })

  it('does not sign an empty measure without a reason, and says why beside the button', async () => {
    const page = await open()
    await page.wrapper.get('.sign-edge').trigger('click')
    await flushPromises()
    expect(askedStep.value).toBeNull()
    expect(page.wrapper.get('.finish').text()).toContain('Nothing is recorded yet')
    expect(page.sent).toHaveLength(0)
  })
})
