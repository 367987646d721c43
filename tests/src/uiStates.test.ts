import { PiniaColada, useQuery, type UseQueryReturn } from '@pinia/colada'
import { flushPromises, mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it } from 'vitest'
import { defineComponent, h, nextTick } from 'vue'
import { http } from '../../src/api/http.ts'
import AttentionTag from '../../src/components/ui/AttentionTag.vue'
import ErrorSummary from '../../src/components/ui/ErrorSummary.vue'
import FormField from '../../src/components/ui/FormField.vue'
import HandMark from '../../src/components/ui/HandMark.vue'
import LoadState from '../../src/components/ui/LoadState.vue'
import SaveState from '../../src/components/ui/SaveState.vue'
import { fakeWire, refusal } from '../support/wire.ts'

afterEach(() => {
  document.body.innerHTML = ''
})

const openList = () =>
  mount(
    defineComponent(() => {
      const query: UseQueryReturn<string[]> = useQuery({
        key: ['names'],
        query: () => http.get<string[]>('/names'),
      })
      return () =>
        h(
          LoadState<string[]>,
          { query, isEmpty: (names: string[]) => names.length === 0 },
          {
            default: ({ data }: { data: string[] }) => h('p', { class: 'names' }, data.join(', ')),
            empty: () => h('p', 'Nobody yet'),
          },
        )
    }),
    { global: { plugins: [createPinia(), PiniaColada, PrimeVue] }, attachTo: document.body },
  )

describe('LoadState', () => {
  it('says that it loads, then shows what came', async () => {
    fakeWire({ status: 200, body: ['Robin', 'Ayo'] })
    const page = openList()
    expect(page.get('[role="status"]').text()).toContain('Loading')
    await flushPromises()
    expect(page.get('.names').text()).toBe('Robin, Ayo')
  })

  it('shows the empty state of the page when there is nothing', async () => {
    fakeWire({ status: 200, body: [] })
    const page = openList()
    await flushPromises()
    expect(page.text()).toBe('Nobody yet')
  })

  it('offers to try again after a failure, and shows the list when that works', async () => {
    fakeWire('cut', { status: 200, body: ['Robin'] })
    const page = openList()
    await flushPromises()
    expect(page.get('[role="alert"]').text()).toContain('could not be loaded')
    await page.get('button').trigger('click')
    await flushPromises()
    expect(page.get('.names').text()).toBe('Robin')
  })

  it.each([
    [403, 'forbidden', 'This is not open to you'],
    [404, 'not_found', 'This is not here, or not open to you'],
  ])('says %i in plain words without offering a retry', async (status, code, words) => {
    fakeWire(refusal(status, code))
    const page = openList()
    await flushPromises()
    expect(page.text()).toContain(words)
    expect(page.find('button').exists()).toBe(false)
  })
})

describe('FormField', () => {
  const field = (props: { error?: string; hint?: string; optional?: boolean; group?: boolean }) =>
    mount(FormField, {
      props: { label: 'Family name', name: 'carers[0].familyName', ...props },
      slots: {
        default: ({ id, describedBy, invalid }: { id: string; describedBy?: string; invalid: boolean }) =>
          h('input', { id, 'aria-describedby': describedBy, 'aria-invalid': invalid }),
      },
    })

  it('ties label, hint and message to the control', () => {
    const page = field({ hint: 'As on the birth certificate', error: 'Enter the family name' })
    const input = page.get('input')
    expect(page.get('label').attributes('for')).toBe(input.attributes('id'))
    const described = (input.attributes('aria-describedby') ?? '').split(' ')
    expect(described.map((id) => page.get(`#${id}`).text())).toEqual([
      'As on the birth certificate',
      expect.stringContaining('Enter the family name'),
    ])
    expect(input.attributes('aria-invalid')).toBe('true')
  })

  it('puts hint and message before the control, where a hand does not cover them', () => {
    const page = field({ hint: 'A hint', error: 'A message' })
    const order = page.html()
    expect(order.indexOf('A hint')).toBeLessThan(order.indexOf('<input'))
    expect(order.indexOf('A message')).toBeLessThan(order.indexOf('<input'))
  })

  it('marks what is optional, not what is required', () => {
    expect(field({ optional: true }).get('label').text()).toBe('Family name (optional)')
    expect(field({}).get('label').text()).toBe('Family name')
  })

  it('is a fieldset with a legend when several controls answer one question', () => {
    expect(field({ group: true }).get('fieldset > legend').text()).toBe('Family name')
  })
})

describe('ErrorSummary', () => {
  it('takes focus when a form is refused, and leads to the field', async () => {
    const page = mount(
      {
        props: { errors: { type: Object, required: true } },
        render(this: { errors: Record<string, string> }) {
          return h('form', [
            h(ErrorSummary, { errors: this.errors }),
            h(
              FormField,
              { label: 'Name', name: 'name' },
              { default: ({ id }: { id: string }) => h('input', { id }) },
            ),
          ])
        },
      },
      { props: { errors: {} }, attachTo: document.body },
    )
    expect(page.find('a').exists()).toBe(false)
    await page.setProps({ errors: { name: 'Enter the name' } })
    await nextTick()
    expect(document.activeElement?.textContent).toContain('One thing needs another look')
    await page.get('a').trigger('click')
    expect(document.activeElement?.id).toBe('field-name')
  })

  it('does not take focus again while messages go away', async () => {
    const page = mount(ErrorSummary, {
      props: { errors: { a: 'Enter a', b: 'Enter b' } },
      attachTo: document.body,
    })
    await nextTick()
    const elsewhere = document.createElement('input')
    document.body.append(elsewhere)
    elsewhere.focus()
    await page.setProps({ errors: { b: 'Enter b' } })
    await nextTick()
    expect(document.activeElement).toBe(elsewhere)
  })
})

describe('states in words', () => {
  it.each([
    ['soon', 'Soon'],
    ['due', 'Due'],
    ['overdue', 'Overdue'],
  ] as const)('shows %s as a word and a shape of its own', (level, word) => {
    const tag = mount(AttentionTag, { props: { level } })
    expect(tag.text()).toBe(word)
    expect(tag.findAll('path').length).toBe(level === 'soon' ? 1 : 2)
  })

  it.each([
    ['left', 'Left', 1],
    ['right', 'Right', 1],
    ['either', 'Either', 2],
    ['swaps', 'Swaps', 2],
    [null, 'Not yet known', 1],
  ] as const)('names the hand %s as %s beside its shape', (hand, word, shapes) => {
    const mark = mount(HandMark, { props: { hand } })
    expect(mark.text()).toBe(word)
    expect(mark.findAll('path')).toHaveLength(shapes)
  })

  it('announces what became of a draft, with the time in words', () => {
    const save = (props: { state: 'saved' | 'failed'; savedAt?: Date; problem?: string }) =>
      mount(SaveState, { props, global: { plugins: [createPinia()] } })
        .get('[role="status"]')
        .text()
    expect(save({ state: 'saved', savedAt: new Date('2026-01-05T14:05:30Z') })).toBe('Saved 14:05')
    expect(save({ state: 'failed', problem: 'the text is too long' })).toBe('Not saved: the text is too long')
  })
})
