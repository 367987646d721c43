import { array, string, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, optionalText, text, tidy } from './fields.ts'
import type { Hand } from './roles.ts'
import type { Page } from './pages.ts'

/** At most five items at once: a teacher can act on five, not on fifteen (clinic rule). */
export const maximumAdviceItems = 5

export const publishAdviceSchema = body({
  items: array(
    body({
      itemId: string()
        .required()
        .matches(/^[A-Z]\d{2}$/, 'This advice is not in the library'),
      because: text('The reason for the teacher', { min: 5, max: 300 }),
    }),
  )
    .required()
    .min(1, 'Choose at least one item')
    .max(maximumAdviceItems, 'Choose five items at most'),
  checkBy: dayField('The check date'),
})
export type PublishAdvice = InferType<typeof publishAdviceSchema>

export const adviceReplies = ['done', 'trying', 'cannot'] as const
export type AdviceReply = (typeof adviceReplies)[number]
export const adviceReplyLabels: Record<AdviceReply, string> = {
  done: 'Done',
  trying: 'Trying it',
  cannot: 'Cannot do it',
}

const sayWhy = 'Say why it cannot be done, so that we can find another way'

export const adviceReplySchema = body({
  reply: choice('an answer', adviceReplies),
  reason: optionalText('The reason', { max: 500 }).when('reply', {
    is: 'cannot',
    then: (schema) => schema.required(sayWhy).test('filled', sayWhy, (value) => tidy(value) !== ''),
  }),
})
export type AdviceReplyGiven = InferType<typeof adviceReplySchema>

/** An item the record's facts call for; a therapist picks, nothing is sent by itself. */
export interface OfferedAdvice {
  itemId: string
  text: string
  because: string
  triggeredBy: string
  caution: string | null
  grade: string
  source: string
  published: boolean
}

export interface PublishedAdvice {
  id: string
  itemId: string
  text: string
  because: string
  caution: string | null
  checkBy: Day
  publishedOn: Day
  endedOn: Day | null
  reply: { answer: AdviceReply; reason: string | null; by: string; at: string } | null
  can: { reply: boolean; end: boolean }
}

export interface ChildSchoolView {
  school: string | null
  className: string | null
  teacher: string | null
  /** Whether the family shares seating and classroom advice with the school now. */
  shared: boolean
  offered: OfferedAdvice[]
  published: PublishedAdvice[]
  can: { publish: boolean }
}

/** A class as its teacher sees it. */
export interface TeacherClassRow {
  id: string
  name: string
  school: string
  schoolYear: number
  sharedPupils: number
  unanswered: number
}

export interface PupilRow {
  id: string
  name: string
  writingHand: Hand | 'swaps' | null
  advice: number
  unanswered: number
  changedOn: Day | null
}
export type PupilPage = Page<PupilRow>

/** Everything a teacher sees of a pupil: nothing clinical. */
export interface PupilView {
  id: string
  name: string
  className: string
  writingHand: Hand | 'swaps' | null
  advice: PublishedAdvice[]
  /** Shared goals in the child's words, where the family agreed. */
  goals: string[]
}
