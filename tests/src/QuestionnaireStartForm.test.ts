import type { UseQueryReturn } from '@pinia/colada'
import { flushPromises, mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { describe, expect, it, vi } from 'vitest'
import { ref } from 'vue'
import { createMemoryHistory, createRouter } from 'vue-router'
import QuestionnaireStartForm from '@/components/questionnaires/QuestionnaireStartForm.vue'
import type { FormView } from '@shared/forms.ts'
import type { QuestionnaireView } from '@shared/questionnaires.ts'
import { startForm, startForms } from '../support/startForms.ts'

const query = (forms: FormView[] | undefined, error: Error | null = null) =>
  ({
    data: ref(forms),
    error: ref(error),
    isLoading: ref(false),
    refetch: vi.fn(),
  }) as unknown as UseQueryReturn<FormView[]>

async function page(forms = query(startForms()), replaces: QuestionnaireView | null = null) {
  const start = vi.fn(async () => ({ id: 'new' }) as QuestionnaireView)
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [{ path: '/:rest(.*)*', component: { render: () => null } }],
  })
  await router.push('/')
  const wrapper = mount(QuestionnaireStartForm, {
    props: { forms, today: '2026-06-10', replaces, start },
    attachTo: document.body,
    global: { plugins: [PrimeVue, createPinia(), router] },
  })
  await flushPromises()
  const choose = async (label: string) => {
    const option = wrapper.findAll('label').find((candidate) => candidate.text().startsWith(label))
    await option?.get('input').setValue(true)
  }
  const offered = () =>
    wrapper
      .findAll('fieldset')
      .at(-1)
      ?.findAll('label')
      .map((label) => label.text()) ?? []
  return { wrapper, start, choose, offered }
}

describe('QuestionnaireStartForm', () => {
  it('offers the forms in use with what each is for, the everyday one chosen', async () => {
    const { wrapper } = await page(
      query([...startForms(), startForm('short-4', { id: 'short-4.v0', retiredAt: '2026-01-01T00:00:00Z' })]),
    )
    expect(wrapper.findAll('.form').length).toBe(6)
    expect(wrapper.get('.form.chosen .title').text()).toBe('Hand use in ten everyday activities')
    expect(wrapper.get('.form.chosen .about').text()).toContain('Which hand the child chooses')
    expect(wrapper.text()).toContain('Go to the ten activities')
  })

  it('offers only those who may answer the chosen form, and chooses them where there is one', async () => {
    const { wrapper, choose, offered, start } = await page()
    expect(offered()).toEqual(['Parent or carer', 'Teacher', 'Child showed it', 'Therapist saw it'])
    await choose('Teacher')
    await choose('Ten tasks, two marks')
    expect(offered()).toEqual(['Parent or carer', 'Child showed it', 'Therapist saw it'])
    await wrapper.get('form').trigger('submit')
    await vi.waitFor(() => expect(wrapper.find('.summary').exists()).toBe(true))
    expect(start).not.toHaveBeenCalled()
    await choose('Eight actions')
    expect(offered()).toEqual(['Child showed it'])
    await wrapper.get('form').trigger('submit')
    await vi.waitFor(() => expect(start).toHaveBeenCalledTimes(1))
    expect(start).toHaveBeenCalledWith({
      formId: 'shown-8.v1',
      informant: 'child_demonstrated',
      respondentName: null,
      answeredOn: '2026-06-10',
      replacesId: null,
    })
  })

  it('puts a response right on the edition of its form that is in use now', async () => {
    const older = startForm('short-4', { retiredAt: '2026-05-01T00:00:00Z' })
    const newer = startForm('short-4', { id: 'short-4.v2', edition: 2 })
    const replaces = {
      id: '6f1c1c54-4d8e-4e0e-9a50-0a8f1f8a9b11',
      form: older,
      informant: 'guardian',
      respondentName: null,
      answeredOn: '2026-04-01',
    } as QuestionnaireView
    const { wrapper, start } = await page(query([older, newer, startForm('ten-task')]), replaces)
    expect(wrapper.text()).toContain('It is answered on edition 2')
    await wrapper.get('form').trigger('submit')
    await vi.waitFor(() => expect(start).toHaveBeenCalledTimes(1))
    expect(start).toHaveBeenCalledWith(
      expect.objectContaining({ formId: 'short-4.v2', replacesId: replaces.id }),
    )
  })

  it('says that there is nothing to begin with, and offers to try again when the forms did not come', async () => {
    expect((await page(query([]))).wrapper.text()).toContain('No form to begin with')
    expect((await page(query(undefined, new Error('lost')))).wrapper.text()).toContain('Try again')
    expect((await page(query(undefined))).wrapper.get('[role=status]').text()).toContain('Loading')
  })
})
