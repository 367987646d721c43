import type { Profile } from '../../shared/users.ts'
import type { Actor, Viewer } from '../access/actor.ts'
import { User } from '../entities/User.ts'
import { transact } from './transact.ts'

/** Stores the person's working hand and theme. */
export const changeProfile = (actor: Actor, viewer: Viewer, profile: Profile): Promise<User> =>
  transact(actor, async (tx, record) => {
    await tx.update(User, { id: viewer.id }, profile)
    record({ action: 'profile.changed', objectType: 'user', objectId: viewer.id })
    return tx.findOneByOrFail(User, { id: viewer.id })
  })
