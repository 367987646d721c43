import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { handProfileOf, handProfileRows, withoutDetails } from '../../shared/handProfile.ts'
import { measureRows } from '../../shared/measureRows.ts'
import { questionnaireRows } from '../../shared/questionnaireRows.ts'
import { answered, formNamed, measured, sidesDetails } from '../support/handEvidence.ts'
import { pegsDetails, reachingDetails, trial } from '../support/measures.ts'

/** Six strong left, three left, one either: right 1, left 16, the clinic's first check value (−88.2). */
const settled = 'LL LL LL LL LL LL L L L B'

describe('rows of questionnaires', () => {
  it('give the quotient with what it rests on, who answered and the cut-offs it was called by', () => {
    const [row] = questionnaireRows([answered(settled, { cutOffs: 'sixty' })])
    expect(row).toMatchObject({
      aspect: 'preference',
      measure: 'Hand use in ten everyday activities',
      occasion: '2026-03-03',
      side: 'left',
      interval: null,
      chance: null,
      basis: '10 of 10 activities answered',
      caution: null,
      cutOffs: { left: -60, right: 60, inclusive: false },
      informant: 'Parent or carer',
      latest: true,
      source: { kind: 'questionnaire' },
    })
    expect(row?.value).toBeCloseTo(-88.2, 1)
  })

  it('open to the formula with the child’s figures, every answer, the cut-offs and the citation', () => {
    const [row] = questionnaireRows([answered('LL L B R RR N - L L L')])
    expect(row?.opens.worked).toMatch(/^100 × \(\d+ − \d+\) ÷ \(\d+ \+ \d+\) = [−+]\d/)
    expect(row?.opens.raw.map(({ value }) => value)).toEqual([
      'Left, always',
      'Left, mostly',
      'Either hand',
      'Right, mostly',
      'Right, always',
      'Does not do this yet',
      'Not answered',
      'Left, mostly',
      'Left, mostly',
      'Left, mostly',
    ])
    expect(row?.opens.sideRule).toContain('−40.0')
    expect(row?.opens.citation).toContain('Oldfield 1971')
    expect(row?.opens.cautions.length).toBeGreaterThan(0)
  })

  it.each([
    [
      '7 answered',
      `${'L '.repeat(7)}N N N`,
      '7 of 10 activities answered, 3 not done yet',
      /^Provisional/,
      false,
    ],
    [
      '5 answered',
      `${'L '.repeat(5)}N N N N N`,
      '5 of 10 activities answered, 5 not done yet',
      /^Not scorable/,
      true,
    ],
    ['none done yet', 'N', '0 of 10 activities answered, 10 not done yet', /^Not scorable/, true],
  ])('warn when only some were answered: %s', (_what, text, basis, caution, empty) => {
    const [row] = questionnaireRows([answered(text)])
    expect(row?.basis).toBe(basis)
    expect(row?.caution).toMatch(caution)
    expect(row?.value === null).toBe(empty)
    expect(row?.side === null).toBe(empty)
    expect(row?.opens.worked === null).toBe(empty)
  })

  it('mark only the newest occasion of a track, and of one day the one locked last', () => {
    const [late, early, old] = [
      answered(settled, { lockedAt: '2026-03-05T09:00:00.000Z' }),
      answered(settled),
      answered(settled, { answeredOn: '2025-03-03' }),
    ]
    expect(questionnaireRows([old, late, early]).map(({ id, latest }) => [id, latest])).toEqual([
      [late.id, true],
      [early.id, false],
      [old.id, false],
    ])
  })

  it('keep each form and each informant on a track of its own', () => {
    const rows = questionnaireRows([
      answered(settled),
      answered('L', { informant: 'teacher', answeredOn: '2025-11-01' }),
      answered('R', { form: formNamed('short-4'), answeredOn: '2025-10-01' }),
    ])
    expect(new Set(rows.map(({ track }) => track)).size).toBe(3)
    expect(rows.every(({ latest }) => latest)).toBe(true)
  })
})

describe('rows of measures', () => {
  const byPlace = (lefts: number[]) => {
    const used = new Map<number, number>()
    return reachingDetails((place) => {
      const times = used.get(place) ?? 0
      used.set(place, times + 1)
      return times < (lefts[place - 1] ?? 0) ? 'left' : 'right'
    })
  }

  it('call 15 of 21 reaches within chance and 16 beyond it (exact sign test: p .078 and .027)', () => {
    const [within] = measureRows([measured(byPlace([3, 3, 3, 3, 2, 1, 0]))])
    expect(within).toMatchObject({
      aspect: 'reaching',
      side: 'middle',
      basis: '21 of 21 reaches counted',
      interval: null,
      informant: null,
    })
    expect(within?.value).toBeCloseTo(-42.857, 3)
    expect(within?.chance?.low).toBeCloseTo(-42.857, 3)
    expect(within?.opens.sideRule).toContain('6 to 15')
    expect(within?.opens.sideRule).toContain('p .078')
    expect(within?.opens.raw).toHaveLength(3 + 21)
    const [beyond] = measureRows([measured(byPlace([3, 3, 3, 3, 2, 2, 0]))])
    expect(beyond).toMatchObject({ side: 'left', aspect: 'reaching' })
    expect(beyond?.opens.sideRule).toContain('p .027')
  })

  it('tell a side of skill only when the interval keeps clear of zero', () => {
    const [clear] = measureRows([measured(pegsDetails([14, 14.2, 13.8], [16, 16.2, 15.8]))])
    expect(clear).toMatchObject({ aspect: 'skill', measure: 'Moving pegs', side: 'left', caution: null })
    // Times: 100 (14 − 16) ÷ (14 + 16), left quicker, so below zero.
    expect(clear?.value).toBeCloseTo(-6.667, 3)
    expect(clear?.opens.worked).toBe('100 × (14.0 − 16.0) ÷ (14.0 + 16.0) = −6.7')
    const [unsure] = measureRows([measured(pegsDetails([14, 18, 12], [16, 13, 17]))])
    expect(unsure?.side).toBe('middle')
  })

  it('say when there are too few trials for an interval, and leave out what was interrupted', () => {
    const details = {
      ...pegsDetails([14], [16]),
      trials: [trial('left', 14), trial('right', 16), trial('right', 30, { interrupted: true })],
    }
    const [row] = measureRows([measured(details as ReturnType<typeof pegsDetails>)])
    expect(row).toMatchObject({
      side: null,
      interval: null,
      caution: 'Fewer than two trials a hand: no interval',
      basis: '1 trial left, 1 right, 1 interrupted',
    })
    expect(row?.opens.raw.at(-1)?.value).toBe('30 s, interrupted and left out')
  })

  it('warn of a side that rests on fewer than three tries', () => {
    const whole = sidesDetails('left', 'right', null)
    if (whole.kind !== 'sides') throw new Error('Not sides')
    const once = { ...whole, eye: { ...whole.eye, far: ['right', null, null] } } as typeof whole
    const cautions = (details: typeof whole) =>
      measureRows([measured(details)]).map(({ aspect, caution }) => [aspect, caution])
    expect(cautions(once)).toEqual([
      ['foot', null],
      ['eye_far', 'Fewer than three tries of an action'],
    ])
    expect(cautions(whole)).toEqual([
      ['foot', null],
      ['eye_far', null],
    ])
  })

  it('give foot, both eyes and ear a row each, and none for what was not done', () => {
    const rows = measureRows([measured(sidesDetails('left', 'right', 'left'))])
    expect(rows.map(({ aspect, side, value }) => [aspect, side, value])).toEqual([
      ['foot', 'left', -100],
      ['eye_far', 'right', 100],
      ['eye_near', 'left', -100],
    ])
    expect(new Set(rows.map(({ id }) => id)).size).toBe(3)
    expect(rows[0]?.opens.cautions.join(' ')).toContain('Ferrero, West & Vadillo 2017')
  })

  it('draw no row for a part that was not done, and keep the earlier one the latest', () => {
    const earlier = measured(sidesDetails('left', 'left'), { measuredOn: '2025-09-01' })
    const notDone = measured(sidesDetails(null, null), { notDoneReason: 'Tired' })
    expect(measureRows([notDone, earlier]).every(({ latest }) => latest)).toBe(true)
  })
})

describe('the whole profile', () => {
  const responses = [answered(settled), answered('R', { informant: 'teacher' })]
  const measures = [
    measured(sidesDetails('right', 'right')),
    measured(pegsDetails([14, 14.2, 13.8], [16, 16.2, 15.8])),
    measured(reachingDetails()),
  ]

  it('puts preference first, then reaching, skill, foot and eyes', () => {
    expect(handProfileRows(responses, measures).map(({ aspect }) => aspect)).toEqual([
      'preference',
      'preference',
      'reaching',
      'skill',
      'foot',
      'eye_far',
      'eye_near',
    ])
  })

  it('reads reaching at the age of the day it was taken, not of the newest answer', () => {
    const evenly = measured(
      reachingDetails((place) => (place > 4 ? 'right' : 'left')),
      { measuredOn: '2024-04-01' },
    )
    const because = (birthDate: string) =>
      handProfileOf([answered('L', { answeredOn: '2024-06-01' })], [evenly], birthDate).statements.find(
        ({ text }) => text.startsWith('Reaching points to neither hand'),
      )?.because
    // Five on the day of reaching, six on the day of the answers.
    expect(because('2018-05-04')).toContain('Under six')
    expect(because('2018-03-04')).not.toContain('Under six')
  })

  it('is empty, and says nothing, for an empty record', () => {
    expect(handProfileOf([], [], '2018-05-04')).toEqual({
      lateralLine: [],
      statements: [],
      informants: [],
      occasions: { forms: [], measures: [] },
    })
  })

  it('says which part was not done and why, until it is done', () => {
    const notDone = measured(pegsDetails([14], [16]), { notDoneReason: 'Wanted to stop.' })
    const said = (...taken: typeof measures) =>
      handProfileOf(responses, taken, '2018-05-04').statements.map(({ text }) => text)
    expect(said(notDone)).toContain('Not done on 3 Mar 2026: Moving pegs. Reason given: Wanted to stop.')
    const later = measured(pegsDetails([14, 15], [16, 17]), { measuredOn: '2026-03-10' })
    expect(said(notDone, later).join(' ')).not.toContain('Not done')
  })

  it('leaves what a row opens to away where only the line is shown', () => {
    const [row] = handProfileRows(responses, measures)
    expect(row && 'opens' in withoutDetails(row)).toBe(false)
  })

  it('turns every value, side and interval round when the hands are swapped', () => {
    const codes = ['LL', 'L', 'B', 'R', 'RR', 'N', '-']
    const swapped = ['RR', 'R', 'B', 'L', 'LL', 'N', '-']
    const hand = fc.constantFrom('left' as const, 'right' as const)
    const other = { left: 'right', right: 'left', middle: 'middle' } as const
    const seconds = fc.array(fc.integer({ min: 8, max: 40 }), { minLength: 2, maxLength: 4 })
    fc.assert(
      fc.property(
        fc.array(fc.nat(6), { minLength: 10, maxLength: 10 }),
        fc.array(hand, { minLength: 7, maxLength: 7 }),
        seconds,
        seconds,
        hand,
        (answers, hands, left, right, side) => {
          const rowsOf = (turn: boolean) =>
            handProfileRows(
              [answered(answers.map((code) => (turn ? swapped : codes)[code]).join(' '))],
              [
                measured(
                  reachingDetails((place) => {
                    const used = hands[place - 1] ?? 'left'
                    return turn ? other[used] : used
                  }),
                ),
                measured(turn ? pegsDetails(right, left) : pegsDetails(left, right)),
                measured(sidesDetails(turn ? other[side] : side, turn ? other[side] : side)),
              ],
            )
          const [before, after] = [rowsOf(false), rowsOf(true)]
          expect(after).toHaveLength(before.length)
          after.forEach((row, index) => {
            const was = before[index]
            if (row.value === null) expect(was?.value).toBeNull()
            else expect(row.value + (was?.value ?? NaN)).toBeCloseTo(0, 9)
            expect(row.side).toBe(was?.side ? other[was.side] : was?.side)
            if (row.interval) expect(row.interval.low + (was?.interval?.high ?? NaN)).toBeCloseTo(0, 6)
            expect(row.chance).toEqual(was?.chance)
          })
        },
      ),
      { numRuns: 60 },
    )
  })
})
