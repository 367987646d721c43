import { consentNeededTexts, type NeededConsent } from '../../shared/consentNeeded.ts'
import type { Day } from '../../shared/days.ts'
import { pastDayProblem } from '../../shared/recordDays.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { conflict, invalid } from '../errors.ts'
import { findChildFacts, isConsentGiven } from '../queries/childFacts.ts'
import { clinicToday, readSettings } from './settings.ts'

/** Refuses (409 `consent_needed`) what may only be added while a consent for the purpose is in force. */
export const requireConsent = async (
  tx: Tx | undefined,
  access: ChildAccess,
  purpose: NeededConsent,
): Promise<void> => {
  if (!(await isConsentGiven(access, purpose, tx)))
    throw conflict('consent_needed', consentNeededTexts[purpose])
}

/** Refuses (422 beside `field`) a day before the child's birth or after today in the clinic. */
export const requirePastDay = async (
  access: ChildAccess,
  field: string,
  label: string,
  day: Day,
): Promise<void> => {
  const { birthDate } = await findChildFacts(access)
  const problem = pastDayProblem(label, day, { birthDate, today: clinicToday(await readSettings()) })
  if (problem !== null) throw invalid({ [field]: problem })
}

/** Answers that were begun for a request and never sent stay in the words of who was asked, also once it has ended. */
export const requestEnded = () =>
  conflict(
    'request_ended',
    'These answers were never sent, and the request has ended. They can be discarded; nobody else changes or signs them.',
  )
