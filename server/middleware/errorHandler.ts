import type { ErrorRequestHandler } from 'express'
import { MulterError } from 'multer'
import { ValidationError } from 'yup'
import { isId } from '../../shared/fields.ts'
import { AppError, conflict, invalid, unavailable } from '../errors.ts'
import { logger } from '../logger.ts'
import { recordAudit } from '../services/audit.ts'

const databaseTrouble = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'ETIMEDOUT',
  'EPIPE',
  'ENOTFOUND',
  'PROTOCOL_CONNECTION_LOST',
  'PROTOCOL_ENQUEUE_AFTER_FATAL_ERROR',
  'ER_SERVER_SHUTDOWN',
  'ER_CON_COUNT_ERROR',
  'ER_STATEMENT_TIMEOUT',
  'ER_TABLEACCESS_DENIED_ERROR',
  'ER_CONNECTION_KILLED',
  'ER_LOCK_DEADLOCK',
  'ER_LOCK_WAIT_TIMEOUT',
  'ER_QUERY_INTERRUPTED',
])

/** Message by field; nested fields keep their path, e.g. `carers[0].email`. */
export const fieldErrors = (error: ValidationError): Record<string, string> => {
  const single = error.inner.length > 0 ? error.inner : [error]
  return Object.fromEntries(single.map((one) => [one.path || 'form', one.message]))
}

const uploadErrors: Record<string, [number, string, string]> = {
  LIMIT_FILE_SIZE: [413, 'too_large', 'This file is too large: 8 MB for pictures, 10 MB for PDF at most.'],
  LIMIT_FILE_COUNT: [422, 'invalid', 'Send one file at a time.'],
  LIMIT_UNEXPECTED_FILE: [422, 'invalid', 'Send one file at a time.'],
}

const toAppError = (error: unknown): AppError | null => {
  if (error instanceof AppError) return error
  if (error instanceof ValidationError) return invalid(fieldErrors(error))
  if (error instanceof MulterError) {
    const [status, code, message] = uploadErrors[error.code] ?? [
      422,
      'invalid',
      'This upload could not be read.',
    ]
    return new AppError(status, code, message, { fields: { file: message } })
  }
  const { status, type, code, driverError } = error as {
    status?: number
    type?: string
    code?: string
    driverError?: { code?: string }
  }
  if (type === 'entity.too.large')
    return new AppError(413, 'too_large', 'This is more text than can be saved at once.')
  if (type === 'charset.unsupported' || type === 'encoding.unsupported')
    return new AppError(415, 'wrong_type', 'This kind of content is not accepted.')
  if (status !== undefined && status >= 400 && status < 500)
    return new AppError(status === 404 ? 404 : 400, 'unreadable', 'This request could not be read.')
  // A trigger stood in the way of a change to something signed or locked (see migrations/…-CloseWhatIsClosed.ts).
  if ((code ?? driverError?.code) === 'ER_SIGNAL_EXCEPTION')
    return conflict('closed', 'This is signed or locked and stays as it is. Nothing was changed.')
  if (databaseTrouble.has(code ?? driverError?.code ?? '')) return unavailable()
  if (/Multipart|Unexpected end of form|Malformed part/i.test((error as Error).message ?? ''))
    return new AppError(400, 'unreadable', 'The upload broke off. Choose the file again.')
  if (/Pool is closed|pool is closed|closed state/i.test((error as Error).message ?? '')) return unavailable()
  return null
}

/** An id that somebody tried stands in the trail of that child, whether they may know of the child or not. */
const idOrNull = (text: string | null | undefined) =>
  text && isId(text.toLowerCase()) ? text.toLowerCase() : null

/** The one exit for errors: refusals are recorded, surprises are logged with the request id and nothing else leaves. */
export const errorHandler: ErrorRequestHandler = async (error: unknown, req, res, next) => {
  if (res.headersSent) return next(error)
  let problem = toAppError(error)
  if (problem && [401, 403, 404].includes(problem.status) && req.actor.viewer) {
    problem = await recordAudit(req.actor, {
      action: res.locals.policyName ?? 'unknown.route',
      childId: req.childAccess?.childId ?? idOrNull(res.locals.attemptedChildId),
      relation: req.childAccess?.relation ?? null,
      result: 'denied',
      detail: {
        status: problem.status,
        ids: res.locals.attemptedIds ?? [],
      },
    }).then(
      () => problem,
      (failure: unknown) => toAppError(failure) ?? problem,
    )
  }
  if (!problem) {
    logger.error({ requestId: req.actor.requestId, error: describe(error) }, 'unexpected error')
    problem = new AppError(
      500,
      'unexpected',
      'Something failed on our side. What you typed is still on the page; please tell the clinic the number below.',
    )
  }
  if (problem.extras.retryAfterSeconds !== undefined)
    res.setHeader('Retry-After', String(problem.extras.retryAfterSeconds))
  res.status(problem.status).json(problem.toProblem(req.actor.requestId))
}

/** Name and stack without the message's data: a driver's message may hold values. */
const describe = (error: unknown) =>
  error instanceof Error
    ? {
        name: error.name,
        code: (error as { code?: string }).code,
        stack: error.stack?.split('\n').slice(1, 8),
      }
    : typeof error
