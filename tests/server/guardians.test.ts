import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { GuardianView } from '../../shared/guardians.ts'
import { selectOne, selectRows } from '../../server/queries/sql.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { mailsTo } from '../support/invitations.ts'
import { letterScene, queuedLetter } from '../support/letters.ts'
import { carerDetails } from '../support/referrals.ts'

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
afterAll(stopApp)

const path = (child: Pick<Child, 'id'>, rest = '') => `/api/children/${child.id}/guardians${rest}`
const list = async (who: Client, child: Pick<Child, 'id'>) =>
  (await who.get(path(child))).body as GuardianView[]

describe('the carers of a child', () => {
  it('are added and corrected by therapist, lead and office, each version once', async () => {
    const child = await buildChild({ therapist: holder })
    const added = await administrator.post(path(child)).send(carerDetails({ name: 'Zoë Ångström' }))
    expect(added.status).toBe(201)
    expect(added.body).toMatchObject({
      name: 'Zoë Ångström',
      account: 'none',
      emailConsent: 'none',
      restricted: false,
      version: 1,
      can: { change: true, invite: true, restrict: true },
    })
    const save = (who: Client, version: number, phone: string) =>
      who
        .put(path(child, `/${added.body.id}`))
        .set('If-Match', `"${version}"`)
        .send(carerDetails({ phone }))
    expect((await save(therapist, 1, '01632 960002')).body.phone).toBe('01632 960002')
    const late = await save(lead, 1, '01632 960003')
    expect([late.status, late.body.code, late.body.current.phone]).toEqual([409, 'stale', '01632 960002'])
    const blind = await therapist.put(path(child, `/${added.body.id}`)).send(carerDetails())
    expect(blind.status).toBe(428)
    expect((await list(lead, child)).map((carer) => carer.version)).toEqual([2])
  })

  it('are added once when the same form arrives twice', async () => {
    const child = await buildChild({ therapist: holder })
    const key = randomUUID()
    const send = () => therapist.post(path(child)).set('Idempotency-Key', key).send(carerDetails())
    const [first, second] = await Promise.all([send(), send()])
    expect(first.body.id).toBe(second.body.id)
    expect(await list(therapist, child)).toHaveLength(1)
  })

  it.each([
    ['email', 'one@a.example, two@b.example'],
    ['email', 'one@a.example\r\nBcc: two@b.example'],
    ['relation', 'neighbour'],
    ['parentalResponsibility', true],
    ['phone', 'ring me'],
    ['name', ''],
    ['restricted', true],
  ])('refuse %s = %j', async (field, value) => {
    const child = await buildChild({ therapist: holder })
    const answer = await therapist.post(path(child)).send({ ...carerDetails(), [field]: value })
    expect(answer.status).toBe(422)
    expect(await list(therapist, child)).toEqual([])
  })

  it('are closed to carers, who would read there whether the clinic thinks them safe to contact', async () => {
    const child = await buildChild({ therapist: holder })
    const mother = await buildUser('guardian')
    const own = await buildGuardian(child, mother, { address: '1 Own Street' })
    const father = await buildGuardian(child, await buildUser('guardian'), {
      address: '2 Secret Street',
      restricted: true,
    })
    const asMother = await signedInAs(mother)
    const answer = await asMother.get(path(child))
    expect(answer.status).toBe(403)
    expect(answer.text).not.toContain('Street')
    for (const id of [own.id, father.id]) {
      const change = await asMother
        .put(path(child, `/${id}`))
        .set('If-Match', '"1"')
        .send(carerDetails())
      expect(change.status).toBe(403)
    }
    expect((await asMother.post(path(child)).send(carerDetails())).status).toBe(403)
  })

  it('are closed to other therapists, teachers and strangers, and never changed through another child', async () => {
    const teacher = await buildUser('teacher')
    const child = await buildChild({ therapist: holder, schoolClassId: (await buildClass(teacher)).id })
    await giveConsent(child, 'share_school_seating', holder)
    const carer = await buildGuardian(child)
    const elsewhere = await buildChild({ therapist: holder })
    expect((await other.get(path(child))).status).toBe(404)
    expect((await (await signedInAs(teacher)).get(path(child))).status).toBe(404)
    expect((await client().get(path(child))).status).toBe(401)
    const cross = await therapist
      .put(path(elsewhere, `/${carer.id}`))
      .set('If-Match', '"1"')
      .send(carerDetails())
    expect(cross.status).toBe(404)
    const acts = { invite: {}, restrict: { restricted: true, reason: 'No reason' } }
    for (const [act, form] of Object.entries(acts)) {
      const answer = await therapist.post(path(elsewhere, `/${carer.id}/${act}`)).send(form)
      expect([act, answer.status]).toEqual([act, 404])
    }
  })

  it('make a task when parental responsibility ends', async () => {
    const child = await buildChild({ therapist: holder })
    const carer = await buildGuardian(child)
    await therapist
      .put(path(child, `/${carer.id}`))
      .set('If-Match', '"1"')
      .send(carerDetails({ parentalResponsibility: 'unknown' }))
    expect(
      await selectRows('SELECT kind, assigneeId FROM tasks WHERE childId = :id', { id: child.id }),
    ).toEqual([{ kind: 'responsibility_changed', assigneeId: holder.id }])
  })
})

describe('restricting a carer', () => {
  it('closes the record at once and cancels what is queued; only the lead lifts it', async () => {
    const scene = await letterScene()
    await queuedLetter(scene)
    const asCarer = await signedInAs(scene.guardianUser)
    expect((await asCarer.get(`/api/my/children/${scene.child.id}`)).status).toBe(200)
    const restrict = (who: Client, restricted: boolean) =>
      who
        .post(path(scene.child, `/${scene.guardian.id}/restrict`))
        .send({ restricted, reason: 'Court order of today' })

    expect((await restrict(scene.as, true)).status).toBe(204)
    expect((await asCarer.get(`/api/my/children/${scene.child.id}`)).status).toBe(404)
    const [mail] = await mailsTo(scene.guardianUser.email)
    expect(mail?.state).toBe('cancelled')
    expect((await restrict(scene.as, true)).body.code).toBe('closed')
    expect((await list(scene.as, scene.child))[0]).toMatchObject({
      restricted: true,
      can: { restrict: false },
    })

    expect((await restrict(scene.as, false)).status).toBe(403)
    expect((await restrict(administrator, false)).status).toBe(403)
    expect((await restrict(lead, false)).status).toBe(204)
    expect((await asCarer.get(`/api/my/children/${scene.child.id}`)).status).toBe(200)
    expect(
      await selectOne('SELECT restrictedReason FROM guardians WHERE id = :id', { id: scene.guardian.id }),
    ).toEqual({ restrictedReason: 'Court order of today' })
  })

  it('needs a reason', async () => {
    const child = await buildChild({ therapist: holder })
    const carer = await buildGuardian(child)
    const answer = await therapist
      .post(path(child, `/${carer.id}/restrict`))
      .send({ restricted: true, reason: '' })
    expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, ['reason']])
  })
})
