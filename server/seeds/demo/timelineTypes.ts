import type { Day } from '../../../shared/days.ts'
import type { DemoConclusion, DemoHistory, DemoMeasure, DemoRequest } from './assessmentTypes.ts'
import type {
  ActorKey,
  DemoAdvice,
  DemoAlertAction,
  DemoConsent,
  DemoGoal,
  DemoLetter,
  DemoLetterAct,
  DemoNote,
  DemoObservation,
  DemoQuestionnaire,
  DemoReferral,
  DemoSample,
  DemoStep,
  DemoTask,
} from './demoTypes.ts'
import type { StaffKey } from './people.ts'

/** What can happen. `index` is the place among the child's own consents, samples, goals, notes, letters and so on. */
export type DemoHappening =
  /** Entered by the administrator. `later` ones are about a child who is known and stay undecided. */
  | { kind: 'referral'; referral: DemoReferral; later: boolean }
  | { kind: 'accept'; step: DemoStep }
  | { kind: 'allocate'; therapist: StaffKey; by: StaffKey }
  | { kind: 'step'; step: DemoStep }
  /** The writing hand, strengths and next review of the child are written down. */
  | { kind: 'care'; by: StaffKey }
  | { kind: 'consent'; consent: DemoConsent; index: number }
  | { kind: 'withdraw'; index: number; reason: string; by: ActorKey }
  /** The clinic asks a carer or a teacher; what comes back takes the request's `key`. */
  | { kind: 'ask'; request: Omit<DemoRequest, 'child' | 'askedDay' | 'remindedDays'>; key: string }
  /** The clinic's own reminders go out, whoever they are for. */
  | { kind: 'remind' }
  /** `key` names the request that is answered; null when staff wrote it down. */
  | { kind: 'history'; history: DemoHistory; key: string | null }
  | { kind: 'questionnaire'; questionnaire: DemoQuestionnaire; key: string | null }
  | { kind: 'measure'; measure: DemoMeasure }
  | { kind: 'conclusion'; conclusion: DemoConclusion; index: number }
  | { kind: 'countersign_conclusion'; index: number; by: StaffKey }
  | { kind: 'observation'; observation: DemoObservation }
  | { kind: 'sample'; sample: DemoSample; index: number }
  | { kind: 'remove_sample'; index: number; by: StaffKey }
  | { kind: 'goal'; goal: DemoGoal; index: number }
  | { kind: 'rating'; index: number; rating: DemoGoal['ratings'][number]; by: StaffKey }
  | { kind: 'end_goal'; index: number; by: StaffKey; outcome: 'finished' | 'set_aside'; reason: string }
  | { kind: 'note'; note: DemoNote; index: number }
  | { kind: 'sign'; index: number; by: StaffKey; lateReason: string | null }
  | { kind: 'countersign'; index: number; by: StaffKey }
  | { kind: 'addendum'; index: number; by: StaffKey; text: string }
  | { kind: 'advice'; advice: DemoAdvice }
  | { kind: 'reply'; itemId: string; reply: NonNullable<DemoAdvice['items'][number]['reply']> }
  | { kind: 'end_advice'; advice: DemoAdvice }
  | { kind: 'letter'; letter: DemoLetter; index: number }
  | { kind: 'letter_act'; index: number; act: DemoLetterAct; author: StaffKey }
  | { kind: 'act_on_alert'; flag: DemoAlertAction['flag']; by: StaffKey; action: string }
  | { kind: 'task'; task: DemoTask; index: number }
  | { kind: 'finish_task'; index: number; by: StaffKey }
  /** Somebody does what the software had put on their list about the child. */
  | { kind: 'finish_own_tasks'; taskKind: string; by: StaffKey }

export type DemoEvent = DemoHappening & {
  /** Number of the child. */
  child: number
  /** The moment to set the clock to. */
  at: Date
  /** The calendar day of it, for dates that forms ask for. */
  on: Day
}
