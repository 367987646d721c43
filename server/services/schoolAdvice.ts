import { randomUUID } from 'node:crypto'
import { adviceItemById } from '../../shared/adviceItems.ts'
import { compareDays, daysBetween, formatDay, type Day } from '../../shared/days.ts'
import { maximumAdviceItems, type PublishAdvice } from '../../shared/schoolAdvice.ts'
import { teacherTextProblem } from '../../shared/teacherText.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { SchoolAdvice } from '../entities/SchoolAdvice.ts'
import { conflict, invalid } from '../errors.ts'
import { findChildFacts, isConsentGiven } from '../queries/childFacts.ts'
import { lockChild } from '../queries/lockChild.ts'
import { listLiveItemIds } from '../queries/schoolAdvice.ts'
import { findForChild } from '../queries/scope.ts'
import { execute } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { once } from './once.ts'
import { clinicToday, readSettings } from './settings.ts'
import { transact } from './transact.ts'

const fact = (access: ChildAccess, action: string, id: string, detail?: AuditFact['detail']): AuditFact => ({
  action,
  objectType: 'schoolAdvice',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
  ...(detail && { detail }),
})

/** A class changes every September: advice is looked at again within the year (clinic rule). */
const longestDays = 366

/** What speaks against the chosen items by themselves, by field; empty when nothing does. */
const problemsOf = (
  { items, checkBy }: PublishAdvice,
  today: Day,
  writingHand: Parameters<typeof teacherTextProblem>[1],
): Record<string, string> => {
  const fields: Record<string, string> = {}
  for (const [index, { itemId, because }] of items.entries()) {
    if (!adviceItemById(itemId)?.audiences.includes('teacher'))
      fields[`items[${index}].itemId`] = 'This is not advice for a teacher'
    else if (items.findIndex((other) => other.itemId === itemId) < index)
      fields[`items[${index}].itemId`] = 'This item is chosen twice'
    const problem = teacherTextProblem(because, writingHand)
    if (problem !== null) fields[`items[${index}].because`] = problem
  }
  if (compareDays(checkBy, today) < 0)
    fields.checkBy = `The check date cannot be in the past: today is ${formatDay(today)}`
  else if (daysBetween(today, checkBy) > longestDays)
    fields.checkBy = `The check date is more than a year ahead (${formatDay(checkBy)}): check the year`
  return fields
}

/**
 * Gives library items to the child's teacher. Throws 422 beside the item or date that does not fit, 409
 * `consent_needed` while the family does not share advice with the school.
 */
export const publishAdvice = async (
  actor: Actor,
  access: ChildAccess,
  advice: PublishAdvice,
  key: string | null,
): Promise<void> => {
  const { writingHand } = await findChildFacts(access)
  const problems = problemsOf(advice, clinicToday(await readSettings()), writingHand)
  if (Object.keys(problems).length > 0) throw invalid(problems)
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    if (!(await isConsentGiven(access, 'share_school_seating', tx)))
      throw conflict(
        'consent_needed',
        'The family does not share seating and classroom advice with the school, so nothing can be given to it. ' +
          'Ask a person with parental responsibility and record the answer under Family and consent.',
      )
    const request = ['schoolAdvice', access.childId, advice]
    const { id, again } = await once(tx, actor, { key, request }, async () => {
      const live = await listLiveItemIds(access, tx)
      const doubled = advice.items.findIndex((item) => live.includes(item.itemId))
      if (doubled >= 0) throw invalid({ [`items[${doubled}].itemId`]: 'The teacher has this item already' })
      if (live.length + advice.items.length > maximumAdviceItems)
        throw invalid({
          items: `A teacher gets ${maximumAdviceItems} items at most at a time, and ${live.length} are in force. End one first.`,
        })
      for (const { itemId, because } of advice.items) {
        const adviceId = randomUUID()
        await tx.insert(SchoolAdvice, {
          id: adviceId,
          childId: access.childId,
          itemId,
          because,
          checkBy: advice.checkBy,
          publishedAt: now(),
          publishedById: access.viewer.id,
          endedAt: null,
          endedById: null,
        })
        record(fact(access, 'schoolAdvice.published', adviceId, { itemId }))
      }
    })
    if (again) record(fact(access, 'schoolAdvice.asked_again', id))
  })
}

/** Takes an item back: the teacher does not see it any more. Answers given to it stay in the record. */
export const endAdvice = (actor: Actor, access: ChildAccess, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    const advice = await findForChild(access, SchoolAdvice, id, tx, { lock: true })
    if (advice.endedAt !== null) throw conflict('closed', 'This advice was ended before. Reload the page.')
    await execute(
      tx,
      'UPDATE school_advice SET endedAt = :now, endedById = :by WHERE id = :id AND endedAt IS NULL',
      {
        id: advice.id,
        now: now(),
        by: access.viewer.id,
      },
    )
    record(fact(access, 'schoolAdvice.ended', advice.id))
  })
