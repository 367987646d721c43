import { pino } from 'pino'

/**
 * Logs carry ids, routes and codes only: no names, no clinical text, no parameters of queries.
 * The server sets the level at boot (LOG_LEVEL, see env.ts); tests keep quiet.
 */
export const logger = pino({ level: process.env.VITEST ? 'silent' : 'warn', base: null })
