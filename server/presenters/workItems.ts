import type { Attention } from '../../shared/attention.ts'
import { ageBand } from '../../shared/birthDates.ts'
import { countersignLevel, unsentLetterLevel, unsignedLevel } from '../../shared/caseloadNeeds.ts'
import { dayOf, formatDay, workingDaysBetween, type Day } from '../../shared/days.ts'
import { episodeStateLabels, type EpisodeState } from '../../shared/episodes.ts'
import { letterStateLabels, type LetterState } from '../../shared/letters.ts'
import { referralStatusLabels, type ReferralStatus } from '../../shared/referrals.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { dueLevel, reviewLevel } from '../../shared/tasks.ts'
import { waitDays, waitingStates, waitLevel } from '../../shared/waits.ts'
import type { WorkListId, WorkRow } from '../queries/workLists.ts'

/** One thing that waits, in words, with the page where it is done. */
export interface WorkItem {
  id: string
  title: string
  detail: string
  person: string | null
  /** A day, or an ISO moment. */
  since: string
  level: Attention
  to: string
}

export interface WorkClock {
  today: Day
  now: Date
  settings: ClinicSettings
}

type Words = (row: WorkRow, clock: WorkClock) => { detail: string; level: Attention; page: string }

const sinceDay = (row: WorkRow, { settings }: WorkClock): Day =>
  row.sinceDay ?? (row.sinceAt ? dayOf(row.sinceAt, settings.timeZone) : '')

const weeks = (days: number) => `${(days / 7).toFixed(1)} weeks`

const wait: Words = (row, clock) => {
  const days = waitDays(sinceDay(row, clock), clock.today)
  return {
    detail: `Waiting ${weeks(days)}; ${episodeStateLabels[row.words as EpisodeState].toLowerCase()}`,
    level: waitLevel(days, clock.settings.waitTargetWeeks) ?? 'soon',
    page: 'glance',
  }
}

const review: Words = (row, clock) => {
  const day = sinceDay(row, clock)
  const level = reviewLevel(day, clock.today) ?? 'soon'
  return {
    detail: `${level === 'overdue' ? 'Review was due' : 'Review due'} ${formatDay(day)}`,
    level,
    page: 'glance',
  }
}

const unsigned: Words = (row, { now, settings }) => ({
  detail: 'Note not signed',
  level: row.sinceAt ? unsignedLevel(row.sinceAt, { ...settings, now }) : 'soon',
  page: `sessions/${row.id}`,
})

const countersign: Words = (row, { now }) => ({
  detail: 'Note waits for a countersignature',
  level: row.sinceAt ? countersignLevel(row.sinceAt, now) : 'due',
  page: `sessions/${row.id}`,
})

const letter: Words = (row, { today, settings }) => ({
  detail: `Letter: ${letterStateLabels[row.words as LetterState].toLowerCase()}`,
  level: row.sinceAt
    ? unsentLetterLevel(row.words as LetterState, row.sinceAt, { ...settings, today })
    : 'due',
  page: `letters/${row.id}`,
})

const failedLetter: Words = (row) => ({
  detail: row.words ?? 'A letter could not be delivered',
  level: 'overdue',
  page: `letters/${row.id}`,
})

const consent: Words = (row) => ({
  detail: 'No consent to assessment and therapy in force',
  level: waitingStates.includes(row.words as EpisodeState) ? 'soon' : 'overdue',
  page: 'family',
})

const referral: Words = (row, clock) => {
  const days = workingDaysBetween(sinceDay(row, clock), clock.today)
  return {
    detail: `Referral, ${referralStatusLabels[row.words as ReferralStatus].toLowerCase()}`,
    level: days > clock.settings.untriagedWorkingDays ? 'overdue' : 'soon',
    page: '',
  }
}

/** A warning sign that nobody answered by the next working day is overdue, whatever it began as (clinic rule). */
const alert: Words = (row, clock) => ({
  detail: row.words ?? 'Warning sign',
  level: workingDaysBetween(sinceDay(row, clock), clock.today) > 1 ? 'overdue' : (row.level ?? 'due'),
  page: 'glance',
})

const task: Words = (row, { today }) => ({
  detail: row.sinceDay === null ? 'No date set' : `Due ${formatDay(row.sinceDay)}`,
  level: dueLevel(row.sinceDay, today),
  page: 'glance',
})

const words: Record<WorkListId, Words> = {
  waiting: wait,
  waiting_over_target: wait,
  reviews_overdue: review,
  reviews_due: review,
  reviews_escalated: review,
  notes_unsigned_24: unsigned,
  notes_unsigned_48: unsigned,
  notes_own: unsigned,
  notes_to_countersign: countersign,
  letters_to_approve: letter,
  letters_own: letter,
  letters_failed: failedLetter,
  consent_missing: consent,
  referrals_untriaged: referral,
  referrals_undecided: referral,
  alerts_open: alert,
  tasks: task,
}

const addressOf = (row: WorkRow, page: string): string =>
  row.childId === null ? '/today' : `/children/${row.childId}/${page}`

/** A referral whose name the viewer may not see yet is told from the next by age band and day. */
const unnamed = (row: WorkRow, { today }: WorkClock): string =>
  row.birthDate === null || row.sinceDay === null
    ? 'A child whose name is shown when opened'
    : `A child of ${ageBand(row.birthDate, today)}, received ${formatDay(row.sinceDay)}`

export const presentWorkItem = (list: WorkListId, row: WorkRow, clock: WorkClock): WorkItem => {
  const { detail, level, page } = words[list](row, clock)
  const isReferral = list === 'referrals_undecided' || list === 'referrals_untriaged'
  const child = row.recordNumber === null ? row.name : `${row.name}, ${row.recordNumber}`
  const isTask = list === 'tasks'
  return {
    id: row.id,
    title: isTask ? (row.words ?? 'Task') : (child ?? unnamed(row, clock)),
    detail: isTask && child !== null ? `${child}. ${detail}` : detail,
    person: row.person,
    since: row.sinceDay ?? row.sinceAt?.toISOString() ?? '',
    level,
    to: isReferral ? `/referrals/${row.id}` : addressOf(row, page),
  }
}
