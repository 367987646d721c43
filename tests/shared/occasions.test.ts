import { describe, expect, it } from 'vitest'
import { compareMeasureOccasions } from '../../shared/measureOccasions.ts'
import { compareFormOccasions, itemChange } from '../../shared/occasions.ts'
import { answered, measured, sidesDetails } from '../support/handEvidence.ts'
import { skillTrends } from '../../shared/trends.ts'
import { pegsDetails, reachingDetails } from '../support/measures.ts'

describe('itemChange', () => {
  // Blank, "does not do this yet" and "either hand" are three different things (clinic rule).
  it.each([
    ['left', 'left', 'same'],
    ['left', 'strong_left', 'firmer'],
    ['left', 'either', 'changed'],
    ['either', 'right', 'changed'],
    [null, 'left', 'newly'],
    ['does_not_do', 'either', 'newly'],
    ['right', null, 'no_longer'],
    ['right', 'does_not_do', 'no_longer'],
    ['does_not_do', 'does_not_do', 'same'],
    [null, null, 'neither'],
    [null, 'does_not_do', 'neither'],
  ] as const)('from %s to %s is %s', (before, after, change) => {
    expect(itemChange(before, after)).toBe(change)
  })
})

describe('compareFormOccasions', () => {
  it('sets the two newest occasions of one form and one informant side by side', () => {
    const [found, ...rest] = compareFormOccasions([
      answered('B', { answeredOn: '2024-01-01' }),
      answered('L L L L L R R B N -', { answeredOn: '2025-03-03' }),
      answered('LL L L L L L R L L L', { answeredOn: '2026-03-03' }),
      answered('R', { informant: 'teacher' }),
    ])
    expect(rest).toEqual([])
    expect(found?.before.on).toBe('2025-03-03')
    expect(found?.after.on).toBe('2026-03-03')
    expect(found?.counts).toEqual({ same: 5, firmer: 1, changed: 2, newly: 2, no_longer: 0, neither: 0 })
    expect(found?.items.filter(({ change }) => change === 'changed').map(({ label }) => label)).toEqual([
      'Spreads or cuts soft food with a table knife',
      'Picks up something small',
    ])
  })

  it('does not work out reliable change for the quotient and says why', () => {
    const [found] = compareFormOccasions([answered('L'), answered('R', { answeredOn: '2025-03-03' })])
    expect(found?.reliable.used).toBe(false)
    expect(found?.reliable.why).toContain('activity by activity')
  })
})

describe('compareMeasureOccasions', () => {
  it('sets reaching, skill and sides of two occasions side by side', () => {
    const found = compareMeasureOccasions([
      measured(reachingDetails(() => 'left')),
      measured(
        reachingDetails((place) => (place < 5 ? 'left' : 'right')),
        { measuredOn: '2025-03-03' },
      ),
      measured(pegsDetails([14, 14, 14], [16, 16, 16])),
      measured(pegsDetails([18, 18, 18], [20, 20, 20]), { measuredOn: '2025-03-03' }),
      measured(sidesDetails('left', 'left')),
    ])
    expect(found.map(({ kind }) => kind)).toEqual(['reaching', 'pegs'])
    expect(found[0]?.lines.slice(0, 2)).toEqual([
      { label: 'Left reaches', before: '12', after: '21' },
      { label: 'Right reaches', before: '9', after: '0' },
    ])
    expect(found[1]?.lines[0]).toEqual({
      label: 'Left hand, mean',
      before: '18.0 s over 3 trials',
      after: '14.0 s over 3 trials',
    })
    expect(found[1]?.means).toEqual([
      { label: 'Left hand', before: 18, after: 14 },
      { label: 'Right hand', before: 20, after: 16 },
    ])
  })

  it('names what was read of reliability for pegs, and that no standard deviation was found', () => {
    const [pegs] = compareMeasureOccasions([
      measured(pegsDetails([14, 14], [16, 16])),
      measured(pegsDetails([18, 18], [20, 20]), { measuredOn: '2025-03-03' }),
    ])
    expect(pegs?.reliable).toMatchObject({ used: false })
    expect(pegs?.reliable?.why).toContain('Smith et al. 2000')
    expect(pegs?.reliable?.cautions.join(' ')).toContain('practice')
  })

  it('warns when the occasions were taken in different ways, and gives no means to compare', () => {
    const twenty = { ...pegsDetails([28, 28], [32, 32]), pegs: 20 } as ReturnType<typeof pegsDetails>
    const [apart] = compareMeasureOccasions([
      measured(twenty),
      measured(pegsDetails([18, 18], [20, 20]), { measuredOn: '2025-03-03' }),
    ])
    expect(apart?.caution).toContain('not taken in the same way')
    expect(apart?.lines.at(-1)).toEqual({ label: 'Pegs in one trial', before: '10', after: '20' })
    expect(apart?.means).toEqual([])
    const [alike] = compareMeasureOccasions([
      measured(pegsDetails([14, 14], [16, 16])),
      measured(pegsDetails([18, 18], [20, 20]), { measuredOn: '2025-03-03' }),
    ])
    expect(alike?.caution).toBeNull()
  })

  it('leaves out a part that was not done', () => {
    expect(
      compareMeasureOccasions([
        measured(pegsDetails([14, 14], [16, 16]), { notDoneReason: 'Tired' }),
        measured(pegsDetails([18, 18], [20, 20]), { measuredOn: '2025-03-03' }),
      ]),
    ).toEqual([])
  })
})

describe('skillTrends', () => {
  const pegs = (measuredOn: string, left: number, right: number) =>
    measured(pegsDetails([left, left], [right, right]), { measuredOn })

  it('gives slopes for 30 days from real dates, by hand: 20, 18 and 14 s thirty and sixty days apart', () => {
    const trends = skillTrends([
      pegs('2026-04-01', 14, 20),
      pegs('2026-01-01', 20, 20),
      pegs('2026-01-31', 18, 20),
    ])
    expect(trends.map(({ label }) => label)).toEqual(['Left hand, mean seconds', 'Right hand, mean seconds'])
    // Slopes in 30 days: −2 (20 to 18), −2 (18 to 14 over 60) and −2 (20 to 14 over 90).
    expect(trends[0]).toMatchObject({ occasions: 3, from: '2026-01-01', to: '2026-04-01' })
    expect(trends[0]?.per30Days).toBeCloseTo(-2, 9)
    expect(trends[0]?.leastSquares.per30Days).toBeCloseTo(-2, 9)
    // Three falling values are one of six orders: two-sided a third, so never a finding.
    expect(trends[0]?.p).toBeCloseTo(1 / 3, 9)
    expect(trends[1]).toMatchObject({ per30Days: 0, p: null })
    expect(trends[0]?.words).toContain('−2.0 in 30 days')
  })

  it('take in only what was taken in the way of the newest', () => {
    const twenty = { ...pegsDetails([40, 40], [44, 44]), pegs: 20 } as ReturnType<typeof pegsDetails>
    const earlier = [pegs('2026-01-01', 20, 20), pegs('2026-01-31', 18, 20), pegs('2026-03-01', 16, 20)]
    expect(skillTrends([...earlier, measured(twenty, { measuredOn: '2026-04-01' })])).toEqual([])
    const [left] = skillTrends([...earlier, measured(twenty, { measuredOn: '2025-12-01' })])
    expect(left).toMatchObject({ occasions: 3, from: '2026-01-01' })
  })

  it('stand with the comparison of their measure', () => {
    const [found] = compareMeasureOccasions([
      pegs('2026-01-01', 20, 20),
      pegs('2026-01-31', 18, 20),
      pegs('2026-04-01', 14, 20),
    ])
    expect(found?.trends).toHaveLength(2)
  })

  it('gives none for two days, for parts not done and for what is no task of both hands', () => {
    expect(skillTrends([pegs('2026-01-01', 20, 20), pegs('2026-01-31', 18, 20)])).toEqual([])
    const notDone = measured(pegsDetails([14, 14], [20, 20]), {
      measuredOn: '2026-04-01',
      notDoneReason: 'Tired',
    })
    expect(skillTrends([pegs('2026-01-01', 20, 20), pegs('2026-01-31', 18, 20), notDone])).toEqual([])
    expect(skillTrends([measured(sidesDetails('left', 'left'))])).toEqual([])
  })
})
