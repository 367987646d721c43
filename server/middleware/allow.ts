import type { Request, RequestHandler, Response } from 'express'
import { forbidden, notFound, signedOut } from '../errors.ts'
import type { Policy } from '../policies/policy.ts'
import { findChildAccess } from '../queries/childAccess.ts'

const declared = Symbol('policy')
type PolicyHandler = RequestHandler & { [declared]?: Policy }

export const policyOf = (handler: unknown): Policy | null =>
  typeof handler === 'function' ? ((handler as PolicyHandler)[declared] ?? null) : null

/**
 * Declares and holds a route's policy. It must be the first handler of every route: the boot checks it.
 * For a child policy the access is found here, so that a route never starts from an id alone.
 */
export const allow = (policy: Policy): RequestHandler => {
  const handler: PolicyHandler = async (req, res, next) => {
    // A denial is recorded by the error exit, which no longer sees the route.
    res.locals.policyName = policy.name
    res.locals.attemptedIds = Object.values(req.params).map((id) => String(id).slice(0, 64))
    res.locals.attemptedChildId = policy.kind === 'child' ? String(req.params.childId).slice(0, 64) : null
    if (policy.kind !== 'open') {
      const { viewer } = req.actor
      if (!viewer) throw signedOut()
      if (policy.kind === 'role' && !policy.roles.some((role) => viewer.roles.includes(role)))
        throw forbidden()
      if (policy.kind === 'child') {
        const access = await findChildAccess(viewer, String(req.params.childId))
        if (!access) throw notFound()
        req.childAccess = access
        if (policy.refused.includes(access.relation)) throw forbidden()
        if (!policy.relations.includes(access.relation)) throw notFound()
      }
    }
    if (policy.audit !== 'none') holdAnswerUntilAudited(req, res)
    next()
  }
  handler[declared] = policy
  return handler
}

/** A successful answer that nobody recorded is a fault of ours: it fails closed instead of leaving. */
const holdAnswerUntilAudited = (req: Request, res: Response) => {
  const check = () => {
    if (res.statusCode < 400 && !req.actor.audited)
      throw new Error(`${req.method} ${req.route?.path} answered without an audit entry`)
  }
  for (const method of ['json', 'send', 'end'] as const) {
    const original = res[method].bind(res) as (...args: unknown[]) => typeof res
    res[method] = ((...args: unknown[]) => {
      if (!res.headersSent) check()
      return original(...args)
    }) as never
  }
}
