import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  answerPoints,
  cutOffSetById,
  cutOffSets,
  directionOf,
  handUseAnswers,
  handUseFormV1,
  scoreHandUse,
  unansweredItems,
  type HandUseAnswer,
} from '../../shared/handUse.ts'
import { formatQuotient } from '../../shared/laterality.ts'

const answerOf: Record<string, HandUseAnswer | null> = {
  SL: 'strong_left',
  L: 'left',
  E: 'either',
  R: 'right',
  SR: 'strong_right',
  N: 'does_not_do',
  '-': null,
}

/** 'SL6 L3 E1' → ten answers in the order of the form. */
function answers(counts: string): Record<string, HandUseAnswer | null> {
  const list = counts.split(' ').flatMap((part) => {
    const [, code, n] = /^([A-Z-]+)(\d*)$/.exec(part)!
    return Array<HandUseAnswer | null>(Number(n || 1)).fill(answerOf[code!]!)
  })
  expect(list).toHaveLength(10)
  return Object.fromEntries(handUseFormV1.items.map((item, i) => [item.id, list[i]!]))
}

describe('the form', () => {
  it('asks ten different activities and leaves out matches, rackets and sharp knives', () => {
    expect(new Set(handUseFormV1.items.map((item) => item.id)).size).toBe(10)
    const words = JSON.stringify(handUseFormV1.items).toLowerCase()
    expect(words).not.toMatch(/match|racket|sharp|broom/)
    expect(handUseFormV1.source).toContain('no child norms')
  })
})

// Points and quotient: Oldfield 1971 (two marks, one mark, one in each column). The sums were worked by hand; the
// count rules (8 and 6) and the default cut-off of 40 are this clinic's.
describe('scoreHandUse', () => {
  it.each([
    ['SL6 L3 E1', 1, 16, 10, '−88.2', 'left'],
    ['SL2 L2 E2 R2 SR1 L1', 6, 9, 10, '−20.0', 'mixed'],
    ['SL3 L1 E1 N2 L1 R1 L1', 2, 10, 8, '−66.7', 'left'],
    ['E10', 10, 10, 10, '0.0', 'mixed'],
    ['R4 SR4 E2', 14, 2, 10, '+75.0', 'right'],
    ['SL8 L2', 0, 18, 10, '−100.0', 'left'],
    ['L10', 0, 10, 10, '−100.0', 'left'],
    ['L2 E5 R3', 8, 7, 10, '+6.7', 'mixed'],
    ['SL5 L4 E1', 1, 15, 10, '−87.5', 'left'],
    ['SL4 L4 E2', 2, 14, 10, '−75.0', 'left'],
    ['L4 E3 R3', 6, 7, 10, '−7.7', 'mixed'],
    ['SL3 L2 R3 SR2', 7, 8, 10, '−6.7', 'mixed'],
    ['SL4 L2 E2 R2', 4, 12, 10, '−50.0', 'left'],
    ['SL9 N1', 0, 18, 9, '−100.0', 'left'],
  ])('%s gives right %i, left %i over %i answers: %s', (counts, right, left, answered, shown, direction) => {
    const score = scoreHandUse(answers(counts))
    expect(score).toMatchObject({ right, left, answered, direction, standing: 'scorable' })
    expect(formatQuotient(score.quotient)).toBe(shown)
  })

  it.each([
    ['L3 E2 R1 N4', 6, 'provisional', '−25.0'],
    ['L3 E2 R1 -4', 6, 'provisional', '−25.0'],
    ['L7 N3', 7, 'provisional', '−100.0'],
    ['L8 N2', 8, 'scorable', '−100.0'],
    ['SL5 N5', 5, 'not_scorable', 'not scorable'],
    ['N10', 0, 'not_scorable', 'not scorable'],
    ['-10', 0, 'not_scorable', 'not scorable'],
  ])('%s with %i answers is %s', (counts, answered, standing, shown) => {
    const score = scoreHandUse(answers(counts))
    expect(score).toMatchObject({ answered, standing })
    expect(formatQuotient(score.quotient)).toBe(shown)
    expect(score.direction === null).toBe(standing === 'not_scorable')
  })

  it('tells "does not do" from "not answered" and from "either"', () => {
    expect(scoreHandUse(answers('L6 N3 -1'))).toMatchObject({ answered: 6, doesNotDo: 3, unanswered: 1 })
    expect(scoreHandUse(answers('L6 E4')).quotient).not.toBe(scoreHandUse(answers('L6 N4')).quotient)
    expect(answerPoints('does_not_do')).toBeNull()
    expect(answerPoints('either')).toEqual({ left: 1, right: 1 })
  })

  it('treats an empty object as ten missing answers', () => {
    expect(scoreHandUse({})).toMatchObject({ unanswered: 10, quotient: null, strength: null })
    expect(unansweredItems({ throws: 'left' })).toHaveLength(9)
    expect(unansweredItems(answers('L6 N4'))).toEqual([])
  })

  it('gives the same quotient to always-left and mostly-left, and tells them apart by strength', () => {
    const always = scoreHandUse(answers('SL10'))
    const mostly = scoreHandUse(answers('L10'))
    expect(always.quotient).toBe(mostly.quotient)
    expect([always.strength, mostly.strength]).toEqual([1, 0])
    expect(scoreHandUse(answers('SL6 L3 E1')).strength).toBeCloseTo(6 / 9, 9)
    expect(scoreHandUse(answers('E10')).strength).toBeNull()
  })
})

describe('cut-offs', () => {
  it.each([
    ['clinic-40', -40, 'left'],
    ['clinic-40', -39.9, 'mixed'],
    ['clinic-40', 40, 'right'],
    ['sign-only', -0.1, 'left'],
    ['sign-only', 0, 'mixed'],
    ['sign-only', 0.1, 'right'],
    ['sixty', -60, 'mixed'],
    ['sixty', -60.1, 'left'],
    ['sixty', 60.1, 'right'],
  ])('%s calls %d %s', (id, quotient, direction) => {
    expect(directionOf(quotient, cutOffSetById(id)!)).toBe(direction)
  })

  it('keeps the set used with the score, so that the same answers can be read again', () => {
    const sixty = cutOffSetById('sixty')!
    const score = scoreHandUse(answers('SL4 L2 E2 R2'), sixty)
    expect(score.direction).toBe('mixed')
    expect(score.cutOffs).toEqual(sixty)
    expect(cutOffSetById('eighty')).toBeNull()
  })
})

describe('left and right mirrored', () => {
  const mirror: Record<HandUseAnswer, HandUseAnswer> = {
    strong_left: 'strong_right',
    left: 'right',
    either: 'either',
    right: 'left',
    strong_right: 'strong_left',
    does_not_do: 'does_not_do',
  }
  const opposite = { left: 'right', right: 'left', mixed: 'mixed' } as const

  it('turns the sign of the quotient and the side, and leaves everything else', () => {
    const ten = fc.array(fc.option(fc.constantFrom(...handUseAnswers)), { minLength: 10, maxLength: 10 })
    fc.assert(
      fc.property(ten, fc.constantFrom(...cutOffSets), (list, cutOffs) => {
        const ids = handUseFormV1.items.map((item) => item.id)
        const given = Object.fromEntries(ids.map((id, i) => [id, list[i] ?? null]))
        const turned = Object.fromEntries(
          ids.map((id) => [id, given[id] === null ? null : mirror[given[id]!]]),
        )
        const score = scoreHandUse(given, cutOffs)
        const other = scoreHandUse(turned, cutOffs)
        expect(other).toMatchObject({
          left: score.right,
          right: score.left,
          answered: score.answered,
          strength: score.strength,
          standing: score.standing,
        })
        if (score.quotient === null) expect(other.quotient).toBeNull()
        else expect(other.quotient! + score.quotient).toBe(0)
        expect(other.direction).toBe(score.direction === null ? null : opposite[score.direction])
      }),
    )
  })
})
