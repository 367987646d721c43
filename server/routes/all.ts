import type { Router } from 'express'
import { letterRoutes } from './letters.ts'
import { questionnaireRoutes } from './questionnaires.ts'
import { schoolRoutes } from './schools.ts'
import { settingsRoutes } from './settings.ts'
import { therapistRoutes } from './therapists.ts'

export interface RouteSettings {
  appUrl: string
}

/** The routers of all nouns, one line each, mounted under /api. */
export const nounRoutes = (settings: RouteSettings): Router[] => [
  letterRoutes(settings),
  questionnaireRoutes(),
  schoolRoutes(),
  settingsRoutes(),
  therapistRoutes(),
]
