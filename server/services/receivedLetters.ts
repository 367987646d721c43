import type { Actor } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { ReceivedLetterRecord } from '../queries/receivedLetters.ts'
import { execute } from '../queries/sql.ts'
import { recordAudit, type AuditFact } from './audit.ts'
import { transact } from './transact.ts'

/** Records that a carer read a letter, as text or as PDF; the first time the delivery becomes "opened". */
export const recordLetterRead = async (
  actor: Actor,
  letter: ReceivedLetterRecord,
  as: 'text' | 'pdf',
): Promise<void> => {
  const fact = (action: string): AuditFact => ({
    action,
    objectType: 'letter',
    objectId: letter.id,
    childId: letter.childId,
    relation: 'guardian',
    detail: { deliveryId: letter.deliveryId, as },
  })
  if (letter.openedAt !== null) return recordAudit(actor, fact('letter.read'))
  await transact(actor, async (tx, record) => {
    const first = await execute(
      tx,
      `UPDATE letter_deliveries SET state = 'opened', openedAt = :now
       WHERE id = :deliveryId AND openedAt IS NULL AND state = 'sent'`,
      { deliveryId: letter.deliveryId, now: now() },
    )
    record(fact(first === 1 ? 'letter.opened' : 'letter.read'))
  })
}
