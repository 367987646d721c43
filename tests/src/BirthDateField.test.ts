import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import { nextTick } from 'vue'
import BirthDateField from '@/components/ui/BirthDateField.vue'
import { joinTypedDay, splitDay } from '@/components/ui/typedDay.ts'
import { dayProblem } from '@shared/days.ts'

const field = (modelValue: string | null, more: { error?: string; hint?: string } = {}) => {
  const wrapper = mount(BirthDateField, {
    props: {
      label: 'Date of birth',
      name: 'birthDate',
      modelValue,
      'onUpdate:modelValue': (value: string | null) => wrapper.setProps({ modelValue: value }),
      ...more,
    },
    global: { plugins: [PrimeVue] },
  })
  return wrapper
}
const type = async (wrapper: ReturnType<typeof field>, day: string, month: string, year: string) => {
  const boxes = wrapper.findAll('input')
  for (const [index, typed] of [day, month, year].entries()) await boxes[index]!.setValue(typed)
  await nextTick()
}
const typed = (wrapper: ReturnType<typeof field>) => wrapper.findAll('input').map((box) => box.element.value)

describe('a typed day', () => {
  it.each([
    [{ day: '3', month: '3', year: '2018' }, '2018-03-03'],
    [{ day: ' 09 ', month: '12', year: '2016' }, '2016-12-09'],
    [{ day: '1', month: 'Mar', year: '2018' }, '2018-03-01'],
    [{ day: '1', month: 'september', year: '2018' }, '2018-09-01'],
  ])('reads %o as %s', (boxes, day) => {
    expect(joinTypedDay(boxes)).toBe(day)
    expect(dayProblem(day)).toBeNull()
  })

  it('is null, not an empty text, when nothing is typed', () => {
    expect(joinTypedDay({ day: '', month: ' ', year: '' })).toBeNull()
  })

  it.each([
    [{ day: '31', month: '2', year: '2018' }, /February 2018: that month has 28 days/],
    [{ day: '3', month: '13', year: '2018' }, /month 13/],
    [{ day: '3', month: '3', year: '18' }, /needs a day, a month and a year/],
    [{ day: '3', month: '', year: '2018' }, /needs a day, a month and a year/],
    [{ day: '3', month: 'Mrz', year: '2018' }, /needs a day, a month and a year/],
  ])('keeps %o for the check to refuse in words', (boxes, problem) => {
    const joined = joinTypedDay(boxes)
    expect(joined).not.toBeNull()
    expect(dayProblem(joined!)).toMatch(problem)
  })

  it('comes back as it was stored, without leading noughts', () => {
    expect(splitDay('2018-03-09')).toEqual({ day: '9', month: '3', year: '2018' })
    expect(joinTypedDay(splitDay('2018-03-09'))).toBe('2018-03-09')
  })
})

describe('BirthDateField', () => {
  it('gives the form a calendar day when day, month and year are typed', async () => {
    const wrapper = field(null)
    await type(wrapper, '9', '3', '2018')
    expect(wrapper.emitted('update:modelValue')!.at(-1)).toEqual(['2018-03-09'])
  })

  it('keeps an impossible date in its boxes when the form refuses it', async () => {
    const wrapper = field(null)
    await type(wrapper, '31', '2', '2018')
    await wrapper.setProps({ error: 'The date of birth cannot be 31 February 2018' })
    expect(typed(wrapper)).toEqual(['31', '2', '2018'])
    expect(wrapper.text()).toContain('The date of birth cannot be 31 February 2018')
  })

  it('ties label, hint and error to the boxes', () => {
    const wrapper = field('2018-03-09', { error: 'Check the year', hint: 'For example 27 3 2018' })
    expect(wrapper.get('legend').text()).toBe('Date of birth')
    const described = wrapper.get('fieldset').attributes('aria-describedby')!.split(' ')
    expect(described.map((id) => wrapper.get(`#${id}`).text())).toEqual([
      'For example 27 3 2018',
      'Error: Check the year',
    ])
    for (const box of wrapper.findAll('input')) {
      expect(wrapper.find(`label[for="${box.attributes('id')}"]`).exists()).toBe(true)
      expect(box.attributes('aria-invalid')).toBe('true')
    }
  })

  it('shows another day when the form sets one, and empties when the form clears it', async () => {
    const wrapper = field('2018-03-09')
    await wrapper.setProps({ modelValue: '2015-11-30' })
    expect(typed(wrapper)).toEqual(['30', '11', '2015'])
    await wrapper.setProps({ modelValue: null })
    expect(typed(wrapper)).toEqual(['', '', ''])
  })
})
