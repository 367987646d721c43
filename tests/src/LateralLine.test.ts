import { mount } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import LateralLine from '@/components/handProfile/LateralLine.vue'
import { axisPosition, sideOf, tracksOf } from '@/components/handProfile/lateralAxis.ts'
import type { LateralLineRow } from '@shared/lateralLine.ts'

const row = (given: Partial<LateralLineRow>): LateralLineRow => ({
  id: 'a',
  measure: 'Hand-use questionnaire',
  occasion: '2026-03-03',
  value: -88.2,
  interval: null,
  basis: '10 of 10 activities answered',
  caution: null,
  cutOffs: { name: '40 either side', left: -40, right: 40, inclusive: true },
  informant: 'Parent or carer',
  latest: true,
  ...given,
})

const picture = (rows: LateralLineRow[]) => mount(LateralLine, { props: { rows } })
const cells = (wrapper: ReturnType<typeof picture>) =>
  wrapper
    .findAll('tbody tr')
    .map((line) => line.findAll('th, td').map((cell) => cell.text().replace(/\s+/g, ' ')))

describe('the axis', () => {
  // Arithmetic of a line from −100 at 0 % to +100 at 100 %: (value + 100) / 2.
  it.each([
    [-100, 0],
    [-88.2, 5.9],
    [-40, 30],
    [0, 50],
    [6.7, 53.35],
    [40, 70],
    [100, 100],
  ])('puts %d at %d %%', (value, percent) => {
    expect(axisPosition(value)).toBe(percent)
  })

  it('keeps the end of an interval that passes the end of the scale on the scale', () => {
    expect([axisPosition(-120), axisPosition(130)]).toEqual([0, 100])
  })

  it('points a mark by the sign alone and gives zero no side', () => {
    expect([-0.1, 0, 0.1].map(sideOf)).toEqual(['left', 'neither', 'right'])
  })
})

describe('tracksOf', () => {
  it('keeps what a parent and what a teacher answered apart, newest occasion first', () => {
    const tracks = tracksOf([
      row({ id: 'old', occasion: '2025-09-01', latest: false }),
      row({ id: 'teacher', informant: 'Teacher' }),
      row({ id: 'new' }),
    ])
    expect(tracks.map((track) => [track.informant, track.rows.map(({ id }) => id)])).toEqual([
      ['Parent or carer', ['new', 'old']],
      ['Teacher', ['teacher']],
    ])
  })
})

describe('LateralLine', () => {
  it('stands the mark on its value, draws the whisker to both ends and the bands to both cut-offs', () => {
    const wrapper = picture([row({ value: -20, interval: { low: -45, high: 10 } })])
    const mark = wrapper.get('.track svg')
    expect(mark.attributes('x')).toBe('40%')
    expect(mark.get('.mark').classes()).toContain('left')
    const whisker = wrapper.get('.whisker line')
    expect([whisker.attributes('x1'), whisker.attributes('x2')]).toEqual(['27.5%', '55%'])
    expect(wrapper.get('.band.left').attributes()).toMatchObject({ x: '0', width: '30%' })
    expect(wrapper.get('.band.right').attributes()).toMatchObject({ x: '70%', width: '30%' })
  })

  it('draws an earlier occasion lighter, under the newest', () => {
    const wrapper = picture([
      row({ id: 'new', value: -60 }),
      row({ id: 'old', value: -20, occasion: '2025-09-01', latest: false }),
    ])
    expect(wrapper.findAll('.mark').map((mark) => mark.classes('earlier'))).toEqual([true, false])
    expect(wrapper.findAll('.track svg').map((mark) => mark.attributes('x'))).toEqual(['40%', '20%'])
  })

  it('says every figure in the table, with side, interval, basis and caution', () => {
    const wrapper = picture([
      row({
        value: 6.7,
        interval: { low: -12, high: 25.4 },
        basis: '7 of 10 activities answered',
        caution: 'Provisional: fewer than 8 answered',
      }),
      row({ id: 'b', measure: 'Foot', informant: null, value: 0, cutOffs: null, basis: '9 actions' }),
    ])
    expect(cells(wrapper)).toEqual([
      [
        'Hand-use questionnaire, Parent or carer',
        '3 Mar 2026',
        '+6.7',
        'Mixed',
        '−12.0 to +25.4',
        '7 of 10 activities answered. Provisional: fewer than 8 answered',
      ],
      ['Foot', '3 Mar 2026', '0.0', 'Neither side', 'None given', '9 actions'],
    ])
  })

  it('says a measure that cannot be scored in words and draws no mark for it', () => {
    const wrapper = picture([row({ value: null, caution: 'fewer than 6 answered' })])
    expect(wrapper.findAll('.mark')).toEqual([])
    expect(wrapper.get('.unscored').text()).toBe('Not scorable: fewer than 6 answered')
    expect(cells(wrapper)[0]?.slice(2, 4)).toEqual(['None', 'Not scorable'])
  })

  it('calls a quotient exactly on an exclusive cut-off mixed, as the scoring does', () => {
    const wrapper = picture([
      row({
        value: 0,
        cutOffs: { name: 'Left below zero, right above', left: 0, right: 0, inclusive: false },
      }),
    ])
    expect(cells(wrapper)[0]?.[3]).toBe('Mixed')
  })
})
