import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { caseloadNeedKinds, type CaseloadPage } from '../../shared/caseload.ts'
import { addDays } from '../../shared/days.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildBusyCaseload, utcToday } from '../support/busyCaseload.ts'
import { buildChild, buildGuardian, buildUser } from '../support/factories.ts'

let holder: User
let leadUser: User
let therapist: Client
let lead: Client
let other: Client
let busy: Awaited<ReturnType<typeof buildBusyCaseload>>

beforeAll(async () => {
  await startApp()
  holder = await buildUser('therapist', { displayName: 'Hedda Holder' })
  leadUser = await buildUser('clinicLead')
  busy = await buildBusyCaseload({ therapist: holder, lead: leadUser }, 20)
  therapist = await signedInAs(holder)
  lead = await signedInAs(leadUser)
  other = await signedInAs(await buildUser('therapist'))
})
afterAll(stopApp)

const page = async (who: Client, query = ''): Promise<CaseloadPage> => {
  const response = await who.get(`/api/caseload${query}`)
  expect(response.status, JSON.stringify(response.body)).toBe(200)
  return response.body as CaseloadPage
}
const namesOf = ({ rows }: CaseloadPage) => rows.map((row) => row.name.split(' ')[1])

describe('the caseload', () => {
  it('shows each child with what waits for the therapist, and nothing where nothing does', async () => {
    const { rows, total } = await page(therapist, '?size=100')
    expect(total).toBe(20)
    for (const child of busy) {
      const row = rows.find((candidate) => candidate.id === child.id)
      expect([child.familyName, row?.needs.map((need) => need.kind).sort()]).toEqual([
        child.familyName,
        [...child.waits].sort(),
      ])
    }
    const waiting = rows.find((row) => row.state === 'waiting')
    expect([waiting?.waitingDays, waiting?.needs[0]?.text]).toEqual([
      137,
      'Waiting 19.6 weeks, over the 18 weeks aimed for',
    ])
    const seen = rows.find((row) => row.name.endsWith('Caseload09'))
    expect(seen).toMatchObject({
      lastSeenOn: addDays(utcToday(), -4),
      therapist: 'Hedda Holder',
      writingHand: 'left',
      state: 'active',
      waitingDays: null,
    })
    expect(seen?.age).toMatch(/^1\d y \d+ m$/)
  })

  it.each(caseloadNeedKinds)('filters by the need “%s” exactly as the rows say it', async (kind) => {
    for (const who of [therapist, lead]) {
      const all = await page(who, '?size=100')
      const filtered = await page(who, `?size=100&need=${kind}`)
      const expected = all.rows.filter((row) => row.needs.some((need) => need.kind === kind))
      expect(namesOf(filtered)).toEqual(namesOf({ ...all, rows: expected }))
      expect(filtered.total).toBe(expected.length)
      // Every kind occurs here for somebody: a filter that finds nothing would prove nothing.
      if (who === lead && kind !== 'letter_draft' && kind !== 'countersign' && kind !== 'task')
        expect(expected.length).toBeGreaterThan(0)
    }
  })

  it('shows the lead what is theirs: letters to approve, not somebody else’s drafts and tasks', async () => {
    const approvals = await page(lead, '?need=letter_approval')
    expect(namesOf(approvals)).toEqual(['Caseload09', 'Caseload19'])
    expect((await page(therapist, '?need=letter_approval')).total).toBe(0)
    expect((await page(lead, '?need=letter_draft')).total).toBe(0)
    expect((await page(lead, '?need=task')).total).toBe(0)
  })

  it('pages with one order from page to page and counts a page past the end', async () => {
    const seen: (string | undefined)[] = []
    for (const number of [1, 2, 3]) seen.push(...namesOf(await page(therapist, `?size=8&page=${number}`)))
    expect(seen).toHaveLength(20)
    expect(new Set(seen).size).toBe(20)
    expect(seen).toEqual([...seen].sort())
    expect(await page(therapist, '?size=8&page=9')).toMatchObject({ rows: [], total: 20, page: 9 })
  })

  it.each([
    ['name', 'desc', (rows: CaseloadPage['rows']) => rows.map((row) => row.name.split(' ')[1] ?? ''), -1],
    ['age', 'asc', (rows: CaseloadPage['rows']) => rows.map((row) => row.birthDate), -1],
    ['nextReviewOn', 'asc', (rows: CaseloadPage['rows']) => rows.map((row) => row.nextReviewOn ?? '9999'), 1],
    ['lastSeenOn', 'desc', (rows: CaseloadPage['rows']) => rows.map((row) => row.lastSeenOn ?? '0'), -1],
  ] as const)('sorts by %s %s, what is missing last', async (sort, direction, keys, order) => {
    const { rows } = await page(therapist, `?size=100&sort=${sort}&direction=${direction}`)
    const found = keys(rows)
    const sorted = [...found].sort((a, b) => (a < b ? -order : a > b ? order : 0))
    expect(found).toEqual(sorted)
  })

  it.each(['state', 'school', 'therapist'])('sorts by %s without losing a child', async (sort) => {
    expect((await page(therapist, `?size=100&sort=${sort}`)).rows).toHaveLength(20)
  })

  it('finds by name in any order and by record number', async () => {
    expect(namesOf(await page(therapist, '?search=caseload07 busy'))).toEqual(['Caseload07'])
    const [first] = busy
    expect(namesOf(await page(therapist, `?search=${first?.recordNumber}`))).toEqual(['Caseload00'])
    expect((await page(therapist, '?search=%25')).total).toBe(0)
    expect((await page(therapist, '?state=waiting')).total).toBe(2)
  })

  it('shows open children unless closed ones are asked for', async () => {
    const closed = await buildChild({ therapist: holder, familyName: 'Closed', state: 'discharged' })
    expect((await page(therapist)).total).toBe(20)
    const list = await page(therapist, '?show=closed')
    expect(list.rows.map((row) => row.id)).toEqual([closed.id])
    expect(list.rows[0]?.needs).toEqual([])
    expect((await page(therapist, '?show=all')).total).toBe(21)
  })

  it('lets the lead choose a therapist, or the children nobody holds', async () => {
    const alone = await buildChild({ familyName: 'Nobodys', state: 'waiting' })
    expect((await page(lead, `?therapistId=${holder.id}`)).total).toBe(20)
    expect((await page(lead, '?therapistId=none')).rows.map((row) => row.id)).toEqual([alone.id])
    expect((await page(lead, `?therapistId=${randomUUID()}`)).total).toBe(0)
  })

  it('does not change by a child the viewer may not see, nor show one’s own child', async () => {
    expect(await page(other, '?show=all')).toMatchObject({ total: 0, rows: [] })
    const own = await buildChild({ familyName: 'Leadsown', therapist: holder })
    await buildGuardian(own, leadUser)
    expect((await page(lead, '?search=Leadsown')).total).toBe(0)
    await buildGuardian(own, holder, { restricted: true })
    expect((await page(therapist, '?search=Leadsown')).total).toBe(0)
  })

  it.each([
    'sort=c.name',
    'direction=up',
    'need=everything',
    'show=some',
    'state=lost',
    'therapistId=1',
    'size=101',
  ])('refuses ?%s and names it', async (query) => {
    const response = await therapist.get(`/api/caseload?${query}`)
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [query.split('=')[0]]])
  })

  it('is for therapists and leads', async () => {
    for (const role of ['administrator', 'teacher', 'guardian'] as const)
      expect((await (await signedInAs(await buildUser(role))).get('/api/caseload')).status).toBe(403)
    expect((await client().get('/api/caseload')).status).toBe(401)
  })
})
