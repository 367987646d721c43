import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import { defineComponent, h, ref } from 'vue'
import QuestionnaireForm from '@/components/questionnaires/QuestionnaireForm.vue'
import { scoreForm } from '@shared/formScores.ts'
import type { FormAnswers, FormScore } from '@shared/forms.ts'
import { cutOffSets, handUseAnswers, type HandUseAnswer } from '@shared/handUse.ts'
import { startForm } from '../support/startForms.ts'

const letters: Record<string, HandUseAnswer> = {
  SL: 'strong_left',
  L: 'left',
  E: 'either',
  R: 'right',
  SR: 'strong_right',
  N: 'does_not_do',
}
/** 'SL,L,-' gives the answers in the order of the form; '-' is not answered. */
const given = (text: string, key = 'hand-use-10'): FormAnswers => {
  const parts = text.split(',')
  return Object.fromEntries(
    startForm(key).definition.items.map((item, index) => [item.id, letters[parts[index] ?? ''] ?? null]),
  )
}
const nothing = given('')

interface Props {
  key?: string
  locked?: boolean
  shownByChild?: boolean
  cutOffSet?: string
  stored?: FormScore
}

function form(start: FormAnswers, { key = 'hand-use-10', ...props }: Props = {}) {
  const answers = ref<FormAnswers>(start)
  const Host = defineComponent({
    setup: () => () =>
      h(QuestionnaireForm, {
        cutOffSet: 'clinic-40',
        ...props,
        form: startForm(key),
        modelValue: answers.value,
        'onUpdate:modelValue': (value: FormAnswers) => (answers.value = value),
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
    [
      'SR,SR,SR,SR,R,R,R,-,-,-',
      '+100.0 Right',
      'Provisional: fewer than 8 of 10 activities answered (clinic rule)',
      '7 of 10',
    ],
  ])('shows for %s the quotient %s', (answers, figure, standing, answered) => {
    const score = scoreOf(form(given(answers)))
    expect(score.figure).toBe(figure)
    expect(score.facts[0]).toBe(standing)
    expect(score.facts[1]).toContain(answered)
  })

  it('says "not scorable" in words when every activity is one the child does not do', () => {
    const score = scoreOf(form(given('N,N,N,N,N,N,N,N,N,N')))
    expect(score.figure).toBe('not scorable')
    expect(score.facts[0]).toBe('Not scorable: fewer than 6 of 10 activities answered (clinic rule)')
  })

  it('says how many answers are still needed while the form is being filled', () => {
    const score = scoreOf(form(given('L,L,L,L')))
    expect([score.figure, score.facts[0]]).toEqual(['not yet', 'A quotient appears after 6 answers: 2 more'])
    const signed = scoreOf(form(given('L,L,L,L'), { locked: true }))
    expect(signed.figure).toBe('not scorable')
    expect(signed.facts[0]).toMatch(/^Not scorable/)
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

describe('QuestionnaireForm with other forms', () => {
  it('offers the answers of the form in its own words, with a key for each', async () => {
    const page = form(given('', 'ten-task-count'), { key: 'ten-task-count' })
    expect(page.wrapper.findAll('fieldset').length).toBe(10)
    const words = page.wrapper
      .findAll('fieldset')[0]
      ?.findAll('.words')
      .map((label) => label.text())
    expect(words).toEqual(['Left hand', 'Either hand', 'Right hand', 'Does not do this yet'])
    expect(page.wrapper.get('.keys').text()).toContain('Keys 1 to 4')
    await radios(page, 0)[0]?.trigger('keydown', { key: '3' })
    expect(page.answers.value.write).toBe('right')
    await radios(page, 1)[0]?.trigger('keydown', { key: '5' })
    expect(page.answers.value.draw).toBeNull()
  })

  // Worked by hand: eight marks of 3 make 24, 100 (16 − 24) / 8 = −100; L L L L B B L R make 20, so −50.
  it.each([
    ['L,L,L,L,L,L,L,L', '24 on 8 to 24 Left', 'Degree 8 of 8; place on the line −100.0'],
    ['L,L,L,L,E,E,L,R', '20 on 8 to 24 Left', 'Degree 4 of 8; place on the line −50.0'],
  ])('adds up the eight actions a child shows: %s', (answers, figure, degree) => {
    const page = form(given(answers, 'shown-8'), { key: 'shown-8', cutOffSet: 'sign-only' })
    const score = scoreOf(page)
    expect(page.wrapper.get('#score-title').text()).toBe('Sum of the actions shown')
    expect(score.figure).toBe(figure)
    expect(score.facts[2]).toBe(degree)
  })

  it('says what the eight actions still need, and why seven are not enough', () => {
    const started = form(given('L,L,L,L,L', 'shown-8'), { key: 'shown-8' })
    expect(scoreOf(started).facts[0]).toBe('The sum appears after 8 answers: 3 more')
    const never = form(given('L,L,L,L,L,L,L,N', 'shown-8'), { key: 'shown-8' })
    expect(scoreOf(never).facts[0]).toBe('Not scorable: the sum needs all 8 actions, and 7 were seen')
  })

  // Mean of −100, −100 and −50 (values from memory, Veale 2014); one left open is a clinic rule.
  it('gives the mean of the short form and says that it is incomplete', () => {
    const page = form(given('SL,SL,-,L', 'short-4'), { key: 'short-4', cutOffSet: 'sixty' })
    const score = scoreOf(page)
    expect(page.wrapper.get('#score-title').text()).toBe('Mean of the answers')
    expect(score.figure).toBe('−83.3 Left')
    expect(score.facts[0]).toMatch(/^Incomplete: fewer than 4 of 4 activities answered/)
  })

  it('shows a decile for the ten tasks with two marks only, as one of adults and from memory', () => {
    const words = ['SL', 'SL', 'SL', 'SL', 'L', 'L', 'L', 'L', 'L', 'R'].join(',')
    // 100 (1 − 13) / 14 = −85.7: decile 6 of left-handed adults, from memory.
    const page = form(given(words, 'ten-task'), { key: 'ten-task' })
    expect(scoreOf(page).figure).toBe('−85.7 Left')
    expect(scoreOf(page).facts).toContain(
      'Among adults: left decile 6 (adult norms, from memory). It does not place a child.',
    )
    expect(
      scoreOf(form(given('SL,SL,SL,L,L,L,R', 'seven-task'), { key: 'seven-task' })).facts.join(),
    ).not.toMatch(/decile/)
  })

  it('puts a caution beside the activity that needs one, and the words to say where the child shows it', () => {
    const page = form(given('', 'ten-task'), { key: 'ten-task', shownByChild: true })
    const cautioned = page.wrapper.findAll('fieldset').filter((item) => item.find('.caution').exists())
    expect(cautioned.map((item) => item.get('.label').text())).toEqual([
      'Cuts paper with scissors',
      'Cuts something soft with a blunt knife, no fork in the other hand',
      'Sweeps with a broom: which hand is on top',
      'Rubs a stick once, quickly, along the side of a box: which hand moves the stick',
    ])
    expect(page.wrapper.findAll('fieldset')[0]?.get('.say').text()).toBe(
      'Say: “Write your name, or one letter you know.”',
    )
    expect(form(given('', 'ten-task'), { key: 'ten-task' }).wrapper.find('.say').exists()).toBe(false)
  })

  it('shows a signed score as it was signed', () => {
    const answers = given('L,L,L,L,L,L,L,L,L,L')
    const signed = { ...scoreForm(startForm('hand-use-10'), answers, cutOffSets[1]), quotient: -62.5 }
    expect(scoreOf(form(answers, { locked: true, stored: signed })).figure).toBe('−62.5 Left')
  })
})
