import { isDeepStrictEqual } from 'node:util'
import { editionProblems, type FormEdition } from '../../shared/formEditions.ts'
import type { Actor } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { QuestionnaireForm } from '../entities/QuestionnaireForm.ts'
import { conflict, invalid, notFound } from '../errors.ts'
import { findForm, lockEditions, type FormRecord } from '../queries/forms.ts'
import type { AuditFact } from './audit.ts'
import { transact } from './transact.ts'

const fact = (action: string, id: string): AuditFact => ({
  action: `form.${action}`,
  objectType: 'form',
  objectId: id,
})

const actingId = ({ viewer }: Actor): string | null => viewer?.id ?? null

const retire = async (tx: Tx, actor: Actor, id: string): Promise<void> => {
  await tx.update(QuestionnaireForm, { id }, { retiredAt: now(), retiredById: actingId(actor) })
}

/** The edition and its siblings, held; 404 when there is none of that name. */
const heldEdition = async (tx: Tx, id: string): Promise<{ form: FormRecord; siblings: FormRecord[] }> => {
  const named = await findForm(id, tx)
  const editions = named ? await lockEditions(named.key, tx) : []
  const form = editions.find((edition) => edition.id === id)
  if (!form) throw notFound()
  return { form, siblings: editions.filter((edition) => edition.id !== id) }
}

/** Nobody begins with it from now on; what was begun or asked for is finished. */
export const retireForm = (actor: Actor, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    const { form } = await heldEdition(tx, id)
    if (form.retiredAt !== null) throw conflict('closed', 'This edition is retired already.')
    await retire(tx, actor, id)
    record(fact('retired', id))
  })

/** Brings an edition back into use, unless another of the same form is in use. */
export const restoreForm = (actor: Actor, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    const { form, siblings } = await heldEdition(tx, id)
    if (form.retiredAt === null) throw conflict('closed', 'This edition is in use already.')
    const used = siblings.find(({ retiredAt }) => retiredAt === null)
    if (used)
      throw conflict(
        'duplicate',
        `Edition ${used.edition} of this form is in use. Retire it first: one is used at a time.`,
      )
    await tx.update(QuestionnaireForm, { id }, { retiredAt: null, retiredById: null })
    record(fact('restored', id))
  })

/**
 * Makes the next edition of a form and retires the one in use, so that two wordings never run side by side. Refuses (422
 * by field) what would make its answers another measure, and (409) words that are in use already, which is also what a
 * second click sends. Answers the id.
 */
export const makeEdition = (actor: Actor, { key, definition }: FormEdition): Promise<string> =>
  transact(actor, async (tx, record) => {
    const editions = await lockEditions(key, tx)
    const newest = editions[0]
    if (!newest) throw invalid({ key: 'Choose a form from the list' })
    const problems = editionProblems(newest.definition, definition)
    if (Object.keys(problems).length > 0) throw invalid(problems)
    const twin = editions.find((edition) => isDeepStrictEqual(edition.definition, definition))
    if (twin)
      throw conflict('duplicate', `Edition ${twin.edition} has these very words. Bring it back instead.`)
    for (const { id, retiredAt } of editions) {
      if (retiredAt !== null) continue
      await retire(tx, actor, id)
      record(fact('retired', id))
    }
    const edition = newest.edition + 1
    const id = `${key}.v${edition}`
    await tx.insert(QuestionnaireForm, {
      id,
      formKey: key,
      edition,
      definition,
      createdAt: now(),
      createdById: actingId(actor),
      retiredAt: null,
      retiredById: null,
    })
    record(fact('edition_made', id))
    return id
  })
