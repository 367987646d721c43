import { asksToSwitchHand } from './handSwitching.ts'
import type { Hand } from './roles.ts'

/** Levels of a goal scale in order: 0 is what was hoped for. */
export const attainmentLevels = [-2, -1, 0, 1, 2] as const
export type AttainmentLevel = (typeof attainmentLevels)[number]

const levelWords: Record<AttainmentLevel, string> = {
  [-2]: 'still getting going',
  [-1]: 'some of the way',
  0: 'reached what we hoped',
  1: 'a little more than we hoped',
  2: 'much more than we hoped',
}

/** Where a goal stands, in words for a family. The baseline tells a start at −1 from a move to −1. */
export function attainmentWords(level: AttainmentLevel, baseline: AttainmentLevel | null = null): string {
  if (baseline !== null && level < 0) {
    if (level === baseline) return 'still where we started'
    if (level < baseline) return 'harder just now than when we started'
  }
  return levelWords[level]
}

/** Importance × difficulty, each 0 to 3. A product of 0 weighs 1 (clinic rule), so that no goal drops out unseen. */
export const goalWeight = (importance: number, difficulty: number): number => importance * difficulty || 1

export interface WeightedLevel {
  weight: number
  /** Null when the goal was not scored. */
  level: number | null
}

/** Expected correlation between goals in the published formula. */
const rho = 0.3

/**
 * Goal attainment T-score: 50 when every goal ends as expected, 10 points for one standard deviation.
 * Null when nothing was scored or every weight is zero: 50 would read as "as expected".
 * Kiresuk & Sherman 1968, Community Ment Health J 4:443-453, in the form of the erratum to Turner-Stokes 2009,
 * Clin Rehabil 23:362-370 (sum of squared weights under the root, not the sum of weights).
 */
export function attainmentTScore(goals: readonly WeightedLevel[]): number | null {
  let weighted = 0
  let sum = 0
  let squares = 0
  for (const { weight, level } of goals) {
    if (level === null) continue
    weighted += weight * level
    sum += weight
    squares += weight * weight
  }
  const spread = Math.sqrt((1 - rho) * squares + rho * sum * sum)
  return spread === 0 ? null : 50 + (10 * weighted) / spread
}

export interface AttainmentChange {
  baselineT: number | null
  followUpT: number | null
  change: number | null
  /** Goals scored both times: only these count, at both times. */
  scored: number
  of: number
}

/** T at the start and now over the goals scored at both times, with the same weights. */
export function attainmentChange(
  goals: readonly { weight: number; baseline: number | null; followUp: number | null }[],
): AttainmentChange {
  const both = goals.filter((goal) => goal.baseline !== null && goal.followUp !== null)
  const baselineT = attainmentTScore(both.map(({ weight, baseline }) => ({ weight, level: baseline })))
  const followUpT = attainmentTScore(both.map(({ weight, followUp }) => ({ weight, level: followUp })))
  const change = baselineT === null || followUpT === null ? null : followUpT - baselineT
  return { baselineT, followUpT, change, scored: both.length, of: goals.length }
}

export interface GoalTextProblem {
  field: 'activity' | 'levels' | 'childVoice'
  /** Position in `levels` (0 is −2), null for a problem of the whole field. */
  level: number | null
  message: string
}

const switchMessage =
  'This asks the child to change hands. We do not set such a goal: describe what the child wants to do, with the hand the child uses.'

const levelName = (index: number): string => ['−2', '−1', '0', '+1', '+2'][index] ?? `number ${index + 1}`

const sameWords = (text: string): string =>
  text
    .normalize('NFKC')
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, ' ')
    .trim()

/**
 * What keeps a goal from being saved: a request to change hands, missing or identical levels, no word of the child.
 * `levels` run from −2 to +2. Empty when the goal can be saved.
 */
export function goalTextProblems(
  text: string,
  levels: readonly string[],
  childVoice: string | null,
  writingHand: Hand | null = null,
): GoalTextProblem[] {
  const problems: GoalTextProblem[] = []
  if (text.trim() === '')
    problems.push({ field: 'activity', level: null, message: 'Say which activity the goal is about' })
  if (asksToSwitchHand(text, writingHand))
    problems.push({ field: 'activity', level: null, message: switchMessage })

  if (levels.length !== attainmentLevels.length) {
    problems.push({ field: 'levels', level: null, message: 'Describe all five levels, from −2 to +2' })
  }
  const seen = new Map<string, number>()
  levels.forEach((words, index) => {
    const key = sameWords(words)
    const earlier = seen.get(key)
    if (key === '') {
      problems.push({ field: 'levels', level: index, message: `Describe level ${levelName(index)}` })
    } else if (earlier !== undefined) {
      const message = `Levels ${levelName(earlier)} and ${levelName(index)} say the same: describe what would look different`
      problems.push({ field: 'levels', level: index, message })
    } else {
      seen.set(key, index)
    }
    if (asksToSwitchHand(words, writingHand))
      problems.push({ field: 'levels', level: index, message: switchMessage })
  })

  if (childVoice === null || childVoice.trim() === '') {
    problems.push({
      field: 'childVoice',
      level: null,
      message: 'Write what the child says about it, in the child’s own words',
    })
  }
  return problems
}
