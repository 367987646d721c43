import { describe, expect, it } from 'vitest'
import { compareMeasureOccasions } from '../../shared/measureOccasions.ts'
import { compareFormOccasions, itemChange } from '../../shared/occasions.ts'
import { answered, measured, sidesDetails } from '../support/handEvidence.ts'
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

  it('leaves out a part that was not done', () => {
    expect(
      compareMeasureOccasions([
        measured(pegsDetails([14, 14], [16, 16]), { notDoneReason: 'Tired' }),
        measured(pegsDetails([18, 18], [20, 20]), { measuredOn: '2025-03-03' }),
      ]),
    ).toEqual([])
  })
})
