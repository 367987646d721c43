import { object, string, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, optionalId, optionalText } from './fields.ts'
import {
  cutOffSets,
  handUseAnswers,
  handUseFormV1,
  type HandUseAnswer,
  type HandUseScore,
} from './handUse.ts'
import type { LateralLineRow } from './lateralLine.ts'

export const informants = ['guardian', 'teacher', 'child_demonstrated', 'therapist'] as const
export type Informant = (typeof informants)[number]
export const informantLabels: Record<Informant, string> = {
  guardian: 'Parent or carer',
  teacher: 'Teacher',
  child_demonstrated: 'Child showed it',
  therapist: 'Therapist saw it',
}

const answer = string<HandUseAnswer>()
  .nullable()
  .defined()
  .oneOf([...handUseAnswers, null] as HandUseAnswer[], 'Choose one of the six answers')

/** Answers by item id; null is "not answered yet". Every item of the form must be present. */
export const handUseAnswersSchema = object(
  Object.fromEntries(handUseFormV1.items.map((item) => [item.id, answer])),
)
  .noUnknown('This form has no activity ${unknown}')
  .required('The answers are missing')
export type HandUseAnswers = Record<string, HandUseAnswer | null>

export const questionnaireStartSchema = body({
  informant: choice('who answered', informants),
  respondentName: optionalText('Who answered', { max: 120 }),
  answeredOn: dayField('The date answered'),
  /** A locked response that this one replaces. */
  replacesId: optionalId('The earlier response'),
})
export type QuestionnaireStart = InferType<typeof questionnaireStartSchema>

export const questionnaireDraftSchema = body({
  informant: choice('who answered', informants),
  respondentName: optionalText('Who answered', { max: 120 }),
  answeredOn: dayField('The date answered'),
  answers: handUseAnswersSchema,
  cutOffSet: choice(
    'a cut-off set',
    cutOffSets.map((set) => set.id),
  ),
  comment: optionalText('The comment', { max: 1000 }),
})
export type QuestionnaireDraft = Omit<InferType<typeof questionnaireDraftSchema>, 'answers'> & {
  answers: HandUseAnswers
}

export interface QuestionnaireView {
  id: string
  childId: string
  formVersion: string
  informant: Informant
  respondentName: string | null
  answeredOn: Day
  answers: HandUseAnswers
  comment: string | null
  cutOffSet: string
  /** Computed by the server; stored with the response once locked. */
  score: HandUseScore
  lockedAt: string | null
  lockedBy: string | null
  replacesId: string | null
  replacedById: string | null
  version: number
  can: { change: boolean; lock: boolean; replace: boolean }
}

export interface HandProfileView {
  lateralLine: LateralLineRow[]
  questionnaires: QuestionnaireView[]
  /** Why nothing can be added now, in words; null when it can. */
  blocked: string | null
  can: { add: boolean }
}
