import { mount, flushPromises } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import { createMemoryHistory, createRouter } from 'vue-router'
import AlertPanel from '@/components/alerts/AlertPanel.vue'
import type { AlertAction, AlertPage, AlertView } from '@shared/alerts.ts'

const alert = (given: Partial<AlertView>): AlertView => ({
  id: 'a',
  flag: 'pain',
  text: 'Writing hurts (5 out of 10).',
  level: 'due',
  urgency: 'safeguarding',
  advice: 'A therapist looks first.',
  holdsBooking: false,
  origin: 'observation',
  originId: null,
  raisedAt: '2026-06-01T09:00:00.000Z',
  raisedBy: 'Adaeze Nwosu-Reid',
  actedAt: null,
  actedBy: null,
  action: null,
  can: { act: true },
  ...given,
})
const urgent = alert({
  id: 'b',
  flag: 'new-neurological-signs',
  text: 'There is new weakness.',
  level: 'overdue',
  urgency: 'same_day',
  holdsBooking: true,
  origin: 'history',
  originId: 'h1',
  raisedBy: null,
})
const answered = alert({
  id: 'c',
  text: 'A skill has been lost.',
  actedAt: '2026-06-02T10:00:00.000Z',
  actedBy: 'Ines Valderrama',
  action: 'Family doctor saw the child the same day.',
  can: { act: false },
})

const pageOf = (rows: AlertView[]): AlertPage => ({
  rows,
  total: rows.length,
  page: 1,
  size: 25,
  open: rows.filter(({ actedAt }) => actedAt === null).length,
})

async function panel(alerts: AlertView[], given: Partial<AlertPage> = {}) {
  const acts: [string, AlertAction][] = []
  const Nothing = { render: () => null }
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [
      { path: '/', component: Nothing },
      { path: '/children/:childId/histories/:historyId', name: 'history', component: Nothing },
      { path: '/q/:childId/:questionnaireId', name: 'questionnaire', component: Nothing },
      { path: '/m/:childId/:measureId', name: 'measure', component: Nothing },
    ],
  })
  await router.push('/')
  const view = mount(AlertPanel, {
    attachTo: document.body,
    props: {
      childId: 'child',
      page: { ...pageOf(alerts), ...given },
      act: async (id: string, action: AlertAction) => {
        acts.push([id, action])
      },
      raise: async () => urgent,
    },
    global: { plugins: [router, createPinia(), PrimeVue] },
  })
  return { view, acts }
}

describe('the panel of warning signs', () => {
  it('leads to older signs, counts those of the whole record, and says where the open ones are', async () => {
    const { view } = await panel([answered], { total: 60, open: 27, page: 3 })
    expect(view.text()).toContain('What waits for somebody is on the first page.')
    expect(view.text()).toContain('Answered (33)')
    expect(view.text()).toContain('Page 3 of 3')
    await view.get('nav button').trigger('click')
    expect(view.emitted('go')).toEqual([[2]])
  })

  it('puts the most urgent open sign first, says what is usually done and what it holds back', async () => {
    const { view } = await panel([alert({}), answered, urgent])
    const [first, second] = view.findAll('ul')[0]!.findAll('li')
    expect(first?.text()).toContain('Same-day medical help')
    expect(first?.text()).toContain('No routine block until answered')
    expect(first?.text()).toContain('answered at home')
    expect(first?.find('a').attributes('href')).toBe('/children/child/histories/h1')
    expect(second?.text()).toContain('Think about welfare')
    expect(second?.text()).toContain('Usual step: A therapist looks first.')
    expect(second?.text()).not.toContain('No routine block')
    view.unmount()
  })

  it('keeps what was done, by whom, behind a step', async () => {
    const { view } = await panel([answered])
    expect(view.text()).toContain('None waits for somebody.')
    const folded = view.find('details')
    expect(folded.text()).toContain('Family doctor saw the child the same day.')
    expect(folded.text()).toContain('Ines Valderrama')
    view.unmount()
  })

  it('says when there is none', async () => {
    const { view } = await panel([])
    expect(view.text()).toContain('None on this record.')
    view.unmount()
  })

  it('writes down what was done, and refuses an empty answer', async () => {
    const { view, acts } = await panel([alert({})])
    await view.find('button[aria-label^="Write what was done about"]').trigger('click')
    await view.find('form').trigger('submit')
    await flushPromises()
    expect(acts).toEqual([])
    await view.find('textarea').setValue('Rang the mother; pauses agreed with school.')
    await view.find('form').trigger('submit')
    await flushPromises()
    expect(acts).toEqual([['a', { action: 'Rang the mother; pauses agreed with school.' }]])
    expect(view.emitted('changed')).toHaveLength(1)
    view.unmount()
  })
})
