import { mount, RouterLinkStub } from '@vue/test-utils'
import { createPinia } from 'pinia'
import { describe, expect, it } from 'vitest'
import HandStatements from '@/components/handProfile/HandStatements.vue'
import InformantsCompared from '@/components/handProfile/InformantsCompared.vue'
import OccasionsCompared from '@/components/handProfile/OccasionsCompared.vue'
import { changeWords, kappaWords, shareWords } from '@/components/handProfile/comparisonWords.ts'
import { countWords } from '@/components/handProfile/profileParts.ts'
import type { HandUseAnswer } from '@shared/handUse.ts'
import type { InformantComparison, InformantPair } from '@shared/informants.ts'
import { agreementOf } from '@shared/kappa.ts'
import type { FormComparison } from '@shared/occasions.ts'
import type { HandStatement } from '@shared/sideStatements.ts'

const tidy = (text: string) => text.replace(/\s+/g, ' ').trim()

const pair = (given: Partial<InformantPair>): InformantPair => ({
  ...agreementOf([]),
  one: 'guardian',
  other: 'teacher',
  discrepancies: 0,
  pointedOut: false,
  note: 'Rough.',
  ...given,
})

const compared = (answers: (HandUseAnswer | null)[][], pairs: InformantPair[]): InformantComparison => ({
  formKey: 'hand-use-10',
  title: 'Hand use in ten everyday activities',
  columns: [
    { responseId: 'g', informant: 'guardian', label: 'Parent or carer', answeredOn: '2026-03-03' },
    { responseId: 't', informant: 'teacher', label: 'Teacher', answeredOn: '2026-03-10' },
  ],
  items: answers.map((given, index) => ({
    id: `item-${index}`,
    label: `Activity ${index + 1}`,
    answers: given,
    differs: given.includes('left') && given.includes('right'),
  })),
  pairs,
  caution: null,
})
const table = (comparison: InformantComparison) =>
  mount(InformantsCompared, {
    props: { childId: 'kit', comparison },
    global: { plugins: [createPinia()], stubs: { RouterLink: RouterLinkStub } },
  })

describe('the words of an agreement', () => {
  // Wilson's interval of 6 of 9 is 0.354 to 0.879 (formula from memory); kappa of the worked example in
  // shared/kappa.ts is .6757, .5317 to .8196.
  it('never gives a percentage without its number and interval', () => {
    const six = agreementOf([
      ...Array.from({ length: 6 }, () => ['left', 'left'] as const),
      ...Array.from({ length: 3 }, () => ['left', 'right'] as const),
    ])
    expect(shareWords(six)).toBe('Agree on 6 of 9: 67% (95% interval 35% to 88%)')
  })

  it('gives kappa with its interval, and a true minus sign', () => {
    expect(
      kappaWords({ ...agreementOf([]), kappa: -0.1234, kappaInterval: { low: -0.4, high: 0.156 } }),
    ).toBe('Cohen’s kappa −0.12 (95% interval −0.40 to 0.16)')
  })

  it('says that nothing can be compared instead of a figure', () => {
    expect(shareWords(agreementOf([]))).toContain('Nothing to compare')
    expect(kappaWords(agreementOf([]))).toBeNull()
  })
})

describe('InformantsCompared', () => {
  it('marks what differs by a sign and a word, and nothing else', () => {
    const rows = table(
      compared(
        [
          ['left', 'right'],
          ['left', 'strong_left'],
          ['either', null],
        ],
        [pair({})],
      ),
    ).findAll('tbody tr')
    expect(rows.map((row) => row.findAll('th, td').map((cell) => tidy(cell.text())))).toEqual([
      ['Activity 1', 'Left, mostly', 'Right, mostly', '≠ Differs'],
      ['Activity 2', 'Left, mostly', 'Left, always', ''],
      ['Activity 3', 'Either hand', 'Not answered', ''],
    ])
  })

  it('flags three differences or more and opens the table, and leaves fewer folded away', () => {
    const flagged = table(
      compared([['left', 'right']], [pair({ compared: 9, agreed: 6, discrepancies: 3, pointedOut: true })]),
    )
    expect(tidy(flagged.get('.pairs li').text())).toContain(
      'Parent or carer and teacher differ on 3 of 9 activities. Three or more: ask about them',
    )
    expect(flagged.get('details').attributes('open')).toBeDefined()
    const calm = table(compared([['left', 'right']], [pair({ compared: 9, agreed: 7, discrepancies: 2 })]))
    expect(calm.find('.flag').exists()).toBe(false)
    expect(calm.get('details').attributes('open')).toBeUndefined()
  })
})

describe('HandStatements', () => {
  const said = (kind: HandStatement['kind'], text: string, because: string | null = null) => ({
    kind,
    text,
    because,
    rowIds: [],
  })

  it('says what agrees, then what differs and why that may be ordinary, then what cannot be told', () => {
    const wrapper = mount(HandStatements, {
      props: {
        statements: [
          said('open', 'Reaching was not recorded yet.'),
          said('differs', 'The foot is right.', 'Sides that differ are ordinary.'),
          said('agrees', 'Both forms point to the left hand.'),
        ],
      },
    })
    expect(wrapper.findAll('h3').map((heading) => tidy(heading.text()))).toEqual([
      'What agrees',
      'What differs',
      'What cannot be told yet',
    ])
    expect(wrapper.findAll('.because').map((why) => why.text())).toEqual(['Sides that differ are ordinary.'])
  })

  it('leaves out a heading that would stand over nothing', () => {
    const wrapper = mount(HandStatements, { props: { statements: [said('agrees', 'All left.')] } })
    expect(wrapper.findAll('h3')).toHaveLength(1)
  })
})

describe('OccasionsCompared', () => {
  const form: FormComparison = {
    formKey: 'hand-use-10',
    title: 'Hand use in ten everyday activities',
    informant: 'guardian',
    informantLabel: 'Parent or carer',
    before: { responseId: 'old', on: '2025-09-01', value: -20 },
    after: { responseId: 'new', on: '2026-03-03', value: -60 },
    items: [
      { id: 'a', label: 'Throws', before: 'right', after: 'left', change: 'changed' },
      { id: 'b', label: 'Eats', before: 'left', after: 'left', change: 'same' },
    ],
    counts: { same: 1, firmer: 0, changed: 1, newly: 0, no_longer: 0, neither: 0 },
    reliable: { used: false, why: 'Reliable change is not worked out for the quotient.', cautions: [] },
    caution: null,
  }

  it('counts what changed and leaves out what did not happen', () => {
    expect(changeWords(form)).toBe('1 same · 1 another answer')
  })

  it('shows both occasions item by item and says once why no change is called reliable', () => {
    const wrapper = mount(OccasionsCompared, {
      props: { forms: [form, { ...form, informant: 'teacher' }], measures: [] },
    })
    const rows = wrapper.get('table').findAll('tbody tr')
    expect(rows.map((row) => row.findAll('th, td').map((cell) => tidy(cell.text())))).toEqual([
      ['Throws', 'Right, mostly', 'Left, mostly', '≠ Another answer'],
      ['Eats', 'Left, mostly', 'Left, mostly', 'Same'],
    ])
    expect(wrapper.findAll('.notes li').map((note) => note.text())).toEqual([form.reliable.why])
  })
})

describe('countWords', () => {
  const closed = { lockedAt: '2026-03-03T10:00:00Z', replacedById: null }
  it.each([
    [[], 'none'],
    [[closed, closed], '2'],
    [[closed, { lockedAt: null, replacedById: null }], '2, 1 in draft'],
    [[closed, { ...closed, replacedById: 'newer' }], '1'],
  ] as const)('says how many hold: %j is %s', (all, words) => {
    expect(countWords(all)).toBe(words)
  })
})
