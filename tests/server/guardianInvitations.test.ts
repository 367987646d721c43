import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { GuardianView } from '../../shared/guardians.ts'
import { selectOne, selectRows } from '../../server/queries/sql.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, testPassword } from '../support/factories.ts'
import { invitationToken, mailsTo } from '../support/invitations.ts'

let holder: User
let therapist: Client
let administrator: Client

beforeAll(async () => {
  await startApp()
  holder = await buildUser('therapist')
  therapist = await signedInAs(holder)
  administrator = await signedInAs(await buildUser('administrator'))
})
afterAll(stopApp)

const path = (child: Pick<Child, 'id'>, rest = '') => `/api/children/${child.id}/guardians${rest}`
const list = async (who: Client, child: Pick<Child, 'id'>) =>
  (await who.get(path(child))).body as GuardianView[]
let number = 0
const address = () => `carer${(number += 1)}@quayle.example`

describe('inviting a carer', () => {
  const invite = (who: Client, child: Pick<Child, 'id'>, guardianId: string) =>
    who.post(path(child, `/${guardianId}/invite`)).send({})

  it('makes an account, sends one link, and the carer signs in and sees the child', async () => {
    const child = await buildChild({ therapist: holder })
    const email = address()
    const carer = await buildGuardian(child, null, { email, name: 'Rosalind Quayle' })
    expect((await invite(administrator, child, carer.id)).status).toBe(204)
    expect((await list(therapist, child))[0]).toMatchObject({ account: 'invited', can: { invite: true } })
    const [mail] = await mailsTo(email)
    expect([mail?.kind, mail?.state]).toEqual(['invitation', 'queued'])
    expect(mail?.text).not.toContain(child.familyName)

    const token = await invitationToken(email)
    const confirm = (given: string) =>
      client().post('/api/invitations/confirm').send({ token: given, newPassword: testPassword })
    expect((await confirm(token)).status).toBe(204)
    expect((await confirm(token)).status).toBe(410)
    const user = await selectOne<{ id: string; roles: string }>(
      'SELECT id, roles FROM users WHERE email = :email',
      { email },
    )
    expect(user?.roles).toContain('guardian')
    const asCarer = await signedInAs({ id: user?.id ?? '', email })
    expect((await asCarer.get('/api/my/children')).body).toEqual([expect.objectContaining({ id: child.id })])
    expect((await list(therapist, child))[0]).toMatchObject({ account: 'active', can: { invite: false } })
    expect((await invite(therapist, child, carer.id)).body.code).toBe('closed')
  })

  it('again ends the earlier link', async () => {
    const child = await buildChild({ therapist: holder })
    const email = address()
    const carer = await buildGuardian(child, null, { email })
    await invite(therapist, child, carer.id)
    const first = await invitationToken(email)
    await invite(therapist, child, carer.id)
    const second = await invitationToken(email)
    const confirm = (token: string) =>
      client().post('/api/invitations/confirm').send({ token, newPassword: testPassword })
    expect((await confirm(first)).status).toBe(410)
    expect((await confirm(second)).status).toBe(204)
    expect(await selectRows('SELECT id FROM users WHERE email = :email', { email })).toHaveLength(1)
  })

  it('adds the child for somebody who signs in already, without a new link', async () => {
    const parent = await buildUser('guardian', { email: address() })
    const child = await buildChild({ therapist: holder })
    const carer = await buildGuardian(child, null, { email: parent.email })
    expect((await invite(therapist, child, carer.id)).status).toBe(204)
    expect(await mailsTo(parent.email)).toEqual([])
    const seen = await (await signedInAs(parent)).get('/api/my/children')
    expect(seen.body).toHaveLength(1)
  })

  it.each([
    ['there is no address', { email: null }, 422],
    ['it is not safe to write', { safeToContact: false }, 422],
    ['the carer is restricted', { restricted: true }, 409],
  ])('is refused when %s', async (_what, given, status) => {
    const child = await buildChild({ therapist: holder })
    const email = address()
    const carer = await buildGuardian(child, null, { email, ...given })
    expect((await invite(therapist, child, carer.id)).status).toBe(status)
    expect(await mailsTo(email)).toEqual([])
  })

  it('is refused for an inbox two carers share, and after three tries in an hour', async () => {
    const child = await buildChild({ therapist: holder })
    const email = address()
    const mother = await buildGuardian(child, null, { email })
    const father = await buildGuardian(child, null, { email, relation: 'father' })
    expect((await invite(therapist, child, mother.id)).status).toBe(204)
    const shared = await invite(therapist, child, father.id)
    expect([shared.status, Object.keys(shared.body.fields)]).toEqual([422, ['email']])
    await invite(therapist, child, mother.id)
    const fourth = await invite(therapist, child, mother.id)
    expect([fourth.status, fourth.headers['retry-after'] !== undefined]).toEqual([429, true])
  })
})
