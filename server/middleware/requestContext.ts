import { randomUUID } from 'node:crypto'
import type { Request, RequestHandler } from 'express'
import type { Actor, Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { signedOut } from '../errors.ts'

declare module 'express-serve-static-core' {
  interface Request {
    actor: Actor
    childAccess?: ChildAccess
  }
  interface Locals {
    policyName?: string
    attemptedChildId?: string | null
    attemptedIds?: string[]
  }
}

/** Gives every request an id and an actor; the viewer is filled in once the session is known. */
export const requestContext: RequestHandler = (req, res, next) => {
  const requestId = randomUUID()
  req.actor = { viewer: null, requestId, audited: false }
  res.setHeader('X-Request-Id', requestId)
  next()
}

/** The signed-in person; use it behind a policy that asks for one. */
export const viewerOf = (req: Request): Viewer => {
  if (!req.actor.viewer) throw signedOut()
  return req.actor.viewer
}

/** The access found by a child policy. */
export const accessOf = (req: Request): ChildAccess => {
  if (!req.childAccess) throw new Error('This route has no child policy')
  return req.childAccess
}
