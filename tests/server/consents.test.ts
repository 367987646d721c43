import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ConsentGiven, ConsentView } from '../../shared/consents.ts'
import { addDays } from '../../shared/days.ts'
import { setClock } from '../../server/clock.ts'
import { selectOne, selectRows } from '../../server/queries/sql.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { utcToday } from '../support/busyCaseload.ts'
import { buildChild, buildClass, buildGuardian, buildUser } from '../support/factories.ts'
import { mailsTo } from '../support/invitations.ts'
import { letterScene, queuedLetter } from '../support/letters.ts'

let holder: User
let therapist: Client
let lead: Client
let administrator: Client
let other: Client

beforeAll(async () => {
  await startApp()
  holder = await buildUser('therapist')
  therapist = await signedInAs(holder)
  lead = await signedInAs(await buildUser('clinicLead'))
  administrator = await signedInAs(await buildUser('administrator'))
  other = await signedInAs(await buildUser('therapist'))
})
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

const path = (child: Pick<Child, 'id'>, rest = '') => `/api/children/${child.id}/consents${rest}`
const consent = (guardianId: string | null, given: Partial<ConsentGiven> = {}): ConsentGiven => ({
  purpose: 'assessment_treatment',
  guardianId,
  basis: 'parental_responsibility',
  method: 'in_person',
  expiresOn: null,
  note: null,
  ...given,
})
const list = async (who: Client, child: Pick<Child, 'id'>) =>
  (await who.get(path(child))).body as ConsentView[]
const withdraw = (who: Client, child: Pick<Child, 'id'>, id: string) =>
  who.post(path(child, `/${id}/withdraw`)).send({ reason: 'The family said so on the phone' })

describe('recording a consent', () => {
  it('names purpose, giver, basis and method, and holds from that moment', async () => {
    const child = await buildChild({ therapist: holder })
    const carer = await buildGuardian(child, null, { name: 'Rosalind Quayle' })
    const given = await therapist
      .post(path(child))
      .send(consent(carer.id, { note: 'Both parents were there' }))
    expect(given.status).toBe(201)
    expect(given.body).toMatchObject({
      purpose: 'assessment_treatment',
      guardianId: carer.id,
      givenBy: 'Rosalind Quayle',
      basis: 'parental_responsibility',
      method: 'in_person',
      note: 'Both parents were there',
      inForce: true,
      withdrawnAt: null,
      can: { withdraw: true },
    })
    expect((await list(administrator, child))[0]?.can.withdraw).toBe(false)
    const again = await therapist.post(path(child)).send(consent(carer.id))
    expect([again.status, again.body.code]).toEqual([409, 'duplicate'])
  })

  it('ends exactly at the end of its last day in the clinic’s zone', async () => {
    const child = await buildChild({ therapist: holder })
    const carer = await buildGuardian(child)
    const last = addDays(utcToday(), 3)
    await therapist.post(path(child)).send(consent(carer.id, { expiresOn: last }))
    const [row] = await list(therapist, child)
    const end = new Date(row?.expiresAt ?? '').getTime()
    const inForceAt = async (moment: number) => {
      setClock(() => new Date(moment))
      const who = await signedInAs(holder)
      return (await list(who, child))[0]?.inForce
    }
    expect([await inForceAt(end - 1), await inForceAt(end)]).toEqual([true, false])
    setClock(() => new Date())
  })

  it('takes the place of an earlier one, so that stopping it once stops it', async () => {
    const child = await buildChild({ therapist: holder })
    const mother = await buildGuardian(child)
    const father = await buildGuardian(child, null, { relation: 'father' })
    await therapist.post(path(child)).send(consent(mother.id, { expiresOn: addDays(utcToday(), 5) }))
    expect((await therapist.post(path(child)).send(consent(father.id))).status).toBe(201)
    const rows = await list(therapist, child)
    expect(rows.map((row) => [row.guardianId, row.inForce]).sort()).toEqual(
      [
        [father.id, true],
        [mother.id, false],
      ].sort(),
    )
    const inForce = rows.find((row) => row.inForce)
    expect((await withdraw(therapist, child, inForce?.id ?? '')).status).toBe(204)
    expect((await list(therapist, child)).some((row) => row.inForce)).toBe(false)
  })

  it('keeps each carer’s e-mail consent apart', async () => {
    const child = await buildChild({ therapist: holder })
    const mother = await buildGuardian(child, null, { email: 'm@quayle.example' })
    const father = await buildGuardian(child, null, { email: 'f@quayle.example', relation: 'father' })
    for (const carer of [mother, father])
      expect(
        (await therapist.post(path(child)).send(consent(carer.id, { purpose: 'email_link' }))).status,
      ).toBe(201)
    expect((await list(therapist, child)).filter((row) => row.inForce)).toHaveLength(2)
  })

  it.each([
    ['whose responsibility is not known', { parentalResponsibility: 'unknown' as const }, {}, 'guardianId'],
    ['without responsibility', { parentalResponsibility: 'no' as const }, {}, 'guardianId'],
    ['who is restricted', { restricted: true }, {}, 'guardianId'],
    ['without an address, to e-mail', { email: null }, { purpose: 'email_link' as const }, 'guardianId'],
    ['on another basis that is not named', {}, { basis: 'other' as const }, 'note'],
    ['as if signed in', {}, { method: 'signed_in' as const }, 'method'],
    ['that has ended', {}, { expiresOn: '2020-01-01' }, 'expiresOn'],
  ])('is refused from a carer %s', async (_who, carerGiven, given, field) => {
    const child = await buildChild({ therapist: holder })
    const carer = await buildGuardian(child, null, carerGiven)
    const answer = await therapist.post(path(child)).send(consent(carer.id, given))
    expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, [field]])
    expect(await list(therapist, child)).toEqual([])
  })

  it('is refused from another child’s carer, and without a carer where one must have given it', async () => {
    const child = await buildChild({ therapist: holder })
    const elsewhere = await buildGuardian(await buildChild({ therapist: holder }))
    for (const guardianId of [elsewhere.id, randomUUID(), null]) {
      const answer = await therapist.post(path(child)).send(consent(guardianId))
      expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, ['guardianId']])
    }
  })

  it('is taken from a young person who decides alone', async () => {
    const child = await buildChild({ therapist: holder, givenName: 'Conrad', familyName: 'Alone' })
    const answer = await therapist.post(path(child)).send(consent(null, { basis: 'young_person_competent' }))
    expect(answer.body).toMatchObject({ givenBy: 'Conrad Alone', guardianId: null, inForce: true })
  })
})

describe('withdrawing a consent', () => {
  it.each(['email_link', 'assessment_treatment'] as const)(
    'of %s stops the queued letter and its e-mail, and tells the therapist',
    async (purpose) => {
      const scene = await letterScene()
      await queuedLetter(scene)
      const [mail] = await mailsTo(scene.guardianUser.email)
      expect(mail?.state).toBe('queued')
      const row = (await list(scene.as, scene.child)).find((candidate) => candidate.purpose === purpose)
      expect((await withdraw(scene.as, scene.child, row?.id ?? '')).status).toBe(204)

      const [after] = await mailsTo(scene.guardianUser.email)
      expect([after?.state, after?.problem]).toEqual([
        'cancelled',
        'Consent was withdrawn before it was sent',
      ])
      const deliveries = await selectRows<{ state: string }>(
        'SELECT d.state FROM letter_deliveries d WHERE d.guardianId = :id',
        { id: scene.guardian.id },
      )
      expect(deliveries).toEqual([{ state: 'cancelled' }])
      expect(
        await selectOne('SELECT kind, assigneeId FROM tasks WHERE childId = :id', { id: scene.child.id }),
      ).toEqual({ kind: 'consent_withdrawn', assigneeId: scene.therapist.id })
    },
  )

  it('to the school closes the child to the teacher with the next request', async () => {
    const teacher = await buildUser('teacher')
    const schoolClass = await buildClass(teacher)
    const child = await buildChild({ therapist: holder, schoolClassId: schoolClass.id })
    const carer = await buildGuardian(child)
    const asTeacher = await signedInAs(teacher)
    const given = await therapist
      .post(path(child))
      .send(consent(carer.id, { purpose: 'share_school_seating' }))
    expect((await asTeacher.get(`/api/pupils/${child.id}`)).status).toBe(200)
    await withdraw(lead, child, given.body.id)
    expect((await asTeacher.get(`/api/pupils/${child.id}`)).status).toBe(404)
  })

  it('is a new row beside the old one, once', async () => {
    const child = await buildChild({ therapist: holder })
    const carer = await buildGuardian(child)
    const given = await therapist.post(path(child)).send(consent(carer.id))
    const answers = await Promise.all([
      withdraw(therapist, child, given.body.id),
      withdraw(lead, child, given.body.id),
    ])
    expect(answers.map((answer) => answer.status).sort()).toEqual([204, 409])
    const rows = await selectRows('SELECT kind FROM consents WHERE childId = :id ORDER BY kind', {
      id: child.id,
    })
    expect(rows).toEqual([{ kind: 'given' }, { kind: 'withdrawn' }])
    const [view] = await list(therapist, child)
    expect(view).toMatchObject({ inForce: false, withdrawalReason: 'The family said so on the phone' })
  })

  it('needs a reason, and reaches no consent of another child', async () => {
    const child = await buildChild({ therapist: holder })
    const elsewhere = await buildChild({ therapist: holder })
    const given = await therapist.post(path(child)).send(consent((await buildGuardian(child)).id))
    expect((await withdraw(therapist, elsewhere, given.body.id)).status).toBe(404)
    const silent = await therapist.post(path(child, `/${given.body.id}/withdraw`)).send({ reason: '' })
    expect([silent.status, Object.keys(silent.body.fields)]).toEqual([422, ['reason']])
    expect((await list(therapist, child))[0]?.inForce).toBe(true)
  })
})

describe('consents', () => {
  it('are read by the office but not recorded there; parents and teachers have their own pages', async () => {
    const teacher = await buildUser('teacher')
    const child = await buildChild({ therapist: holder, schoolClassId: (await buildClass(teacher)).id })
    const parent = await buildUser('guardian')
    const carer = await buildGuardian(child, parent)
    await therapist.post(path(child)).send(consent(carer.id, { purpose: 'share_school_seating' }))
    expect(await list(administrator, child)).toHaveLength(1)
    expect((await administrator.post(path(child)).send(consent(carer.id))).status).toBe(403)
    expect((await (await signedInAs(parent)).get(path(child))).status).toBe(403)
    expect((await (await signedInAs(teacher)).get(path(child))).status).toBe(403)
    expect((await other.get(path(child))).status).toBe(404)
    expect((await other.post(path(child)).send(consent(carer.id))).status).toBe(404)
    expect((await client().get(path(child))).status).toBe(401)
  })
})
