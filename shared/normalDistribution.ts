/**
 * Probability above z of the standard normal distribution. Near the middle the power series of the area, further out the
 * continued fraction of the tail, which stays accurate however small the tail (NIST DLMF 7.6.2 and 7.9.3).
 */
export function normalUpperTail(z: number): number {
  if (z < 0) return 1 - normalUpperTail(-z)
  const density = Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI)
  if (z < 3) {
    let term = z
    let area = z
    for (let k = 3; term > area * 1e-17; k += 2) {
      term *= (z * z) / k
      area += term
    }
    return 0.5 - density * area
  }
  let fraction = z
  for (let k = 120; k >= 1; k -= 1) fraction = z + k / fraction
  return density / fraction
}

/** Probability up to z. */
export const normalCdf = (z: number): number => normalUpperTail(-z)
