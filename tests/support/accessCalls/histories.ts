import { buildHistory, historyDetails } from '../histories.ts'
import { seenOn } from '../records.ts'
import { authorOf, type Calls, type On } from './call.ts'

const draft = async (on: On) => {
  const history = await buildHistory(on.child.child, authorOf(on), {
    locked: false,
    details: { enjoys: 'Building dens' },
  })
  return { ids: [history.id], version: history.version }
}

const path = (rest: string) => rest.replace('…', '/api/children/:childId')

/** Histories written down by the therapist, and warning signs. */
export const historyCalls: Calls = {
  [path('GET …/histories')]: () => ({}),
  [path('POST …/histories')]: () => ({
    body: { respondentName: 'Mother', answeredOn: seenOn(), replacesId: null },
  }),
  [path('GET …/histories/:id')]: draft,
  [path('PUT …/histories/:id')]: async (on) => ({
    ...(await draft(on)),
    body: {
      respondentName: 'Mother',
      answeredOn: seenOn(),
      details: historyDetails({ enjoys: 'Building dens', visionChecked: 'yes' }),
    },
  }),
  [path('DELETE …/histories/:id')]: draft,
  [path('POST …/histories/:id/lock')]: async (on) => ({ ...(await draft(on)), body: {} }),
  [path('GET …/alerts')]: () => ({}),
  [path('POST …/alerts')]: () => ({ body: { flag: 'tremor', words: 'Hands shake when pouring' } }),
}
