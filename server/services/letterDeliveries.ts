import type { ConsentPurpose } from '../../shared/consents.ts'
import type { DeliveryState } from '../../shared/letters.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { LetterDelivery } from '../entities/LetterDelivery.ts'
import { emailConsent } from '../queries/inForce.ts'
import { consentInForce } from '../queries/scope.ts'
import { execute, selectOne, selectRows } from '../queries/sql.ts'

/** Cancels what is queued and not yet being handed over, with its e-mails. Answers the ids of the deliveries. */
const cancelQueued = async (
  tx: Tx,
  condition: string,
  parameters: Record<string, string>,
  why: string,
): Promise<string[]> => {
  const rows = await selectRows<{ id: string; outboxMessageId: string }>(
    `SELECT d.id, d.outboxMessageId FROM letter_deliveries d
       JOIN letters l ON l.id = d.letterId JOIN outbox_messages m ON m.id = d.outboxMessageId
     WHERE m.state = 'queued' AND ${condition} FOR UPDATE`,
    parameters,
    tx,
  )
  for (const row of rows) {
    await execute(
      tx,
      "UPDATE outbox_messages SET state = 'cancelled', problem = :why WHERE id = :id AND state = 'queued'",
      {
        id: row.outboxMessageId,
        why,
      },
    )
    await setDeliveryState(tx, row.id, 'cancelled')
  }
  return rows.map((row) => row.id)
}

/**
 * A consent was withdrawn: nothing that rests on it may leave. E-mail consent belongs to one carer; without consent to
 * assessment and therapy nothing goes to anybody. Other purposes do not touch letters to the family.
 */
export const cancelDeliveriesForConsent = async (
  tx: Tx,
  consent: { childId: string; guardianId: string | null; purpose: ConsentPurpose },
): Promise<string[]> => {
  const why = 'Consent was withdrawn before it was sent'
  const { childId, guardianId, purpose } = consent
  if (purpose === 'assessment_treatment') return cancelQueued(tx, 'l.childId = :childId', { childId }, why)
  const channel = { email_link: 'link', email_attachment: 'attachment' }[purpose as string]
  if (channel === undefined || guardianId === null) return []
  return cancelQueued(tx, 'd.guardianId = :guardianId AND d.channel = :channel', { guardianId, channel }, why)
}

export const cancelDeliveriesOfLetter = (tx: Tx, letterId: string): Promise<string[]> =>
  cancelQueued(tx, 'd.letterId = :letterId', { letterId }, 'The letter was recalled')

export const cancelDeliveriesToGuardian = (tx: Tx, guardianId: string): Promise<string[]> =>
  cancelQueued(tx, 'd.guardianId = :guardianId', { guardianId }, 'This carer may not be written to')

/** Moves a delivery and, once none of its letter's deliveries is under way, the letter itself. */
export const setDeliveryState = async (tx: Tx, deliveryId: string, state: DeliveryState): Promise<void> => {
  await tx.update(LetterDelivery, { id: deliveryId }, { state })
  await execute(
    tx,
    `UPDATE letters l JOIN letter_deliveries d ON d.letterId = l.id AND d.id = :deliveryId
     SET l.version = l.version + 1, l.state = CASE
       WHEN EXISTS (SELECT 1 FROM letter_deliveries s WHERE s.letterId = l.id AND s.state IN ('sent', 'opened')) THEN 'sent'
       WHEN EXISTS (SELECT 1 FROM letter_deliveries s WHERE s.letterId = l.id AND s.state IN ('queued', 'sending')) THEN 'queued'
       ELSE 'approved' END
     WHERE l.state IN ('queued', 'approved')`,
    { deliveryId },
  )
}

/**
 * Why a queued letter must not leave after all, in words; null when it still may. Judged at the moment of sending:
 * consent, restriction, safety of contact and the address may have changed since it was queued.
 */
export const reasonNotToDeliver = async (outboxMessageId: string): Promise<string | null> => {
  const treatment = consentInForce('g.childId', ['assessment_treatment'])
  const row = await selectOne<{
    state: string
    restricted: number
    safeToContact: number
    ended: number
    sameAddress: number
    consent: number
    treatment: number
  }>(
    `SELECT l.state, g.restricted, g.safeToContact, g.endedAt IS NOT NULL AS ended, g.email = m.recipient AS sameAddress,
       IF(d.channel = 'link', ${emailConsent('email_link')}, ${emailConsent('email_attachment')}) AS consent,
       ${treatment.sql} AS treatment
     FROM letter_deliveries d JOIN letters l ON l.id = d.letterId JOIN guardians g ON g.id = d.guardianId
       JOIN outbox_messages m ON m.id = d.outboxMessageId
     WHERE d.outboxMessageId = :outboxMessageId`,
    { ...treatment.parameters, now: now(), outboxMessageId },
  )
  if (!row) return 'The letter is not known any more'
  if (row.state === 'recalled') return 'The letter was recalled'
  if (Number(row.restricted) === 1 || Number(row.ended) === 1) return 'This carer may not be written to'
  if (Number(row.safeToContact) === 0) return 'It is not safe to contact this carer'
  if (Number(row.sameAddress) !== 1) return 'The carer’s address has changed since it was queued'
  if (Number(row.treatment) !== 1) return 'Consent to assessment and therapy is not in force'
  if (Number(row.consent) !== 1) return 'Consent to e-mail is not in force'
  return null
}
