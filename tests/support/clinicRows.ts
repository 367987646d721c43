import { randomUUID } from 'node:crypto'
import type { ReferralDetails, ReferralStatus } from '../../shared/referrals.ts'
import { now } from '../../server/clock.ts'
import { AdviceAnswer } from '../../server/entities/AdviceAnswer.ts'
import { Alert } from '../../server/entities/Alert.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Referral } from '../../server/entities/Referral.ts'
import { SchoolAdvice } from '../../server/entities/SchoolAdvice.ts'
import type { User } from '../../server/entities/User.ts'
import { insertRow } from './insertRow.ts'
import { dueOn } from './records.ts'
import { referralDetails } from './referrals.ts'

/* Rows around a child: advice to the school, alerts and stored referrals. */

type Of = Pick<Child, 'id'>
type By = Pick<User, 'id'>

export const buildAdvice = (child: Of, by: By, given: Partial<SchoolAdvice> = {}): Promise<SchoolAdvice> =>
  insertRow(SchoolAdvice, {
    id: randomUUID(),
    childId: child.id,
    itemId: 'S01',
    because: 'Elbows meet at the shared desk',
    checkBy: dueOn(),
    publishedAt: now(),
    publishedById: by.id,
    endedAt: null,
    endedById: null,
    ...given,
  })

export const buildReply = (advice: Pick<SchoolAdvice, 'id'>, by: By, given: Partial<AdviceAnswer> = {}) =>
  insertRow(AdviceAnswer, {
    id: randomUUID(),
    adviceId: advice.id,
    reply: 'trying',
    reason: null,
    byId: by.id,
    at: now(),
    ...given,
  })

export const buildAlert = (child: Of, text: string): Promise<Alert> =>
  insertRow(Alert, {
    id: randomUUID(),
    childId: child.id,
    flag: 'RED-01',
    text,
    level: 'due',
    urgency: 'ask',
    advice: null,
    origin: 'referral',
    originId: null,
    holdsBooking: false,
    raisedAt: now(),
    raisedById: null,
    actedAt: null,
    actedById: null,
    action: null,
  })

export const buildReferral = (
  by: By,
  status: ReferralStatus,
  { child = null, ...given }: Partial<ReferralDetails> & { child?: Of | null } = {},
): Promise<Referral> => {
  const details = referralDetails(given)
  return insertRow(Referral, {
    id: randomUUID(),
    receivedOn: details.receivedOn,
    status,
    details,
    givenName: details.givenName,
    familyName: details.familyName,
    birthDate: details.birthDate,
    schoolClassId: details.classId,
    priority: child ? 'routine' : null,
    childId: child?.id ?? null,
    enteredById: by.id,
    decidedById: child ? by.id : null,
    decidedAt: child ? now() : null,
    decisionReason: null,
    outcome: null,
    createdAt: now(),
  })
}
