import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import LetterFinishedPage from '@/components/letters/LetterFinishedPage.vue'
import type { ChildHeader } from '@shared/children.ts'
import type { DeliveryState, LetterView } from '@shared/letters.ts'

const child: ChildHeader = {
  id: 'child',
  recordNumber: 'FF-2026-0001',
  name: 'Wren Tolliver',
  preferredName: null,
  birthDate: '2018-05-04',
  age: '8 y 6 m',
  relation: 'assignedTherapist',
  school: null,
  className: null,
  interpreterLanguage: null,
  lookedAfter: false,
  courtOrder: false,
  consentsForSelf: false,
  state: 'active',
  therapist: 'Hedda Holder',
  alerts: [],
  emergencyText: null,
  correctedAge: null,
  sections: ['letters'],
  namesake: false,
  can: { writeNote: true, startLetter: true },
}
const letterTo = (copies: Record<string, DeliveryState>, carers: string[]): LetterView => ({
  id: 'letter',
  childId: 'child',
  childName: child.name,
  recordNumber: child.recordNumber,
  kind: 'progress',
  state: Object.keys(copies).length > 0 ? 'sent' : 'approved',
  salutation: 'Dear family',
  sections: [],
  nextVisitOn: null,
  author: 'Hedda Holder',
  approver: 'Hedda Holder',
  approvedAt: '2026-11-20T10:00:00.000Z',
  returnedReason: null,
  facts: [],
  checks: { findings: [], reading: { ease: null, grade: null, words: 0, longestSentence: null } },
  recipients: carers.map((name) => ({
    guardianId: name,
    name,
    relation: 'Mother',
    channel: 'link',
    why: null,
  })),
  deliveries: Object.entries(copies).map(([name, state]) => ({
    id: name,
    guardianId: name,
    recipient: name,
    channel: 'link',
    state,
    attempts: 1,
    lastTriedAt: null,
    nextTryAt: null,
    problem: null,
    openedAt: null,
    can: { retry: false },
  })),
  pdf: null,
  version: 3,
  can: {
    change: false,
    submit: false,
    approve: false,
    return: false,
    takeBack: false,
    send: true,
    recall: false,
    discard: false,
  },
})
const sendButtons = (letter: LetterView) => {
  const same = () => Promise.resolve(letter)
  const wrapper = mount(LetterFinishedPage, {
    props: {
      letter,
      child,
      pdfUrl: '/pdf',
      busy: false,
      refused: null,
      retrying: null,
      approve: same,
      giveBack: same,
      send: same,
    },
    global: {
      plugins: [PrimeVue],
      stubs: { PageFrame: { template: '<div><slot name="actions" /></div>' }, DayText: true },
    },
  })
  return wrapper
    .findAll('button')
    .map((button) => [button.text(), button.classes('p-button-secondary') ? 'secondary' : 'primary'])
}

describe('sending a finished letter', () => {
  it.each<[string, Record<string, DeliveryState>, string[], string[][]]>([
    ['nobody has it: the next step', {}, ['Mara'], [['Send', 'primary']]],
    ['everybody has it: nothing', { Mara: 'sent' }, ['Mara'], []],
    ['it is on its way to everybody: nothing', { Mara: 'queued', Piet: 'opened' }, ['Mara', 'Piet'], []],
    ['one is left', { Mara: 'opened' }, ['Mara', 'Piet'], [['Send to another carer', 'secondary']]],
    ['the only copy failed: the next step', { Mara: 'failed' }, ['Mara'], [['Send', 'primary']]],
  ])('%s', (_what, copies, carers, buttons) => {
    expect(sendButtons(letterTo(copies, carers))).toEqual(buttons)
  })
})
