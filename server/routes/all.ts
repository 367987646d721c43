import type { Router } from 'express'

export interface RouteSettings {
  appUrl: string
}

/** The routers of all nouns, one line each, mounted under /api. */
export const nounRoutes = (_settings: RouteSettings): Router[] => []
