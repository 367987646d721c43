import { mount, RouterLinkStub } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import LateralLine from '@/components/handProfile/LateralLine.vue'
import {
  axisPosition,
  chanceWordsAt,
  lateralGroups,
  sideOf,
  type OpeningRow,
} from '@/components/handProfile/lateralAxis.ts'

const row = (given: Partial<OpeningRow>): OpeningRow => ({
  id: 'a',
  aspect: 'preference',
  track: 'hand-use-10|guardian',
  measure: 'Hand-use questionnaire',
  occasion: '2026-03-03',
  value: -88.2,
  side: 'left',
  interval: null,
  chance: null,
  basis: '10 of 10 activities answered',
  caution: null,
  cutOffs: { name: '40 either side', left: -40, right: 40, inclusive: true },
  informant: 'Parent or carer',
  latest: true,
  source: { kind: 'questionnaire', id: 'a' },
  ...given,
})
const reaching = (given: Partial<OpeningRow>): OpeningRow =>
  row({
    id: 'r',
    aspect: 'reaching',
    track: 'reaching',
    measure: 'Reaching across the midline',
    informant: null,
    cutOffs: null,
    source: { kind: 'measure', id: 'r' },
    ...given,
  })

const picture = (rows: OpeningRow[], childId: string | null = null) =>
  mount(LateralLine, {
    props: { rows, childId },
    global: { plugins: [PrimeVue], stubs: { RouterLink: RouterLinkStub } },
  })
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

describe('lateralGroups', () => {
  it('never puts preference and skill together, whatever order the rows come in', () => {
    const groups = lateralGroups([
      row({ id: 'foot', aspect: 'foot', track: 'foot', measure: 'Foot' }),
      row({ id: 'pegs', aspect: 'skill', track: 'pegs', measure: 'Moving pegs' }),
      reaching({}),
      row({}),
    ])
    expect(groups.map(({ label, tracks }) => [label, tracks.map(({ measure }) => measure)])).toEqual([
      ['Which hand is chosen', ['Hand-use questionnaire', 'Reaching across the midline']],
      ['How well each hand does', ['Moving pegs']],
      ['Foot, eye and ear', ['Foot']],
    ])
  })
})

describe('LateralLine', () => {
  it('stands the mark on its value, draws the whisker to both ends and the bands to both cut-offs', () => {
    const wrapper = picture([row({ value: -20, side: 'middle', interval: { low: -45, high: 10 } })])
    const mark = wrapper.get('.track svg')
    expect(mark.attributes('x')).toBe('40%')
    expect(mark.get('.mark').classes()).toContain('left')
    const whisker = wrapper.get('.whisker .ink.line')
    expect([whisker.attributes('x1'), whisker.attributes('x2')]).toEqual(['27.5%', '55%'])
    expect(wrapper.findAll('.whisker .ink.cap').map((cap) => cap.attributes('x1'))).toEqual(['27.5%', '55%'])
    expect(wrapper.get('.band.left').attributes()).toMatchObject({ x: '0', width: '30%' })
    expect(wrapper.get('.band.right').attributes()).toMatchObject({ x: '70%', width: '30%' })
  })

  it('leaves the cap off where an interval passes the end of the scale: it does not end there', () => {
    const wrapper = picture([row({ value: -90, interval: { low: -112, high: -68 } })])
    const whisker = wrapper.get('.whisker .ink.line')
    expect([whisker.attributes('x1'), whisker.attributes('x2')]).toEqual(['0%', '16%'])
    expect(wrapper.findAll('.whisker .ink.cap').map((cap) => cap.attributes('x1'))).toEqual(['16%'])
  })

  // 21 reaches: 6 to 15 with one hand are within chance (exact sign test), so the index runs from −42.9 to +42.9.
  it('hatches the chance band from limit to limit and says “within chance” in words', () => {
    const wrapper = picture([
      reaching({ value: -4.8, side: 'middle', chance: { low: -42.857, high: 42.857 } }),
    ])
    const band = wrapper.get('.chance .within')
    expect([band.attributes('x'), band.attributes('width')]).toEqual(['28.57%', '42.86%'])
    const hatch = wrapper.get('.chance pattern').attributes('id')
    expect(band.attributes('fill')).toBe(`url(#${hatch})`)
    expect(wrapper.get('.chance text').text()).toBe('within chance')
    expect(wrapper.get('.value').text()).toContain('Within chance')
  })

  it('puts the words of the band into the half that the mark leaves free', () => {
    const chance = { low: -40, high: 40 }
    expect(chanceWordsAt(chance, -10)).toBe(60)
    expect(chanceWordsAt(chance, 10)).toBe(40)
    expect(chanceWordsAt(chance, -70)).toBe(50)
  })

  it('draws an earlier occasion lighter, under the newest', () => {
    const wrapper = picture([
      row({ id: 'new', value: -60 }),
      row({ id: 'old', value: -20, side: 'middle', occasion: '2025-09-01', latest: false }),
    ])
    expect(wrapper.findAll('.track .mark').map((mark) => mark.classes('earlier'))).toEqual([true, false])
    expect(wrapper.findAll('.track svg').map((mark) => mark.attributes('x'))).toEqual(['40%', '20%'])
  })

  it('says every figure in the table, with side, interval or chance, basis and caution', () => {
    const wrapper = picture([
      row({
        value: 6.7,
        side: 'middle',
        interval: { low: -12, high: 25.4 },
        basis: '7 of 10 activities answered',
        caution: 'Provisional: fewer than 8 answered',
      }),
      reaching({
        value: -61.9,
        chance: { low: -42.857, high: 42.857 },
        basis: '21 of 21 reaches counted',
      }),
      row({
        id: 'b',
        aspect: 'foot',
        track: 'foot',
        measure: 'Foot',
        informant: null,
        value: 0,
        side: 'middle',
        cutOffs: null,
        basis: '3 actions shown',
      }),
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
      [
        'Reaching across the midline',
        '3 Mar 2026',
        '−61.9',
        'Left',
        'Chance: −42.9 to +42.9',
        '21 of 21 reaches counted',
      ],
      ['Foot', '3 Mar 2026', '0.0', 'Mixed', 'None given', '3 actions shown'],
    ])
  })

  it('says a measure that cannot be scored in words and draws no mark for it', () => {
    const wrapper = picture([row({ value: null, side: null, caution: 'fewer than 6 answered' })])
    expect(wrapper.findAll('.track .mark')).toEqual([])
    expect(wrapper.get('.unscored').text()).toBe('Not scorable: fewer than 6 answered')
    expect(cells(wrapper)[0]?.slice(2, 4)).toEqual(['None', 'Not scorable'])
  })

  it('opens a figure down to raw answers, the formula with figures, the rule and the source', () => {
    const opens = {
      formula: '100 × (R − L) ÷ (R + L)',
      worked: '100 × (1 − 16) ÷ (1 + 16) = −88.2',
      raw: [{ label: 'Throws a small ball', value: 'Left, always' }],
      sideRule: '40 either side: left up to −40.0',
      citation: 'Oldfield 1971',
      cautions: ['No child norms are claimed.'],
    }
    const details = picture([row({ opens })], 'kit').get('details.measure-row')
    expect(details.get('summary').text()).toContain('Hand-use questionnaire')
    for (const words of [
      'Throws a small ball',
      'Left, always',
      opens.worked,
      opens.sideRule,
      'Oldfield 1971',
    ])
      expect(details.text()).toContain(words)
    expect(details.getComponent(RouterLinkStub).props('to')).toEqual({
      name: 'questionnaire',
      params: { childId: 'kit', questionnaireId: 'a' },
    })
  })

  it('opens nothing where a page only shows the line', () => {
    expect(
      picture([row({})])
        .find('details')
        .exists(),
    ).toBe(false)
  })
})
