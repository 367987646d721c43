import { guardianRelationLabels } from '../../shared/guardians.ts'
import type {
  DeliveryView,
  LetterChecks,
  LetterRecipient,
  LetterRow,
  LetterView,
} from '../../shared/letters.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import {
  canApproveLetter,
  canChangeLetter,
  canDiscardLetter,
  canRecallLetter,
  canRetryDelivery,
  canReturnLetter,
  canSendLetter,
  canSubmitLetter,
  canTakeBackLetter,
  letterChannel,
} from '../policies/letters.ts'
import type { DeliveryRow, LetterListRow, LetterRecord, RecipientRow } from '../queries/letters.ts'

const presentDelivery = (row: DeliveryRow, mayRetry: boolean): DeliveryView => ({
  id: row.id,
  guardianId: row.guardianId,
  recipient: row.recipient,
  channel: row.channel,
  state: row.state,
  attempts: row.attempts,
  lastTriedAt: row.lastTriedAt?.toISOString() ?? null,
  nextTryAt: row.state === 'queued' ? row.nextAttemptAt.toISOString() : null,
  problem: row.problem,
  openedAt: row.openedAt?.toISOString() ?? null,
  can: { retry: mayRetry && row.state === 'failed' },
})

const presentRecipient = (carer: RecipientRow): LetterRecipient => ({
  guardianId: carer.guardianId,
  name: carer.name,
  relation: guardianRelationLabels[carer.relation],
  ...letterChannel(carer),
})

export const presentLetter = (
  letter: LetterRecord,
  access: ChildAccess,
  related: { checks: LetterChecks; recipients: RecipientRow[]; deliveries: DeliveryRow[] },
): LetterView => ({
  id: letter.id,
  childId: letter.childId,
  childName: `${letter.preferredName ?? letter.givenName} ${letter.familyName}`,
  recordNumber: letter.recordNumber,
  kind: letter.kind,
  state: letter.state,
  salutation: letter.content.salutation,
  sections: letter.content.sections,
  nextVisitOn: letter.content.nextVisitOn,
  author: letter.author,
  approver: letter.approver,
  approvedAt: letter.approvedAt?.toISOString() ?? null,
  returnedReason: letter.returnedReason,
  facts: letter.facts,
  checks: related.checks,
  recipients: related.recipients.map(presentRecipient),
  deliveries: related.deliveries.map((row) => presentDelivery(row, canRetryDelivery(access))),
  pdf:
    letter.pdfBytes === null || letter.pdfSha256 === null
      ? null
      : { bytes: letter.pdfBytes, sha256: letter.pdfSha256.toString('hex') },
  version: letter.version,
  can: {
    change: canChangeLetter(access, letter),
    submit: canSubmitLetter(access, letter),
    approve: canApproveLetter(access, letter),
    return: canReturnLetter(access, letter),
    takeBack: canTakeBackLetter(access, letter),
    send: canSendLetter(access, letter),
    recall: canRecallLetter(access, letter),
    discard: canDiscardLetter(access, letter),
  },
})

export const presentLetterRow = (row: LetterListRow): LetterRow => ({
  id: row.id,
  childId: row.childId,
  childName: row.childName,
  recordNumber: row.recordNumber,
  kind: row.kind,
  state: row.state,
  author: row.author,
  approver: row.approver,
  changedAt: row.changedAt.toISOString(),
  sentAt: row.sentAt?.toISOString() ?? null,
  delivery: row.delivery,
})
