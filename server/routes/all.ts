import type { Router } from 'express'
import { answerLinkRoutes } from './answerLinks.ts'
import { answerRequestRoutes } from './answerRequests.ts'
import { alertRoutes } from './alerts.ts'
import { auditEntryRoutes } from './auditEntries.ts'
import { caseloadRoutes } from './caseload.ts'
import { childRoutes } from './children.ts'
import { classRoutes } from './classes.ts'
import { conclusionRoutes } from './conclusions.ts'
import { consentRoutes } from './consents.ts'
import { familyRoutes } from './family.ts'
import { formRoutes } from './forms.ts'
import { goalRoutes } from './goals.ts'
import { guardianRoutes } from './guardians.ts'
import { handProfileRoutes } from './handProfile.ts'
import { historyRoutes } from './histories.ts'
import { letterRoutes } from './letters.ts'
import { measureRoutes } from './measures.ts'
import { questionnaireRoutes } from './questionnaires.ts'
import { receivedLetterRoutes } from './receivedLetters.ts'
import { referralRoutes } from './referrals.ts'
import { reviewRoutes } from './review.ts'
import { sampleRoutes } from './samples.ts'
import { schoolAdviceRoutes } from './schoolAdvice.ts'
import { schoolRoutes } from './schools.ts'
import { sessionNoteRoutes } from './sessionNotes.ts'
import { settingsRoutes } from './settings.ts'
import { taskRoutes } from './tasks.ts'
import { therapistRoutes } from './therapists.ts'
import { todayRoutes } from './today.ts'
import { userRoutes } from './users.ts'
import { writingObservationRoutes } from './writingObservations.ts'

export interface RouteSettings {
  appUrl: string
}

/** The routers of all nouns, one line each, mounted under /api. */
export const nounRoutes = (settings: RouteSettings): Router[] => [
  answerLinkRoutes(),
  // Before classRoutes, where /pupils/to-answer would be a child's id.
  answerRequestRoutes(settings),
  alertRoutes(),
  auditEntryRoutes(),
  caseloadRoutes(),
  childRoutes(),
  classRoutes(),
  conclusionRoutes(),
  consentRoutes(),
  familyRoutes(),
  formRoutes(),
  goalRoutes(),
  guardianRoutes(settings),
  handProfileRoutes(),
  historyRoutes(),
  letterRoutes(settings),
  measureRoutes(),
  questionnaireRoutes(),
  receivedLetterRoutes(),
  referralRoutes(),
  reviewRoutes(),
  sampleRoutes(),
  schoolAdviceRoutes(),
  schoolRoutes(),
  sessionNoteRoutes(),
  settingsRoutes(),
  taskRoutes(),
  therapistRoutes(),
  todayRoutes(),
  userRoutes(settings),
  writingObservationRoutes(),
]
