import { addDays, type Day } from '../../../shared/days.ts'
import { isOpen } from '../../../shared/episodes.ts'
import { adviceGiven } from './advice.ts'
import { alertActions } from './alertActions.ts'
import { assessmentOf } from './assessmentTimeline.ts'
import { children, laterReferrals } from './children.ts'
import { demoDay, demoMoment, demoWorkday } from './demoDays.ts'
import type { DemoChild, TimeOfDay } from './demoTypes.ts'
import { goals } from './goals.ts'
import { letters } from './letters.ts'
import { observations } from './observations.ts'
import { at, of, type Planned } from './planned.ts'
import { samples } from './samples.ts'
import { sessionNotes } from './sessionNotes.ts'
import { tasks } from './tasks.ts'
import type { DemoEvent } from './timelineTypes.ts'

const minutesLater = (time: TimeOfDay, minutes: number): TimeOfDay => {
  const total = Number(time.slice(0, 2)) * 60 + Number(time.slice(3)) + minutes
  return `${String(Math.floor(total / 60)).padStart(2, '0')}:${String(total % 60).padStart(2, '0')}`
}

const stepTimes: Partial<Record<string, TimeOfDay>> = {
  waiting: '09:40',
  consented: '10:45',
  assessing: '08:45',
  formulated: '16:00',
  active: '16:10',
  review: '17:30',
  discharged: '17:40',
  redirected: '13:00',
  consent_withdrawn: '15:50',
}

function careOf(child: DemoChild): Planned[] {
  const lastOpen = child.steps.findLast(({ to }) => isOpen(to))
  return [
    at(child.referral.receivedDay, '09:00', { kind: 'referral', referral: child.referral, later: false }),
    ...child.steps.flatMap((step) => {
      if (step.to !== 'triaged') return [at(step.day, stepTimes[step.to] ?? '17:00', { kind: 'step', step })]
      const accepted = at(step.day, '09:30', { kind: 'accept', step })
      if (child.therapist === null) return [accepted]
      return [accepted, at(step.day, '09:35', { kind: 'allocate', therapist: child.therapist, by: 'ines' })]
    }),
    ...(lastOpen ? [at(lastOpen.day, '16:15', { kind: 'care', by: child.therapist ?? 'ines' })] : []),
    ...child.consents.flatMap((consent, index) => [
      at(consent.givenDay, '10:30', { kind: 'consent', consent, index }),
      ...(consent.withdrawn
        ? [
            at(consent.withdrawn.day, consent.withdrawn.time, {
              kind: 'withdraw',
              index,
              ...consent.withdrawn,
            }),
          ]
        : []),
    ]),
  ]
}

function findingsOf(child: number): Planned[] {
  return [
    ...of(observations, child).map((observation) =>
      at(observation.observedDay, '11:40', { kind: 'observation', observation }),
    ),
    ...of(samples, child).flatMap((sample, index) => [
      at(sample.takenDay, '12:00', { kind: 'sample', sample, index }),
      ...(sample.removedDay === null
        ? []
        : [at(sample.removedDay, '12:20', { kind: 'remove_sample', index, by: sample.by })]),
    ]),
    ...of(goals, child).flatMap((goal, index) => [
      at(goal.setDay, '16:20', { kind: 'goal', goal, index }),
      ...goal.ratings.map((rating) =>
        at(rating.day, '16:40', { kind: 'rating', index, rating, by: goal.by }),
      ),
      ...(goal.ended
        ? [at(goal.ended.day, '17:20', { kind: 'end_goal', index, by: goal.by, ...goal.ended })]
        : []),
    ]),
  ]
}

function notesOf(child: number): Planned[] {
  return of(sessionNotes, child).flatMap((note, index) => {
    const end = minutesLater(note.startTime, note.minutes)
    const { signed, countersigned, addenda } = note
    return [
      at(note.heldDay, end, { kind: 'note', note, index }),
      ...(signed
        ? [
            at(signed.day, signed.day === note.heldDay ? minutesLater(end, 15) : '09:00', {
              kind: 'sign',
              index,
              by: note.author,
              lateReason: signed.lateReason,
            }),
          ]
        : []),
      ...(countersigned
        ? [at(countersigned.day, '09:45', { kind: 'countersign', index, by: countersigned.by })]
        : []),
      ...addenda.map(({ day, by, text }) => at(day, '11:00', { kind: 'addendum', index, by, text })),
    ]
  })
}

function sharingOf(child: number): Planned[] {
  return [
    ...of(adviceGiven, child).flatMap((advice) => [
      at(advice.publishedDay, '17:00', { kind: 'advice', advice }),
      ...advice.items.flatMap(({ itemId, reply }) =>
        reply ? [at(reply.day, '13:00', { kind: 'reply', itemId, reply })] : [],
      ),
      ...(advice.endedDay === null ? [] : [at(advice.endedDay, '15:30', { kind: 'end_advice', advice })]),
    ]),
    ...of(letters, child).flatMap((letter, index) => [
      at(letter.createdDay, '18:00', { kind: 'letter', letter, index }),
      ...letter.acts.map((act) =>
        at(act.day, { submit: '18:20', return: '10:00', approve: '10:10', send: '10:30' }[act.act], {
          kind: 'letter_act',
          index,
          act,
          author: letter.author,
        }),
      ),
    ]),
    ...of(alertActions, child).map(({ day, time, flag, by, action }) =>
      at(day, time, { kind: 'act_on_alert', flag, by, action }),
    ),
    ...of(tasks, child).flatMap((task, index) => [
      at(task.createdDay, '17:50', { kind: 'task', task, index }),
      ...(task.done ? [at(task.done.day, '17:55', { kind: 'finish_task', index, by: task.done.by })] : []),
    ]),
    ...of(laterReferrals, child).map(({ referral }) =>
      at(referral.receivedDay, '09:00', { kind: 'referral', referral, later: true }),
    ),
  ]
}

const plannedOf = (child: DemoChild): Planned[] =>
  [
    ...careOf(child),
    ...assessmentOf(child.number),
    ...findingsOf(child.number),
    ...notesOf(child.number),
    ...sharingOf(child.number),
  ].toSorted((a, b) => a.day - b.day || a.time.localeCompare(b.time))

const aMinute = 60_000

/** The child's story with real dates: on weekdays, never before the referral, each event after the one before it. */
function datedStory(child: DemoChild, demoToday: Day, timeZone: string): DemoEvent[] {
  const received = demoDay(demoToday, child.referral.receivedDay)
  let last = 0
  return plannedOf(child).map(({ day, time, happening }) => {
    const workday = happening.kind === 'referral' ? demoDay(demoToday, day) : demoWorkday(demoToday, day)
    const on = workday < received ? received : workday
    last = Math.max(demoMoment(on, time, timeZone).getTime(), last + aMinute)
    return { child: child.number, on, at: new Date(last), ...happening }
  })
}

/**
 * Everything that happened in the demo clinic, in the order in which it happened, up to the end of the day before
 * `demoToday`. Whoever seeds sets the clock to `at`, and gives `on` where a form asks for a date.
 */
export const demoTimeline = (demoToday: Day, timeZone: string): DemoEvent[] =>
  children
    .flatMap((child) => datedStory(child, demoToday, timeZone))
    .filter((event) => event.on <= addDays(demoToday, -1))
    .toSorted((a, b) => a.at.getTime() - b.at.getTime())
