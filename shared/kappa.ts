import { wilsonInterval, z95 } from './wilson.ts'

interface Interval {
  low: number
  high: number
}

export interface Agreement {
  /** Pairs compared. */
  compared: number
  agreed: number
  /** Share agreed, 0 to 1, with Wilson's 95 % interval; null when nothing was compared. */
  share: number | null
  shareInterval: Interval | null
  /** Null when nothing was compared or chance alone would already agree on everything. */
  kappa: number | null
  /**
   * Large-sample 95 % interval, kept within −1 and 1. Null without kappa, and where the large-sample error is zero and
   * would claim certainty: at kappa 1, and when one rater gave the same answer throughout.
   */
  kappaInterval: Interval | null
}

/**
 * Percentage agreement and Cohen's kappa of two raters over nominal categories.
 * Kappa: Cohen 1960, Educ Psychol Meas 20:37-46. Standard error: Fleiss, Cohen & Everitt 1969, Psychol Bull 72:323-327,
 * as worked in an open package's reference page (31, 12, 4, 58: kappa .6757, error .0734, .5317 to .8196).
 */
export function agreementOf<Category extends string>(
  pairs: readonly (readonly [Category, Category])[],
): Agreement {
  const n = pairs.length
  const agreed = pairs.filter(([one, other]) => one === other).length
  const base = {
    compared: n,
    agreed,
    share: n === 0 ? null : agreed / n,
    shareInterval: wilsonInterval(agreed, n),
  }
  const categories = [...new Set(pairs.flat())]
  const shareOf = (matches: (pair: readonly [Category, Category]) => boolean) =>
    pairs.filter(matches).length / n
  const row = (category: Category) => shareOf(([one]) => one === category)
  const column = (category: Category) => shareOf(([, other]) => other === category)

  const byChance = categories.reduce((sum, category) => sum + row(category) * column(category), 0)
  // Fewer than two categories, or nothing compared: chance explains everything and kappa is 0 ÷ 0.
  if (categories.length < 2) return { ...base, kappa: null, kappaInterval: null }
  const kappa = (agreed / n - byChance) / (1 - byChance)

  const diagonal = categories.reduce(
    (sum, category) =>
      sum +
      shareOf(([one, other]) => one === category && other === category) *
        (1 - (row(category) + column(category)) * (1 - kappa)) ** 2,
    0,
  )
  const elsewhere = pairs
    .filter(([one, other]) => one !== other)
    .reduce((sum, [one, other]) => sum + (column(one) + row(other)) ** 2 / n, 0)
  const centred = (kappa - byChance * (1 - kappa)) ** 2
  const variance = (diagonal + (1 - kappa) ** 2 * elsewhere - centred) / (n * (1 - byChance) ** 2)
  const error = Math.sqrt(Math.max(0, variance))
  // Zero, but by the sums of a computer its square is off by some 1e-17, and the root of that is a few billionths.
  const certain = agreed === n || error < 1e-6
  return {
    ...base,
    kappa,
    kappaInterval: certain
      ? null
      : { low: Math.max(-1, kappa - z95 * error), high: Math.min(1, kappa + z95 * error) },
  }
}
