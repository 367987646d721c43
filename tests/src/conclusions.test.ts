import { enableAutoUnmount, flushPromises, mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { createMemoryHistory, createRouter } from 'vue-router'
import { conclusionsApi } from '@/api/conclusions.ts'
import ConclusionDraftPage from '@/components/conclusions/ConclusionDraftPage.vue'
import ConclusionSignedPage from '@/components/conclusions/ConclusionSignedPage.vue'
import EvidencePicker from '@/components/conclusions/EvidencePicker.vue'
import {
  differingParts,
  evidenceGroups,
  lostEvidence,
  withEvidence,
} from '@/components/conclusions/conclusionDraft.ts'
import { currentConclusion } from '@/components/handProfile/profileParts.ts'
import { routes } from '@/router/routes.ts'
import type { ChildHeader } from '@shared/children.ts'
import {
  emptyConclusion,
  type ConclusionCheck,
  type ConclusionContent,
  type ConclusionView,
  type EvidenceChoice,
} from '@shared/conclusions.ts'
import { fakeWire, refusal, type SentRequest } from '../support/wire.ts'

enableAutoUnmount(afterEach)

const child: ChildHeader = {
  id: 'kit',
  recordNumber: 'FF-2026-0001',
  name: 'Kit Marlow',
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
  state: 'assessing',
  therapist: 'Hedda Holder',
  alerts: [],
  emergencyText: null,
  correctedAge: null,
  sections: ['hand-profile'],
  namesake: false,
  can: { writeNote: true, startLetter: true },
}
const view = (given: Partial<ConclusionView>): ConclusionView => ({
  id: 'c1',
  childId: 'kit',
  author: 'Hedda Holder',
  state: 'draft',
  content: { ...emptyConclusion },
  evidence: null,
  signedAt: null,
  countersignedAt: null,
  countersignedBy: null,
  replacesId: null,
  replacedById: null,
  version: 1,
  can: { change: true, sign: true, countersign: false, replace: false, discard: true, report: false },
  ...given,
})
const reached: EvidenceChoice = {
  kind: 'measure',
  id: 'reach',
  words: 'Reaching across the midline, 3 Mar 2026: 14 left, 7 right',
  on: '2026-03-03',
}
const answered: EvidenceChoice = {
  kind: 'questionnaire',
  id: 'answers',
  words: 'Hand use in ten everyday activities, 1 Mar 2026: −88.2',
  on: '2026-03-01',
}
const written: ConclusionContent = {
  ...emptyConclusion,
  handPreference: 'left_settled',
  confidence: 'high',
  evidence: [
    { kind: 'measure', id: 'reach' },
    { kind: 'questionnaire', id: 'answers' },
  ],
  strengths: 'Draws birds with care.',
  mattersToChild: 'Wants to finish a page.',
  reasoning: 'Asked and seen agree.',
  plan: 'advice',
}
const checked = (given: Partial<ConclusionCheck> = {}): ConclusionCheck => ({
  evidenceChoices: [reached, answered],
  contradictions: [],
  missing: {},
  findings: [],
  unfinished: [],
  warningSigns: [],
  ...given,
})

/** A server with one draft and one answer to "what does the record say". */
function server(start: ConclusionContent, check: () => ConclusionCheck | 'cut') {
  let stored = view({ content: start })
  const signed: unknown[] = []
  const { sent } = fakeWire((request: SentRequest) => {
    if (request.path.endsWith('/check')) {
      const answer = check()
      return answer === 'cut' ? 'cut' : { status: 200, body: answer }
    }
    if (request.headers.get('If-Match') !== `"${stored.version}"`)
      return refusal(409, 'stale', { current: stored })
    if (request.path.endsWith('/sign')) {
      signed.push(request.body)
      return { status: 200, body: view({ state: 'signed', version: stored.version + 1 }) }
    }
    stored = { ...stored, content: request.body as ConclusionContent, version: stored.version + 1 }
    return { status: 200, body: stored }
  })
  return { sent, signed }
}

async function openDraft(start: ConclusionContent, check: () => ConclusionCheck | 'cut' = () => checked()) {
  const wire = server(start, check)
  const router = createRouter({ history: createMemoryHistory(), routes })
  const page = mount(ConclusionDraftPage, {
    attachTo: document.body,
    props: {
      conclusion: view({ content: start }),
      child,
      save: (content, version) => conclusionsApi.save('kit', 'c1', content, version),
      check: () => conclusionsApi.check('kit', 'c1'),
      sign: (signature, version) => conclusionsApi.sign('kit', 'c1', signature, version),
      refused: null,
    },
    global: { plugins: [createPinia(), PrimeVue, router] },
  })
  await flushPromises()
  const press = async (label: string) => {
    const button = page.findAll('button').find((one) => one.text() === label)
    if (!button) throw new Error(`There is no button “${label}”`)
    await button.trigger('click')
    await flushPromises()
  }
  return { page, press, ...wire }
}
const titles = (page: Awaited<ReturnType<typeof openDraft>>['page']) =>
  page.findAll('h2').map((heading) => heading.text())

describe('a conclusion before it is signed', () => {
  it('lists what is missing, strengths among it, and opens no signature', async () => {
    const { page, press, signed } = await openDraft({ ...written, strengths: '  ', reasoning: null })
    await press('Sign')
    expect(page.get('.summary').text()).toContain('strengths come first')
    expect(page.findAll('.field-error').map((error) => error.text())).toHaveLength(2)
    expect(titles(page)).not.toContain('Sign the conclusion')
    expect(signed).toEqual([])
  })

  it('shows every disagreement beside the fields and wants an answer to them before the signature', async () => {
    const words = 'What was answered points to the left hand and reaching to the right.'
    const { page, press } = await openDraft(written, () => checked({ contradictions: [words] }))
    expect(page.get('.disagreements').text()).toBe(words)
    await press('Sign')
    expect(page.get('#field-aboutDisagreements-error').text()).toContain('disagreements')
    expect(titles(page)).not.toContain('Sign the conclusion')
    await page.get('#field-aboutDisagreements').setValue('The cards lay nearer the right hand.')
    await press('Sign')
    expect(titles(page)).toContain('Sign the conclusion')
    expect(page.get('form').text()).toContain('One, answered in the text')
  })

  it('asks the record again at the moment of signing: what was locked meanwhile counts', async () => {
    let later: string[] = []
    const { page, press } = await openDraft(written, () => checked({ contradictions: later }))
    expect(page.find('.disagreements').exists()).toBe(false)
    later = ['Two questionnaires point to different hands.']
    await press('Sign')
    expect(page.get('.disagreements').text()).toBe(later[0])
    expect(titles(page)).not.toContain('Sign the conclusion')
  })

  it('does not open the signature while the record cannot be read, and says so', async () => {
    const { page, press } = await openDraft(written, () => 'cut')
    await press('Sign')
    expect(page.get('.beside').text()).toContain('The record could not be compared')
    expect(titles(page)).not.toContain('Sign the conclusion')
  })

  it('points to what was begun and not locked', async () => {
    const { page, press } = await openDraft(written, () =>
      checked({ unfinished: [{ kind: 'measure', id: 'pegs', words: 'Moving pegs, begun for 3 Mar 2026' }] }),
    )
    await press('Sign')
    expect(page.get('[role="alert"]').text()).toContain('begun and is not signed yet')
    expect(page.get('a[href="/children/kit/measures/pegs"]').text()).toBe('Moving pegs, begun for 3 Mar 2026')
    expect(titles(page)).not.toContain('Sign the conclusion')
  })

  it('does not open the signature while a warning sign waits, and leads to where it is acted on', async () => {
    const sign = 'It is reported that a skill has been lost.'
    const { page, press } = await openDraft(written, () => checked({ warningSigns: [sign] }))
    await press('Sign')
    expect(page.get('[role="alert"]').text()).toContain('A warning sign comes first')
    const first = page.get('section[aria-labelledby="signs-title"]')
    expect(first.text()).toContain(sign)
    expect(first.get('a').attributes('href')).toBe('/children/kit/glance')
    expect(titles(page)).not.toContain('Sign the conclusion')
  })

  it('refuses a plan that would have the child change hands, in words beside the plan', async () => {
    const { page, press } = await openDraft({
      ...written,
      planDetail: 'Teach her to write with the right hand.',
    })
    await press('Sign')
    expect(page.get('#field-planDetail-error').text()).toContain('do not advise changing the hand')
    expect(titles(page)).not.toContain('Sign the conclusion')
  })

  it('signs only after the tick, with the version last saved', async () => {
    const { page, press, sent, signed } = await openDraft(written)
    await page.get('#field-planDetail').setValue('Left-handed scissors for school.')
    await press('Sign')
    await page.get('form').trigger('submit')
    await vi.waitFor(() =>
      expect(page.get('form').text()).toContain('Confirm that you have read the conclusion'),
    )
    expect(signed).toEqual([])
    await page.get('form input[type="checkbox"]').setValue(true)
    await page.get('form').trigger('submit')
    await vi.waitFor(() => expect(signed).toEqual([{ confirmed: true }]))
    expect(sent.at(-1)?.headers.get('If-Match')).toBe('"2"')
    await vi.waitFor(() => expect(page.emitted('signed')).toHaveLength(1))
  })

  it('closes the signature when a word is changed after it was opened', async () => {
    const { page, press } = await openDraft(written)
    await press('Sign')
    expect(titles(page)).toContain('Sign the conclusion')
    await page.get('#field-reasoning').setValue('Asked and seen agree, twice.')
    expect(titles(page)).not.toContain('Sign the conclusion')
  })
})

describe('evidence', () => {
  it('stands by kind, newest first', () => {
    const older = { ...reached, id: 'older', on: '2025-03-03' }
    expect(
      evidenceGroups([older, answered, reached]).map(({ label, choices }) => [
        label,
        choices.map(({ id }) => id),
      ]),
    ).toEqual([
      ['Questionnaires', ['answers']],
      ['Measures', ['reach', 'older']],
    ])
  })

  it('keeps everything seen on one day together; only what is older is folded away', () => {
    const seen = ['2026-03-03', '2026-03-02', '2026-03-02', '2026-03-02', '2026-03-02', '2026-03-01']
    const choices = seen.map((on, n) => ({ ...reached, id: `m${n}`, words: `Measure ${n}`, on }))
    const picker = mount(EvidencePicker, {
      props: { choices, modelValue: [] },
      global: { plugins: [PrimeVue] },
    })
    expect(picker.findAll('details label').map((label) => label.text())).toEqual(['Measure 5'])
    expect(picker.findAll('label').filter((label) => label.text().startsWith('Measure'))).toHaveLength(6)
  })

  it('is never chosen twice, and can be let go', () => {
    const once = withEvidence([], reached, true)
    expect(withEvidence(once, reached, true)).toEqual([{ kind: 'measure', id: 'reach' }])
    expect(withEvidence(once, reached, false)).toEqual([])
  })

  it('says which chosen piece is no longer in the record', () => {
    expect(lostEvidence([answered, { kind: 'measure', id: 'gone' }], [reached, answered])).toEqual([
      { kind: 'measure', id: 'gone' },
    ])
  })
})

describe('two people write one conclusion', () => {
  it('shows only the parts that differ, evidence in words', () => {
    const theirs: ConclusionContent = { ...written, evidence: [answered], reasoning: 'Seen twice.' }
    expect(differingParts(written, theirs, [reached, answered])).toEqual([
      {
        label: 'What it rests on',
        mine: `${answered.words}\n${reached.words}`,
        theirs: answered.words,
      },
      { label: 'How the conclusion was reached', mine: 'Asked and seen agree.', theirs: 'Seen twice.' },
    ])
  })
})

describe('a conclusion that is closed', () => {
  const closed = (given: Partial<ConclusionView>) =>
    mount(ConclusionSignedPage, {
      props: {
        conclusion: view({ state: 'signed', content: written, signedAt: '2026-03-04T10:00:00Z', ...given }),
        child,
        reportUrl: '/api/children/kit/conclusions/c1/report.pdf',
        replacing: false,
        refused: null,
        countersign: () => Promise.resolve(view({})),
      },
      global: {
        plugins: [createPinia(), PrimeVue, createRouter({ history: createMemoryHistory(), routes })],
      },
    })
  const can = {
    change: false,
    sign: false,
    countersign: false,
    replace: false,
    discard: false,
    report: false,
  }

  it('offers no field to write in, strengths first', () => {
    const page = closed({ can: { ...can, report: true, replace: true } })
    expect(page.findAll('textarea, input')).toEqual([])
    expect(page.findAll('h2')[0]?.text()).toBe('What goes well')
    expect(page.get('.file-link').attributes('href')).toBe('/api/children/kit/conclusions/c1/report.pdf')
  })

  it('says that it waits, and for whom it is not yet a conclusion', () => {
    const page = closed({ state: 'awaiting_countersignature', can: { ...can, countersign: true } })
    expect(page.text()).toContain('Waits for countersignature')
    expect(page.text()).toContain('It counts once an experienced colleague has countersigned it')
    expect(page.findAll('button').map((button) => button.text())).toEqual(['Countersign'])
  })

  it('leads from a replaced one to the one that took its place', () => {
    const page = closed({ replacedById: 'c2', can })
    expect(page.get('a[href="/children/kit/conclusions/c2"]').text()).toContain('took its place')
  })
})

describe('currentConclusion', () => {
  const signed = view({ id: 'now', state: 'signed' })
  it('is the draft before the one that holds, and never a replaced one', () => {
    const replaced = view({ id: 'old', state: 'signed', replacedById: 'now' })
    expect(currentConclusion([replaced, signed])?.id).toBe('now')
    expect(currentConclusion([signed, view({ id: 'draft' })])?.id).toBe('draft')
    expect(currentConclusion([])).toBeNull()
  })
})
