import type { Day } from './days.ts'
import type { FormAnswers, FormView } from './forms.ts'
import type { HistoryDetails } from './histories.ts'

/** What the clinic asks for. */
export const requestedForms = ['history', 'questionnaire'] as const
export type RequestedForm = (typeof requestedForms)[number]

/** Whom it asks. */
export const answererKinds = ['guardian', 'teacher'] as const
export type AnswererKind = (typeof answererKinds)[number]

/** Days a link can be used, and days after which a reminder goes out (domain: day 7 and 14, link 28 days). */
export const requestDays = 28
export const reminderDays = [7, 14] as const

export const requestStates = ['waiting', 'begun', 'answered', 'expired', 'cancelled'] as const
export type RequestState = (typeof requestStates)[number]

/** A request as the therapist sees it. */
export interface AnswerRequestView {
  id: string
  asks: RequestedForm
  formTitle: string
  answerer: AnswererKind
  /** The carer's or teacher's name. */
  askedOf: string
  askedAt: string
  expiresAt: string
  byLink: boolean
  reminders: number
  state: RequestState
  answeredAt: string | null
  /** The history or response that came back; null until something was saved. */
  answerId: string | null
  version: number
  can: { cancel: boolean; remind: boolean }
}

/** A line of "to answer" for a carer or teacher. */
export interface ToAnswer {
  id: string
  childId: string
  childName: string
  title: string
  begun: boolean
  askedOn: Day
  answerBy: Day
}

/** What the answering page works on, the same for a carer signed in, a teacher, and a carer with a link. */
export interface AnswerPage {
  requestId: string
  asks: RequestedForm
  childName: string
  askedOf: string
  answerBy: Day
  /** Set for a questionnaire. */
  form: FormView | null
  answers: FormAnswers | null
  comment: string | null
  /** Set for a history. */
  history: HistoryDetails | null
  /** 0 while nothing was saved. */
  version: number
  /** Urgent words for the family that the answers so far call for (same-day signs); empty when none. */
  urgent: string[]
  clinic: { name: string; phone: string; emergencyText: string }
}
