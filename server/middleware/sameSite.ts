import type { RequestHandler } from 'express'
import { AppError, conflict } from '../errors.ts'

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS'])

/**
 * Refuses unsafe requests that another site could have caused: the browser's own statement of origin, a header that
 * no form can send, and JSON or our upload only. The header names the person the page was made for.
 */
export const sameSiteOnly =
  (appOrigin: string): RequestHandler =>
  (req, _res, next) => {
    if (safeMethods.has(req.method)) return next()
    const site = req.get('Sec-Fetch-Site')
    const origin = req.get('Origin')
    const madeFor = req.get('X-Fanflower-User')
    if (
      (site && site !== 'same-origin') ||
      (origin && origin !== appOrigin && origin !== `${req.protocol}://${req.host}`) ||
      !madeFor
    )
      throw new AppError(403, 'cross_site', 'This request did not come from Fanflower’s own pages.')
    const hasBody = req.get('Transfer-Encoding') !== undefined || Number(req.get('Content-Length') ?? 0) > 0
    if (hasBody && !req.is(['application/json', 'multipart/form-data']))
      throw new AppError(415, 'wrong_type', 'This kind of content is not accepted.')
    next()
  }

/** A page made for one person never acts for another who signed in later in the same browser. */
export const sameUserOnly: RequestHandler = (req, _res, next) => {
  if (safeMethods.has(req.method)) return next()
  const madeFor = req.get('X-Fanflower-User')
  const signedIn = req.actor.viewer?.id
  if (signedIn && madeFor !== 'none' && madeFor !== signedIn)
    throw conflict(
      'session_changed',
      'Somebody else signed in on this browser. Nothing was saved; your text is still here.',
    )
  next()
}
