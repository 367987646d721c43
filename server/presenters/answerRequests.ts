import {
  requestTitles,
  type AnswerChoices,
  type AnswererKind,
  type AnswerPage,
  type AnswerRequestView,
  type RequestState,
  type ToAnswer,
} from '../../shared/answerRequests.ts'
import { dayOf } from '../../shared/days.ts'
import { urgentWordsFor } from '../../shared/redFlagSources.ts'
import { consentNeededTexts } from '../../shared/consentNeeded.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canChangeRequest, carerRefusal, noObservationConsent } from '../policies/answerRequests.ts'
import type { CarerToAsk, TeacherToAsk } from '../queries/answerAddressees.ts'
import type { AnswerableRequest, AnswerRequestRow, ToAnswerRow } from '../queries/answerRequests.ts'
import type { FormRecord } from '../queries/forms.ts'
import { presentForm } from './forms.ts'
import type { KeptAnswers } from '../queries/answers.ts'

const stateOf = (row: AnswerRequestRow, at: Date): RequestState => {
  if (row.answeredAt !== null) return 'answered'
  if (row.cancelledAt !== null) return 'cancelled'
  if (row.expiresAt <= at) return 'expired'
  return row.answerId === null ? 'waiting' : 'begun'
}

export const presentAnswerRequest = (
  row: AnswerRequestRow,
  access: ChildAccess,
  at: Date,
): AnswerRequestView => {
  const state = stateOf(row, at)
  return {
    id: row.id,
    asks: row.asks,
    formTitle: row.formTitle ?? requestTitles[row.asks],
    answerer: row.answerer,
    askedOf: row.askedOf,
    askedAt: row.askedAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    byLink: row.byLink,
    reminders: row.reminders,
    state,
    cancelledWhy: row.cancelledWhy,
    answeredAt: row.answeredAt?.toISOString() ?? null,
    answerId: row.answerId,
    version: row.version,
    can: { cancel: canChangeRequest(access, state), remind: canChangeRequest(access, state) },
  }
}

const isAnswerer = (informant: string): informant is AnswererKind =>
  informant === 'guardian' || informant === 'teacher'

export const presentAnswerChoices = (of: {
  consented: boolean
  observationShared: boolean
  forms: readonly FormRecord[]
  carers: readonly CarerToAsk[]
  teachers: readonly TeacherToAsk[]
}): AnswerChoices => ({
  blocked: of.consented ? null : consentNeededTexts.assessment_treatment,
  forms: of.forms
    .filter((form) => form.retiredAt === null)
    .map((form) => ({
      id: form.id,
      title: form.definition.title,
      informants: form.definition.informants.filter(isAnswerer),
    }))
    .filter((form) => form.informants.length > 0),
  guardians: of.carers.map((carer) => ({
    id: carer.id,
    name: carer.name,
    refused: carerRefusal(carer, true),
    byLink: carerRefusal(carer, true) === null,
    signedIn: carerRefusal(carer, false) === null,
    email: carer.email,
    verified: carer.verified,
  })),
  teachers: of.observationShared ? of.teachers.map(({ id, name }) => ({ id, name })) : [],
  teachersRefused: !of.observationShared
    ? noObservationConsent
    : of.teachers.length === 0
      ? 'No teacher of the child’s present class has a sign-in.'
      : null,
})

export const presentToAnswer = (row: ToAnswerRow, timeZone: string): ToAnswer => ({
  id: row.id,
  childId: row.childId,
  classId: row.classId,
  childName: row.childName,
  title: row.formTitle ?? requestTitles[row.asks],
  begun: row.begun,
  askedOn: dayOf(row.askedAt, timeZone),
  answerBy: dayOf(row.expiresAt, timeZone),
})

export const presentAnswerPage = (
  request: AnswerableRequest,
  kept: KeptAnswers,
  clinic: ClinicSettings,
): AnswerPage => ({
  requestId: request.id,
  asks: request.asks,
  childName: request.childName,
  spokenName: request.spokenName,
  askedOf: request.askedOf,
  answerBy: dayOf(request.expiresAt, clinic.timeZone),
  form: kept.form && presentForm(kept.form),
  answers: kept.answers,
  comment: kept.comment,
  history: kept.history,
  version: kept.version,
  urgent: kept.history === null ? [] : urgentWordsFor(kept.history),
  clinic: { name: clinic.clinicName, phone: clinic.clinicPhone, emergencyText: clinic.emergencyText },
})
