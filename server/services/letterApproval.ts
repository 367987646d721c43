import { createHash, randomUUID } from 'node:crypto'
import { checkLetter, openFindings } from '../../shared/letterChecks.ts'
import type { LetterApproval, LetterChecks, LetterDraft } from '../../shared/letters.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { LetterVersion } from '../entities/LetterVersion.ts'
import { AppError } from '../errors.ts'
import { UnprintableTextError } from '../pdf/letterFonts.ts'
import { renderLetterPdf } from '../pdf/letterPdf.ts'
import { listOtherNames, listRecipients, type LetterRecord } from '../queries/letters.ts'
import { wholeNames } from '../queries/names.ts'
import { letterFact, patchLetter } from './letters.ts'
import { printInTurn } from './printInTurn.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'

/** The checks of a text, with the names that belong in this letter and those that do not. */
export const checkLetterText = async (
  access: ChildAccess,
  letter: LetterRecord,
  draft: LetterDraft,
): Promise<LetterChecks> => {
  const [otherNames, carers] = await Promise.all([listOtherNames(access), listRecipients(access)])
  const ownNames = [
    letter.givenName,
    letter.familyName,
    letter.preferredName ?? '',
    // A child elsewhere may be called exactly the same.
    ...wholeNames(letter),
    letter.author,
    access.viewer.displayName,
  ]
  return checkLetter(draft, {
    ownNames: [...ownNames, ...carers.map((carer) => carer.name)].filter((name) => name !== ''),
    otherNames,
  })
}

/** The name a letter is filed under: the given one, with the one the child goes by. */
const identifyingName = ({ givenName, preferredName, familyName }: LetterRecord): string =>
  [givenName, preferredName === null || preferredName === givenName ? null : `(${preferredName})`, familyName]
    .filter((part) => part !== null)
    .join(' ')

/**
 * Approves a letter: checks it once more, prints it, and keeps text, overrides, PDF and hash as a version that never
 * changes. Throws 422 while blocked words, gaps or unanswered findings remain, or a character cannot be printed.
 */
export const approveLetter = async (
  actor: Actor,
  access: ChildAccess,
  letter: LetterRecord,
  version: number,
  approval: LetterApproval,
): Promise<void> => {
  const checks = await checkLetterText(access, letter, letter.content)
  const open = openFindings(checks, approval.overrides)
  if (open.length > 0)
    throw new AppError(422, 'letter_not_ready', 'This letter cannot be approved yet.', {
      fields: Object.fromEntries(
        open.map((finding, index) => [
          `finding${index}`,
          finding.phrase === null ? finding.message : `“${finding.phrase}”: ${finding.message}`,
        ]),
      ),
    })
  const settings = await readSettings()
  const approvedAt = now()
  const page = {
    kind: letter.kind,
    childName: identifyingName(letter),
    recordNumber: letter.recordNumber,
    approvedAt: approvedAt.toISOString(),
    salutation: letter.content.salutation,
    sections: letter.content.sections,
    author: letter.author,
    approver: access.viewer.id === letter.authorId ? null : access.viewer.displayName,
    clinic: settings,
  }
  const pdf = await printInTurn(() => renderLetterPdf(page)).catch((error: unknown) => {
    if (error instanceof UnprintableTextError) throw new AppError(422, 'unprintable', error.message)
    throw error
  })
  await transact(actor, async (tx, record) => {
    const versionId = randomUUID()
    await tx.insert(LetterVersion, {
      id: versionId,
      letterId: letter.id,
      content: letter.content,
      overrides: approval,
      pdf,
      pdfBytes: pdf.length,
      pdfSha256: createHash('sha256').update(pdf).digest(),
      approvedById: access.viewer.id,
      approvedAt,
    })
    await patchLetter(tx, letter, version, {
      state: 'approved',
      approvedVersionId: versionId,
      returnedReason: null,
    })
    record(letterFact(access, 'letter.approved', letter.id))
  })
}
