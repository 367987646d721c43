import { array, number, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, optionalText, text } from './fields.ts'

const scale = (label: string) =>
  number().required(`Choose ${label}`).integer().min(0, '0 to 3').max(3, '0 to 3')

export const goalSchema = body({
  activity: text('The activity', { min: 10, max: 300 }),
  childVoice: text('The child’s own words', { min: 2, max: 300 }),
  /** Five observable levels, −2 … +2 in this order. */
  levels: array(text('Each level', { min: 3, max: 300 }))
    .required()
    .length(5, 'Describe all five levels'),
  baseline: number().required('Choose the starting level').oneOf([-2, -1], 'Start at −2 or −1'),
  importance: scale('how important it is'),
  difficulty: scale('how hard it is'),
  targetOn: dayField('The target date'),
})
export type GoalDetails = InferType<typeof goalSchema>

export const goalRatingSchema = body({
  level: number().required('Choose a level').integer().min(-2).max(2),
  ratedOn: dayField('The date'),
  note: optionalText('The note', { max: 500 }),
})
export type GoalRating = InferType<typeof goalRatingSchema>

export const goalOutcomes = ['finished', 'set_aside'] as const
export type GoalOutcome = (typeof goalOutcomes)[number]

export const goalEndSchema = body({
  outcome: choice('how it ended', goalOutcomes),
  reason: text('The reason', { min: 2, max: 300 }),
})
export type GoalEnd = InferType<typeof goalEndSchema>

/** A child works towards four goals at most at a time (clinic rule). */
export const mostOpenGoals = 4

export interface GoalView extends GoalDetails {
  id: string
  ratings: { level: number; ratedOn: Day; by: string; note: string | null }[]
  latestLevel: number | null
  endedOn: Day | null
  outcome: GoalOutcome | null
  endReason: string | null
  setOn: Day
  version: number
  can: { change: boolean; rate: boolean }
}

export interface GoalsView {
  goals: GoalView[]
  /** T at baseline and now over the goals scored at both; null when none is. */
  baselineScore: number | null
  score: number | null
  scored: number
  can: { add: boolean }
}
