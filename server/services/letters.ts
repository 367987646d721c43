import type { LetterDraft, LetterReturn } from '../../shared/letters.ts'
import { draftProgressLetter, progressLetterTemplate } from '../../shared/letterTemplates.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Letter } from '../entities/Letter.ts'
import { conflict } from '../errors.ts'
import type { LetterRecord } from '../queries/letters.ts'
import { readProgressFacts } from '../queries/progressFacts.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

export const letterFact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action,
  objectType: 'letter',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

/** Assembles a draft from the record as it is now; the facts used are kept with it. Answers the letter's id. */
export const createProgressLetter = async (
  actor: Actor,
  access: ChildAccess,
  key: string | null,
): Promise<string> => {
  const settings = await readSettings()
  const facts = await readProgressFacts(access, settings)
  const assembled = draftProgressLetter(facts)
  return transact(actor, (tx, record) =>
    createOnce(
      tx,
      actor,
      record,
      { key, request: ['letter', access.childId, 'progress'] },
      (id) => letterFact(access, 'letter.created', id),
      async (letterId) => {
        await tx.insert(Letter, {
          id: letterId,
          childId: access.childId,
          kind: 'progress',
          templateVersion: progressLetterTemplate,
          state: 'draft',
          content: {
            salutation: assembled.salutation,
            sections: assembled.sections,
            nextVisitOn: facts.nextVisitOn,
          },
          facts: assembled.facts,
          authorId: access.viewer.id,
          approvedVersionId: null,
          returnedReason: null,
          discardedAt: null,
          createdAt: now(),
          changedAt: now(),
        })
      },
    ),
  )
}

/** Applies a change to a letter that must still have the version the person saw; throws StaleWrite otherwise. */
export const patchLetter = (
  tx: Tx,
  letter: LetterRecord,
  version: number,
  patch: Parameters<typeof updateIfCurrent<Letter>>[4],
): Promise<void> => updateIfCurrent<Letter>(tx, Letter, letter.id, version, { ...patch, changedAt: now() })

/** Saves the text of a draft. */
export const changeLetter = (
  actor: Actor,
  access: ChildAccess,
  letter: LetterRecord,
  version: number,
  content: LetterDraft,
) =>
  transact(actor, async (tx, record) => {
    await patchLetter(tx, letter, version, { content })
    record(letterFact(access, 'letter.changed', letter.id))
  })

/** A newly qualified author hands the letter to the lead. */
export const submitLetter = (actor: Actor, access: ChildAccess, letter: LetterRecord, version: number) =>
  transact(actor, async (tx, record) => {
    await patchLetter(tx, letter, version, { state: 'awaiting_approval', returnedReason: null })
    record(letterFact(access, 'letter.submitted', letter.id))
  })

/** The lead gives a letter back with what to change. */
export const returnLetter = (
  actor: Actor,
  access: ChildAccess,
  letter: LetterRecord,
  version: number,
  { reason }: LetterReturn,
) =>
  transact(actor, async (tx, record) => {
    await patchLetter(tx, letter, version, { state: 'draft', returnedReason: reason })
    record(letterFact(access, 'letter.returned', letter.id))
  })

/** Opens a submitted or approved, unsent letter for changes: it must be approved again afterwards. */
export const takeBackLetter = (actor: Actor, access: ChildAccess, letter: LetterRecord, version: number) =>
  transact(actor, async (tx, record) => {
    await patchLetter(tx, letter, version, { state: 'draft', approvedVersionId: null })
    record(letterFact(access, 'letter.reopened', letter.id))
  })

export const discardLetter = (actor: Actor, access: ChildAccess, letter: LetterRecord, version: number) =>
  transact(actor, async (tx, record) => {
    if (letter.state !== 'draft') throw conflict('closed', 'Only a draft can be discarded.')
    await patchLetter(tx, letter, version, { discardedAt: now() })
    record(letterFact(access, 'letter.discarded', letter.id))
  })
