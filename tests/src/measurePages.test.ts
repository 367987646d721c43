import { flushPromises, mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it, vi } from 'vitest'
import type { Component } from 'vue'
import { createMemoryHistory, createRouter } from 'vue-router'
import { http } from '../../src/api/http.ts'
import MeasureFinishedPage from '../../src/components/measures/MeasureFinishedPage.vue'
import MeasureStartForm from '../../src/components/measures/MeasureStartForm.vue'
import { emptyDetails, scoreMeasure } from '../../shared/measureScores.ts'
import type { MeasureStart } from '../../shared/measureSchemas.ts'
import type { MeasureView, SkillDetails } from '../../shared/measures.ts'
import { measureDraft } from '../support/measurePages.ts'
import { fakeWire, refusal } from '../support/wire.ts'

const mounted: { unmount: () => void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

function open<Props extends object>(component: Component, props: Props) {
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [{ path: '/:path(.*)*', name: 'measure', component: { render: () => null } }],
  })
  const wrapper = mount(component, {
    props: props as Record<string, unknown>,
    attachTo: document.body,
    global: { plugins: [router, createPinia(), PrimeVue] },
  })
  mounted.push(wrapper)
  return wrapper
}

describe('starting a measure', () => {
  const form = (replaces: MeasureView | null = null) =>
    open(MeasureStartForm, {
      today: '2026-03-03',
      replaces,
      start: (start: MeasureStart) => http.post<MeasureView>('/measures', start),
    })
  const sentBy = async (wrapper: ReturnType<typeof form>) => {
    const { sent } = fakeWire({ status: 201, body: measureDraft('reaching') })
    await wrapper.get('form').trigger('submit')
    await vi.waitFor(() => expect(sent).toHaveLength(1))
    return sent[0]?.body
  }

  it.each([
    ['reaching', { cardsPerPlace: 3 }],
    ['pegs', { startHand: null, pegs: 10 }],
    ['tapping', { startHand: null, seconds: 20 }],
    ['dots', { startHand: null, seconds: 20 }],
    ['sides', {}],
    ['seating', {}],
  ])('sends for %s only the options that belong to it', async (kind, options) => {
    const wrapper = form()
    const at = ['reaching', 'pegs', 'tapping', 'dots', 'sides', 'seating'].indexOf(kind)
    await wrapper.findAll('input[type="radio"][name="kind"]')[at]?.setValue(true)
    await flushPromises()
    expect(await sentBy(wrapper)).toEqual({
      kind,
      measuredOn: '2026-03-03',
      replacesId: null,
      options,
    })
  })

  it('asks for the kind beside its field when none is chosen, and sends nothing', async () => {
    const { sent } = fakeWire({ status: 201, body: measureDraft('reaching') })
    const wrapper = form()
    await wrapper.get('form').trigger('submit')
    await vi.waitFor(() => expect(wrapper.find('.field-error').exists()).toBe(true))
    expect(wrapper.get('.field-error').text()).toContain('Choose what to measure')
    expect(sent).toHaveLength(0)
  })

  it('says in the server’s words that another one was begun, and keeps what was chosen', async () => {
    fakeWire(refusal(409, 'duplicate'))
    const wrapper = form()
    const pegs = wrapper.findAll<HTMLInputElement>('input[type="radio"][name="kind"]')[1]
    await pegs?.setValue(true)
    await wrapper.get('form').trigger('submit')
    await vi.waitFor(() => expect(wrapper.text()).toContain('Refused: duplicate'))
    expect(pegs?.element.checked).toBe(true)
  })

  it('takes kind and options over when a locked measure is corrected', async () => {
    const earlier = measureDraft('reaching', { cardsPerPlace: 6 })
    const wrapper = form({ ...earlier, id: '0b2b6f6e-3d1f-4b0e-9a59-0d9f2f6a1c11' })
    expect(wrapper.find('input[name="kind"]').exists()).toBe(false)
    expect(await sentBy(wrapper)).toMatchObject({
      kind: 'reaching',
      replacesId: '0b2b6f6e-3d1f-4b0e-9a59-0d9f2f6a1c11',
      options: { cardsPerPlace: 6 },
    })
  })
})

describe('a locked measure', () => {
  const details: SkillDetails = {
    ...(emptyDetails('pegs', { startHand: 'left' }, 1) as SkillDetails),
    trials: [
      { hand: 'left', value: 12, interrupted: false, confirmed: false },
      { hand: 'right', value: 15, interrupted: false, confirmed: false },
      { hand: 'left', value: 3, interrupted: true, confirmed: false },
    ],
  }
  const locked: MeasureView = {
    ...measureDraft('pegs', {}, details),
    score: scoreMeasure(details),
    lockedAt: '2026-03-03T10:00:00.000Z',
    lockedBy: 'Ben Test',
    can: { change: false, lock: false, replace: true },
  }

  it('shows every trial, the score with formula and source, and who locked it', () => {
    const wrapper = open(MeasureFinishedPage, { measure: locked, childId: 'child', problem: null })
    const text = wrapper.text()
    // 100 (12 − 15)/(12 + 15) = −11.1, minus is left faster (methods C).
    expect(text).toContain('−11.1, left faster')
    expect(text).toContain('100 × (left − right) ÷ (left + right)')
    expect(text).toContain('Schmidt and colleagues (2000)')
    expect(text).toContain('12.0 s')
    expect(text).toContain('interrupted, left out')
    expect(text).toContain('Ben Test')
    expect(wrapper.findAll('input')).toEqual([])
  })

  it('offers to correct it, and leads to the later one once there is one', async () => {
    const wrapper = open(MeasureFinishedPage, { measure: locked, childId: 'child', problem: null })
    await wrapper.get('section.edge button').trigger('click')
    expect(wrapper.emitted('replace')).toHaveLength(1)
    await wrapper.setProps({
      measure: { ...locked, replacedById: 'later', can: { ...locked.can, replace: false } },
    })
    expect(wrapper.get('section.edge').text()).toBe('The later one')
    expect(wrapper.text()).toContain('Replaced by a later one')
  })

  it('says why it was not done instead of figures', () => {
    const empty = measureDraft('pegs')
    const wrapper = open(MeasureFinishedPage, {
      measure: {
        ...empty,
        notDoneReason: 'Tired after reaching',
        lockedAt: locked.lockedAt,
        lockedBy: 'Ben',
      },
      childId: 'child',
      problem: null,
    })
    expect(wrapper.text()).toContain('Tired after reaching')
    expect(wrapper.text()).not.toContain('Index')
  })
})
