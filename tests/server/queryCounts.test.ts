import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { User } from '../../server/entities/User.ts'
import { measureKinds } from '../../shared/measures.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildBusyCaseload } from '../support/busyCaseload.ts'
import { buildUser } from '../support/factories.ts'
import { buildMeasure } from '../support/measures.ts'
import { othersIn, questionsIn, statementsOf } from '../support/queries.ts'
import { buildQuestionnaire } from '../support/records.ts'

/*
 * Bars of this product for a list of 30 children of every kind: the statements are counted where they leave for MariaDB.
 * The session row, the person and the access to the child count; the audit trail, written in groups for all requests
 * together, does not, and neither does the mark that somebody is active, written at most every ten seconds.
 */
const most = { caseload: 4, glance: 8, handProfile: 8 }

let therapist: Client
let lead: Client
let therapistRow: User | null = null
let busy: Awaited<ReturnType<typeof buildBusyCaseload>>

beforeAll(async () => {
  await startApp()
  const people = { therapist: await buildUser('therapist'), lead: await buildUser('clinicLead') }
  therapistRow = people.therapist
  busy = await buildBusyCaseload(people, 30)
  therapist = await signedInAs(people.therapist)
  lead = await signedInAs(people.lead)
})
afterAll(stopApp)

const ask = async (who: Client, path: string) => {
  let rows = 0
  const statements = await statementsOf(async () => {
    const response = await who.get(path)
    expect(response.status).toBe(200)
    rows = response.body.rows?.length ?? 0
  })
  return { questions: questionsIn(statements), others: othersIn(statements), rows }
}

describe('the number of queries', () => {
  it('of the caseload stays at four, however many children are shown', async () => {
    for (const who of [therapist, lead]) {
      const many = await ask(who, '/api/caseload?size=100')
      expect(many.rows).toBe(30)
      expect(many.questions.length, many.questions.join('\n')).toBeLessThanOrEqual(most.caseload)
      const one = await ask(who, '/api/caseload?size=1')
      expect(one.rows).toBe(1)
      expect(one.questions).toHaveLength(many.questions.length)
    }
  })

  it('of a child at a glance stays at eight, for an empty and for a full record', async () => {
    // The tenth kind has notes, a questionnaire, a goal, a sample and a letter; the first has next to nothing.
    for (const child of [busy[0], busy[9]]) {
      const { questions } = await ask(therapist, `/api/children/${child?.id}/glance`)
      expect(questions.length, questions.join('\n')).toBeLessThanOrEqual(most.glance)
    }
  })

  it('of the hand profile stays under eight, however much was asked and measured', async () => {
    const [empty, full] = [busy[0], busy[9]]
    if (!full || !therapistRow) throw new Error('The tenth kind of child is missing')
    for (const day of ['2026-01-05', '2026-02-05']) {
      await buildQuestionnaire(full, therapistRow, { locked: true, informant: 'guardian', answeredOn: day })
      for (const kind of measureKinds)
        await buildMeasure(full, therapistRow, { locked: true, kind, measuredOn: day })
    }
    const few = await ask(therapist, `/api/children/${empty?.id}/hand-profile`)
    const many = await ask(therapist, `/api/children/${full.id}/hand-profile`)
    expect(many.questions.length, many.questions.join('\n')).toBeLessThanOrEqual(most.handProfile)
    expect(many.questions).toHaveLength(few.questions.length)
    const { questions } = await ask(therapist, `/api/children/${full.id}/glance`)
    expect(questions.length, questions.join('\n')).toBeLessThanOrEqual(most.glance)
  })

  it('counts what really ran: each page asks for the session, the person and something of its own', async () => {
    const { questions, others } = await ask(therapist, '/api/caseload')
    expect(questions.some((question) => question.includes('FROM user_sessions'))).toBe(true)
    expect(questions.some((question) => question.includes('`users`'))).toBe(true)
    expect(questions.some((question) => question.startsWith('WITH page'))).toBe(true)
    expect(others.filter((statement) => !statement.startsWith('UPDATE user_sessions'))).toEqual([])
  })
})
