import { randomUUID } from 'node:crypto'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { LetterDelivery } from '../entities/LetterDelivery.ts'
import { conflict, invalid, notFound } from '../errors.ts'
import { letterAttached, letterNotice } from '../mail/mailTemplates.ts'
import { letterChannel } from '../policies/letters.ts'
import { isConsentGiven } from '../queries/childFacts.ts'
import { findLetterPdf, listRecipients, type LetterRecord, type RecipientRow } from '../queries/letters.ts'
import { execute, selectOne } from '../queries/sql.ts'
import { cancelDeliveriesOfLetter, setDeliveryState } from './letterDeliveries.ts'
import { letterFact, patchLetter } from './letters.ts'
import { enqueueMail } from './outbox.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'

/** Days for which the link in the e-mail opens the letter; later the letter is still under My child. */
const linkDays = 14

/** Two people at one address would open each other's letters: only one of them may be chosen. */
const assertOwnAddress = (chosen: RecipientRow[]) => {
  const addresses = chosen.map((carer) => carer.email?.toLowerCase())
  if (new Set(addresses).size < addresses.length)
    throw invalid({
      guardianIds:
        'Two of these carers share one e-mail address. Choose one of them, or ask for an address of their own.',
    })
}

/**
 * Queues an approved letter for the chosen carers: one delivery and one e-mail each, in one transaction. Consent is
 * judged here and again when the e-mail leaves. A letter already under way to a carer is not queued twice.
 */
export const sendLetter = async (
  actor: Actor,
  access: ChildAccess,
  letter: LetterRecord,
  version: number,
  guardianIds: readonly string[],
  appUrl: string,
): Promise<void> => {
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    // What has reached one carer stays sent while it goes to another.
    await patchLetter(tx, letter, version, { state: letter.state === 'sent' ? 'sent' : 'queued' })
    await assertTreatmentConsent(tx, access)
    const carers = await listRecipients(access, tx)
    const chosen = [...new Set(guardianIds)].map((id) => {
      const carer = carers.find((candidate) => candidate.guardianId === id)
      if (!carer) throw notFound()
      return carer
    })
    assertOwnAddress(chosen)
    const { approvedVersionId } = letter
    if (approvedVersionId === null) throw conflict('closed', 'Only an approved letter can be sent.')
    const { pdf } = await findLetterPdf(access, letter.id)
    for (const carer of chosen) {
      const { channel, why } = letterChannel(carer)
      if (channel === null || carer.email === null) throw invalid({ guardianIds: `${carer.name}: ${why}` })
      await assertNotUnderWay(tx, letter.id, carer)
      const deliveryId = randomUUID()
      const content =
        channel === 'link'
          ? letterNotice({
              clinic: settings,
              link: `${appUrl}/letter/${deliveryId}`,
              worksFor: `${linkDays} days`,
            })
          : letterAttached({ clinic: settings })
      const outboxMessageId = await enqueueMail(
        tx,
        {
          kind: 'letter',
          recipient: carer.email,
          ...content,
          ...(channel === 'attachment' && {
            attachments: [{ filename: 'letter.pdf', content: pdf, contentType: 'application/pdf' }],
          }),
        },
        access.viewer.id,
      )
      await tx.insert(LetterDelivery, {
        id: deliveryId,
        letterId: letter.id,
        letterVersionId: approvedVersionId,
        guardianId: carer.guardianId,
        channel,
        outboxMessageId,
        state: 'queued',
        createdAt: now(),
        linkEndsAt: new Date(now().getTime() + linkDays * 86_400_000),
        openedAt: null,
      })
      record({ ...letterFact(access, 'letter.queued', letter.id), detail: { deliveryId, channel } })
    }
  })
}

const assertTreatmentConsent = async (tx: Tx, access: ChildAccess) => {
  if (!(await isConsentGiven(access, 'assessment_treatment', tx)))
    throw conflict(
      'consent_needed',
      'Consent to assessment and therapy is not in force, so no letter may leave.',
    )
}

const assertNotUnderWay = async (tx: Tx, letterId: string, carer: RecipientRow) => {
  const underWay = await selectOne(
    `SELECT id FROM letter_deliveries WHERE letterId = :letterId AND guardianId = :guardianId
       AND state IN ('queued', 'sending', 'sent', 'opened') FOR UPDATE`,
    { letterId, guardianId: carer.guardianId },
    tx,
  )
  if (underWay) throw conflict('already_sent', `This letter is already on its way to ${carer.name}.`)
}

/** Stops what has not left yet. What was sent stays sent. */
export const recallLetter = (actor: Actor, access: ChildAccess, letter: LetterRecord, version: number) =>
  transact(actor, async (tx, record) => {
    await patchLetter(tx, letter, version, { state: 'recalled' })
    await cancelDeliveriesOfLetter(tx, letter.id)
    record(letterFact(access, 'letter.recalled', letter.id))
  })

/** Puts a failed delivery back into the queue, e.g. once the address was corrected by the receiver. */
export const retryDelivery = (actor: Actor, access: ChildAccess, letter: LetterRecord, deliveryId: string) =>
  transact(actor, async (tx, record) => {
    const delivery = await tx.findOneBy(LetterDelivery, { id: deliveryId, letterId: letter.id })
    if (!delivery) throw notFound()
    const queued = await execute(
      tx,
      `UPDATE outbox_messages SET state = 'queued', nextAttemptAt = :now, createdAt = :now, problem = NULL
       WHERE id = :id AND state = 'failed'`,
      { id: delivery.outboxMessageId, now: now() },
    )
    if (queued === 0) throw conflict('not_failed', 'Only a delivery that failed can be tried again.')
    await setDeliveryState(tx, delivery.id, 'queued')
    record({ ...letterFact(access, 'letter.retried', letter.id), detail: { deliveryId } })
  })
