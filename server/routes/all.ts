import type { Router } from 'express'
import { caseloadRoutes } from './caseload.ts'
import { childRoutes } from './children.ts'
import { classRoutes } from './classes.ts'
import { familyRoutes } from './family.ts'
import { letterRoutes } from './letters.ts'
import { questionnaireRoutes } from './questionnaires.ts'
import { receivedLetterRoutes } from './receivedLetters.ts'
import { referralRoutes } from './referrals.ts'
import { sampleRoutes } from './samples.ts'
import { schoolAdviceRoutes } from './schoolAdvice.ts'
import { schoolRoutes } from './schools.ts'
import { sessionNoteRoutes } from './sessionNotes.ts'
import { settingsRoutes } from './settings.ts'
import { taskRoutes } from './tasks.ts'
import { therapistRoutes } from './therapists.ts'

export interface RouteSettings {
  appUrl: string
}

/** The routers of all nouns, one line each, mounted under /api. */
export const nounRoutes = (settings: RouteSettings): Router[] => [
  caseloadRoutes(),
  childRoutes(),
  classRoutes(),
  familyRoutes(),
  letterRoutes(settings),
  questionnaireRoutes(),
  receivedLetterRoutes(),
  referralRoutes(),
  sampleRoutes(),
  schoolAdviceRoutes(),
  schoolRoutes(),
  sessionNoteRoutes(),
  settingsRoutes(),
  taskRoutes(),
  therapistRoutes(),
]
