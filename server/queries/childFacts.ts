import type { ConsentPurpose } from '../../shared/consents.ts'
import type { WritingHand } from '../../shared/children.ts'
import type { Day } from '../../shared/days.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { consentInForce, within } from './scope.ts'
import { flag, selectOne } from './sql.ts'

export interface ChildFacts {
  recordNumber: string
  birthDate: Day
  writingHand: WritingHand | null
}

/** The few facts about a child that rules on dates, goals and files need. */
export const findChildFacts = async (access: ChildAccess, tx?: Tx): Promise<ChildFacts> => {
  const scope = within(access, 'c.id')
  const facts = await selectOne<ChildFacts>(
    `SELECT c.recordNumber, c.birthDate, c.writingHand FROM children c WHERE ${scope.sql}`,
    scope.parameters,
    tx,
  )
  if (!facts) throw notFound()
  return facts
}

/** Is a consent for this purpose in force for the child now? */
export const isConsentGiven = async (
  access: ChildAccess,
  purpose: ConsentPurpose,
  tx?: Tx,
): Promise<boolean> => {
  const scope = within(access, 'c.id')
  const consent = consentInForce('c.id', [purpose])
  const found = await selectOne<{ given: number }>(
    `SELECT ${consent.sql} AS given FROM children c WHERE ${scope.sql}`,
    { ...scope.parameters, ...consent.parameters },
    tx,
  )
  return found !== null && flag(found.given)
}

/** Birth date, and whether a consent for this purpose is in force now, in one query. */
export const findConsentedChild = async (
  access: ChildAccess,
  purpose: ConsentPurpose,
): Promise<{ birthDate: Day; consented: boolean }> => {
  const scope = within(access, 'c.id')
  const consent = consentInForce('c.id', [purpose])
  const found = await selectOne<{ birthDate: Day; given: number }>(
    `SELECT c.birthDate, ${consent.sql} AS given FROM children c WHERE ${scope.sql}`,
    { ...scope.parameters, ...consent.parameters },
  )
  if (!found) throw notFound()
  return { birthDate: found.birthDate, consented: flag(found.given) }
}
