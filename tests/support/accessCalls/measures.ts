import { database } from '../../../server/dataSource.ts'
import { buildMeasure, reachingDetails } from '../measures.ts'
import { seenOn } from '../records.ts'
import { authorOf, type Calls, type On } from './call.ts'

const draft = async (on: On) => {
  const details = reachingDetails()
  const measure = await buildMeasure(on.child.child, authorOf(on), {
    locked: false,
    kind: 'reaching',
    details,
  })
  return { ids: [measure.id], version: measure.version }
}

const path = (rest: string) => rest.replace('…', '/api/children/:childId')

/** Measures taken with the child. */
export const measureCalls: Calls = {
  [path('GET …/measures')]: () => ({}),
  [path('POST …/measures')]: ({ child }) => ({
    body: { kind: 'sides', measuredOn: seenOn(), replacesId: null },
    // One occasion has one record: the next caller begins anew.
    after: () =>
      database().query(`DELETE FROM measures WHERE childId = ? AND kind = 'sides' AND lockedAt IS NULL`, [
        child.child.id,
      ]),
  }),
  [path('GET …/measures/:id')]: draft,
  [path('PUT …/measures/:id')]: async (on) => ({
    ...(await draft(on)),
    body: { measuredOn: seenOn(), details: reachingDetails(), notDoneReason: null, comment: 'Sat well.' },
  }),
  [path('DELETE …/measures/:id')]: draft,
  [path('POST …/measures/:id/lock')]: async (on) => ({ ...(await draft(on)), body: {} }),
}
