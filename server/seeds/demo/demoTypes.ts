import type { ConsentBasis, ConsentMethod, ConsentPurpose } from '../../../shared/consents.ts'
import type { EpisodeState } from '../../../shared/episodes.ts'
import type { GoalDetails } from '../../../shared/goals.ts'
import type { GuardianDetails, GuardianRelation } from '../../../shared/guardians.ts'
import type { HandUseAnswer } from '../../../shared/handUse.ts'
import type { LetterSectionId } from '../../../shared/letters.ts'
import type { Informant } from '../../../shared/questionnaires.ts'
import type { RedFlagId } from '../../../shared/redFlagRows.ts'
import type { Priority, ReferralDetails } from '../../../shared/referrals.ts'
import type { Hand, Role } from '../../../shared/roles.ts'
import type { SampleDetails } from '../../../shared/samples.ts'
import type { AdviceReply } from '../../../shared/schoolAdvice.ts'
import type { Addendum, NoteDraft } from '../../../shared/sessionNotes.ts'
import type { WritingHand } from '../../../shared/children.ts'
import type { WritingObservationDetails } from '../../../shared/writingObservations.ts'
import type { SampleDrawing } from '../sampleDrawing.ts'
import type { ParentKey } from './parents.ts'
import type { StaffKey, TeacherKey } from './people.ts'
import type { ClassKey } from './schools.ts'

/*
 * The demo clinic as data. Nothing here touches the database: timeline.ts puts everything in the order in which it
 * happened, and the seeding code carries each event out through the same services as real use.
 */

/** Days from the demo day: 0 is the day of seeding, -150 lies 150 days back, 28 is four weeks ahead. */
export type Offset = number

/** Time of day in the clinic's zone, 'HH:MM'. */
export type TimeOfDay = string

/** An adult who acts in the demo. */
export type ActorKey = StaffKey | TeacherKey | ParentKey

export interface DemoPerson<Key extends ActorKey = ActorKey> {
  key: Key
  displayName: string
  email: string
  password: string
  roles: Role[]
  newlyQualified: boolean
  /** Share of a full post; null for people who are not staff. */
  wte: number | null
  workingHand: Hand
}

export interface DemoCarer extends GuardianDetails {
  relation: GuardianRelation
  /** The account this carer signs in with; null has none. */
  account: ParentKey | null
}

/** One step of the episode. Steps to `triaged` carry out the acceptance of the referral. */
export interface DemoStep {
  to: EpisodeState
  day: Offset
  by: StaffKey
  reason: string
}

export interface DemoConsent {
  purpose: ConsentPurpose
  /** Position among the child's carers. */
  carer: number
  basis: ConsentBasis
  method: ConsentMethod
  givenDay: Offset
  /** Staff member who recorded it; null when the carer gave it signed in. */
  recordedBy: StaffKey | null
  expiresDay: Offset | null
  note: string | null
  withdrawn: { day: Offset; time: TimeOfDay; reason: string; by: ActorKey } | null
}

export interface DemoReferral extends Omit<
  ReferralDetails,
  | 'givenName'
  | 'familyName'
  | 'preferredName'
  | 'birthDate'
  | 'homeLanguages'
  | 'interpreterLanguage'
  | 'scriptDirection'
  | 'classId'
  | 'lookedAfter'
  | 'carers'
  | 'receivedOn'
> {
  receivedDay: Offset
  priority: Priority
  priorityReason: string | null
}

export interface DemoChild {
  /** Row of the demo scenario, 1 to 40. */
  number: number
  givenName: string
  familyName: string
  preferredName: string | null
  age: { years: number; months: number }
  /** Days past the last whole month of age (0 to 27), so that birthdays are spread. */
  ageDays: number
  homeLanguages: string
  interpreterLanguage: string | null
  scriptDirection: ReferralDetails['scriptDirection']
  lookedAfter: boolean
  consentsForSelf: boolean
  classKey: ClassKey
  writingHand: WritingHand | null
  /** What the child enjoys and does well, one a line; null before anybody asked. */
  strengths: string | null
  therapist: StaffKey | null
  referral: DemoReferral
  carers: DemoCarer[]
  consents: DemoConsent[]
  /** After `referred`, in order. */
  steps: DemoStep[]
  nextReviewDay: Offset | null
}

/** A further referral for a child already known, not decided yet. */
export interface DemoLaterReferral {
  child: number
  referral: DemoReferral
}

/** Whom the clinic asked: a carer by the place among the child's carers, or a teacher. */
export type Asked = number | TeacherKey

export interface DemoQuestionnaire {
  child: number
  /** Edition of the form. */
  formId: string
  informant: Informant
  respondentName: string
  answeredDay: Offset
  /** Who wrote the answers down, or asked for them. */
  by: StaffKey
  /** Answered signed in by the one who was asked; null when staff wrote it down. */
  asked: { day: Offset; of: Asked } | null
  /** By item id of the form; null is "not answered yet". */
  answers: Record<string, HandUseAnswer | null>
  comment: string | null
  locked: boolean
}

export interface DemoObservation extends Omit<WritingObservationDetails, 'observedOn'> {
  child: number
  observedDay: Offset
  by: StaffKey
}

export interface DemoSample {
  child: number
  takenDay: Offset
  by: StaffKey
  details: Omit<SampleDetails, 'takenOn'>
  drawing: SampleDrawing
  /** When it was taken out again, e.g. because it was filed under the wrong child. */
  removedDay: Offset | null
}

export interface DemoGoal {
  child: number
  setDay: Offset
  by: StaffKey
  details: Omit<GoalDetails, 'targetOn'> & { targetDay: Offset }
  ratings: { level: number; day: Offset; note: string | null }[]
  ended: { day: Offset; outcome: 'finished' | 'set_aside'; reason: string } | null
}

export interface DemoNote extends Omit<NoteDraft, 'heldOn' | 'goalIds'> {
  child: number
  heldDay: Offset
  author: StaffKey
  /** Positions among the child's goals, in the order of the goals table. */
  goals: number[]
  /** Null leaves a draft. */
  signed: { day: Offset; lateReason: string | null } | null
  /** For newly qualified authors; null leaves a signed note waiting. */
  countersigned: { day: Offset; by: StaffKey } | null
  addenda: (Addendum & { day: Offset; by: StaffKey })[]
}

export interface DemoAdvice {
  child: number
  by: StaffKey
  publishedDay: Offset
  checkByDay: Offset
  items: {
    itemId: string
    because: string
    reply: { answer: AdviceReply; reason: string | null; day: Offset; by: TeacherKey } | null
  }[]
  endedDay: Offset | null
}

/** What happens to a letter, in order. */
export type DemoLetterAct =
  | { act: 'submit'; day: Offset }
  | { act: 'return'; day: Offset; by: StaffKey; reason: string }
  | { act: 'approve'; day: Offset; by: StaffKey; overrides: { phrase: string; reason: string }[] }
  /** `outcome` is where the deliveries stand in the end; `cancelled` follows from a consent withdrawn meanwhile. */
  | {
      act: 'send'
      day: Offset
      carers: number[]
      outcome: 'sent' | 'opened' | 'queued' | 'failed' | 'cancelled'
    }

/** Sections to put in place of the assembled ones: null empties a section. Others stay as the record gives them. */
export type DemoLetterText = Partial<Record<LetterSectionId, string | null>>

export interface DemoLetter {
  child: number
  author: StaffKey
  createdDay: Offset
  /** Null keeps the assembled greeting. */
  salutation: string | null
  nextVisitDay: Offset | null
  /** A first wording that the checker refuses, saved before the one that stands; null when there was none. */
  firstWording: DemoLetterText | null
  wording: DemoLetterText
  acts: DemoLetterAct[]
}

/** What was done about a red flag. The flag itself comes from the referral, a history or a measure. */
export interface DemoAlertAction {
  child: number
  flag: RedFlagId
  from: 'referral' | 'history' | 'measure' | 'observation'
  day: Offset
  time: TimeOfDay
  by: StaffKey
  action: string
}

export interface DemoTask {
  child: number
  kind: string
  text: string
  createdDay: Offset
  dueDay: Offset
  assignee: StaffKey | null
  forRole: Role | null
  done: { day: Offset; by: StaffKey } | null
}
