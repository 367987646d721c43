import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { selectRows } from '../../server/queries/sql.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import type { ChildIdentityView } from '../../shared/children.ts'
import { addDays, dayOf } from '../../shared/days.ts'
import type { GuardianView } from '../../shared/guardians.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

let therapist: User
let anna: Client
let child: Child

beforeAll(async () => {
  await startApp()
  therapist = await buildUser('therapist')
  anna = await signedInAs(therapist)
})
afterAll(stopApp)

beforeEach(async () => {
  child = await buildChild({ therapist, writingHand: 'left' })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const at = (path: string) => `/api/children/${child.id}${path}`

const trail = async () =>
  (
    await selectRows<{ action: string }>(
      'SELECT action FROM audit_entries WHERE childId = :id ORDER BY position',
      {
        id: child.id,
      },
    )
  ).map((entry) => entry.action)

// AUD-01 of the clinic's audit duty: every read of identifiable data, however it came about.
describe('a stale save shows what is stored', () => {
  it('of the identity, and leaves the entry of a read', async () => {
    const {
      id: _id,
      recordNumber: _number,
      version: _version,
      can: _can,
      ...identity
    } = (await anna.get(at('/identity'))).body as ChildIdentityView
    const answer = await anna.put(at('/identity')).set('If-Match', '"99"').send(identity)
    expect([answer.status, answer.body.code, answer.body.current.givenName]).toEqual([
      409,
      'stale',
      child.givenName,
    ])
    expect(await trail()).toEqual(['child.identity_read', 'child.identity_read'])
  })

  it('of the care details, and leaves the entry of a read', async () => {
    const answer = await anna
      .patch(at('/care'))
      .set('If-Match', '"99"')
      .send({ writingHand: 'left', nextReviewOn: null, strengths: 'Carving' })
    expect([answer.status, answer.body.current]).toMatchObject([409, { writingHand: 'left', version: 1 }])
    expect(await trail()).toEqual(['child.care_read'])
  })

  it('of the episode, and leaves the entry of a read', async () => {
    const answer = await anna
      .post(at('/state'))
      .set('If-Match', '"99"')
      .send({ to: 'review', reason: 'Twelve weeks are over' })
    expect([answer.status, answer.body.current]).toMatchObject([409, { episodeVersion: 1 }])
    expect(await trail()).toEqual(['episode.read'])
  })

  it('of a carer, and leaves the entry of a read', async () => {
    const { id } = await buildGuardian(child)
    const [carer] = (await anna.get(at('/guardians'))).body as GuardianView[]
    if (!carer) throw new Error('No carer was listed')
    const { name, relation, parentalResponsibility, courtOrder, safeToContact, email, phone, address } = carer
    const answer = await anna
      .put(at(`/guardians/${id}`))
      .set('If-Match', '"99"')
      .send({ name, relation, parentalResponsibility, courtOrder, safeToContact, email, phone, address })
    expect([answer.status, answer.body.current?.id]).toEqual([409, id])
    expect(await trail()).toEqual(['guardian.listed', 'guardian.read'])
  })
})

describe('a create that is asked for twice under one key', () => {
  it('is done once, and the trail says which of the two did it', async () => {
    const key = randomUUID()
    const set = () =>
      anna
        .post(at('/goals'))
        .set('Idempotency-Key', key)
        .send({
          activity: 'Writes a shopping list that a friend can read',
          childVoice: 'I want others to read my list',
          levels: ['One word', 'Half of the words', 'Most words', 'Every word', 'Every word, in a hurry'],
          baseline: -1,
          importance: 3,
          difficulty: 2,
          targetOn: addDays(dayOf(new Date(), 'Europe/London'), 60),
        })
    const [first, second] = [await set(), await set()]
    expect([first.status, second.status, second.body.id]).toEqual([201, 201, first.body.id])
    expect(await trail()).toEqual(['goal.created', 'goal.asked_again'])
  })
})

describe('a sign-in', () => {
  it('leaves the version of the account alone, so that an open form about the person stays good', async () => {
    const colleague = await buildUser('therapist')
    await signedInAs(colleague)
    const [row] = await selectRows<{ version: number; lastSignInAt: Date | null }>(
      'SELECT version, lastSignInAt FROM users WHERE id = :id',
      { id: colleague.id },
    )
    expect(row).toMatchObject({ version: 1, lastSignInAt: expect.any(Date) })
  })
})
