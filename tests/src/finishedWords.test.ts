import { mount, RouterLinkStub } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import type { Component } from 'vue'
import HistoryList from '@/components/histories/HistoryList.vue'
import MeasureList from '@/components/measures/MeasureList.vue'
import QuestionnaireList from '@/components/questionnaires/QuestionnaireList.vue'
import { emptyHistory, type HistoryInformant, type HistoryView } from '@shared/histories.ts'
import type { QuestionnaireView } from '@shared/questionnaires.ts'
import { answered } from '../support/handEvidence.ts'
import { measureDraft } from '../support/measurePages.ts'

const kept = {
  childId: 'child',
  lockedAt: '2026-03-03T12:00:00.000Z',
  lockedBy: 'Ada Test',
  replacesId: null,
  replacedById: null,
  leftOver: false,
  version: 2,
  can: { change: false, lock: false, discard: false, replace: true },
}
const response = (requestId: string | null): QuestionnaireView => ({
  ...answered('L'),
  ...kept,
  respondentName: null,
  comment: null,
  cutOffSet: 'clinic-40',
  requestId,
})
const history = (informant: HistoryInformant): HistoryView => ({
  ...kept,
  id: `history-${informant}`,
  informant,
  respondentName: null,
  answeredOn: '2026-03-03',
  details: emptyHistory,
  missing: [],
  correctedUntilMonths: 24,
})
const measure = { ...measureDraft('pegs'), ...kept }

describe('what is finished on the hand profile', () => {
  it.each<[string, Component, object, 'Signed' | 'Sent']>([
    ['a measure', MeasureList, { measures: [measure] }, 'Signed'],
    ['a response of staff', QuestionnaireList, { questionnaires: [response(null)] }, 'Signed'],
    ['a response of who was asked', QuestionnaireList, { questionnaires: [response('asked')] }, 'Sent'],
    ['a history written down', HistoryList, { histories: [history('therapist')] }, 'Signed'],
    ['a history of a family', HistoryList, { histories: [history('guardian')] }, 'Sent'],
  ])('says of %s by one word how it was finished', (_, list, props, word) => {
    const text = mount(list, {
      props: { childId: 'child', ...props },
      global: { plugins: [createPinia(), PrimeVue], stubs: { RouterLink: RouterLinkStub } },
    }).text()
    expect(text).toContain(word)
    expect(text).not.toMatch(/Locked|Closed|Draft/)
  })
})

describe('what a family or school has begun', () => {
  const begun = { lockedAt: null, lockedBy: null }
  const shown = (list: Component, props: object) =>
    mount(list, {
      props: { childId: 'child', ...props },
      global: { plugins: [createPinia(), PrimeVue], stubs: { RouterLink: RouterLinkStub } },
    }).text()

  it('stands without a result while it is being answered', () => {
    const text = shown(QuestionnaireList, { questionnaires: [{ ...response('asked'), ...begun }] })
    expect(text).toContain('Being answered')
    expect(text).toContain('10 of 10 answered')
    expect(text).not.toMatch(/Draft|100\.0|, left/)
  })

  it('is called never sent once its request has ended', () => {
    const left = { ...begun, leftOver: true }
    expect(shown(QuestionnaireList, { questionnaires: [{ ...response('asked'), ...left }] })).toContain(
      'Never sent',
    )
    const text = shown(HistoryList, { histories: [{ ...history('guardian'), ...left }] })
    expect(text).toContain('Never sent')
    expect(text).not.toContain('With the family')
  })

  it('shows the result of a draft that staff are writing', () => {
    const text = shown(QuestionnaireList, { questionnaires: [{ ...response(null), ...begun }] })
    expect(text).toContain('Draft')
    expect(text).toContain('100.0, left')
  })
})
