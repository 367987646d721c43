import type { LinkEndReason } from '../../shared/answerRequests.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { AnswerRequest } from '../entities/AnswerRequest.ts'
import { stillOpen } from '../queries/answerRequests.ts'
import { execute, selectRows } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { forgetLink } from './outbox.ts'
import { updateIfCurrent } from './versions.ts'

interface OpenLink {
  id: string
  version: number
  mailId: string | null
}

/**
 * Ends the links that one carer was sent, with what waits to be sent, in the transaction of the change that calls for it:
 * whoever reads the old address meets the questions no more. Requests that are answered signed in stay.
 */
export const endLinksOf = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  access: ChildAccess,
  { guardianId, why }: { guardianId: string; why: LinkEndReason },
): Promise<void> => {
  const links = await selectRows<OpenLink>(
    `SELECT r.id, r.version, r.mailId FROM answer_requests r
     WHERE r.childId = :childId AND r.guardianId = :guardianId AND r.tokenHash IS NOT NULL AND ${stillOpen('r')}
     ORDER BY r.id FOR UPDATE`,
    { childId: access.childId, guardianId, scopeNow: now() },
    tx,
  )
  for (const { id, version, mailId } of links) {
    await updateIfCurrent(tx, AnswerRequest, id, version, { cancelledAt: now(), cancelledWhy: why })
    await execute(
      tx,
      `UPDATE outbox_messages SET state = 'cancelled', problem = 'Its link was ended', ${forgetLink}
       WHERE id = :mailId AND state = 'queued'`,
      { mailId },
    )
    record({
      action: 'answerRequest.link_ended',
      objectType: 'answerRequest',
      objectId: id,
      childId: access.childId,
      relation: access.relation,
      detail: { why },
    })
  }
}
