import { mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { expect, it } from 'vitest'
import ChildBanner from '@/components/children/ChildBanner.vue'
import type { ChildHeader } from '@shared/children.ts'

const child: ChildHeader = {
  id: 'child',
  recordNumber: 'FF-2026-0001',
  name: 'Mara Example',
  preferredName: null,
  birthDate: '2018-01-09',
  age: '8 y 1 m',
  relation: 'assignedTherapist',
  school: null,
  className: null,
  interpreterLanguage: null,
  lookedAfter: false,
  courtOrder: false,
  consentsForSelf: false,
  state: 'active',
  therapist: 'Ada Test',
  alerts: [
    {
      id: 'sign',
      text: 'The right hand does clearly better at Moving pegs.',
      level: 'due',
      urgency: 'ask',
      advice: 'Plan a full assessment.',
      raisedAt: '2026-03-03T10:00:00.000Z',
    },
  ],
  emergencyText: null,
  correctedAge: null,
  sections: [],
  namesake: false,
  can: { writeNote: true, startLetter: true },
}

it('keeps a space between what a sign says and what is usually done', () => {
  const banner = mount(ChildBanner, {
    props: { child, mayAct: true },
    global: { plugins: [createPinia(), PrimeVue] },
  })
  expect(banner.get('.sign').text()).toBe(
    'The right hand does clearly better at Moving pegs. Plan a full assessment.',
  )
})
