/*
 * How often left-handedness is found, as context for parents. Groups, never this child: early-life factors together
 * predict one person's hand hardly at all (de Kovel et al. 2019, about 500,000 people). Figures with a source and figures
 * of common practice are kept apart.
 */

export const parentPairs = ['both_right', 'one_left', 'both_left'] as const
export type ParentPair = (typeof parentPairs)[number]
export const parentPairLabels: Record<ParentPair, string> = {
  both_right: 'Both parents right-handed',
  one_left: 'One parent left-handed',
  both_left: 'Both parents left-handed',
}

export interface PublishedRate {
  pair: ParentPair
  /** Of a hundred children in such families, how many are left-handed. Decimals from memory: not to be shown. */
  percent: number
  /** The same as it was read, at second hand: what is shown. */
  about: number
}

export const publishedSource =
  'Whole percents of some 70,000 children, after McManus & Bryden 1992, read at second hand'

/** Left-handed children by their parents' hands. */
export const publishedRates: readonly PublishedRate[] = [
  { pair: 'both_right', percent: 9.5, about: 9 },
  { pair: 'one_left', percent: 19.5, about: 19 },
  { pair: 'both_left', percent: 26.1, about: 26 },
]

/** People in general, with the lowest and highest figure by definition used. */
export const generalRate = {
  percent: 10.6,
  low: 9.3,
  high: 18.1,
  people: 2_396_170,
  source: 'Papadatou-Pastou et al. 2020, Psychol Bull 146:481-524',
}

/** Male against female odds of being left-handed: an odds ratio, not a ratio of percentages. */
export const maleOddsRatio = {
  ratio: 1.23,
  low: 1.19,
  high: 1.27,
  source: 'Papadatou-Pastou et al. 2008, Psychol Bull 134:677-699',
}

/** Twins against children born alone. */
export const twinOddsRatio = {
  ratio: 1.4,
  low: 1.26,
  high: 1.57,
  source: 'Pfeifer et al. 2022, BMC Psychol 10:11',
}

export const commonPracticeSource = 'Common practice, no source'

/** Figures therapists often say; no publication was found for them. */
export const commonPracticeRates: readonly { label: string; percent: number }[] = [
  { label: 'People in general', percent: 10 },
  { label: 'Father left-handed, mother right-handed', percent: 17 },
  { label: 'Both parents right-handed', percent: 10 },
]

/** Whether the mother's or the father's hand counts for more is contested: studies find either, or both. */
export const contested =
  'Studies disagree on whether the mother’s or the father’s hand matters more, so the rates name no parent.'

/**
 * The probability that goes with another one through an odds ratio. Probabilities lie between 0 and 1.
 * Throws RangeError outside (0, 1) or for a ratio that is not positive.
 */
export function throughOdds(probability: number, oddsRatio: number): number {
  if (!(probability > 0 && probability < 1)) throw new RangeError('A probability lies between 0 and 1')
  if (!(oddsRatio > 0)) throw new RangeError('An odds ratio is positive')
  const odds = (probability / (1 - probability)) * oddsRatio
  return odds / (1 + odds)
}

/** Left-handed children to expect in a group, and the chance of at least one: 30 at 10.6 % give 3.18 and 0.965. */
export const expectedInGroup = (prevalence: number, size: number) => ({
  expected: size * prevalence,
  atLeastOne: 1 - (1 - prevalence) ** size,
})
