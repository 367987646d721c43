import { emptyConclusion, type ConclusionState } from '../../../shared/conclusions.ts'
import { buildConclusion, clearBegun } from '../conclusions.ts'
import { buildQuestionnaire } from '../records.ts'
import { authorOf, type Calls, type On } from './call.ts'

const draft = async (on: On) => {
  await clearBegun(on.child.child)
  const { id: evidence } = await buildQuestionnaire(on.child.child, authorOf(on), { locked: true })
  const conclusion = await buildConclusion(on.child.child, authorOf(on), 'draft', {
    evidence: [{ kind: 'questionnaire', id: evidence }],
  })
  return { ids: [conclusion.id], version: conclusion.version }
}

/** Reads are prepared for everybody before anybody calls, so that none may take away another's. */
const stored = (state: ConclusionState) => async (on: On) => ({
  ids: [(await buildConclusion(on.child.child, authorOf(on), state)).id],
})

const path = (rest: string) => rest.replace('…', '/api/children/:childId')

/** What the therapist concludes, and the report of it. */
export const conclusionCalls: Calls = {
  [path('GET …/conclusions')]: () => ({}),
  [path('POST …/conclusions')]: async ({ child }) => {
    await clearBegun(child.child)
    return { body: { replacesId: null } }
  },
  [path('GET …/conclusions/:id')]: stored('draft'),
  [path('PUT …/conclusions/:id')]: async (on) => ({
    ...(await draft(on)),
    body: { ...emptyConclusion, strengths: 'Draws maps.' },
  }),
  [path('DELETE …/conclusions/:id')]: draft,
  [path('GET …/conclusions/:id/check')]: stored('draft'),
  [path('POST …/conclusions/:id/sign')]: async (on) => ({ ...(await draft(on)), body: { confirmed: true } }),
  [path('POST …/conclusions/:id/countersign')]: async ({ child, scene }) => {
    const conclusion = await buildConclusion(child.child, scene.newlyQualified, 'awaiting_countersignature')
    return { ids: [conclusion.id], version: conclusion.version, body: { confirmed: true } }
  },
  [path('GET …/conclusions/:id/report.pdf')]: stored('signed'),
}
