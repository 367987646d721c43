import { goalDetails, allAnswers, buildGoal, buildNote, buildQuestionnaire, buildSample } from '../records.ts'
import { noObservation, sampleDetails, seenOn } from '../records.ts'
import { noteDraft } from '../notes.ts'
import { authorOf, type Calls, type On } from './call.ts'

const draftForm = async (on: On) => {
  const form = await buildQuestionnaire(on.child.child, authorOf(on), { locked: false })
  return { ids: [form.id], version: form.version }
}

const ownNote = async (on: On) => {
  const note = await buildNote(on.child.child, authorOf(on), 'draft')
  return { ids: [note.id], version: note.version }
}

const sample = async ({ child, scene }: On) => ({
  ids: [(await buildSample(child.child, child.therapist, scene.picture)).id],
})

const path = (rest: string) => rest.replace('…', '/api/children/:childId')

/** What is seen, measured, written and agreed about a child. */
export const recordCalls: Calls = {
  [path('GET …/hand-profile')]: () => ({}),
  [path('POST …/questionnaires')]: () => ({
    body: {
      formId: 'hand-use-10.v1',
      informant: 'therapist',
      respondentName: null,
      answeredOn: seenOn(),
      replacesId: null,
    },
  }),
  [path('GET …/questionnaires/:id')]: draftForm,
  [path('PUT …/questionnaires/:id')]: async (on) => ({
    ...(await draftForm(on)),
    body: {
      informant: 'therapist',
      respondentName: null,
      answeredOn: seenOn(),
      answers: allAnswers('strong_left'),
      cutOffSet: 'clinic-40',
      comment: null,
    },
  }),
  [path('DELETE …/questionnaires/:id')]: draftForm,
  [path('POST …/questionnaires/:id/lock')]: async (on) => ({ ...(await draftForm(on)), body: {} }),

  [path('GET …/writing-observations')]: () => ({}),
  [path('POST …/writing-observations')]: () => ({ body: { ...noObservation, observedOn: seenOn() } }),

  [path('GET …/session-notes')]: () => ({}),
  [path('POST …/session-notes')]: () => ({ body: noteDraft({ heldOn: seenOn() }) }),
  [path('GET …/session-notes/:id')]: ownNote,
  [path('PUT …/session-notes/:id')]: async (on) => ({
    ...(await ownNote(on)),
    body: noteDraft({ heldOn: seenOn(), plan: 'Try a sloped board.' }),
  }),
  [path('DELETE …/session-notes/:id')]: ownNote,
  [path('GET …/session-notes/:id/revisions')]: ownNote,
  [path('POST …/session-notes/:id/sign')]: async (on) => ({
    ...(await ownNote(on)),
    body: { confirmed: true, lateReason: 'The network was down' },
  }),
  [path('POST …/session-notes/:id/countersign')]: async ({ child, scene }) => {
    const note = await buildNote(child.child, scene.newlyQualified, 'awaiting_countersignature')
    return { ids: [note.id], version: note.version, body: {} }
  },
  [path('POST …/session-notes/:id/addenda')]: async (on) => {
    const note = await buildNote(on.child.child, authorOf(on), 'signed')
    return { ids: [note.id], version: note.version, body: { text: 'The slope was 20 degrees.' } }
  },

  [path('GET …/samples')]: () => ({}),
  [path('POST …/samples')]: ({ scene }) => ({ file: scene.picture, body: sampleDetails() }),
  [path('GET …/samples/:id/file')]: sample,
  [path('GET …/samples/:id/thumbnail')]: sample,
  [path('DELETE …/samples/:id')]: sample,

  [path('GET …/goals')]: () => ({}),
  [path('POST …/goals')]: () => ({ body: goalDetails() }),
  [path('POST …/goals/:id/ratings')]: async ({ child }) => ({
    ids: [(await buildGoal(child.child, child.therapist)).id],
    body: { level: 0, ratedOn: seenOn(), note: null },
  }),
  [path('POST …/goals/:id/end')]: async ({ child }) => {
    const goal = await buildGoal(child.child, child.therapist)
    return {
      ids: [goal.id],
      version: goal.version,
      body: { outcome: 'finished', reason: 'Writes a page' },
    }
  },
}
