import type { AdviceReplyGiven } from '../../shared/schoolAdvice.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { AdviceAnswer } from '../entities/AdviceAnswer.ts'
import { conflict } from '../errors.ts'
import { canReplyToAdvice } from '../policies/schoolAdvice.ts'
import { findPupilAdvice } from '../queries/classes.ts'
import { createOnce } from './once.ts'
import { transact } from './transact.ts'

/** Adds a teacher's answer to an item in force. Earlier answers stay: the newest one counts. */
export const replyToAdvice = (
  actor: Actor,
  access: ChildAccess,
  adviceId: string,
  { reply, reason }: AdviceReplyGiven,
  key: string | null,
): Promise<string> =>
  transact(actor, async (tx, record) => {
    const advice = await findPupilAdvice(access, adviceId, tx)
    if (!canReplyToAdvice(access, advice))
      throw conflict('closed', 'The clinic has ended this advice. Reload the page to see what holds now.')
    return createOnce(
      tx,
      actor,
      record,
      { key, request: ['adviceAnswer', adviceId, reply, reason] },
      (id) => ({
        action: 'adviceAnswer.created',
        objectType: 'adviceAnswer',
        objectId: id,
        childId: access.childId,
        relation: access.relation,
      }),
      async (id) => {
        await tx.insert(AdviceAnswer, {
          id,
          adviceId: advice.id,
          reply,
          reason,
          byId: access.viewer.id,
          at: now(),
        })
      },
    )
  })
