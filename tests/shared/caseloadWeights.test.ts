import { describe, expect, it } from 'vitest'
import { closedStates, episodeStates } from '../../shared/episodes.ts'
import { caseloadCapacity, caseloadPoints, noAddedWork } from '../../shared/caseloadWeights.ts'

// The points are this clinic's own (see the file); the sums below were worked by hand.
describe('caseload points', () => {
  it.each([
    ['referred', 0.25],
    ['triaged', 0.25],
    ['waiting', 0.25],
    ['consented', 0.25],
    ['assessing', 2],
    ['formulated', 2],
    ['active', 3],
    ['review', 1],
    ['advice_only', 0.5],
    ['discharged', 0],
    ['redirected', 0],
    ['declined', 0],
    ['moved_away', 0],
    ['consent_withdrawn', 0],
    ['closed_unseen', 0],
  ] as const)('of a child who is %s are %d', (state, points) => {
    expect(caseloadPoints(state)).toBe(points)
  })

  it('know every state, and give closed ones nothing but advice', () => {
    for (const state of episodeStates)
      expect(caseloadPoints(state) > 0).toBe(!closedStates.includes(state) || state === 'advice_only')
  })

  it.each([
    ['an interpreter', { interpreter: true }, 4],
    ['an interpreter and two households', { interpreter: true, twoHouseholds: true }, 5],
    [
      'everything at once, capped',
      {
        interpreter: true,
        twoHouseholds: true,
        monthlySchoolVisits: true,
        safeguarding: true,
        supervisesLearner: true,
      },
      6,
    ],
  ])('of a child in therapy with %s', (_what, added, points) => {
    expect(caseloadPoints('active', { ...noAddedWork, ...added })).toBe(points)
  })

  it('stay below the cap where the state is light: a review with three additions is 4', () => {
    expect(
      caseloadPoints('review', {
        ...noAddedWork,
        interpreter: true,
        twoHouseholds: true,
        safeguarding: true,
      }),
    ).toBe(4)
    expect(caseloadPoints('discharged', { ...noAddedWork, interpreter: true })).toBe(0)
  })
})

describe('capacity', () => {
  it.each([
    [1, 40],
    [0.6, 24],
    [0.8, 32],
    [0, 0],
    [null, null],
  ])('for %s of full time is %s points', (wte, capacity) => {
    expect(caseloadCapacity(wte)).toBe(capacity)
  })
})
