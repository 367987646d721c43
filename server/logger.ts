import { pino } from 'pino'

/**
 * Logs carry ids, routes and codes only: no names, no clinical text, no parameters of queries.
 * Tests keep quiet unless LOG_LEVEL asks for more.
 */
export const logger = pino({
  level: process.env.LOG_LEVEL ?? (process.env.VITEST ? 'silent' : 'warn'),
  base: null,
})
