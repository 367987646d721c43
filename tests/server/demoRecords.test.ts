import { describe, expect, it } from 'vitest'
import type { Schema } from 'yup'
import { sampleSvg } from '../../server/seeds/drawSample.ts'
import { adviceGiven } from '../../server/seeds/demo/advice.ts'
import { alertActions } from '../../server/seeds/demo/alertActions.ts'
import { hasOpenEpisode } from '../../server/seeds/demo/childParts.ts'
import { children, laterReferrals } from '../../server/seeds/demo/children.ts'
import { clinicSettings } from '../../server/seeds/demo/clinic.ts'
import { birthDateFor } from '../../server/seeds/demo/demoDays.ts'
import type { DemoChild, DemoReferral } from '../../server/seeds/demo/demoTypes.ts'
import { goals } from '../../server/seeds/demo/goals.ts'
import { histories } from '../../server/seeds/demo/histories.ts'
import { measures } from '../../server/seeds/demo/measures.ts'
import { observations } from '../../server/seeds/demo/observations.ts'
import { moreQuestionnaires } from '../../server/seeds/demo/moreQuestionnaires.ts'
import { questionnaires } from '../../server/seeds/demo/questionnaires.ts'
import { samples } from '../../server/seeds/demo/samples.ts'
import { countLetters } from '../../server/seeds/demo/sampleTexts.ts'
import { sessionNotes } from '../../server/seeds/demo/sessionNotes.ts'
import { adviceItemById } from '../../shared/adviceItems.ts'
import { addDays } from '../../shared/days.ts'
import { nextStates } from '../../shared/episodes.ts'
import { goalTextProblems } from '../../shared/goalAttainment.ts'
import { goalSchema } from '../../shared/goals.ts'
import { questionnaireDraftSchema } from '../../shared/questionnaires.ts'
import { referralFlagsOf } from '../../shared/referralFlags.ts'
import { missingFromReferral, referralSchema } from '../../shared/referrals.ts'
import { sampleDetailsSchema } from '../../shared/samples.ts'
import { adviceReplySchema, publishAdviceSchema } from '../../shared/schoolAdvice.ts'
import { missingFromNote, noteDraftSchema } from '../../shared/sessionNotes.ts'
import { settingsSchema } from '../../shared/settings.ts'
import { writingObservationSchema } from '../../shared/writingObservations.ts'

const today = '2026-12-01'
const someId = '5f0c1c1e-0000-4000-8000-000000000001'

/** What the form would say; empty when it takes the record as it is. */
function problemsOf(schema: Schema, value: unknown): string[] {
  try {
    schema.validateSync(value, { strict: true, abortEarly: false })
    return []
  } catch (error) {
    return (error as { errors: string[] }).errors
  }
}

const without = <T extends object, K extends keyof T>(value: T, ...keys: K[]): Omit<T, K> =>
  Object.fromEntries(Object.entries(value).filter(([key]) => !keys.includes(key as K))) as Omit<T, K>

const referralDetails = (child: DemoChild, referral: DemoReferral) => ({
  ...without(referral, 'receivedDay', 'priority', 'priorityReason'),
  receivedOn: addDays(today, referral.receivedDay),
  givenName: child.givenName,
  familyName: child.familyName,
  preferredName: child.preferredName,
  birthDate: birthDateFor(today, child.age, child.ageDays),
  homeLanguages: child.homeLanguages,
  interpreterLanguage: child.interpreterLanguage,
  scriptDirection: child.scriptDirection,
  lookedAfter: child.lookedAfter,
  classId: someId,
  carers: child.carers.map((carer) => without(carer, 'account')),
})

const allQuestionnaires = [...questionnaires, ...moreQuestionnaires]
const childOf = (number: number) => children.find((child) => child.number === number)!

describe('every record of the demo is one that its form would take', () => {
  it('the settings', () => {
    expect(problemsOf(settingsSchema, clinicSettings)).toEqual([])
  })

  it.each(children)('referral $number: complete and valid', (child) => {
    const details = referralDetails(child, child.referral)
    expect(problemsOf(referralSchema, details)).toEqual([])
    expect(missingFromReferral(details)).toEqual([])
  })

  it.each(laterReferrals)('later referral of $child', ({ child, referral }) => {
    expect(problemsOf(referralSchema, referralDetails(childOf(child), referral))).toEqual([])
  })

  it('questionnaires', () => {
    for (const { answers, informant, respondentName, answeredDay, comment } of allQuestionnaires)
      expect(
        problemsOf(questionnaireDraftSchema, {
          answers,
          informant,
          respondentName,
          comment,
          answeredOn: addDays(today, answeredDay),
          cutOffSet: 'clinic-40',
        }),
      ).toEqual([])
  })

  it('writing observations', () => {
    for (const observation of observations)
      expect(
        problemsOf(writingObservationSchema, {
          ...without(observation, 'child', 'observedDay', 'by'),
          observedOn: addDays(today, observation.observedDay),
        }),
      ).toEqual([])
  })

  it('samples', () => {
    for (const { details, takenDay } of samples)
      expect(problemsOf(sampleDetailsSchema, { ...details, takenOn: addDays(today, takenDay) })).toEqual([])
  })

  it('goals, none of which asks a child to change hands', () => {
    for (const { child, details } of goals) {
      const { writingHand } = childOf(child)
      const given = { ...without(details, 'targetDay'), targetOn: addDays(today, details.targetDay) }
      expect(problemsOf(goalSchema, given)).toEqual([])
      const hand = writingHand === 'swaps' ? null : writingHand
      expect(goalTextProblems(details.activity, details.levels, details.childVoice, hand)).toEqual([])
    }
  })

  it('session notes, and nothing is missing where one is signed', () => {
    for (const note of sessionNotes) {
      const { heldDay, goals: touched } = note
      const draft = {
        ...without(note, 'child', 'author', 'heldDay', 'signed', 'countersigned', 'addenda', 'goals'),
        heldOn: addDays(today, heldDay),
        goalIds: touched.map(() => someId),
      }
      expect(problemsOf(noteDraftSchema, draft)).toEqual([])
      if (note.signed) expect(missingFromNote(note)).toEqual({})
    }
  })

  it('advice, of the library and for teachers', () => {
    for (const { items, checkByDay } of adviceGiven) {
      const given = items.map(({ itemId, because }) => ({ itemId, because }))
      expect(problemsOf(publishAdviceSchema, { items: given, checkBy: addDays(today, checkByDay) })).toEqual(
        [],
      )
      for (const { itemId, reply } of items) {
        expect([itemId, adviceItemById(itemId)?.audiences]).toEqual([
          itemId,
          expect.arrayContaining(['teacher']),
        ])
        if (reply)
          expect(problemsOf(adviceReplySchema, { reply: reply.answer, reason: reply.reason })).toEqual([])
      }
    }
  })

  it('steps of every episode, in an order that is allowed', () => {
    for (const { number, steps } of children) {
      const states = ['referred' as const, ...steps.map(({ to }) => to)]
      states.slice(1).forEach((to, index) => {
        expect([number, nextStates(states[index]!)]).toEqual([number, expect.arrayContaining([to])])
      })
      expect(steps.map(({ day }) => day)).toEqual(steps.map(({ day }) => day).toSorted((a, b) => a - b))
    }
  })
})

describe('the demo’s stories', () => {
  it('hold as many letters in each picture as were counted, on paper that has room for them', () => {
    for (const { child, details, drawing } of samples) {
      expect([child, countLetters(drawing.text)]).toEqual([child, details.letters])
      expect(drawing.mirroredLetters).toBe(details.reversals)
      expect(() => sampleSvg(drawing)).not.toThrow()
    }
  })

  it('take Freya’s page out of Axel’s record and keep it in hers', () => {
    const [freya] = samples.filter(({ child }) => child === 11)
    const [misfiled, own] = samples.filter(({ child }) => child === 12)
    expect(misfiled).toMatchObject({ removedDay: -42, details: { letters: freya!.details.letters } })
    expect(misfiled!.drawing.text).toBe(freya!.drawing.text)
    expect(own!.removedDay).toBeNull()
  })

  it('withdraw every consent of child 16, and of no other child', () => {
    const withdrawn = children.filter(({ consents }) => consents.some((consent) => consent.withdrawn))
    expect(withdrawn.map(({ number }) => number)).toEqual([16])
    expect(childOf(16).consents.every((consent) => consent.withdrawn?.day === -9)).toBe(true)
  })

  it('give both parents of child 23 a link, each at an address of their own', () => {
    const { carers, consents } = childOf(23)
    expect(carers.map(({ courtOrder, account }) => [courtOrder, account])).toEqual([
      [true, 'nadiaSiddiq'],
      [true, 'danielRowe'],
    ])
    expect(carers[0]!.address).not.toBe(carers[1]!.address)
    const links = consents.filter(({ purpose }) => purpose === 'email_link')
    expect(links.map(({ carer }) => carer)).toEqual([0, 1])
  })

  it('leave one note unsigned, for 52 hours at least whatever the hour', () => {
    const drafts = sessionNotes.filter(({ signed }) => signed === null)
    expect(drafts.map(({ child }) => child)).toEqual([21])
    const { heldDay, startTime, minutes } = drafts[0]!
    const endHour = Number(startTime.slice(0, 2)) + (Number(startTime.slice(3)) + minutes) / 60
    // From the end of the session to midnight before the demo day, clocks changing in spring included.
    expect(-heldDay * 24 - endHour - 1).toBeGreaterThanOrEqual(52)
  })

  it('leave one note of the newly qualified therapist without a second signature', () => {
    const open = sessionNotes.filter(
      ({ author, signed, countersigned }) => author === 'rohan' && signed && !countersigned,
    )
    expect(open.map(({ child }) => child)).toEqual([3])
  })

  it('answer every warning sign of a referral with somebody who acted', () => {
    for (const child of children) {
      const { reason, concerns, birthDate, receivedOn } = referralDetails(child, child.referral)
      const raised = referralFlagsOf({ reason, concerns, birthDate, receivedOn }).map(({ id }) => id)
      const answered = alertActions
        .filter(({ child: number, from }) => number === child.number && from === 'referral')
        .map(({ flag }) => flag)
      expect([child.number, answered.toSorted()]).toEqual([child.number, raised.toSorted()])
    }
  })

  it('gather the consent that each record needs before it is made', () => {
    const given = (child: number, purpose: string, day: number) =>
      childOf(child).consents.some(
        (consent) =>
          consent.purpose === purpose && consent.givenDay <= day && (consent.withdrawn?.day ?? 99) >= day,
      )
    for (const { child, takenDay } of samples)
      expect([child, given(child, 'store_work_samples', takenDay)]).toEqual([child, true])
    for (const { child, answeredDay } of [...allQuestionnaires, ...histories])
      expect([child, given(child, 'assessment_treatment', answeredDay)]).toEqual([child, true])
    for (const { child, measuredDay } of measures)
      expect([child, given(child, 'assessment_treatment', measuredDay)]).toEqual([child, true])
    for (const { child, heldDay } of sessionNotes.filter(({ type }) => type !== 'phone'))
      expect([child, given(child, 'assessment_treatment', heldDay)]).toEqual([child, true])
    for (const { child, publishedDay } of adviceGiven)
      expect([child, given(child, 'share_school_seating', publishedDay)]).toEqual([child, true])
  })

  it('touch only goals that were set before', () => {
    for (const { child, heldDay, goals: touched } of sessionNotes) {
      const own = goals.filter((goal) => goal.child === child)
      for (const index of touched) expect([child, own[index]!.setDay]).toEqual([child, expect.any(Number)])
      for (const index of touched) expect(own[index]!.setDay).toBeLessThanOrEqual(heldDay)
    }
  })

  it('give every child in open care with a therapist a note by that therapist, and no one else writes', () => {
    for (const child of children.filter(hasOpenEpisode)) {
      const authors = new Set(
        sessionNotes.filter((note) => note.child === child.number).map(({ author }) => author),
      )
      expect([child.number, [...authors]]).toEqual([
        child.number,
        child.therapist === null ? [] : [child.therapist],
      ])
    }
  })
})
