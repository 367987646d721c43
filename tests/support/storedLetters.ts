import { createHash, randomUUID } from 'node:crypto'
import type { LetterDraft, LetterState } from '../../shared/letters.ts'
import { now } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { Guardian } from '../../server/entities/Guardian.ts'
import { Letter } from '../../server/entities/Letter.ts'
import { LetterDelivery } from '../../server/entities/LetterDelivery.ts'
import { LetterVersion } from '../../server/entities/LetterVersion.ts'
import { OutboxMessage } from '../../server/entities/OutboxMessage.ts'
import type { User } from '../../server/entities/User.ts'
import { readyText } from './letters.ts'

const sha256 = (data: Buffer) => createHash('sha256').update(data).digest()

/** The ready text with one more thing the child does well. */
export const letterText = (strength: string): LetterDraft =>
  ({
    ...readyText,
    sections: readyText.sections.map((section) =>
      section.id === 'strengths' ? { ...section, text: `${section.text}\n- ${strength}` } : section,
    ),
  }) as LetterDraft

/** A letter in any state, with its approved version once it has been approved. */
export const buildLetter = async (
  child: Pick<Child, 'id'>,
  author: Pick<User, 'id'>,
  state: LetterState,
  content: LetterDraft = letterText('Draws birds'),
): Promise<Letter> => {
  const { manager } = database()
  const letter = manager.create(Letter, {
    id: randomUUID(),
    childId: child.id,
    kind: 'progress',
    templateVersion: 'progress.v1',
    state,
    content,
    facts: [],
    authorId: author.id,
    approvedVersionId: null,
    returnedReason: null,
    discardedAt: null,
    createdAt: now(),
    changedAt: now(),
  })
  await manager.insert(Letter, letter)
  if (['draft', 'awaiting_approval'].includes(state)) return letter
  const pdf = Buffer.from('%PDF-1.4\n% a stand-in for a printed letter\n%%EOF\n')
  const version = {
    id: randomUUID(),
    letterId: letter.id,
    content,
    overrides: { overrides: [] },
    pdf,
    pdfBytes: pdf.length,
    pdfSha256: sha256(pdf),
    approvedById: author.id,
    approvedAt: now(),
  }
  await manager.insert(LetterVersion, version)
  await manager.query('UPDATE letters SET approvedVersionId = ? WHERE id = ?', [version.id, letter.id])
  letter.approvedVersionId = version.id
  return letter
}

/** One carer's copy of an approved letter, with its e-mail. */
export const buildDelivery = async (
  letter: Letter,
  guardian: Pick<Guardian, 'id'>,
  state: 'queued' | 'sent' | 'failed',
): Promise<LetterDelivery> => {
  if (letter.approvedVersionId === null) throw new Error('Only an approved letter is delivered')
  const { manager } = database()
  const mime = Buffer.from('Subject: A letter from the clinic\r\n\r\nFollow the link.\r\n')
  const messageId = randomUUID()
  await manager.insert(OutboxMessage, {
    id: messageId,
    kind: 'letter',
    recipient: 'somebody@harrowmere.example',
    messageId: `<${messageId}@clinic.example>`,
    mime,
    mimeSha256: sha256(mime),
    state,
    attempts: state === 'queued' ? 0 : 1,
    createdAt: now(),
    nextAttemptAt: now(),
    leaseOwner: null,
    leaseUntil: null,
    lastTriedAt: null,
    sentAt: state === 'sent' ? now() : null,
    problem: state === 'failed' ? 'The address was refused' : null,
    enqueuedById: letter.authorId,
  })
  const delivery = manager.create(LetterDelivery, {
    id: randomUUID(),
    letterId: letter.id,
    letterVersionId: letter.approvedVersionId,
    guardianId: guardian.id,
    channel: 'link',
    outboxMessageId: messageId,
    state,
    createdAt: now(),
    linkEndsAt: new Date(now().getTime() + 14 * 86_400_000),
    openedAt: null,
  })
  await manager.insert(LetterDelivery, delivery)
  return delivery
}
