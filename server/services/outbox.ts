import { createHash, randomUUID } from 'node:crypto'
import MailComposer from 'nodemailer/lib/mail-composer'
import { isOneMailbox } from '../../shared/fields.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { OutboxMessage, type OutboxKind } from '../entities/OutboxMessage.ts'

export interface Mail {
  kind: OutboxKind
  /** Exactly one mailbox. */
  recipient: string
  subject: string
  text: string
  html: string
  /** Buffers only: nothing is ever read from a path or an address. */
  attachments?: { filename: string; content: Buffer; contentType: string }[]
}

export interface MailSender {
  name: string
  address: string
}

let sender: MailSender = { name: 'Fanflower', address: 'no-reply@fanflower.example' }

/** Set at boot from the settings: the visible sender of every e-mail. */
export const setMailSender = (next: MailSender): void => {
  sender = next
}

/**
 * Part of the UPDATE that ends an e-mail (sent, failed or cancelled): one that brought a link forgets its bytes, so that
 * only the hash of the link's secret stays. A trigger refuses it earlier and for other kinds.
 */
export const forgetLink = "mime = IF(kind IN ('answer_request', 'invitation', 'password_reset'), '', mime)"

/**
 * Puts an e-mail into the outbox in the caller's transaction: no act, no mail. Message-ID and bytes are fixed here,
 * so that a repeated attempt is recognised by the receiver. Throws when the address is not one mailbox.
 */
export const enqueueMail = async (tx: Tx, mail: Mail, enqueuedById: string | null): Promise<string> => {
  if (!isOneMailbox(mail.recipient)) throw new Error('An e-mail needs exactly one mailbox')
  const id = randomUUID()
  const messageId = `<${id}@${sender.address.split('@')[1]}>`
  const mime = await new MailComposer({
    from: { name: sender.name, address: sender.address },
    to: { name: '', address: mail.recipient },
    messageId,
    date: now(),
    subject: mail.subject,
    text: mail.text,
    html: mail.html,
    attachments: mail.attachments ?? [],
    disableFileAccess: true,
    disableUrlAccess: true,
    headers: { 'Auto-Submitted': 'auto-generated' },
  })
    .compile()
    .build()
  await tx.insert(OutboxMessage, {
    id,
    kind: mail.kind,
    recipient: mail.recipient,
    messageId,
    mime,
    mimeSha256: createHash('sha256').update(mime).digest(),
    state: 'queued',
    attempts: 0,
    createdAt: now(),
    nextAttemptAt: now(),
    leaseOwner: null,
    leaseUntil: null,
    lastTriedAt: null,
    sentAt: null,
    problem: null,
    enqueuedById,
  })
  return id
}
