import type { Role } from '../../shared/roles.ts'

/** The signed-in person of one request. */
export interface Viewer {
  id: string
  displayName: string
  roles: readonly Role[]
  newlyQualified: boolean
}

/**
 * Who acts, in one request or job. `audited` turns true when an audit entry was made:
 * a route that answers without one is refused (see middleware/allow.ts).
 */
export interface Actor {
  viewer: Viewer | null
  requestId: string
  audited: boolean
}

/** Jobs and the seed act for nobody signed in. */
export const systemActor = (requestId: string): Actor => ({ viewer: null, requestId, audited: false })

export const actorFor = (viewer: Viewer, requestId: string): Actor => ({ viewer, requestId, audited: false })
