import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import { defineComponent, h, ref } from 'vue'
import QuestionnaireForm from '@/components/questionnaires/QuestionnaireForm.vue'
import { handUseAnswers, handUseFormV1, type HandUseAnswer } from '@shared/handUse.ts'
import type { HandUseAnswers } from '@shared/questionnaires.ts'

const letters: Record<string, HandUseAnswer> = {
  SL: 'strong_left',
  L: 'left',
  E: 'either',
  R: 'right',
  SR: 'strong_right',
  N: 'does_not_do',
}
/** 'SL,L,-' gives the answers in the order of the form; '-' is not answered. */
const given = (text: string): HandUseAnswers => {
  const parts = text.split(',')
  return Object.fromEntries(
    handUseFormV1.items.map((item, index) => [item.id, letters[parts[index] ?? ''] ?? null]),
  )
}
const nothing = given('')

function form(start: HandUseAnswers, props: { locked?: boolean } = {}) {
  const answers = ref<HandUseAnswers>(start)
  const Host = defineComponent({
    setup: () => () =>
      h(QuestionnaireForm, {
        ...props,
        cutOffSet: 'clinic-40',
        modelValue: answers.value,
        'onUpdate:modelValue': (value: HandUseAnswers) => (answers.value = value),
      }),
  })
  const wrapper = mount(Host, { attachTo: document.body, global: { plugins: [PrimeVue] } })
  return { wrapper, answers }
}
const scoreOf = ({ wrapper }: ReturnType<typeof form>) => ({
  figure: wrapper.get('.figure').text().replace(/\s+/g, ' '),
  facts: wrapper.findAll('.score .words li').map((line) => line.text()),
})
const radios = ({ wrapper }: ReturnType<typeof form>, index: number) =>
  wrapper.findAll('fieldset')[index]?.findAll<HTMLInputElement>('input') ?? []

describe('QuestionnaireForm', () => {
  it('offers six answers to each of ten activities', () => {
    const page = form(nothing)
    expect(page.wrapper.findAll('fieldset').length).toBe(10)
    for (let index = 0; index < 10; index += 1) expect(radios(page, index).length).toBe(6)
  })

  // Worked by hand from 100 (R − L) / (R + L), points 0/2, 0/1, 1/1, 1/0, 2/0 (Oldfield 1971).
  it.each([
    ['SL,SL,SL,SL,SL,SL,L,L,L,E', '−88.2 Left', 'Scorable', '10 of 10 activities answered'],
    ['SL,SL,L,L,E,E,R,R,SR,L', '−20.0 Mixed', 'Scorable', '10 of 10 activities answered'],
    [
      'SL,SL,SL,L,E,N,N,L,R,L',
      '−66.7 Left',
      'Scorable',
      '8 of 10 activities answered; 2 not done yet, left out',
    ],
    ['E,E,E,E,E,E,E,E,E,E', '0.0 Mixed', 'Scorable', '10 of 10 activities answered'],
    ['SR,SR,SR,SR,R,R,R,-,-,-', '+100.0 Right', 'Provisional: fewer than 8 activities answered', '7 of 10'],
  ])('shows for %s the quotient %s', (answers, figure, standing, answered) => {
    const score = scoreOf(form(given(answers)))
    expect(score.figure).toBe(figure)
    expect(score.facts[0]).toBe(standing)
    expect(score.facts[1]).toContain(answered)
  })

  it('says "not scorable" in words when every activity is one the child does not do', () => {
    const score = scoreOf(form(given('N,N,N,N,N,N,N,N,N,N')))
    expect(score.figure).toBe('not scorable')
    expect(score.facts[0]).toBe('Not scorable: fewer than 6 activities answered')
  })

  it('says how many answers are still needed while the form is being filled', () => {
    expect(scoreOf(form(given('L,L,L,L'))).facts[0]).toBe('A quotient appears after 6 answers: 2 more')
  })

  it('gives strength as the share of "always", apart from the quotient', () => {
    expect(scoreOf(form(given('SL,SL,L,L,L,L,L,L,L,L'))).facts[2]).toBe(
      '20% of the answers that name a side are “always”',
    )
  })

  it('answers with a number key and moves to the next activity', async () => {
    const page = form(nothing)
    await radios(page, 0)[0]?.trigger('keydown', { key: '2' })
    await page.wrapper.vm.$nextTick()
    expect(page.answers.value.draws_writes).toBe(handUseAnswers[1])
    expect(document.activeElement).toBe(radios(page, 1)[0]?.element)
  })

  it('takes an answer back with 0, which is "not answered" and not "either"', async () => {
    const page = form(given('L,L,L,L,L,L,L,L,L,L'))
    await radios(page, 9)[1]?.trigger('keydown', { key: '0' })
    expect(page.answers.value.taps_screen).toBeNull()
    expect(scoreOf(page).facts[1]).toBe('9 of 10 activities answered; 1 still open')
  })

  it('counts again when one answer changes', async () => {
    const page = form(given('L,L,L,L,L,L,L,L,L,L'))
    expect(scoreOf(page).figure).toBe('−100.0 Left')
    await radios(page, 0)[3]?.setValue(true)
    expect(scoreOf(page).figure).toBe('−80.0 Left')
  })

  it('takes no answer once it is locked', async () => {
    const page = form(given('L,L,L,L,L,L,L,L,L,L'), { locked: true })
    await radios(page, 0)[1]?.trigger('keydown', { key: '5' })
    expect(page.answers.value.draws_writes).toBe('left')
    expect(radios(page, 0).every((radio) => radio.element.disabled)).toBe(true)
  })
})
