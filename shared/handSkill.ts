import { lateralityQuotient } from './laterality.ts'
import type { HandSummary, Interval, SkillDetails, SkillKind, SkillScore, SkillTrial } from './measures.ts'
import type { Hand } from './roles.ts'
import { studentTFactor } from './studentT.ts'

/*
 * Skill of each hand: pegs by time, taps and dots by count, three to five trials a hand. The index is the difference as a
 * share of the total (Schmidt et al. 2000, Neuropsychologia 38:529-534, abstract read). Degrees on different tasks hardly
 * go together (McManus, Van Horn & Bryden 2016, Laterality 21:371-396), so indices of different tasks are never averaged.
 * No table of times by age is built in: a child is compared with themselves.
 */

export const leastTrials = 3
export const mostTrials = 5

export const skillUnit = (kind: SkillKind): 'seconds' | 'count' => (kind === 'pegs' ? 'seconds' : 'count')

/**
 * Index of two means, −100 … +100, positive when the right hand is better: 100 (R − L)/(R + L) for counts,
 * 100 (L − R)/(L + R) for times. Null when a hand is missing or both are 0.
 */
export function skillIndex(
  unit: 'seconds' | 'count',
  { left, right }: { left: number | null; right: number | null },
): number | null {
  if (left === null || right === null) return null
  return lateralityQuotient(unit === 'count' ? { left, right } : { left: right, right: left })
}

/** The trials that count: taken, and not interrupted. */
export const countedTrials = (
  trials: readonly SkillTrial[],
  hand: Hand,
): (SkillTrial & { value: number })[] =>
  trials.filter(
    (trial): trial is SkillTrial & { value: number } =>
      trial.hand === hand && !trial.interrupted && trial.value !== null,
  )

/**
 * Mean, standard deviation (n − 1) and 95 % interval of the mean by Student's t with n − 1 degrees of freedom, in the
 * unit of the values. Values are sorted first, so that their order changes not even the last digit. Trials that do not
 * differ at all say nothing about the spread, so they have no interval: one of no width would claim certainty.
 */
export function summariseTrials(values: readonly number[]): HandSummary {
  const n = values.length
  if (n === 0) return { trials: 0, mean: null, sd: null, interval: null }
  const sorted = values.toSorted((a, b) => a - b)
  const least = sorted[0]
  // Asked of the values, not of the deviation: adding up 20.1 three times does not give 60.3 to the last digit.
  if (n > 1 && least !== undefined && least === sorted.at(-1))
    return { trials: n, mean: least, sd: 0, interval: null }
  const mean = sorted.reduce((sum, value) => sum + value, 0) / n
  if (n === 1) return { trials: 1, mean, sd: null, interval: null }
  const sd = Math.sqrt(sorted.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1))
  const half = (studentTFactor(n - 1) * sd) / Math.sqrt(n)
  return { trials: n, mean, sd, interval: { low: mean - half, high: mean + half } }
}

/**
 * Approximate 95 % interval of the index by the delta method. For I = 100 (R − L)/(R + L) of two independent means,
 * Var I ≈ (200/(R + L)²)² (L² s²R/nR + R² s²L/nL), the same for times; half-width t × √Var with the degrees of freedom of
 * Welch and Satterthwaite, held within −100 … +100. Rough for few trials, and trials of one sitting are not quite
 * independent. Null with fewer than two trials a hand, and when no trial differs: the spread is then not known, and an
 * interval of no width would claim certainty. Formula derived here; methods from memory.
 */
export function skillIndexInterval(
  index: number | null,
  { left, right }: { left: HandSummary; right: HandSummary },
): Interval | null {
  if (index === null || left.mean === null || right.mean === null || left.sd === null || right.sd === null)
    return null
  const slope = 200 / (left.mean + right.mean) ** 2
  const fromRight = (slope * left.mean * right.sd) ** 2 / right.trials
  const fromLeft = (slope * right.mean * left.sd) ** 2 / left.trials
  const variance = fromRight + fromLeft
  if (variance === 0) return null
  const freedom = variance ** 2 / (fromRight ** 2 / (right.trials - 1) + fromLeft ** 2 / (left.trials - 1))
  const half = studentTFactor(freedom) * Math.sqrt(variance)
  return { low: Math.max(-100, index - half), high: Math.min(100, index + half) }
}

/** Mean, spread and interval of each hand and the index of the means. Interrupted trials are kept and left out. */
export function scoreSkill({ kind, trials }: Pick<SkillDetails, 'kind' | 'trials'>): SkillScore {
  const summaryOf = (hand: Hand) => summariseTrials(countedTrials(trials, hand).map(({ value }) => value))
  const unit = skillUnit(kind)
  const left = summaryOf('left')
  const right = summaryOf('right')
  const index = skillIndex(unit, { left: left.mean, right: right.mean })
  return {
    kind,
    unit,
    left,
    right,
    interrupted: trials.filter((trial) => trial.interrupted).length,
    index,
    interval: skillIndexInterval(index, { left, right }),
  }
}

const cautionOf: Record<SkillKind, string> = {
  pegs: 'The gap between the hands is larger in younger children and shrinks with age (Bryden et al. 2003). Practice makes later trials quicker.',
  tapping:
    'How much faster one hand taps says little about which hand is preferred (233 children, Njiokiktjien et al. 1997).',
  dots: 'From 4 to 18 years the hands do not fall into two groups on dots (conference abstract, n 274): nobody is classed by them.',
}

/** There is an index and trials enough, and still no interval: they are too alike to say how far they spread. */
export const tooAlike = ({ index, interval, left, right }: SkillScore): boolean =>
  index !== null && interval === null && left.trials > 1 && right.trials > 1

/** What must be read with the figures, the weakest point first. */
export function skillCautions(score: SkillScore): string[] {
  const few = Math.min(score.left.trials, score.right.trials)
  return [
    ...(few === 0 ? ['One hand has no counted trial, so there is no index.'] : []),
    ...(few > 0 && few < leastTrials
      ? [`Fewer than ${leastTrials} counted trials with one hand: take more before you lean on this.`]
      : []),
    ...(tooAlike(score)
      ? [
          'The trials are too alike to say how sure the gap is, so there is no interval. Take more, or read the watch to a tenth.',
        ]
      : []),
    ...(score.interval === null ? [] : ['The interval of the index is approximate.']),
    cautionOf[score.kind],
  ]
}

/** Words that must stand where the indices of several tasks are seen together. */
export const neverAveraged =
  'Tasks agree on the better hand more than on how much better it is, so the figures of different tasks are not averaged (McManus, Van Horn & Bryden 2016).'

/*
 * Beyond these a value is asked about before it is kept. Clinic rules, wide on purpose and no norms: seconds a peg, and
 * taps or dots a second.
 */
export const likelyPace: Record<SkillKind, Interval> = {
  pegs: { low: 0.5, high: 12 },
  tapping: { low: 0.5, high: 10 },
  dots: { low: 0.1, high: 5 },
}

type TrialSetting = Pick<SkillDetails, 'pegs' | 'seconds'>

const fewestSteps = (value: number) => Number(value.toFixed(1))

/**
 * The question to ask before a value is kept, or null when it is plausible. Pegs in seconds for the pegs of one trial,
 * tapping and dots as a count in the seconds of one trial. 0 s, an hour for ten pegs and 400 taps in 10 s are asked about.
 */
export function unlikelyTrial(
  kind: SkillKind,
  value: number | null,
  { pegs, seconds }: TrialSetting,
): string | null {
  const amount = kind === 'pegs' ? pegs : seconds
  if (value === null || amount === null) return null
  const least = likelyPace[kind].low * amount
  const most = likelyPace[kind].high * amount
  if (value >= least && value <= most) return null
  const shown = fewestSteps(value)
  const limits = `${fewestSteps(least)} to ${fewestSteps(most)}`
  if (kind === 'pegs')
    return `${shown} s for ${amount} ${amount === 1 ? 'peg' : 'pegs'} is unusual (${limits} s is likely). Is that the value?`
  const things = kind === 'tapping' ? 'taps' : 'dots'
  return `${shown} ${things} in ${amount} s is unusual (${limits} is likely). Is that the value?`
}

/** Positions of trials that count, are unlikely, and were not confirmed. */
export const unansweredTrials = (details: SkillDetails): number[] =>
  details.trials.flatMap((trial, at) =>
    !trial.interrupted && !trial.confirmed && unlikelyTrial(details.kind, trial.value, details) !== null
      ? [at]
      : [],
  )

export interface NextTrial {
  hand: Hand
  /** 1 to 5: both hands have one trial in each round. */
  round: number
  /** Each hand has its three trials; more are welcome and not needed. */
  enough: boolean
}

/**
 * The hand to test next: each round has one counted trial a hand and starts with the other hand than the round before,
 * so that practice and tiredness fall on both. An interrupted trial is taken again with the same hand. Null when both
 * hands have five.
 */
export function nextTrial({
  startHand,
  trials,
}: Pick<SkillDetails, 'startHand' | 'trials'>): NextTrial | null {
  const left = countedTrials(trials, 'left').length
  const right = countedTrials(trials, 'right').length
  const done = Math.min(left, right)
  if (done >= mostTrials) return null
  const other = startHand === 'left' ? 'right' : 'left'
  const first = done % 2 === 0 ? startHand : other
  const hand = left === right ? first : left < right ? 'left' : 'right'
  return { hand, round: done + 1, enough: done >= leastTrials }
}
