import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { addDays } from '../../shared/days.ts'
import { reviewFigureIds, type ReviewListPage, type ReviewView } from '../../shared/review.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildBusyCaseload, utcToday } from '../support/busyCaseload.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { enterReferral } from '../support/referrals.ts'

let lead: Client
let leadUser: User
let therapistUser: User
let review: ReviewView

beforeAll(async () => {
  await startApp()
  leadUser = await buildUser('clinicLead')
  therapistUser = await buildUser('therapist', { displayName: 'Anna Able', wte: '0.60' })
  await buildUser('therapist', { displayName: 'Bo Bare', wte: null })
  await buildBusyCaseload({ therapist: therapistUser, lead: leadUser }, 10)
  const alone = await buildChild({ state: 'waiting', receivedOn: addDays(utcToday(), -30) })
  await giveConsent(alone, 'assessment_treatment', leadUser)
  const administrator = await signedInAs(await buildUser('administrator'))
  await enterReferral(administrator, { familyName: 'Untriaged', receivedOn: addDays(utcToday(), -40) })
  await enterReferral(administrator, { familyName: 'Fresh', receivedOn: utcToday() })
  lead = await signedInAs(leadUser)
  review = (await lead.get('/api/review')).body as ReviewView
})
afterAll(stopApp)

const list = async (figure: string, query = '') =>
  (await lead.get(`/api/review/${figure}${query}`)).body as ReviewListPage

describe('the figures of the review', () => {
  it('count what the record holds', () => {
    const counts = Object.fromEntries(review.figures.map((figure) => [figure.id, figure.count]))
    expect(counts).toEqual({
      waiting: 2,
      waiting_over_target: 1,
      reviews_overdue: 1,
      notes_unsigned_24: 1,
      notes_unsigned_48: 1,
      // The only note that waits was written by the lead, who cannot sign it a second time.
      notes_to_countersign: 0,
      letters_to_approve: 1,
      letters_failed: 1,
      consent_missing: 1,
      referrals_untriaged: 1,
      alerts_open: 0,
    })
    expect(review.figures.map((figure) => figure.level)).toEqual([
      ...Array<string>(5).fill('overdue'),
      ...Array<string>(3).fill('due'),
      null,
      null,
      null,
    ])
    const target = review.figures.find((figure) => figure.id === 'waiting_over_target')
    expect(target).toMatchObject({ rule: 'over 18 weeks', label: 'Waiting too long' })
  })

  it.each(reviewFigureIds)(
    'open the list behind “%s” with the same count, the children and the page to go to',
    async (id) => {
      const figure = review.figures.find((candidate) => candidate.id === id)
      const page = await list(id)
      expect([page.total, page.rows.length]).toEqual([figure?.count, figure?.count])
      expect([page.label, page.rule]).toEqual([figure?.label, figure?.rule])
      for (const row of page.rows) {
        expect(row.to).toMatch(/^\/(children\/[0-9a-f-]{36}\/|referrals\/[0-9a-f-]{36}$)/)
        expect(row.since).toMatch(/^\d{4}-\d{2}-\d{2}/)
        expect(row.detail).not.toMatch(/undefined|null|NaN/)
      }
    },
  )

  it('say in words what waits, for whom and since when', async () => {
    const [review35] = (await list('reviews_overdue')).rows
    expect(review35).toMatchObject({ person: 'Anna Able', level: 'overdue', since: addDays(utcToday(), -35) })
    expect(review35?.title).toMatch(/^Busy01 Caseload01, FF-/)
    const [failed] = (await list('letters_failed')).rows
    expect(failed?.detail).toBe('The address was refused')
    const [referral] = (await list('referrals_untriaged')).rows
    expect(referral?.title).toBe('Ottoline Untriaged')
  })

  it('page', async () => {
    const second = await list('waiting', '?size=1&page=2')
    expect(second).toMatchObject({ total: 2, page: 2, size: 1 })
    // The longest wait stands first, so the second page holds the shorter one.
    expect(second.rows[0]?.since).toBe(addDays(utcToday(), -30))
  })
})

describe('waits and loads', () => {
  it('draw a bar for each child who waits, against the target, with median and longest', () => {
    expect(review.waiting.map((bar) => [bar.days, bar.targetDays])).toEqual([
      [137, 126],
      [30, 126],
    ])
    expect(review.waits).toEqual({ median: 83.5, p90: 137, longest: 137, n: 2 })
  })

  it('weigh each caseload against the hours, by name, and show the children nobody holds', () => {
    // Worked by hand: nine children in therapy at 3 points and one waiting at 0.25; 0.6 of 40 points.
    expect(review.loads).toEqual([
      {
        therapistId: therapistUser.id,
        therapist: 'Anna Able',
        wte: 0.6,
        openCases: 10,
        points: 27.25,
        capacity: 24,
        reviewsOverdue: 1,
      },
      expect.objectContaining({ therapist: 'Bo Bare', wte: null, capacity: null, points: 0, openCases: 0 }),
      expect.objectContaining({ therapistId: null, therapist: 'Nobody yet', openCases: 1, points: 0.25 }),
    ])
  })

  it('count an interpreter, two households and a court order as more work', async () => {
    const child = await buildChild({ therapist: therapistUser, interpreterLanguage: 'Dari' })
    await giveConsent(child, 'assessment_treatment', leadUser)
    await buildGuardian(child, null, { address: '1 Canal Street', courtOrder: true })
    await buildGuardian(child, null, { address: '2 Canal Street', relation: 'father' })
    const after = (await lead.get('/api/review')).body as ReviewView
    expect(after.loads[0]?.points).toBe(27.25 + 6)
  })

  it('leave out the lead’s own child', async () => {
    const own = await buildChild({ state: 'waiting', familyName: 'Leadsown' })
    await buildGuardian(own, leadUser)
    const after = (await lead.get('/api/review')).body as ReviewView
    expect(after.waiting).toHaveLength(2)
    expect(JSON.stringify(after)).not.toContain('Leadsown')
    expect((await list('waiting')).total).toBe(2)
  })
})

describe('the review', () => {
  it('is the lead’s only, and knows no other figures', async () => {
    for (const role of ['therapist', 'administrator', 'teacher', 'guardian'] as const) {
      const other = await signedInAs(await buildUser(role))
      expect((await other.get('/api/review')).status).toBe(403)
      expect((await other.get('/api/review/waiting')).status).toBe(403)
    }
    expect((await client().get('/api/review')).status).toBe(401)
    expect((await lead.get('/api/review/salaries')).status).toBe(404)
    expect((await lead.get('/api/review/waiting?size=0')).body.fields).toHaveProperty('size')
  })
})
