import { now } from '../../../server/clock.ts'
import { database } from '../../../server/dataSource.ts'
import { buildAdvice } from '../clinicRows.ts'
import { giveConsent } from '../factories.ts'
import { dueOn } from '../records.ts'
import { takeBackConsents, versionOf, type Calls } from './call.ts'

/** What leaves for the school, and the rooms of teachers and carers. */
export const roomCalls: Calls = {
  'GET /api/children/:childId/school': () => ({}),
  'POST /api/children/:childId/advice': async ({ child }) => {
    // Five at once is the clinic's limit, so what earlier calls gave is over.
    await database().query(
      "UPDATE school_advice SET endedAt = ?, endedById = ? WHERE childId = ? AND endedAt IS NULL AND itemId <> 'S01'",
      [now(), child.therapist.id, child.child.id],
    )
    return {
      body: { items: [{ itemId: 'S02', because: 'The wall is on the left' }], checkBy: dueOn() },
    }
  },
  'POST /api/children/:childId/advice/:id/end': async ({ child }) => ({
    ids: [(await buildAdvice(child.child, child.therapist, { itemId: 'S03' })).id],
    body: {},
  }),

  'GET /api/classes': () => ({}),
  'GET /api/classes/:id/pupils': ({ child }) => ({ ids: [child.schoolClass.id], query: 'size=100' }),
  'GET /api/pupils/:childId': () => ({}),
  'POST /api/pupils/:childId/advice/:id/replies': async ({ child }) => ({
    ids: [(await buildAdvice(child.child, child.therapist, { itemId: 'S05' })).id],
    body: { reply: 'done', reason: null },
  }),

  'GET /api/my/children': () => ({}),
  'GET /api/my/children/:childId': () => ({}),
  'PUT /api/my/children/:childId/contact': async ({ child, person }) => {
    const own = child.guardians.get(person.key) ?? [...child.guardians.values()][0]
    return {
      version: own ? await versionOf('guardians', own.id) : 1,
      body: { phone: own?.phone ?? null, address: own?.address ?? null },
    }
  },
  'POST /api/my/children/:childId/consents': async ({ child }) => {
    await takeBackConsents(child, 'observer_present')
    return { body: { purpose: 'observer_present' } }
  },
  'POST /api/my/children/:childId/consents/:id/withdraw': async ({ child }) => ({
    ids: [(await giveConsent(child.child, 'teaching_use', child.therapist)).id],
    body: { reason: null },
  }),
}
