import type { Router } from 'express'
import { familyRoutes } from './family.ts'
import { letterRoutes } from './letters.ts'
import { questionnaireRoutes } from './questionnaires.ts'
import { receivedLetterRoutes } from './receivedLetters.ts'
import { referralRoutes } from './referrals.ts'
import { schoolRoutes } from './schools.ts'
import { sessionNoteRoutes } from './sessionNotes.ts'
import { settingsRoutes } from './settings.ts'
import { therapistRoutes } from './therapists.ts'

export interface RouteSettings {
  appUrl: string
}

/** The routers of all nouns, one line each, mounted under /api. */
export const nounRoutes = (settings: RouteSettings): Router[] => [
  familyRoutes(),
  letterRoutes(settings),
  questionnaireRoutes(),
  receivedLetterRoutes(),
  referralRoutes(),
  schoolRoutes(),
  sessionNoteRoutes(),
  settingsRoutes(),
  therapistRoutes(),
]
