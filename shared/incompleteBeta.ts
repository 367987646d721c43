/** Coefficients of Stirling's series, B(2k) / (2k (2k − 1)) from the Bernoulli numbers (NIST DLMF 5.11.1). */
const stirling = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156]

/** Natural logarithm of the gamma function for x > 0: raised above 12 by its recurrence, then Stirling's series. */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`No gamma function of ${x} here`)
  let raised = x
  let factors = 1
  while (raised < 12) {
    factors *= raised
    raised += 1
  }
  const series = stirling.reduce((sum, coefficient, k) => sum + coefficient / raised ** (2 * k + 1), 0)
  return (raised - 0.5) * Math.log(raised) - raised + Math.log(2 * Math.PI) / 2 + series - Math.log(factors)
}

const tiny = 1e-300
const awayFromZero = (value: number) => (Math.abs(value) < tiny ? tiny : value)

/** The continued fraction of NIST DLMF 8.17.22, from the front (modified Lentz); quick for x < (a + 1)/(a + b + 2). */
function betaFraction(x: number, a: number, b: number): number {
  let numerator = 1
  let denominator = 1 / awayFromZero(1 - ((a + b) * x) / (a + 1))
  let value = denominator
  for (let m = 1; m <= 1000; m += 1) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m))
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1))
    for (const term of [even, odd]) {
      denominator = 1 / awayFromZero(1 + term * denominator)
      numerator = awayFromZero(1 + term / numerator)
      value *= numerator * denominator
    }
    if (Math.abs(numerator * denominator - 1) < 1e-16) break
  }
  return value
}

/**
 * Regularised incomplete beta function I_x(a, b) for 0 ≤ x ≤ 1, a and b positive.
 * `rest` is 1 − x, given apart where the caller knows it better than a subtraction would.
 */
export function incompleteBeta(x: number, a: number, b: number, rest = 1 - x): number {
  if (!(x >= 0 && rest >= 0)) throw new RangeError(`No incomplete beta function at ${x}`)
  if (x === 0) return 0
  if (rest === 0) return 1
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log(rest))
  return x < (a + 1) / (a + b + 2)
    ? (front * betaFraction(x, a, b)) / a
    : 1 - (front * betaFraction(rest, b, a)) / b
}
