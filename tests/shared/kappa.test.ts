import fc from 'fast-check'
import jstat from 'jstat'
import { mean, sum } from 'simple-statistics'
import { describe, expect, it } from 'vitest'
import { agreementOf } from '../../shared/kappa.ts'

const { jStat } = jstat

/** Pairs of categories from a square table of counts, rows the first rater. */
const pairsOf = (table: number[][]) =>
  table.flatMap((row, i) =>
    row.flatMap((count, j) => Array.from({ length: count }, () => [`c${i}`, `c${j}`] as const)),
  )

/** Kappa of a table of cell shares, by the parts of a statistics library. */
const kappaOfShares = (cells: number[][]) => {
  const rows = cells.map((row) => sum(row))
  const columns = cells.map((_, j) => sum(cells.map((row) => row[j] ?? NaN)))
  const agreed = sum(cells.map((row, i) => row[i] ?? NaN))
  const chance = sum(rows.map((row, i) => row * (columns[i] ?? NaN)))
  return (agreed - chance) / (1 - chance)
}

/** Standard error by the delta method with numerical slopes: another way than the published closed formula. */
const errorByDelta = (table: number[][]) => {
  const n = sum(table.flat())
  const shares = table.map((row) => row.map((count) => count / n))
  const step = 1e-6
  const moved = (i: number, j: number, by: number) =>
    kappaOfShares(shares.map((row, a) => row.map((share, b) => (a === i && b === j ? share + by : share))))
  const slopes = shares.map((row, i) =>
    row.map((_, j) => (moved(i, j, step) - moved(i, j, -step)) / (2 * step)),
  )
  const weighted = (power: number) =>
    sum(shares.flatMap((row, i) => row.map((share, j) => share * (slopes[i]?.[j] ?? NaN) ** power)))
  return Math.sqrt((weighted(2) - weighted(1) ** 2) / n)
}

describe('agreementOf', () => {
  it('gives kappa and its interval as worked on a statistics package’s reference page (read)', () => {
    // 31, 12, 4, 58: kappa .6756757, standard error .07344761, limits .5317210 and .8196303.
    const found = agreementOf(
      pairsOf([
        [31, 12],
        [4, 58],
      ]),
    )
    expect(found).toMatchObject({ compared: 105, agreed: 89 })
    expect(found.kappa).toBeCloseTo(0.6756757, 7)
    expect(found.kappaInterval?.low).toBeCloseTo(0.531721, 6)
    expect(found.kappaInterval?.high).toBeCloseTo(0.8196303, 6)
  })

  it('gives .676 for the diagnoses of Fleiss 1981 in three categories (from memory)', () => {
    const found = agreementOf(
      pairsOf([
        [75, 1, 4],
        [5, 4, 1],
        [0, 0, 10],
      ]),
    )
    expect(found.kappa).toBeCloseTo(0.676, 3)
    expect(found.share).toBeCloseTo(0.89, 10)
  })

  it('is null when nothing was compared', () => {
    expect(agreementOf([])).toEqual({
      compared: 0,
      agreed: 0,
      share: null,
      shareInterval: null,
      kappa: null,
      kappaInterval: null,
    })
  })

  it('is null, not 0 and not 1, when both always say the same one thing', () => {
    const found = agreementOf([
      ['left', 'left'],
      ['left', 'left'],
    ])
    expect(found).toMatchObject({ share: 1, kappa: null, kappaInterval: null })
  })

  it('gives kappa 1 no interval, for the large-sample error would be zero', () => {
    const found = agreementOf([
      ['left', 'left'],
      ['right', 'right'],
      ['left', 'left'],
    ])
    expect(found).toMatchObject({ share: 1, kappa: 1, kappaInterval: null })
  })

  it('gives no interval when one rater always says the same, for the large-sample error would be zero', () => {
    const found = agreementOf([
      ['left', 'left'],
      ['left', 'left'],
      ['left', 'right'],
      ['left', 'either'],
    ])
    expect(found).toMatchObject({ kappa: 0, kappaInterval: null, share: 0.5 })
  })

  it('is 0 when agreement is what chance gives, and negative below it', () => {
    expect(
      agreementOf(
        pairsOf([
          [4, 4],
          [4, 4],
        ]),
      ).kappa,
    ).toBeCloseTo(0, 12)
    expect(
      agreementOf(
        pairsOf([
          [0, 5],
          [5, 0],
        ]),
      ).kappa,
    ).toBeCloseTo(-1, 12)
  })

  it('agrees with a contingency table of a statistics library and with the delta method', () => {
    const z = jStat.normal.inv(0.975, 0, 1)
    const cell = fc.integer({ min: 1, max: 30 })
    const table = fc.array(fc.array(cell, { minLength: 3, maxLength: 3 }), { minLength: 3, maxLength: 3 })
    fc.assert(
      fc.property(table, (counts) => {
        const n = sum(counts.flat())
        const found = agreementOf(pairsOf(counts))
        const kappa = kappaOfShares(counts.map((row) => row.map((count) => count / n)))
        expect(found.kappa).toBeCloseTo(kappa, 9)
        expect(found.share).toBeCloseTo(mean(pairsOf(counts).map(([a, b]) => (a === b ? 1 : 0))), 9)
        const half = z * errorByDelta(counts)
        expect(found.kappaInterval?.low).toBeCloseTo(Math.max(-1, kappa - half), 5)
        expect(found.kappaInterval?.high).toBeCloseTo(Math.min(1, kappa + half), 5)
      }),
      { numRuns: 50 },
    )
  })

  it('does not care who is named first', () => {
    const side = fc.constantFrom('left', 'either', 'right')
    fc.assert(
      fc.property(fc.array(fc.tuple(side, side), { minLength: 1, maxLength: 12 }), (pairs) => {
        const one = agreementOf(pairs)
        const other = agreementOf(pairs.map(([a, b]) => [b, a] as const))
        expect(other.share).toBe(one.share)
        if (one.kappa === null) expect(other.kappa).toBeNull()
        else expect(other.kappa).toBeCloseTo(one.kappa, 10)
      }),
    )
  })
})
