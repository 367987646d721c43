import { boolean, mixed, number, string, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, optionalId, optionalText } from './fields.ts'
import type { FormAnswers, FormView } from './forms.ts'
import type { HistoryDetails } from './histories.ts'
import type { Page } from './pages.ts'

/** What the clinic asks for. */
export const requestedForms = ['history', 'questionnaire'] as const
export type RequestedForm = (typeof requestedForms)[number]

/** Whom it asks. */
export const answererKinds = ['guardian', 'teacher'] as const
export type AnswererKind = (typeof answererKinds)[number]

/** Days a link can be used, and days after which a reminder goes out (domain: day 7 and 14, link 28 days). */
export const requestDays = 28
export const reminderDays = [7, 14] as const

/** A reminder sent by hand so many days before one was due takes its place. */
export const reminderRestDays = 2
const dayMs = 86_400_000

interface RequestMoments {
  askedAt: Date
  remindedAt: Date | null
  savedAt: Date | null
}

/**
 * The day (7 or 14 after asking) whose reminder is due now; null when none is. One e-mail makes up for all that were
 * missed. Nobody is reminded who saved something in the last day: they are at it.
 */
export function dueReminder({ askedAt, remindedAt, savedAt }: RequestMoments, at: Date): number | null {
  const dueAt = (days: number) => askedAt.getTime() + days * dayMs
  const latest = reminderDays.filter((days) => at.getTime() >= dueAt(days)).at(-1)
  if (latest === undefined) return null
  if (remindedAt !== null && remindedAt.getTime() >= dueAt(latest - reminderRestDays)) return null
  if (savedAt !== null && at.getTime() - savedAt.getTime() < dayMs) return null
  return latest
}

export const requestStates = ['waiting', 'begun', 'answered', 'expired', 'cancelled'] as const
export type RequestState = (typeof requestStates)[number]
export const requestStateLabels: Record<RequestState, string> = {
  waiting: 'Waiting',
  begun: 'Begun',
  answered: 'Answered',
  expired: 'Time is over',
  cancelled: 'Withdrawn',
}

/** Why a link ended with a change of its carer; whoever asks anew sees it. */
export const linkEndReasons = ['address', 'contact'] as const
export type LinkEndReason = (typeof linkEndReasons)[number]
export const linkEndLabels: Record<LinkEndReason, string> = {
  address: 'ended: the carer’s e-mail address changed. Ask again, so that the link goes to the new one',
  contact: 'ended: this carer may not be written to any more',
}

/** How families and teachers read what is asked. */
export const requestTitles: Record<RequestedForm, string> = {
  history: 'How things began',
  questionnaire: 'Which hand for which activity',
}

export const answerRequestSchema = body({
  asks: choice('what you ask for', requestedForms),
  /** An edition of a questionnaire; null for the history. */
  formId: string()
    .nullable()
    .defined()
    .max(40, 'Choose a form from the list')
    .when('asks', {
      is: 'questionnaire',
      then: (schema) => schema.required('Choose a form'),
      otherwise: (schema) => schema.oneOf([null], 'The history has one form only'),
    }),
  answerer: choice('whom you ask', answererKinds).when('asks', {
    is: 'history',
    then: (schema) =>
      schema.test(
        'carer',
        'Only a parent or carer is asked how things began',
        (answerer) => answerer === 'guardian',
      ),
  }),
  guardianId: optionalId('The carer').when('answerer', {
    is: 'guardian',
    then: (schema) => schema.required('Choose a carer'),
    otherwise: (schema) => schema.oneOf([null], 'Choose either a carer or a teacher'),
  }),
  teacherId: optionalId('The teacher').when('answerer', {
    is: 'teacher',
    then: (schema) => schema.required('Choose a teacher'),
    otherwise: (schema) => schema.oneOf([null], 'Choose either a carer or a teacher'),
  }),
  /** An e-mail with a link that needs no sign-in; for carers only. */
  byLink: boolean()
    .required('Choose how it is answered')
    .when('answerer', {
      is: 'teacher',
      then: (schema) => schema.test('signed-in', 'Teachers sign in to answer', (byLink) => byLink === false),
    }),
  /** Somebody asked the carer whether this is their address: a link shows the questions to whoever gets it. */
  addressConfirmed: boolean(),
})
export type AnswerRequestDetails = InferType<typeof answerRequestSchema>

/** Answers so far, as they come in; their content is checked against the form that was asked. */
const draftFields = {
  answers: mixed<FormAnswers>().test('map', 'The answers could not be read', isMapOrAbsent),
  comment: optionalText('The comment', { max: 1000 }).optional(),
  history: mixed<HistoryDetails>().test('map', 'The answers could not be read', isMapOrAbsent),
}

function isMapOrAbsent(value: unknown): boolean {
  return value === undefined || (typeof value === 'object' && value !== null && !Array.isArray(value))
}

export const answerDraftSchema = body(draftFields)
export interface AnswerDraft {
  answers?: FormAnswers
  comment?: string | null
  history?: HistoryDetails
}

const proof = {
  token: string().required('This link is not complete').max(200, 'This link is not complete'),
  /** The child's, typed by the carer. */
  birthDate: dayField('The date of birth'),
}
const savedVersion = number().required().integer().min(0).max(999_999_999)

export const answerLinkSchema = body(proof)
export type AnswerLink = InferType<typeof answerLinkSchema>
export const answerLinkDraftSchema = body({ ...proof, version: savedVersion, ...draftFields })
export const answerLinkSendSchema = body({ ...proof, version: savedVersion })

/** Whom the clinic can ask about a child, and what for. */
export interface AnswerChoices {
  /** Why nothing can be asked now, in words; null when it can. */
  blocked: string | null
  forms: { id: string; title: string; informants: AnswererKind[] }[]
  guardians: {
    id: string
    name: string
    /** Why this carer cannot be asked, in words; null when they can. */
    refused: string | null
    byLink: boolean
    signedIn: boolean
    /** Where a link would go. */
    email: string | null
    /** The carer is known by their own sign-in: nobody needs to confirm the address. */
    verified: boolean
  }[]
  teachers: { id: string; name: string }[]
  /** Why no teacher can be asked, in words; null when one can. */
  teachersRefused: string | null
}

/** A request as therapist and lead see it. */
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
  /** Why it ended by itself; null otherwise. */
  cancelledWhy: LinkEndReason | null
  answeredAt: string | null
  /** The history or response that came back; null until something was saved. */
  answerId: string | null
  version: number
  can: { cancel: boolean; remind: boolean }
}

/** The newest first. */
export interface AnswerRequestPage extends Page<AnswerRequestView> {
  /** How many of all can still be answered. */
  waiting: number
}

/** A line of "to answer" for a carer or teacher. */
export interface ToAnswer {
  id: string
  childId: string
  /** The child's class, for a teacher's own pages; null for a carer. */
  classId: string | null
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
  /** What the child is called at home, without the family name: for the questions. */
  spokenName: string
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
