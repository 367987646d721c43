import { attentionLevels, type Attention } from './attention.ts'
import type { CaseloadNeed } from './caseload.ts'
import { addDays, compareDays, dayOf, formatDay, workingDaysBetween, type Day } from './days.ts'
import { isOpen, type EpisodeState } from './episodes.ts'
import type { LetterState } from './letters.ts'
import { dueLevel, reviewLevel } from './tasks.ts'
import { waitDays, waitingStates, waitLevel } from './waits.ts'

/** What the record says about one child, as far as something may wait for the viewer. */
export interface NeedFacts {
  state: EpisodeState
  receivedOn: Day
  nextReviewOn: Day | null
  /** Draft notes, and when the earliest of their sessions ended. */
  unsignedNotes: number
  unsignedSince: Date | null
  /** When the earliest note that waits for this viewer's countersignature was signed. */
  countersignSince: Date | null
  /** When the letter left longest was last changed: of this viewer's drafts, and of those to approve. */
  draftSince: Date | null
  approvalSince: Date | null
  lettersFailed: number
  /** Consent to assessment and therapy is in force; the day it ends, when it does. */
  consented: boolean
  consentEndsOn: Day | null
  /** The open task of this viewer that is due first, and how many there are. */
  task: { text: string; dueOn: Day | null } | null
  tasks: number
}

/** The clinic's thresholds and the moment of looking. */
export interface NeedRules {
  today: Day
  now: Date
  waitTargetWeeks: number
  unsignedSoonHours: number
  unsignedOverdueHours: number
  letterTargetWorkingDays: number
  timeZone: string
}

/** Days before a consent ends in which that is shown (clinic rule). */
export const consentNoticeDays = 30

/** Days after which a missing countersignature is overdue (clinic rule). */
export const countersignDays = 7

const hoursSince = (moment: Date, now: Date) => (now.getTime() - moment.getTime()) / 3_600_000

/** Soon at first, due after the first limit, overdue after the second; limits in hours since the session ended. */
export function unsignedLevel(
  endedAt: Date,
  rules: Pick<NeedRules, 'now' | 'unsignedSoonHours' | 'unsignedOverdueHours'>,
): Attention {
  const hours = hoursSince(endedAt, rules.now)
  if (hours > rules.unsignedOverdueHours) return 'overdue'
  return hours > rules.unsignedSoonHours ? 'due' : 'soon'
}

export const countersignLevel = (signedAt: Date, now: Date): Attention =>
  hoursSince(signedAt, now) > countersignDays * 24 ? 'overdue' : 'due'

/**
 * A letter that has not left: soon while it is being written, due once it waits for somebody, overdue after the clinic's
 * working days, counted from its last change.
 */
export function unsentLetterLevel(
  state: LetterState,
  changedAt: Date,
  {
    today,
    letterTargetWorkingDays,
    timeZone,
  }: Pick<NeedRules, 'today' | 'letterTargetWorkingDays' | 'timeZone'>,
): Attention {
  if (workingDaysBetween(dayOf(changedAt, timeZone), today) > letterTargetWorkingDays) return 'overdue'
  return state === 'draft' ? 'soon' : 'due'
}

const many = (count: number, one: string, more: string) => (count === 1 ? one : `${count} ${more}`)

const need = (kind: CaseloadNeed['kind'], level: Attention | null, text: string): CaseloadNeed[] =>
  level === null ? [] : [{ kind, level, text }]

function reviewNeed({ nextReviewOn }: NeedFacts, { today }: NeedRules): CaseloadNeed[] {
  if (nextReviewOn === null) return []
  const level = reviewLevel(nextReviewOn, today)
  const word = level === 'overdue' ? 'Review was due' : 'Review due'
  return need('review', level, `${word} ${formatDay(nextReviewOn)}`)
}

function consentNeed({ state, consented, consentEndsOn }: NeedFacts, { today }: NeedRules): CaseloadNeed[] {
  const text = 'No consent to assessment and therapy'
  if (!consented) return need('consent', waitingStates.includes(state) ? 'soon' : 'overdue', text)
  if (consentEndsOn === null || compareDays(consentEndsOn, addDays(today, consentNoticeDays)) > 0) return []
  return need('consent', 'soon', `Consent ends ${formatDay(consentEndsOn)}`)
}

function waitNeed({ state, receivedOn }: NeedFacts, { today, waitTargetWeeks }: NeedRules): CaseloadNeed[] {
  if (!waitingStates.includes(state)) return []
  const days = waitDays(receivedOn, today)
  const level = waitLevel(days, waitTargetWeeks)
  const weeks = (days / 7).toFixed(1)
  const over = level === 'overdue' ? `, over the ${waitTargetWeeks} weeks aimed for` : ''
  return need('wait', level, `Waiting ${weeks} weeks${over}`)
}

function writingNeeds(facts: NeedFacts, rules: NeedRules): CaseloadNeed[] {
  return [
    ...(facts.unsignedSince
      ? need(
          'unsigned_note',
          unsignedLevel(facts.unsignedSince, rules),
          many(facts.unsignedNotes, 'A note is not signed', 'notes are not signed'),
        )
      : []),
    ...(facts.countersignSince
      ? need(
          'countersign',
          countersignLevel(facts.countersignSince, rules.now),
          'A note waits for a countersignature',
        )
      : []),
    ...need('letter_failed', facts.lettersFailed > 0 ? 'overdue' : null, 'A letter could not be delivered'),
    ...need(
      'letter_approval',
      facts.approvalSince && unsentLetterLevel('awaiting_approval', facts.approvalSince, rules),
      'A letter waits for approval',
    ),
    ...need(
      'letter_draft',
      facts.draftSince && unsentLetterLevel('draft', facts.draftSince, rules),
      'A letter is being written',
    ),
  ]
}

/**
 * What waits for this viewer about one child, the most pressing first. Review, consent and wait end with the episode;
 * unsigned notes and failed letters do not.
 */
export function needsOf(facts: NeedFacts, rules: NeedRules): CaseloadNeed[] {
  const open = isOpen(facts.state)
  const needs = [
    ...(open ? [...reviewNeed(facts, rules), ...consentNeed(facts, rules), ...waitNeed(facts, rules)] : []),
    ...writingNeeds(facts, rules),
    ...(facts.task
      ? need(
          'task',
          dueLevel(facts.task.dueOn, rules.today),
          facts.tasks > 1 ? `${facts.task.text} (and ${facts.tasks - 1} more)` : facts.task.text,
        )
      : []),
  ]
  return needs.toSorted((a, b) => attentionLevels.indexOf(b.level) - attentionLevels.indexOf(a.level))
}
