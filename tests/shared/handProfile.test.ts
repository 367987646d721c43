import { describe, expect, it } from 'vitest'
import { handUseRows } from '../../shared/handProfile.ts'
import { cutOffSetById, handUseFormV1, scoreHandUse, type HandUseAnswer } from '../../shared/handUse.ts'

const answers = (given: (HandUseAnswer | null)[]) =>
  Object.fromEntries(handUseFormV1.items.map((item, index) => [item.id, given[index] ?? null]))

const settled: HandUseAnswer[] = [...Array(6).fill('strong_left'), ...Array(3).fill('left'), 'either']

const locked = (
  id: string,
  answeredOn: string,
  given: (HandUseAnswer | null)[] = settled,
  set = 'clinic-40',
) => ({
  id,
  answeredOn,
  informant: 'guardian' as const,
  score: scoreHandUse(answers(given), cutOffSetById(set) ?? undefined),
  lockedAt: `${answeredOn}T12:00:00.000Z`,
})

describe('handUseRows', () => {
  it('gives the quotient with what it rests on, who answered and the cut-offs it was called by', () => {
    // Six strong left, three left, one either: right 1, left 16, the clinic's first check value (-88.2).
    const [row] = handUseRows([locked('a', '2026-03-03', settled, 'sixty')])
    expect(row).toMatchObject({
      measure: 'Hand-use questionnaire',
      occasion: '2026-03-03',
      interval: null,
      basis: '10 of 10 activities answered',
      caution: null,
      cutOffs: { left: -60, right: 60, inclusive: false },
      informant: 'Parent or carer',
      latest: true,
    })
    expect(row?.value).toBeCloseTo(-88.2, 1)
  })

  it.each([
    ['7 answered', 7, '7 of 10 activities answered', /^Provisional/, false],
    ['5 answered', 5, '5 of 10 activities answered', /^Not scorable/, true],
    ['none done yet', 0, '0 of 10 activities answered', /^Not scorable/, true],
  ])('warns when only some were answered: %s', (_what, count, basis, caution, empty) => {
    const given = settled.map((answer, index) => (index < count ? answer : 'does_not_do'))
    const [row] = handUseRows([locked('a', '2026-03-03', given)])
    expect(row?.basis).toBe(basis)
    expect(row?.caution).toMatch(caution)
    expect(row?.value === null).toBe(empty)
  })

  it('marks only the newest occasion, and of one day the one locked last', () => {
    const late = { ...locked('late', '2026-03-03'), lockedAt: '2026-03-05T09:00:00.000Z' }
    const rows = handUseRows([locked('old', '2025-03-03'), late, locked('early', '2026-03-03')])
    expect(rows.map(({ id, latest }) => [id, latest])).toEqual([
      ['late', true],
      ['early', false],
      ['old', false],
    ])
  })
})
