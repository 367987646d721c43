import { flushPromises, mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it, vi } from 'vitest'
import AnswerRequestForm from '@/components/answerRequests/AnswerRequestForm.vue'
import AnswerRequestList from '@/components/answerRequests/AnswerRequestList.vue'
import AnswerLinkForm from '@/components/answerRequests/AnswerLinkForm.vue'
import {
  requestStates,
  type AnswerChoices,
  type AnswerRequestDetails,
  type AnswerRequestView,
} from '@shared/answerRequests.ts'

const opened: { unmount: () => void }[] = []
afterEach(() => opened.splice(0).forEach((wrapper) => wrapper.unmount()))
const plugins = () => {
  const pinia = createPinia()
  setActivePinia(pinia)
  return [pinia, PrimeVue]
}

const mother = '11111111-1111-4111-8111-111111111111'
const father = '22222222-2222-4222-8222-222222222222'
const teacher = '33333333-3333-4333-8333-333333333333'
const choices: AnswerChoices = {
  blocked: null,
  forms: [{ id: 'three.v1', title: 'Three activities', informants: ['guardian', 'teacher'] }],
  guardians: [
    {
      id: mother,
      name: 'Wren Marsh',
      refused: null,
      byLink: true,
      signedIn: true,
      email: 'wren@marsh.example',
      verified: true,
    },
    {
      id: father,
      name: 'Falk Marsh',
      refused: null,
      byLink: true,
      signedIn: false,
      email: 'falk@marsh.example',
      verified: false,
    },
    {
      id: 'x',
      name: 'Odd Marsh',
      refused: 'This carer may not be written to.',
      byLink: false,
      signedIn: false,
      email: null,
      verified: false,
    },
  ],
  teachers: [{ id: teacher, name: 'Ms Larch' }],
  teachersRefused: null,
}
const request: AnswerRequestView = {
  id: 'r1',
  asks: 'questionnaire',
  formTitle: 'Three activities',
  answerer: 'guardian',
  askedOf: 'Wren Marsh',
  askedAt: '2026-03-01T10:00:00.000Z',
  expiresAt: '2026-03-29T10:00:00.000Z',
  byLink: false,
  reminders: 1,
  state: 'waiting',
  cancelledWhy: null,
  answeredAt: null,
  answerId: null,
  version: 1,
  can: { cancel: true, remind: true },
}

function form(given: Partial<AnswerChoices> = {}) {
  const sent: AnswerRequestDetails[] = []
  const wrapper = mount(AnswerRequestForm, {
    attachTo: document.body,
    global: { plugins: plugins() },
    props: {
      choices: { ...choices, ...given },
      ask: (asked: AnswerRequestDetails) => {
        sent.push(asked)
        return Promise.resolve(request)
      },
    },
  })
  opened.push(wrapper)
  const choose = async (label: string) => {
    const option = wrapper.findAll('label.option').find((candidate) => candidate.text() === label)
    if (!option) throw new Error(`No choice “${label}”`)
    await option.get('input').setValue(true)
  }
  const what = async (value: string) => {
    wrapper.findComponent({ name: 'Select' }).vm.$emit('update:modelValue', value)
    await flushPromises()
  }
  const submit = async () => {
    const before = sent.length
    await wrapper.get('form').trigger('submit')
    // The check of the form runs in the background and answers a moment later: sent, or with a message.
    await vi.waitFor(() => {
      if (sent.length === before && wrapper.findAll('.field-error').length === 0) throw new Error('not yet')
    })
  }
  return { wrapper, sent, choose, what, submit }
}

describe('asking for answers', () => {
  it('asks somebody with a sign-in to sign in, and somebody without by a link', async () => {
    const page = form()
    await page.choose('Wren Marsh')
    await page.what('three.v1')
    await page.submit()
    await page.choose('Falk Marsh')
    expect(page.wrapper.text()).not.toContain('Signed in')
    expect(page.wrapper.text()).toContain('falk@marsh.example')
    await page.wrapper.get('input[type=checkbox]').setValue(true)
    await page.what('history')
    await page.submit()
    expect(page.sent).toEqual([
      {
        asks: 'questionnaire',
        formId: 'three.v1',
        answerer: 'guardian',
        guardianId: mother,
        teacherId: null,
        byLink: false,
        addressConfirmed: false,
      },
      {
        asks: 'history',
        formId: null,
        answerer: 'guardian',
        guardianId: father,
        teacherId: null,
        byLink: true,
        addressConfirmed: true,
      },
    ])
  })

  it('asks whether the address was confirmed of a carer by link, anew for each, and not of one known by a sign-in', async () => {
    const page = form()
    const tick = () => page.wrapper.find('input[type=checkbox]')
    await page.choose('Falk Marsh')
    await tick().setValue(true)
    await page.choose('Wren Marsh')
    await page.choose('By a link in the e-mail, without signing in')
    expect(tick().exists()).toBe(false)
    await page.choose('Falk Marsh')
    expect((tick().element as HTMLInputElement).checked).toBe(false)
  })

  it('offers no carer who may not be written to, and says why', () => {
    const page = form()
    expect(page.wrapper.findAll('label.option').map((option) => option.text())).not.toContain('Odd Marsh')
    expect(page.wrapper.text()).toContain('Odd Marsh: This carer may not be written to.')
  })

  it('asks a teacher signed in, and says why none can be asked', async () => {
    const page = form()
    await page.choose('A teacher')
    await page.choose('Ms Larch')
    await page.what('three.v1')
    await page.submit()
    expect(page.sent[0]).toMatchObject({
      answerer: 'teacher',
      teacherId: teacher,
      guardianId: null,
      byLink: false,
    })
    const refused = form({ teachers: [], teachersRefused: 'The family has not agreed.' })
    await refused.choose('A teacher')
    expect(refused.wrapper.text()).toContain('The family has not agreed.')
  })

  it('names what is missing and sends nothing', async () => {
    const page = form()
    await page.submit()
    expect(page.wrapper.text()).toContain('Choose a carer')
    expect(page.sent).toEqual([])
  })
})

describe('what was asked', () => {
  it('says the state of each in a word, with its dates and reminders', () => {
    const requests = requestStates.map((state) => ({
      ...request,
      id: state,
      state,
      answeredAt: state === 'answered' ? '2026-03-05T10:00:00.000Z' : null,
      can: { cancel: false, remind: false },
    }))
    const wrapper = mount(AnswerRequestList, {
      global: { plugins: plugins() },
      props: { requests, timeZone: 'Europe/London', reminding: null },
    })
    opened.push(wrapper)
    const lines = wrapper.findAll('li').map((line) => line.text().replace(/\s+/g, ' '))
    expect(lines.map((line, index) => line.includes(requests[index]?.formTitle ?? '?'))).toEqual(
      requestStates.map(() => true),
    )
    const words = ['Waiting', 'Begun', 'Answered', 'Time is over', 'Withdrawn']
    expect(words.filter((word, index) => !lines[index]?.includes(word))).toEqual([])
    expect(lines[0]).toContain('Asked 1 Mar 2026; open until 29 Mar 2026; 1 reminder sent')
    expect(lines[2]).toContain('answered 5 Mar 2026')
    expect(wrapper.findAll('button')).toHaveLength(0)
  })

  it('says of a link that ended with its carer’s address why, and what to do', () => {
    const ended = { ...request, state: 'cancelled', cancelledWhy: 'address' } as const
    const wrapper = mount(AnswerRequestList, {
      global: { plugins: plugins() },
      props: { requests: [ended], timeZone: 'Europe/London', reminding: null },
    })
    opened.push(wrapper)
    expect(wrapper.text()).toContain('e-mail address changed. Ask again')
  })

  it('offers a reminder and a way to withdraw, each naming the person', async () => {
    const wrapper = mount(AnswerRequestList, {
      global: { plugins: plugins() },
      props: { requests: [request], timeZone: 'Europe/London', reminding: null },
    })
    opened.push(wrapper)
    await wrapper.get('[aria-label="Send a reminder to Wren Marsh: Three activities"]').trigger('click')
    await wrapper.get('[aria-label="Withdraw what Wren Marsh was asked: Three activities"]').trigger('click')
    expect(wrapper.emitted('remind')).toEqual([[request]])
    expect(wrapper.emitted('cancel')).toEqual([[request]])
  })
})

describe('the page of a link', () => {
  it('asks for the birth date before anything is shown, and says who is signed in here', async () => {
    const wrapper = mount(AnswerLinkForm, {
      global: { plugins: plugins() },
      props: { modelValue: null, errors: {}, problem: null, busy: false, signedInAs: 'Lucía Quispe' },
    })
    opened.push(wrapper)
    expect(wrapper.findAll('label').map((label) => label.text())).toEqual(['Day', 'Month', 'Year'])
    expect(wrapper.text()).toContain('Lucía Quispe is signed in in this browser')
    await wrapper.get('form').trigger('submit')
    expect(wrapper.emitted('submit')).toHaveLength(1)
  })
})
