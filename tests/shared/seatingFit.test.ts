import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { SeatingDetails } from '../../shared/measures.ts'
import { emptyDetails } from '../../shared/measureScores.ts'
import {
  changeToFit,
  depthRange,
  deskConstant,
  deskRange,
  fitOf,
  marksByPopliteal,
  marksByStature,
  scoreSeating,
  seatRange,
  seatingCautions,
  seatingCautionsOf,
  sizeMarks,
} from '../../shared/seatingFit.ts'

const measured = (given: Partial<SeatingDetails> = {}): SeatingDetails => ({
  ...(emptyDetails('seating', {}, 1) as SeatingDetails),
  ...given,
})

/*
 * EN 1729-1: a supplier's sizing page and a German table quoting the 2006 edition (both second hand). Popliteal heights of
 * marks 0 and 7 and the table of mark 0 are from memory.
 */
describe('sizeMarks', () => {
  it.each([
    ['from memory in part', 0, 200, 250, 800, 950, 210, 400],
    ['both pages', 1, 250, 280, 930, 1160, 260, 460],
    ['EN-2', 2, 280, 315, 1080, 1210, 310, 530],
    ['EN-3', 3, 315, 355, 1190, 1420, 350, 590],
    ['EN-4', 4, 355, 405, 1330, 1590, 380, 640],
    ['EN-5', 5, 405, 435, 1460, 1765, 430, 710],
    ['EN-6', 6, 435, 485, 1590, 1880, 460, 760],
    ['EN-7', 7, 485, null, 1740, 2070, 510, 820],
  ])('%s: mark %d', (_id, mark, from, to, statureFrom, statureTo, seatHeightMm, tableHeightMm) =>
    expect(sizeMarks[mark]).toMatchObject({
      ...{ mark, seatHeightMm, tableHeightMm },
      poplitealMm: { from, to },
      statureMm: { from: statureFrom, to: statureTo },
    }),
  )

  it('says which figures were not read anywhere', () => {
    expect(sizeMarks.filter(({ fromMemory }) => fromMemory.length > 0).map(({ mark }) => mark)).toEqual([
      0, 7,
    ])
  })
})

describe('the mark', () => {
  it.each([
    ['EN-P1', 260, [1]],
    ['EN-P2', 300, [2]],
    ['EN-P3', 330, [3]],
    ['inside mark 4', 380, [4]],
    ['EN-P5', 420, [5]],
    ['EN-P6', 460, [6]],
    ['the open end', 520, [7]],
    // The printed ranges touch; trying both is the clinic's rule.
    ['a shared boundary', 280, [1, 2]],
    ['the upper boundary', 485, [6, 7]],
    ['below the table', 199, []],
  ])('%s by popliteal height, %d mm', (_id, height, marks) => expect(marksByPopliteal(height)).toEqual(marks))

  it.each([
    ['EN-S1 two marks', 1200, [2, 3]],
    ['EN-S2 one mark', 1250, [3]],
    ['above the table', 2100, []],
  ])('%s by body height, %d mm', (_id, height, marks) => expect(marksByStature(height)).toEqual(marks))

  it('goes by the knee in shoes, by body height only without it, and by nothing else', () => {
    const knee = measured({ poplitealCm: 30, shoeCm: 2, statureCm: 125 })
    expect(scoreSeating(knee)).toMatchObject({ marks: [3], marksFrom: 'popliteal' })
    expect(scoreSeating(measured({ poplitealCm: 30 }))).toMatchObject({ marks: [2] })
    expect(scoreSeating(measured({ statureCm: 120 }))).toMatchObject({ marks: [2, 3], marksFrom: 'stature' })
    expect(scoreSeating(measured())).toMatchObject({ marks: null, marksFrom: null })
    expect(scoreSeating(measured({ poplitealCm: 25.2, shoeCm: 2.8 })).marks).toEqual([1, 2])
  })
})

// Reviews of Castellucci, Arezes & Molenbroek 2014 and 2015 (abstracts read, equations from memory).
describe('the match equations', () => {
  it.each([
    ['FIT-1', 35, 'match', 0],
    ['FIT-2', 38.5, 'high', -0.6446012],
    ['FIT-3', 31, 'low', 1.9089653],
  ])('%s: seat of %f cm for 35 cm and a shoe of 3 cm', (_id, seatHeightCm, fit, change) => {
    const details = measured({ poplitealCm: 35, shoeCm: 3, seatHeightCm })
    const range = seatRange(details)
    expect(range).toEqual({
      low: expect.closeTo(32.908965343808674, 9),
      high: expect.closeTo(37.85539852748633, 9),
    })
    expect(fitOf(seatHeightCm, range)).toBe(fit)
    expect(scoreSeating(details).seatChange).toBeCloseTo(change, 6)
  })

  it('FIT-4: desk of 55 cm over a seat of 35, elbow 18, shoulder 42', () => {
    const details = measured({ seatHeightCm: 35, elbowHeightCm: 18, shoulderHeightCm: 42, deskHeightCm: 55 })
    expect(deskRange(details)).toEqual({ low: 53, high: expect.closeTo(56.5592, 9) })
    expect(scoreSeating(details).deskChange).toBe(0)
  })

  it('FIT-5: the desk constants agree with flexion 25° and abduction 20°', () => {
    expect(deskConstant(25, 20)).toBeCloseTo(0.14834926036085344, 9)
    expect(deskConstant(25, 20)).toBeCloseTo(0.1483, 4)
  })

  it('FIT-6: depth for 36 cm from buttock to knee', () => {
    expect(depthRange(36)).toEqual({ low: expect.closeTo(28.8, 9), high: expect.closeTo(34.2, 9) })
  })

  it('never say that something fits while a measure is missing', () => {
    const score = scoreSeating(
      measured({ seatHeightCm: 35, seatDepthCm: 30, deskHeightCm: 55, elbowHeightCm: 18 }),
    )
    expect(score).toMatchObject({
      ...{ seatRange: null, depthRange: null, deskRange: null },
      ...{ seatChange: null, depthChange: null, deskChange: null },
    })
    expect(fitOf(null, { low: 1, high: 2 })).toBeNull()
    expect(deskRange({ seatHeightCm: 35, elbowHeightCm: 22, shoulderHeightCm: 22 })).toBeNull()
  })

  it('change by exactly what brings the furniture to the nearer end', () => {
    const lengths = fc.double({ min: 10, max: 90, noNaN: true })
    fc.assert(
      fc.property(lengths, lengths, lengths, (value, one, two) => {
        const range = { low: Math.min(one, two), high: Math.max(one, two) }
        const change = changeToFit(value, range)!
        const changed = value + change
        expect(changed).toBeGreaterThanOrEqual(range.low - 1e-9)
        expect(changed).toBeLessThanOrEqual(range.high + 1e-9)
        if (fitOf(value, range) === 'match') expect(change).toBe(0)
        else
          expect(Math.min(Math.abs(changed - range.low), Math.abs(changed - range.high))).toBeLessThan(1e-9)
      }),
    )
  })
})

describe('seatingCautionsOf', () => {
  const cautions = (given: Partial<SeatingDetails>) => seatingCautionsOf(scoreSeating(measured(given)))

  it('says what the score rests on', () => {
    expect(cautions({})).toEqual([])
    expect(cautions({ statureCm: 120 })).toContain(seatingCautions.stature)
    expect(cautions({ poplitealCm: 28 })).toContain(seatingCautions.boundary)
    expect(cautions({ poplitealCm: 19 })).toContain(seatingCautions.outside)
    expect(cautions({ poplitealCm: 35 })).toContain(seatingCautions.memory)
  })

  it('asks for a footrest before new furniture where the seat is too high, and for the desk after the seat', () => {
    const high = cautions({ poplitealCm: 35, shoeCm: 3, seatHeightCm: 38.5 })
    expect(high).toEqual(expect.arrayContaining([seatingCautions.footrest, seatingCautions.deskAfterSeat]))
    expect(cautions({ poplitealCm: 35, shoeCm: 3, seatHeightCm: 31 })).not.toContain(seatingCautions.footrest)
  })
})
