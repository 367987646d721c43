import { mount, type VueWrapper } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { nextTick } from 'vue'
import { createMemoryHistory, createRouter } from 'vue-router'
import HistorySteps from '@/components/histories/HistorySteps.vue'
import type { AnswerDraft, AnswerPage } from '@shared/answerRequests.ts'
import { emptyHistory, type HistoryDetails } from '@shared/histories.ts'
import { historyGroups } from '@shared/historyQuestions.ts'

let wrapper: VueWrapper | null = null
beforeEach(() => {
  vi.useFakeTimers()
  Element.prototype.scrollIntoView = () => undefined
})
afterEach(() => {
  wrapper?.unmount()
  document.body.innerHTML = ''
  vi.useRealTimers()
})

const pageOf = (given: Partial<HistoryDetails> | null, version = 0): AnswerPage => ({
  requestId: 'a',
  asks: 'history',
  childName: 'Robin Marsh',
  spokenName: 'Robin',
  askedOf: 'Maren Holt',
  answerBy: '2026-07-01',
  form: null,
  answers: null,
  comment: null,
  history: given === null ? null : { ...emptyHistory, ...given },
  version,
  urgent: [],
  clinic: { name: 'The clinic', phone: '01632 960 140', emergencyText: 'Call the emergency number at once.' },
})

async function steps(page: AnswerPage) {
  const saves: { draft: AnswerDraft; version: number }[] = []
  const sends: number[] = []
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [{ path: '/:rest(.*)*', component: { render: () => null } }],
  })
  await router.push('/')
  wrapper = mount(HistorySteps, {
    attachTo: document.body,
    props: {
      page,
      save: async (draft: AnswerDraft, version: number) => {
        saves.push({ draft: structuredClone(draft), version })
        return { version: version + 1 }
      },
      send: async (version: number) => {
        sends.push(version)
      },
    },
    global: { plugins: [router, createPinia(), PrimeVue] },
  })
  const view = wrapper
  const press = async (name: string) => {
    const button = view.findAll('button').find((found) => found.text() === name)
    if (!button) throw new Error(`No button ${name}`)
    await button.trigger('click')
    await vi.advanceTimersByTimeAsync(0)
    await nextTick()
  }
  const choose = async (question: string, answer: string) => {
    const group = view.findAll('fieldset').find((found) => found.find('legend').text().includes(question))
    const option = group?.findAll('label').find((found) => found.text() === answer)
    if (!option) throw new Error(`No answer ${answer} to ${question}`)
    await option.find('input').trigger('change')
  }
  const title = () => view.find('h2').text()
  return { view, saves, sends, press, choose, title }
}

const partOf = (id: string) => historyGroups.findIndex((group) => group.id === id)

describe('the history on a phone', () => {
  it('shows one group a page with its place, and begins with what the child enjoys', async () => {
    const { view, title, press } = await steps(pageOf(null))
    expect(title()).toBe('What Robin enjoys')
    expect(view.text()).toContain(`Part 1 of ${historyGroups.length}`)
    expect(view.findAll('h2')).toHaveLength(1)
    await press('Next')
    expect(title()).toBe('Which hand')
    expect(view.text()).toContain(`Part 2 of ${historyGroups.length}`)
    await press('Back')
    expect(title()).toBe('What Robin enjoys')
  })

  it('saves by itself, and at once when the page is turned', async () => {
    const { view, saves, press } = await steps(pageOf(null))
    await view.find('textarea').setValue('Building dens')
    expect(saves).toEqual([])
    await press('Next')
    expect(saves.map(({ version, draft }) => [version, draft.history?.enjoys])).toEqual([
      [0, 'Building dens'],
    ])
    await press('Back')
    await view.find('textarea').setValue('Building dens and swimming')
    await vi.advanceTimersByTimeAsync(3_000)
    expect(saves.at(-1)).toMatchObject({
      version: 1,
      draft: { history: { enjoys: 'Building dens and swimming' } },
    })
  })

  it('goes on where the first answer is missing when somebody comes back', async () => {
    const begun = {
      enjoys: 'Dens',
      childsWords: 'I like blue',
      firstNoticedUnsure: true,
      consistency: 'always',
    } as const
    const { title } = await steps(pageOf(begun, 4))
    expect(title()).toBe('Has the hand changed?')
  })

  it('says under the answer what calls for help today, and on every page after it', async () => {
    const { view, choose, press } = await steps(pageOf({}, 0))
    for (let part = 0; part < partOf('new-signs'); part += 1) await press('Next')
    expect(view.text()).not.toContain('Please get help today')
    await choose('Has one side of the face begun to droop', 'Yes')
    const note = view
      .findAll('[role="alert"]')
      .find((found) => found.text().includes('Please get help today'))
    expect(note?.text()).toContain('a drooping face')
    expect(note?.text()).toContain('Call the emergency number at once.')
    const questions = view.findAll('.question')
    const asked = questions.findIndex((found) => found.text().includes('Has one side of the face'))
    expect(questions[asked]?.element.nextElementSibling).toBe(note?.element)

    await press('Next')
    expect(view.findAll('.urgent')).toHaveLength(1)
    await press('Go to the end and check')
    expect(view.findAll('.urgent')).toHaveLength(1)
  })

  it('turns to what calls for help today and not past it', async () => {
    const { view, choose, press } = await steps(pageOf({}, 0))
    for (let part = 0; part < partOf('new-signs'); part += 1) await press('Next')
    await choose('Has one side of the face begun to droop', 'Yes')
    const turnedTo: Element[] = []
    Element.prototype.scrollIntoView = function (this: Element) {
      turnedTo.push(this)
    }
    await press('Next')
    const [reached] = turnedTo
    const note = view.find('.urgent').element
    expect(reached?.compareDocumentPosition(note)).toBe(Node.DOCUMENT_POSITION_FOLLOWING)
    expect(reached?.textContent).toContain(`Part ${partOf('new-signs') + 2} of`)
  })

  it('asks on only where an answer calls for it', async () => {
    const { view, choose, press } = await steps(pageOf({}))
    for (let part = 0; part < partOf('changes'); part += 1) await press('Next')
    expect(view.text()).not.toContain('When did that happen?')
    await choose('Has Robin changed from mostly', 'Yes')
    expect(view.text()).toContain('When did that happen?')
  })

  it('lists what is not answered, leads back to it, and sends all the same', async () => {
    const { view, press, sends, title } = await steps(pageOf({ enjoys: 'Dens', pain: 0 }, 3))
    await press('Go to the end and check')
    expect(title()).toBe('Check your answers')
    expect(view.text()).toMatch(/questions have no answer yet/)
    expect(view.text()).toContain('0 out of 10')
    await press('Do Robin’s hands shake?')
    expect(title()).toBe('The other hand')
    await press('Go to the end and check')
    await press('Send to the clinic')
    expect(sends).toEqual([3])
    expect(view.emitted('sent')).toHaveLength(1)
  })

  it('does not send without what the child enjoys, and says so with a way there', async () => {
    const { view, press, sends, title } = await steps(pageOf({ pain: 2 }, 3))
    await press('Go to the end and check')
    await press('Send to the clinic')
    expect(sends).toEqual([])
    const words = view.findAll('[role="alert"]').find((found) => found.text().includes('Not sent yet'))
    expect(words?.text()).toContain('What does Robin enjoy')
    await press('What does Robin enjoy and do well?')
    expect(title()).toBe('What Robin enjoys')
  })
})

describe('a question', () => {
  const tick = async (view: VueWrapper, on: boolean) => {
    const box = view.find('input[type="checkbox"]')
    await box.setValue(on)
  }

  it('takes “Not sure” as an answer, which takes the place of a number and gives way to one', async () => {
    const { view, saves, press } = await steps(pageOf({ firstNoticedMonths: 14 }))
    await press('Next')
    await tick(view, true)
    await vi.advanceTimersByTimeAsync(3_000)
    expect(saves.at(-1)?.draft.history).toMatchObject({ firstNoticedUnsure: true, firstNoticedMonths: null })

    const number = view.find('input[inputmode="decimal"]')
    await number.setValue('18')
    await number.trigger('input')
    await number.trigger('blur')
    await vi.advanceTimersByTimeAsync(3_000)
    expect(saves.at(-1)?.draft.history).toMatchObject({ firstNoticedUnsure: false, firstNoticedMonths: 18 })
  })

  it('is answered by a letter of the keyboard', async () => {
    const { view, saves, press } = await steps(pageOf({}))
    for (let part = 0; part < partOf('family'); part += 1) await press('Next')
    const radios = view.findAll('input[type="radio"]')
    await radios[0]!.trigger('keydown', { key: 'l' })
    await vi.advanceTimersByTimeAsync(3_000)
    expect(saves.at(-1)?.draft.history?.family.mother).toBe('left')
  })

  it('keeps a half-typed date on the page until it is one', async () => {
    const { view, saves, choose, press } = await steps(pageOf({}))
    for (let part = 0; part < partOf('changes'); part += 1) await press('Next')
    await choose('Has Robin changed from mostly', 'Yes')
    const box = (label: string) => {
      const id = view
        .findAll('label')
        .find((found) => found.text() === label)
        ?.attributes('for')
      return view.find(`[id="${id}"]`)
    }
    await box('Day').setValue('3')
    await box('Month').setValue('Mar')
    await vi.advanceTimersByTimeAsync(3_000)
    expect(saves.at(-1)?.draft.history?.handChangedOn).toBeNull()
    await box('Month').trigger('focusout')
    expect(view.text()).toContain('This is not kept yet')
    await box('Year').setValue('2026')
    expect(view.text()).not.toContain('This is not kept yet')
    await vi.advanceTimersByTimeAsync(3_000)
    expect(saves.at(-1)?.draft.history?.handChangedOn).toBe('2026-03-03')
  })
})
