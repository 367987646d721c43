import { flushPromises, mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it } from 'vitest'
import AnswerFlow from '@/components/answerRequests/AnswerFlow.vue'
import { HttpProblem } from '@/api/http.ts'
import type { AnswerDraft, AnswerPage } from '@shared/answerRequests.ts'
import type { FormAnswers } from '@shared/forms.ts'

const items = ['Draws or writes', 'Throws a small ball', 'Brushes teeth'].map((label, index) => ({
  id: `item_${index + 1}`,
  label,
  childLabel: null,
  caution: index === 1 ? 'Use a soft ball' : null,
}))
const answers = (given: FormAnswers = {}): FormAnswers => ({
  item_1: null,
  item_2: null,
  item_3: null,
  ...given,
})

const pageOf = (given: Partial<AnswerPage> = {}): AnswerPage => ({
  requestId: 'r1',
  asks: 'questionnaire',
  childName: 'Pip Marsh',
  spokenName: 'Pip',
  askedOf: 'Wren Marsh',
  answerBy: '2026-03-29',
  form: {
    id: 'three.v1',
    key: 'three',
    edition: 1,
    retiredAt: null,
    definition: {
      title: 'Three activities',
      purpose: 'For this test',
      scoring: 'edinburgh_style',
      items,
      options: ['strong_left', 'left', 'either', 'right', 'strong_right', 'does_not_do'],
      informants: ['guardian'],
      citation: 'none',
      cautions: [],
      cutOffSet: null,
    },
  },
  answers: answers(),
  comment: null,
  history: null,
  version: 0,
  urgent: [],
  clinic: { name: 'Harrowmere', phone: '01632 960123', emergencyText: 'Call the emergency number.' },
  ...given,
})

const opened: { unmount: () => void }[] = []
afterEach(() => opened.splice(0).forEach((wrapper) => wrapper.unmount()))

/** The flow on a server that keeps what it is given, one version after the other. */
function open(page: AnswerPage, refuse: { save?: HttpProblem; send?: HttpProblem } = {}) {
  const saved: AnswerDraft[] = []
  const sent: number[] = []
  let version = page.version
  const wrapper = mount(AnswerFlow, {
    attachTo: document.body,
    global: { plugins: [createPinia(), PrimeVue] },
    props: {
      page,
      save: (draft: AnswerDraft) => {
        if (refuse.save) return Promise.reject(refuse.save)
        saved.push(draft)
        version += 1
        return Promise.resolve({ ...page, ...draft, version } as AnswerPage)
      },
      send: (at: number) => {
        if (refuse.send) return Promise.reject(refuse.send)
        sent.push(at)
        return Promise.resolve()
      },
    },
  })
  opened.push(wrapper)
  const heading = () => wrapper.get('h2').text()
  const press = async (label: string) => {
    const button = wrapper
      .findAll('button')
      .find((candidate) => candidate.text() === label || candidate.attributes('aria-label') === label)
    if (!button) throw new Error(`No button “${label}” on: ${wrapper.text()}`)
    await button.trigger('click')
    await flushPromises()
  }
  const choose = async (label: string) => {
    const card = wrapper.findAll('label').find((candidate) => candidate.text() === label)
    if (!card) throw new Error(`No answer “${label}”`)
    await card.get('input').setValue(true)
  }
  return { wrapper, saved, sent, heading, press, choose }
}

describe('answering a questionnaire step by step', () => {
  it('shows one activity a page with its place, saves on the way, and takes focus to each heading', async () => {
    const flow = open(pageOf())
    expect(flow.heading()).toBe('Before you begin')
    await flow.press('Begin')
    expect(flow.wrapper.findAll('fieldset')).toHaveLength(1)
    expect(flow.heading()).toBe('1 of 3: Draws or writes')
    expect(document.activeElement?.textContent).toContain('Draws or writes')
    await flow.choose('Left, mostly')
    await flow.press('Next')
    expect(flow.heading()).toBe('2 of 3: Throws a small ball')
    expect(flow.wrapper.text()).toContain('Use a soft ball')
    expect(flow.saved.at(-1)?.answers).toEqual(answers({ item_1: 'left' }))
    await flow.press('Back')
    expect(flow.wrapper.get<HTMLInputElement>('input:checked').element.value).toBe('left')
  })

  it('keeps blank, either hand and “does not do this yet” apart', async () => {
    const flow = open(pageOf())
    await flow.press('Begin')
    await flow.press('Leave open for now')
    await flow.choose('Either hand')
    await flow.press('Next')
    await flow.choose('Does not do this yet')
    await flow.press('Next')
    await flow.press('Next')
    expect(flow.saved.at(-1)?.answers).toEqual(answers({ item_2: 'either', item_3: 'does_not_do' }))
    expect(flow.wrapper.get('[role=status]').text()).toContain('1 of 3 not answered yet')
    expect(flow.wrapper.text()).toContain('Not answered yet')
  })

  it('goes on where the first answer is missing when one comes back', () => {
    const flow = open(pageOf({ version: 3, answers: answers({ item_1: 'left' }) }))
    expect(flow.heading()).toBe('2 of 3: Throws a small ball')
  })

  it('lists everything before it is sent, leads back to what is missing, and then says what happens next', async () => {
    const flow = open(pageOf({ version: 3, answers: answers({ item_1: 'left', item_3: 'right' }) }))
    await flow.press('Leave open for now')
    await flow.press('Next')
    await flow.press('Next')
    await flow.press('Answer: Throws a small ball')
    await flow.choose('Right, always')
    await flow.press('Back to my answers')
    expect(flow.heading()).toBe('Look at your answers')
    expect(flow.wrapper.find('.missing').exists()).toBe(false)
    await flow.press('Send my answers')
    expect(flow.sent).toEqual([4])
    expect(flow.heading()).toBe('Thank you: your answers have arrived')
    expect(flow.wrapper.text()).toContain('01632 960123')
  })

  it('offers no sending while nothing is answered', async () => {
    const flow = open(pageOf())
    await flow.press('Begin')
    for (const label of ['Leave open for now', 'Leave open for now', 'Leave open for now', 'Next'])
      await flow.press(label)
    const send = flow.wrapper.findAll('button').find((button) => button.text() === 'Send my answers')
    expect(send?.attributes('disabled')).toBeDefined()
  })

  it('shows both when another phone saved meanwhile, and sends neither until one is chosen', async () => {
    const theirs = pageOf({ version: 2, answers: answers({ item_1: 'right' }), comment: null })
    const stale = new HttpProblem(409, {
      code: 'stale',
      message: 'Somebody saved a newer version.',
      current: theirs,
      requestId: 'x',
    })
    const refuse: { save?: HttpProblem } = { save: stale }
    const flow = open(pageOf({ version: 1 }), refuse)
    await flow.choose('Left, mostly')
    await flow.press('Next')
    const conflict = flow.wrapper.get('.conflict').text()
    expect(conflict).toContain('Left, mostly')
    expect(conflict).toContain('Right, mostly')
    await flow.press('Take the saved text')
    delete refuse.save
    await flow.press('Back')
    expect(flow.wrapper.get<HTMLInputElement>('input:checked').element.value).toBe('right')
  })

  it('says why when sending is refused, and keeps the answers on the page', async () => {
    const ended = new HttpProblem(410, {
      code: 'link_ended',
      message: 'This link has ended.',
      requestId: 'x',
    })
    const full = answers({ item_1: 'left', item_2: 'left', item_3: 'left' })
    const flow = open(pageOf({ version: 5, answers: full }), { send: ended })
    await flow.press('Send my answers')
    expect(flow.wrapper.get('[role=alert]').text()).toContain('This link has ended.')
    expect(flow.heading()).toBe('Look at your answers')
  })
})
