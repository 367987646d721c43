import type { Router } from 'express'
import { letterRoutes } from './letters.ts'

export interface RouteSettings {
  appUrl: string
}

/** The routers of all nouns, one line each, mounted under /api. */
export const nounRoutes = (settings: RouteSettings): Router[] => [letterRoutes(settings)]
