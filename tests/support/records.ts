import { createHash, randomUUID } from 'node:crypto'
import { addDays } from '../../shared/days.ts'
import type { GoalDetails } from '../../shared/goals.ts'
import { cutOffSets, handUseFormV1, scoreHandUse, type HandUseAnswer } from '../../shared/handUse.ts'
import { canonicalNote, type NoteDraft, type NoteState } from '../../shared/sessionNotes.ts'
import type { SampleDetails } from '../../shared/samples.ts'
import type { WritingObservationDetails } from '../../shared/writingObservations.ts'
import { now } from '../../server/clock.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Goal } from '../../server/entities/Goal.ts'
import { GoalRating } from '../../server/entities/GoalRating.ts'
import { NoteRevision } from '../../server/entities/NoteRevision.ts'
import { NoteSignature } from '../../server/entities/NoteSignature.ts'
import { QuestionnaireResponse } from '../../server/entities/QuestionnaireResponse.ts'
import { Sample } from '../../server/entities/Sample.ts'
import { SessionNote } from '../../server/entities/SessionNote.ts'
import type { User } from '../../server/entities/User.ts'
import { WritingObservation } from '../../server/entities/WritingObservation.ts'
import { insertRow } from './insertRow.ts'
import { noteDraft } from './notes.ts'

/* Rows of a child's record, written as the app account writes them. */

type Of = Pick<Child, 'id'>
type By = Pick<User, 'id'>

/** A day in the past for whatever was seen or written, so that no clock makes it the future. */
export const seenOn = () => addDays(now().toISOString().slice(0, 10), -20)
export const dueOn = () => addDays(now().toISOString().slice(0, 10), 40)
const sha256 = (data: Buffer | string) => createHash('sha256').update(data).digest()

export const allAnswers = (answer: HandUseAnswer = 'left'): Record<string, HandUseAnswer> =>
  Object.fromEntries(handUseFormV1.items.map((item) => [item.id, answer]))

export const buildQuestionnaire = (
  child: Of,
  by: By,
  { locked, ...given }: Partial<QuestionnaireResponse> & { locked: boolean },
) =>
  insertRow(QuestionnaireResponse, {
    id: randomUUID(),
    childId: child.id,
    formVersion: handUseFormV1.version,
    informant: 'therapist',
    respondentName: null,
    answeredOn: seenOn(),
    answers: allAnswers(),
    comment: null,
    cutOffSet: cutOffSets[0].id,
    score: locked ? { ...scoreHandUse(allAnswers()), method: 'edinburgh_style', total: null } : null,
    lockedAt: locked ? now() : null,
    lockedById: locked ? by.id : null,
    startedById: by.id,
    replacesId: null,
    createdAt: now(),
    ...given,
  })

export const buildObservation = (
  child: Of,
  by: By,
  details: Partial<WritingObservationDetails> = {},
): Promise<WritingObservation> =>
  insertRow(WritingObservation, {
    id: randomUUID(),
    childId: child.id,
    observedOn: seenOn(),
    details: { ...noObservation, observedOn: seenOn(), ...details },
    observedById: by.id,
    recordedAt: now(),
  })

export const noObservation: Omit<WritingObservationDetails, 'observedOn'> = {
  writingHand: 'left',
  paperOffsetCm: null,
  paperTiltDegrees: 20,
  otherHandSteadies: null,
  wristPosture: null,
  wristExtensionDegrees: null,
  grip: null,
  fingerToTipMm: null,
  pressure: null,
  minutesWritten: null,
  painBefore: null,
  painAfter: null,
  deskType: 'double',
  elbowClash: 'yes',
  leftClearanceCm: null,
  lightSide: null,
  feetFlat: null,
  deskAboveElbowCm: null,
  note: null,
}

/** A note with its first revision and, once handed in, its author's signature. */
export const buildNote = async (
  child: Of,
  author: By,
  state: NoteState,
  content: Partial<NoteDraft> = {},
): Promise<SessionNote> => {
  const text = noteDraft({ heldOn: seenOn(), ...content })
  const note = await insertRow(SessionNote, {
    id: randomUUID(),
    childId: child.id,
    authorId: author.id,
    heldOn: text.heldOn,
    startTime: text.startTime,
    minutes: text.minutes,
    endedAt: new Date(`${text.heldOn}T11:00:00Z`),
    type: text.type,
    state,
    summary: text.plan.slice(0, 160),
    discardedAt: null,
    createdAt: now(),
  })
  const revision = await insertRow(NoteRevision, {
    id: randomUUID(),
    noteId: note.id,
    revision: 1,
    content: text,
    byId: author.id,
    at: now(),
  })
  if (state !== 'draft')
    await insertRow(NoteSignature, {
      id: randomUUID(),
      noteId: note.id,
      revisionId: revision.id,
      kind: 'author',
      signedById: author.id,
      signedRole: 'Therapist',
      signedAt: now(),
      timeZone: 'Europe/London',
      textHash: sha256(canonicalNote(note.id, child.id, text)),
      lateReason: null,
    })
  return note
}

export const sampleDetails = (given: Partial<SampleDetails> = {}): SampleDetails => ({
  takenOn: seenOn(),
  task: 'copy',
  script: 'print',
  seconds: 120,
  letters: 60,
  legibleLetters: 50,
  reversals: 1,
  smudge: 'light',
  lineAdherence: 3,
  otherChildVisible: false,
  note: null,
  ...given,
})

/** `picture` is what is stored as file and thumbnail alike. */
export const buildSample = (
  child: Of,
  by: By,
  picture: Buffer,
  details: Partial<SampleDetails> = {},
): Promise<Sample> =>
  insertRow(Sample, {
    id: randomUUID(),
    childId: child.id,
    takenOn: seenOn(),
    details: sampleDetails(details),
    contentType: 'image/png',
    bytes: picture.length,
    width: 40,
    height: 30,
    pixelsPerMm: null,
    sha256: sha256(picture),
    originalSha256: sha256(picture),
    content: picture,
    thumbnail: picture,
    uploadedById: by.id,
    uploadedAt: now(),
    removedAt: null,
    removedById: null,
  })

export const goalDetails = (given: Partial<GoalDetails> = {}): GoalDetails => ({
  activity: 'Writes five lines in class without a sore hand',
  childVoice: 'I want to finish my story',
  levels: [
    'Writes one line',
    'Writes three lines',
    'Writes five lines',
    'Writes seven lines',
    'Writes a whole page',
  ],
  baseline: -2,
  importance: 3,
  difficulty: 2,
  targetOn: dueOn(),
  ...given,
})

export const buildGoal = async (child: Of, by: By, details: Partial<GoalDetails> = {}): Promise<Goal> => {
  const goal = await insertRow(Goal, {
    id: randomUUID(),
    childId: child.id,
    details: goalDetails(details),
    setOn: seenOn(),
    endedOn: null,
    outcome: null,
    setById: by.id,
    createdAt: now(),
  })
  await insertRow(GoalRating, {
    id: randomUUID(),
    goalId: goal.id,
    level: -1,
    ratedOn: seenOn(),
    note: null,
    ratedById: by.id,
    createdAt: now(),
  })
  return goal
}
