/** z of a two-sided 95 % interval, the .975 quantile of the standard normal distribution. */
export const z95 = 1.959963984540054

/**
 * Wilson's score interval for a proportion of `k` in `n`, kept within 0 and 1: 81 of 263 give .2553 to .3662.
 * Null when n is 0. Throws RangeError unless 0 ≤ k ≤ n.
 * Wilson 1927, J Am Stat Assoc 22:209-212; compared with other methods in Newcombe 1998, Stat Med 17:857-872.
 */
export function wilsonInterval(k: number, n: number, z = z95): { low: number; high: number } | null {
  if (!(k >= 0 && k <= n)) throw new RangeError(`No proportion of ${k} in ${n}`)
  if (n === 0) return null
  const share = k / n
  const widened = 1 + (z * z) / n
  const centre = (share + (z * z) / (2 * n)) / widened
  const half = (z / widened) * Math.sqrt((share * (1 - share)) / n + (z * z) / (4 * n * n))
  // At 0 and n the exact limits are 0 and 1; rounding must not move them.
  return {
    low: k === 0 ? 0 : Math.max(0, centre - half),
    high: k === n ? 1 : Math.min(1, centre + half),
  }
}
