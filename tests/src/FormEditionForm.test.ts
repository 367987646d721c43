import { flushPromises, mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { describe, expect, it, vi } from 'vitest'
import { createMemoryHistory, createRouter } from 'vue-router'
import FormEditionForm from '@/components/forms/FormEditionForm.vue'
import { formFamilies } from '@/components/forms/formFamilies.ts'
import type { FormEdition } from '@shared/formEditions.ts'
import { startForm, startForms } from '../support/startForms.ts'

async function page() {
  const form = startForm('shown-8')
  const make = vi.fn(async ({ definition }: FormEdition) => ({ ...form, edition: 2, definition }))
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [{ path: '/:rest(.*)*', component: { render: () => null } }],
  })
  await router.push('/')
  const wrapper = mount(FormEditionForm, {
    props: { form, next: 2, make },
    attachTo: document.body,
    global: { plugins: [PrimeVue, createPinia(), router] },
  })
  const field = (name: string) => wrapper.get<HTMLInputElement>(`#field-${name}`)
  const press = async (label: string) => {
    await wrapper
      .findAll('button')
      .find((button) => button.text() === label)
      ?.trigger('click')
    await flushPromises()
  }
  /** Sends the words and waits until they are shown or refused: checks run a moment later. */
  const look = async () => {
    await wrapper.get('form').trigger('submit')
    await vi.waitFor(() =>
      expect(wrapper.find('.preview').exists() || wrapper.find('.summary').exists()).toBe(true),
    )
  }
  return { wrapper, form, make, field, press, look }
}

describe('FormEditionForm', () => {
  it('shows new words as they will be answered before they are put into use', async () => {
    const { wrapper, make, field, press, look, form } = await page()
    await field('definition-items-0-childLabel').setValue('Draw me a long line.')
    await look()
    expect(make).not.toHaveBeenCalled()
    expect(wrapper.get('h2').text()).toBe('Preview of edition 2: Eight actions shown by the child')
    expect(wrapper.findAll('fieldset').length).toBe(8)
    expect(wrapper.text()).toContain('Say: “Draw me a long line.”')
    await press('Put edition 2 into use')
    const sent = make.mock.calls[0]?.[0]
    expect(sent?.key).toBe('shown-8')
    expect(sent?.definition.items[0]?.childLabel).toBe('Draw me a long line.')
    expect(sent?.definition.items.slice(1)).toEqual(form.definition.items.slice(1))
    expect(wrapper.emitted('made')).toHaveLength(1)
  })

  it('goes back to the words with everything that was typed', async () => {
    const { field, press, look } = await page()
    await field('definition-title').setValue('Eight things to show')
    await look()
    await press('Back to the words')
    expect(field('definition-title').element.value).toBe('Eight things to show')
  })

  it('keeps a caution that an activity had, and says so beside it', async () => {
    const { wrapper, make, field, look } = await page()
    await field('definition-items-4-caution').setValue('')
    await look()
    expect(wrapper.get('[role=group]').text()).toContain('Activity 5: This activity needs a caution')
    expect(wrapper.get('#field-definition-items-4-caution-error').text()).toContain('keep one')
    expect(make).not.toHaveBeenCalled()
  })

  it('offers no change to activities, answers or method', async () => {
    const { wrapper } = await page()
    const labels = wrapper.findAll('label').map((label) => label.text())
    expect(labels.some((label) => /method$|answers|cut-off/i.test(label))).toBe(false)
    expect(wrapper.findAll('button').map((button) => button.text())).not.toContain('Add an activity')
  })
})

describe('formFamilies', () => {
  it('puts the edition in use first and the everyday form before the others', () => {
    const old = startForm('short-4', { retiredAt: '2026-01-01T00:00:00Z' })
    const forms = [
      ...startForms().filter(({ key }) => !['short-4', 'ten-task'].includes(key)),
      old,
      startForm('short-4', { id: 'short-4.v2', edition: 2 }),
      startForm('ten-task', { retiredAt: '2026-01-01T00:00:00Z' }),
    ]
    const families = formFamilies(forms)
    expect(families[0]?.key).toBe('hand-use-10')
    expect(families.at(-1)?.key).toBe('ten-task')
    const short = families.find(({ key }) => key === 'short-4')
    expect([short?.current.id, short?.others.map(({ id }) => id)]).toEqual(['short-4.v2', ['short-4.v1']])
  })
})
