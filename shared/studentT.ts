import { incompleteBeta } from './incompleteBeta.ts'

/** Probability above t ≥ 0, by the incomplete beta function (NIST DLMF 8.17; Student 1908, Biometrika 6:1-25). */
const upperTail = (t: number, df: number): number =>
  incompleteBeta(df / (df + t * t), df / 2, 0.5, (t * t) / (df + t * t)) / 2

const checkDegrees = (df: number): void => {
  if (!(df > 0)) throw new RangeError(`Student's t needs more than ${df} degrees of freedom`)
}

/** Probability of a value up to t. Degrees of freedom need not be whole. Throws RangeError unless df > 0. */
export function studentTCdf(t: number, df: number): number {
  checkDegrees(df)
  return t < 0 ? upperTail(-t, df) : 1 - upperTail(t, df)
}

/**
 * The t below which a share p (0 < p < 1) of the distribution lies: 12 degrees and p .975 give 2.178813.
 * Bisection of the tail probability: slow and safe. Throws RangeError outside 0 < p < 1 and unless df > 0.
 */
export function studentTQuantile(p: number, df: number): number {
  checkDegrees(df)
  if (!(p > 0 && p < 1)) throw new RangeError(`No quantile of Student's t for ${p}`)
  if (p === 0.5) return 0
  const tail = Math.min(p, 1 - p)
  let low = 0
  let high = 1
  while (upperTail(high, df) > tail) {
    low = high
    high *= 2
  }
  while (high - low > 1e-14 * high) {
    const middle = (low + high) / 2
    if (middle <= low || middle >= high) break
    if (upperTail(middle, df) > tail) low = middle
    else high = middle
  }
  const t = (low + high) / 2
  return p < 0.5 ? -t : t
}

/** The factor of a two-sided interval at this level, 95 % unless told: t(1 − (1 − level)/2; df). */
export const studentTFactor = (df: number, level = 0.95): number => studentTQuantile(1 - (1 - level) / 2, df)
