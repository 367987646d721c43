import type { AnswererKind, RequestState } from '../../shared/answerRequests.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation, openPolicy, rolePolicy } from './policy.ts'

// The lead asks too: a child who waits has no therapist yet, and answers from home take their time.
const write = (name: string) => childPolicy(name, ['assignedTherapist', 'clinicLead'], 'write')

const noSignIn = 'a carer without a sign-in answers; the secret of the link and the birth date are the proof'

export const answerRequestPolicies = {
  list: childPolicy('answerRequest.list', ['assignedTherapist', 'clinicLead'], 'read'),
  choices: write('answerRequest.choices'),
  create: write('answerRequest.create'),
  cancel: write('answerRequest.cancel'),
  remind: write('answerRequest.remind'),

  // A request belongs to one person: the queries look for the viewer's own, and everybody else's is absent.
  toAnswerAsCarer: rolePolicy('answerRequest.toAnswer', ['guardian'], 'read'),
  readAsCarer: childPolicy('answerRequest.page', ['guardian'], 'read'),
  saveAsCarer: childPolicy('answerRequest.save', ['guardian'], 'write'),
  sendAsCarer: childPolicy('answerRequest.send', ['guardian'], 'write'),
  toAnswerAsTeacher: rolePolicy('answerRequest.toAnswer', ['teacher'], 'read'),
  readAsTeacher: childPolicy('answerRequest.page', ['teacher'], 'read'),
  saveAsTeacher: childPolicy('answerRequest.save', ['teacher'], 'write'),
  sendAsTeacher: childPolicy('answerRequest.send', ['teacher'], 'write'),

  openLink: openPolicy('answerLink.open', noSignIn, 'read'),
  saveByLink: openPolicy('answerLink.save', noSignIn, 'write'),
  sendByLink: openPolicy('answerLink.send', noSignIn, 'write'),
}

export const canAsk = (access: ChildAccess) => isRelation(access, 'assignedTherapist', 'clinicLead')

/** Only what is still to come back can be withdrawn or asked for again. */
export const canChangeRequest = (access: ChildAccess, state: RequestState) =>
  canAsk(access) && (state === 'waiting' || state === 'begun')

/** A carer as far as being asked goes. */
export interface CarerStanding {
  restricted: boolean
  ended: boolean
  safeToContact: boolean
  /** The child is of age and this is not the young person. */
  childOfAge: boolean
  email: string | null
  signsIn: boolean
}

/** Why this carer cannot be asked, in words for staff; null when they can. */
export const carerRefusal = (carer: CarerStanding, byLink: boolean): string | null => {
  if (carer.restricted || carer.ended) return 'This carer may not be written to.'
  if (!carer.safeToContact) return 'It is marked as not safe to contact this carer.'
  if (carer.childOfAge) return 'The young person is of age: ask them.'
  if (carer.email === null) return 'Enter an e-mail address for this carer first.'
  if (!byLink && !carer.signsIn) return 'This carer does not sign in yet: invite them, or send a link.'
  return null
}

export const noTreatmentConsent = 'Consent to assessment and therapy is not in force.'
export const noObservationConsent =
  'The family has not agreed that the school tells us what it sees. Ask them first.'
export const notThisTeacher = 'Choose a teacher of the child’s present class.'

export interface RequestStanding {
  answerer: AnswererKind
  byLink: boolean
  over: boolean
  treatmentConsent: boolean
  observationConsent: boolean
  /** Null for a teacher. */
  carer: CarerStanding | null
  /** The teacher teaches the child's class now, with an account in use. */
  teaches: boolean
}

/** Why nobody may be written to about this request any more, in words for staff; null when they still may. */
export const reasonNotToWrite = (request: RequestStanding): string | null => {
  if (request.over) return 'It was answered, withdrawn or its time is over.'
  if (!request.treatmentConsent) return noTreatmentConsent
  if (request.carer !== null) return carerRefusal(request.carer, request.byLink)
  if (!request.observationConsent) return noObservationConsent
  return request.teaches ? null : notThisTeacher
}
