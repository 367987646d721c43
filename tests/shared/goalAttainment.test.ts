import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  attainmentChange,
  attainmentLevels,
  attainmentTScore,
  attainmentWords,
  goalTextProblems,
  goalWeight,
} from '../../shared/goalAttainment.ts'

const goals = (levels: (number | null)[], weights: number[]) =>
  levels.map((level, i) => ({ level, weight: weights[i]! }))
const equal = (n: number, level: number) => goals(Array(n).fill(level), Array(n).fill(1))

// Kiresuk & Sherman 1968, Community Ment Health J 4:443-453; formula read in the published erratum to Turner-Stokes
// 2009, Clin Rehabil 23:362-370; values worked by hand from it.
describe('attainmentTScore', () => {
  it.each([
    ['GAS-01 one goal at -1', equal(1, -1), 40],
    ['GAS-04', equal(4, -1), 35.490475],
    ['GAS-05', equal(5, -1), 34.924433],
    ['GAS-06', equal(6, -1), 34.508067],
    ['GAS-07', equal(7, -1), 34.188612],
    ['GAS-08', equal(8, -1), 33.935613],
    ['GAS-10', equal(2, -2), 25.193053],
    ['GAS-12', equal(4, -2), 20.98095],
    ['GAS-15 all as expected', equal(3, 0), 50],
    ['GAS-16 unequal weights', goals([0, 0, 0, 0], [3, 1, 2, 5]), 50],
    ['GAS-17', goals([1, 0, 1], [1, 1, 2]), 60],
    ['GAS-18', goals([1, -1, 2], [1, 1, 2]), 63.333333],
    ['GAS-19', goals([1, 0, -1, 2], [1, 1, 4, 6]), 60],
    // The uncorrected formula of the paper gives 59.045340 here.
    ['GAS-20 squared weights', goals([1, -1], [4, 1]), 56.81115],
    ['GAS-22 an unscored goal leaves both sums', goals([1, null, -1, 0], [1, 1, 1, 1]), 50],
    ['GAS-26', equal(3, 2), 77.386128],
    ['GAS-27', goals([1, 0], [1, 1]), 56.201737],
    ['weights 6, 4, 2 at the start', goals([-1, -1, -2], [6, 4, 2]), 34.6],
    ['weights 6, 4, 2 later', goals([0, 1, 0], [6, 4, 2]), 54.4],
  ])('%s', (_id, list, expected) => {
    expect(Math.abs(attainmentTScore(list)! - expected)).toBeLessThan(0.05)
  })

  // Turner-Stokes & Williams 2010, Clin Rehabil 24:66-73, abstract: baselines all at -2 have median 21.0, quartiles
  // 19.8 and 22.6; standard rating upper quartile 35.5. Matching them to numbers of goals is an inference.
  it.each([
    ['GAS-X1', equal(3, -2), 22.6],
    ['GAS-X2', equal(4, -2), 21.0],
    ['GAS-X3', equal(5, -2), 19.8],
    ['GAS-X4', equal(4, -1), 35.5],
  ])('%s agrees with print', (_id, list, expected) => {
    expect(Math.abs(attainmentTScore(list)! - expected)).toBeLessThan(0.05)
  })

  it.each([
    ['GAS-24 nothing scored', goals([null, null], [1, 1])],
    ['GAS-25 all weights zero', goals([2, -2], [0, 0])],
    ['no goals', []],
  ])('%s is null, not 50', (_id, list) => {
    expect(attainmentTScore(list)).toBeNull()
  })

  const anyGoals = fc.array(
    fc.record({
      weight: fc.integer({ min: 1, max: 9 }),
      level: fc.option(fc.constantFrom(...attainmentLevels)),
    }),
    { minLength: 1, maxLength: 8 },
  )

  it('does not change when every weight is multiplied by the same number', () => {
    fc.assert(
      fc.property(anyGoals, fc.integer({ min: 2, max: 50 }), (list, times) => {
        const once = attainmentTScore(list)
        const scaled = attainmentTScore(list.map((goal) => ({ ...goal, weight: goal.weight * times })))
        if (once === null) expect(scaled).toBeNull()
        else expect(scaled).toBeCloseTo(once, 9)
      }),
    )
  })

  it('lies as far above 50 as it lay below when every level is turned round', () => {
    fc.assert(
      fc.property(anyGoals, (list) => {
        const score = attainmentTScore(list)
        fc.pre(score !== null)
        const turned = list.map((goal) => ({ ...goal, level: goal.level === null ? null : -goal.level }))
        expect(attainmentTScore(turned)! + score).toBeCloseTo(100, 9)
      }),
    )
  })
})

describe('attainmentChange', () => {
  const at = (baseline: (number | null)[], followUp: (number | null)[]) =>
    baseline.map((level, i) => ({ weight: 1, baseline: level, followUp: followUp[i]! }))

  it('GAS-C1: same goals and weights at both times', () => {
    const change = attainmentChange(at([-1, -1, -1], [0, 1, 0]))
    expect(change.baselineT).toBeCloseTo(36.306936, 5)
    expect(change.followUpT).toBeCloseTo(54.564355, 5)
    expect(change.change).toBeCloseTo(18.257419, 5)
    expect(change).toMatchObject({ scored: 3, of: 3 })
  })

  it('GAS-C2: a goal not scored later leaves both times, and the count says so', () => {
    const change = attainmentChange(at([-1, -1, -1], [0, null, 0]))
    expect(change.baselineT).toBeCloseTo(37.596527, 5)
    expect(change.followUpT).toBe(50)
    expect(change.change).toBeCloseTo(12.403473, 5)
    expect(change).toMatchObject({ scored: 2, of: 3 })
  })

  it('answers null when no goal was scored twice', () => {
    expect(attainmentChange(at([-1], [null]))).toEqual({
      baselineT: null,
      followUpT: null,
      change: null,
      scored: 0,
      of: 1,
    })
  })
})

// Importance × difficulty, 0 to 3 each: the scales are common practice; a product of 0 weighs 1 by clinic rule.
describe('goalWeight', () => {
  it.each([
    [3, 2, 6],
    [2, 2, 4],
    [1, 2, 2],
    [0, 3, 1],
    [2, 0, 1],
    [3, 3, 9],
  ])('importance %i, difficulty %i weighs %i', (importance, difficulty, expected) => {
    expect(goalWeight(importance, difficulty)).toBe(expected)
  })
})

describe('attainmentWords', () => {
  it.each([
    [-2, -2, 'still where we started'],
    [-1, -1, 'still where we started'],
    [-2, -1, 'harder just now than when we started'],
    [-1, -2, 'some of the way'],
    [0, -2, 'reached what we hoped'],
    [1, -1, 'a little more than we hoped'],
    [2, -2, 'much more than we hoped'],
    [-2, null, 'still getting going'],
  ] as const)('level %i from %j reads "%s"', (level, baseline, words) => {
    expect(attainmentWords(level, baseline)).toBe(words)
  })

  it('never calls a level less, fail or worse', () => {
    const all = attainmentLevels.flatMap((level) =>
      [null, -1, -2].map((b) => attainmentWords(level, b as -1)),
    )
    expect(all.join(' ')).not.toMatch(/less|fail|worse|poor/i)
  })
})

describe('goalTextProblems', () => {
  const levels = ['One line', 'Two lines', 'Three lines', 'Four lines', 'A whole page']
  const activity = 'Writes a story at school and can read it afterwards'
  const voice = 'I want to finish my dragon story'

  it('finds nothing in a goal about an activity with five levels and the child’s words', () => {
    expect(goalTextProblems(activity, levels, voice, 'left')).toEqual([])
  })

  it.each([
    ['a change of hand in the goal', 'Switch to the right hand for writing', levels, voice, 'activity', null],
    [
      'a change of hand in a level',
      activity,
      [...levels.slice(0, 4), 'Writes a page with the right hand'],
      voice,
      'levels',
      4,
    ],
    ['no activity', '  ', levels, voice, 'activity', null],
    ['no word of the child', activity, levels, '  ', 'childVoice', null],
    ['no word of the child', activity, levels, null, 'childVoice', null],
    [
      'two levels alike but for case and stops',
      activity,
      ['One line', 'one line.', 'b', 'c', 'd'],
      voice,
      'levels',
      1,
    ],
    ['an empty level', activity, ['a', 'b', '', 'c', 'd'], voice, 'levels', 2],
    ['four levels', activity, levels.slice(0, 4), voice, 'levels', null],
  ])('finds %s', (_what, text, given, child, field, level) => {
    const problems = goalTextProblems(text, given, child, 'left')
    expect(problems).toHaveLength(1)
    expect(problems[0]).toMatchObject({ field, level })
  })

  it('names the levels that say the same', () => {
    const [problem] = goalTextProblems(activity, ['x', 'a', 'b', 'a', 'c'], voice)
    expect(problem!.message).toContain('Levels −1 and +1 say the same')
  })

  it('reports every problem at once', () => {
    const fields = goalTextProblems('Switch to the right hand', ['a', 'a'], '').map(({ field }) => field)
    expect(fields).toEqual(['activity', 'levels', 'levels', 'childVoice'])
  })
})
