import { mixed, string, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, optionalId, optionalText } from './fields.ts'
import type { FormAnswers, FormScore, FormView } from './forms.ts'
import { cutOffSets } from './handUse.ts'

export const informants = ['guardian', 'teacher', 'child_demonstrated', 'therapist'] as const
export type Informant = (typeof informants)[number]
export const informantLabels: Record<Informant, string> = {
  guardian: 'Parent or carer',
  teacher: 'Teacher',
  child_demonstrated: 'Child showed it',
  therapist: 'Therapist saw it',
}

export type HandUseAnswers = FormAnswers

const isMap = (value: unknown) => typeof value === 'object' && value !== null && !Array.isArray(value)

export const questionnaireStartSchema = body({
  /** An edition in use. */
  formId: string().required('Choose a form').max(40, 'Choose a form from the list'),
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
  /** By item of the form that was begun: each is there, null when it is not answered yet. Checked against that form. */
  answers: mixed<FormAnswers>()
    .required('The answers are missing')
    .test('map', 'The answers could not be read', isMap),
  cutOffSet: choice(
    'a cut-off set',
    cutOffSets.map((set) => set.id),
  ),
  comment: optionalText('The comment', { max: 1000 }),
})
export type QuestionnaireDraft = InferType<typeof questionnaireDraftSchema>

/** The word for a finished response: a therapist signs, a family or teacher who was asked sends. */
export const responseFinishedLabel = ({ requestId }: { requestId: string | null }) =>
  requestId === null ? 'Signed' : 'Sent'

export interface QuestionnaireView {
  id: string
  childId: string
  /** The edition that is answered. */
  form: FormView
  informant: Informant
  respondentName: string | null
  answeredOn: Day
  answers: FormAnswers
  comment: string | null
  cutOffSet: string
  /** Computed by the server; stored with the response once locked. */
  score: FormScore
  lockedAt: string | null
  lockedBy: string | null
  /** The request that a carer or teacher answers with it; null when staff write the answers down. */
  requestId: string | null
  replacesId: string | null
  replacedById: string | null
  /** Begun for a request that ended before it was sent: nobody can finish it, and the therapist may discard it. */
  leftOver: boolean
  version: number
  can: { change: boolean; lock: boolean; discard: boolean; replace: boolean }
}
