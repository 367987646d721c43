/** Most signs the exact sum is asked for: beyond it the binomial coefficients leave the range of a number. */
const mostSigns = 1000

/**
 * Probability of `least` or more of `n` signs falling one way when either way is equally likely: an exact binomial sum.
 * Throws RangeError for counts that are not whole, not ordered or over 1000.
 */
export function fairTail(n: number, least: number): number {
  if (![n, least].every(Number.isInteger) || n < 0 || least < 0 || least > n || n > mostSigns)
    throw new RangeError(`No sign test for ${least} of ${n}`)
  let ways = 1
  let sum = 0
  for (let count = n; count >= least; count -= 1) {
    sum += ways
    ways = (ways * count) / (n - count + 1)
  }
  return sum / 2 ** n
}

export interface SignTest {
  /** Pairs that point one way or the other; ties are dropped. */
  n: number
  /** Null when nothing is left after the ties. */
  twoSided: number | null
  /** In the direction the signs took. */
  oneSided: number | null
}

/**
 * Exact sign test. Ties say nothing about direction and are dropped; the two-sided value doubles the smaller tail, at
 * most 1. Arbuthnott 1710 in modern form; worked values 8 of 10 (p .1094) and 7 of 8 (one-sided .0352) on public
 * statistics course pages.
 */
export function signTest({ plus, minus }: { plus: number; minus: number }): SignTest {
  const n = plus + minus
  if (n === 0) return { n, twoSided: null, oneSided: null }
  const oneSided = fairTail(n, Math.max(plus, minus))
  return { n, twoSided: Math.min(1, 2 * oneSided), oneSided }
}

/**
 * Lowest and highest count of `n` choices for one hand that is still not beyond chance, two-sided: of 21 reaches 6 to
 * 15. With five choices or fewer every count is within chance. Null when there is nothing to choose.
 */
export function chanceCounts(n: number, level = 0.05): { low: number; high: number } | null {
  if (n === 0) return null
  let high = n
  while (high > n / 2 && 2 * fairTail(n, high) <= level) high -= 1
  return { low: n - high, high }
}

/** The same limits on the scale of an index 100 (R − L)/(R + L). */
export function chanceIndex(n: number, level = 0.05): { low: number; high: number } | null {
  const counts = chanceCounts(n, level)
  if (!counts) return null
  const high = (100 * (counts.high - counts.low)) / n
  return { low: high === 0 ? 0 : -high, high }
}
