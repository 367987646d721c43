import { describe, expect, it } from 'vitest'
import { alertActions } from '../../server/seeds/demo/alertActions.ts'
import { answerRequests } from '../../server/seeds/demo/answerRequests.ts'
import type { DemoHistory } from '../../server/seeds/demo/assessmentTypes.ts'
import { children } from '../../server/seeds/demo/children.ts'
import { conclusions } from '../../server/seeds/demo/conclusions.ts'
import { birthDateFor } from '../../server/seeds/demo/demoDays.ts'
import { histories } from '../../server/seeds/demo/histories.ts'
import { measures } from '../../server/seeds/demo/measures.ts'
import { moreQuestionnaires } from '../../server/seeds/demo/moreQuestionnaires.ts'
import { questionnaires } from '../../server/seeds/demo/questionnaires.ts'
import { measured } from '../../server/seeds/playMeasures.ts'
import { conclusionFindings, missingForSigning } from '../../shared/conclusionChecks.ts'
import { addDays, ageInMonths } from '../../shared/days.ts'
import { historyDayProblems, historyDetailsSchema, type HistoryDetails } from '../../shared/histories.ts'
import { measureDetailsSchema } from '../../shared/measureSchemas.ts'
import { lockProblems, scoreMeasure } from '../../shared/measureScores.ts'
import type { MeasureScore } from '../../shared/measures.ts'
import { redFlagsOfHistory } from '../../shared/redFlagSources.ts'

const today = '2026-12-01'
const childOf = (number: number) => children.find((child) => child.number === number)!
const bornOn = (number: number) => birthDateFor(today, childOf(number).age, childOf(number).ageDays)

const detailsOf = ({ details, handChangedDay, injuryDay }: DemoHistory): HistoryDetails => ({
  ...details,
  handChangedOn: handChangedDay === null ? null : addDays(today, handChangedDay),
  injuryOn: injuryDay === null ? null : addDays(today, injuryDay),
})

const flagsOf = (history: DemoHistory) =>
  redFlagsOfHistory(detailsOf(history), {
    ageMonths: ageInMonths(bornOn(history.child), addDays(today, history.answeredDay)),
    writingHand: childOf(history.child).writingHand,
  }).map(({ id }) => id)

const scoresOf = <Kind extends MeasureScore['kind']>(
  child: number,
  kind: Kind,
): (MeasureScore & { kind: Kind })[] =>
  measures
    .filter((measure) => measure.child === child)
    .map(({ details }) => scoreMeasure(measured(details)))
    .filter((score): score is MeasureScore & { kind: Kind } => score.kind === kind)

describe('every part of the demo’s assessments is one that its form would take', () => {
  it.each(histories)('history of child $child on day $answeredDay', (history) => {
    const details = detailsOf(history)
    expect(historyDetailsSchema.isValidSync(details, { strict: true })).toBe(true)
    expect(historyDayProblems(details, { birthDate: bornOn(history.child), today })).toEqual({})
    expect(details.enjoys).not.toBeNull()
    expect(details.childsWords).not.toBeNull()
  })

  it.each(measures)('$details.kind of child $child on day $measuredDay can be locked', (measure) => {
    const details = measured(measure.details)
    expect(measureDetailsSchema.isValidSync(details, { strict: true })).toBe(true)
    expect(lockProblems(details, measure.notDoneReason)).toEqual({})
  })

  it.each(conclusions)('conclusion on child $child of day $writtenDay: nothing to reword', ({ content }) => {
    const whole = { ...content, evidence: [{ kind: 'history' as const, id: 'any' }] }
    expect(missingForSigning(whole)).toEqual({})
    expect(conclusionFindings(whole)).toEqual([])
  })

  it('times and counts that vary from trial to trial, in turn with both hands', () => {
    for (const { child, details } of measures) {
      if (!('trials' in details)) continue
      for (const hand of ['left', 'right'] as const) {
        const values = details.trials.filter((trial) => trial.hand === hand).map(({ value }) => value)
        expect([child, values.length < 2 || new Set(values).size > 1]).toEqual([child, true])
      }
    }
  })
})

/* Source of the figures below: the clinic's demo scenario. */
describe('the demo’s assessments follow the scenario', () => {
  it('every child in care with a therapist has a history, and child 14 has one from the father', () => {
    const told = new Set(histories.map(({ child }) => child))
    const withTherapist = children.filter(({ therapist }) => therapist !== null).map(({ number }) => number)
    expect(withTherapist.filter((number) => !told.has(number))).toEqual([])
    const [father] = histories.filter(({ child }) => child === 14)
    expect([father!.askedDay, childOf(14).carers[father!.carer]!.relation]).toEqual([-10, 'father'])
  })

  it.each([
    [8, ['preference-before-12-months', 'other-hand-or-lost-skill']],
    [27, ['change-of-hand']],
    [39, ['new-neurological-signs', 'other-hand-or-lost-skill']],
    [15, ['change-of-hand']],
  ])('child %i: the history raises %j', (child, flags) => {
    expect(histories.filter((history) => history.child === child).flatMap(flagsOf)).toEqual(flags)
  })

  it('answers every flag of a history within a day, and none that is not raised', () => {
    for (const { number } of children) {
      const told = histories.filter(({ child }) => child === number)
      const own = alertActions.filter(({ child }) => child === number)
      // A sign has one name in referral and history, so it stands once.
      const referred: string[] = own.filter(({ from }) => from === 'referral').map(({ flag }) => flag)
      const answered = own.filter(({ from }) => from === 'history').map(({ flag }) => flag)
      const raised = told.flatMap(flagsOf).filter((flag) => !referred.includes(flag))
      expect([number, answered.toSorted()]).toEqual([number, raised.toSorted()])
      for (const { flag, day } of own.filter(({ from }) => from === 'history')) {
        const days = told.filter((history) => flagsOf(history).some((id) => id === flag))
        expect(days.some(({ answeredDay }) => day - answeredDay >= 0 && day - answeredDay <= 1)).toBe(true)
      }
    }
  })

  it('child 10: reaches across for 2 of 9 far cards and swaps within the reach', () => {
    const [score] = scoresOf(10, 'reaching')
    expect(score).toMatchObject({ crossing: { count: 2, of: 9 }, swapped: 2 })
  })

  it('child 11: reaches across for 7 of 9', () => {
    expect(scoresOf(11, 'reaching')[0]!.crossing).toEqual({ count: 7, of: 9 })
  })

  it('child 15: the left hand is clearly the more skilled, on both occasions and both tasks', () => {
    const scores = [...scoresOf(15, 'pegs'), ...scoresOf(15, 'dots')]
    expect(scores).toHaveLength(4)
    for (const { interval } of scores) expect(interval!.high).toBeLessThan(0)
  })

  it('child 15: possibly switched, low and then medium confidence', () => {
    const own = conclusions.filter(({ child }) => child === 15)
    expect(
      own.map(({ content, replacesEarlier }) => [
        content.handPreference,
        content.confidence,
        replacesEarlier,
      ]),
    ).toEqual([
      ['possibly_switched', 'low', false],
      ['possibly_switched', 'medium', true],
    ])
  })

  it('child 22: chair and desk out of range', () => {
    const [score] = scoresOf(22, 'seating')
    expect(score!.seatChange).toBeLessThan(0)
    expect(score!.deskChange).toBeLessThan(0)
  })

  it('child 31: no leading hand on any measure of skill or reaching, and a draft that calls it steady by task', () => {
    expect(scoresOf(31, 'reaching')[0]!.pTwoSided).toBeGreaterThan(0.05)
    for (const { interval } of [...scoresOf(31, 'pegs'), ...scoresOf(31, 'dots')]) {
      expect(interval!.low).toBeLessThan(0)
      expect(interval!.high).toBeGreaterThan(0)
    }
    const [draft] = conclusions.filter(({ child }) => child === 31)
    expect([draft!.signed, draft!.content.handPreference]).toEqual([false, 'mixed_steady_by_task'])
  })

  it('waits for one countersignature, of the newly qualified therapist, on child 32', () => {
    const waiting = conclusions.filter(
      ({ by, signed, countersigned }) => by === 'rohan' && signed && !countersigned,
    )
    expect(waiting.map(({ child }) => child)).toEqual([32])
  })

  it('asks for what is still to come: child 7 a week ago, child 25 of school, due back 16 days ago', () => {
    const of = (number: number) => answerRequests.filter(({ child }) => child === number)
    expect(of(7).map(({ askedDay }) => askedDay)).toEqual([-7])
    expect(of(25)[0]).toMatchObject({ of: 'kwabena', askedDay: -16 - 14 })
    expect(questionnaires.find(({ child }) => child === 9)).toMatchObject({ locked: false, asked: { of: 0 } })
  })

  it('asks both forms of the twins’ one parent', () => {
    for (const number of [11, 12])
      expect(questionnaires.find(({ child }) => child === number)?.respondentName).toBe('Maja Lindqvist')
  })

  it('shows every form and every kind of informant', () => {
    const all = [...questionnaires, ...moreQuestionnaires]
    expect(new Set(all.map(({ formId }) => formId))).toEqual(
      new Set(['hand-use-10.v1', 'short-4.v1', 'ten-task.v1', 'shown-8.v1']),
    )
    expect(new Set(all.map(({ informant }) => informant)).size).toBe(4)
  })
})
