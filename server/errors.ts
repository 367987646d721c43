import type { Problem } from '../shared/problems.ts'

interface Extras {
  fields?: Record<string, string>
  current?: unknown
  retryAfterSeconds?: number
}

/** An expected refusal: it has a status, a stable word and a sentence for people. */
export class AppError extends Error {
  readonly status: number
  readonly code: string
  readonly extras: Extras

  constructor(status: number, code: string, message: string, extras: Extras = {}) {
    super(message)
    this.status = status
    this.code = code
    this.extras = extras
  }

  toProblem(requestId: string): Problem {
    const { fields, current } = this.extras
    return {
      code: this.code,
      message: this.message,
      ...(fields && { fields }),
      ...(current !== undefined && { current }),
      requestId,
    }
  }
}

export const signedOut = () =>
  new AppError(
    401,
    'signed_out',
    'You are not signed in. Sign in again to go on; what is on this page is kept.',
  )

/** For what is absent and for what the caller may not know of: the two must look alike. */
export const notFound = () => new AppError(404, 'not_found', 'There is nothing here that you can open.')

export const forbidden = (message = 'Your role does not allow this.') =>
  new AppError(403, 'forbidden', message)

export const conflict = (code: string, message: string, current?: unknown) =>
  new AppError(409, code, message, { current })

export const stale = (current: unknown) =>
  conflict(
    'stale',
    'Somebody saved a newer version in the meantime. Both texts are kept: compare them and save again.',
    current,
  )

export const ifMatchMissing = () =>
  new AppError(428, 'if_match', 'This change must say which version it was made from. Reload the page.')

export const gone = (code: string, message: string) => new AppError(410, code, message)

export const invalid = (fields: Record<string, string>) =>
  new AppError(422, 'invalid', 'Some answers need another look. Nothing you typed is lost.', { fields })

export const slowDown = (retryAfterSeconds: number) =>
  new AppError(429, 'slow_down', `Too many tries. Wait ${waitingTime(retryAfterSeconds)} and try again.`, {
    retryAfterSeconds,
  })

export const unavailable = (retryAfterSeconds = 2) =>
  new AppError(
    503,
    'unavailable',
    'The clinic’s database cannot be reached just now. Nothing was saved; try again in a moment.',
    { retryAfterSeconds },
  )

/** For work that waits in line here, when the line is full. */
export const busy = (retryAfterSeconds: number) =>
  new AppError(
    503,
    'busy',
    `Too much is being worked on just now. Nothing was saved; try again in ${waitingTime(retryAfterSeconds)}.`,
    { retryAfterSeconds },
  )

const waitingTime = (seconds: number) =>
  seconds < 60
    ? `${seconds} ${seconds === 1 ? 'second' : 'seconds'}`
    : `${Math.ceil(seconds / 60)} ${seconds <= 60 ? 'minute' : 'minutes'}`
