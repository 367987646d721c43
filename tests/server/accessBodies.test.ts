import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { closeDatabase, database } from '../../server/dataSource.ts'
import { buildAdvice, buildReferral } from '../support/clinicRows.ts'
import { buildGuardian, giveConsent } from '../support/factories.ts'
import { noteDraft } from '../support/notes.ts'
import { personKeys, type PersonKey } from '../support/accessPeople.ts'
import { buildScene, childOf, personOf, type Scene } from '../support/accessScene.ts'
import {
  checksums,
  expected,
  perform,
  prepareCall,
  targetsOf,
  type Caller,
  type ReadyCall,
} from '../support/accessSweep.ts'
import { openWire, type Answer, type Wire } from '../support/accessWire.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { buildGoal, buildNote, buildQuestionnaire, seenOn } from '../support/records.ts'
import { decision } from '../support/referrals.ts'
import { buildDelivery, buildLetter } from '../support/storedLetters.ts'
import { accessRows, type AccessRow } from './accessFixture.ts'

/* What stands in a body or behind an address must belong to the child in the address, and to the form. */

let wire: Wire
let scene: Scene

beforeAll(async () => {
  await openClinicDatabase()
  wire = await openWire()
  scene = await buildScene()
})
afterAll(async () => {
  await wire.close()
  await closeDatabase()
})

const ask = (as: PersonKey, route: string, body?: object, version?: number): Promise<Answer> => {
  const [method = '', path = ''] = route.split(' ')
  const { user, cookie } = personOf(scene, as)
  return wire.ask({ method, path, body, version, userId: user.id, cookie })
}

/** Sends it and answers the status; nothing may have been written. */
const refusedWithoutTrace = async (...asked: Parameters<typeof ask>): Promise<number> => {
  const before = await checksums()
  const answer = await ask(...asked)
  expect(await checksums()).toEqual(before)
  return answer.status
}

describe('an id of another child in a body', () => {
  const base = () => `/api/children/${childOf(scene, 'first').child.id}`
  const pair = () => ({ first: childOf(scene, 'first'), second: childOf(scene, 'second') })

  it('as the goal of a note is refused, new or changed', async () => {
    const { first, second } = pair()
    const goal = await buildGoal(second.child, second.therapist)
    const note = await buildNote(first.child, first.therapist, 'draft')
    const body = noteDraft({ heldOn: seenOn(), goalIds: [goal.id] })
    expect([404, 422]).toContain(await refusedWithoutTrace('T1', `POST ${base()}/session-notes`, body))
    expect([404, 422]).toContain(
      await refusedWithoutTrace('T1', `PUT ${base()}/session-notes/${note.id}`, body, note.version),
    )
  })

  it('as the response that a new one replaces is refused', async () => {
    const { second } = pair()
    const locked = await buildQuestionnaire(second.child, second.therapist, { locked: true })
    const body = { informant: 'therapist', respondentName: null, answeredOn: seenOn(), replacesId: locked.id }
    expect([404, 422]).toContain(await refusedWithoutTrace('T1', `POST ${base()}/questionnaires`, body))
  })

  it('as the carer of a letter is refused', async () => {
    const { first, second } = pair()
    const letter = await buildLetter(first.child, first.therapist, 'approved')
    const stranger = second.guardians.get('GX')
    const body = { guardianIds: [stranger?.id] }
    for (const person of ['T1', 'L'] as const)
      expect([404, 422]).toContain(
        await refusedWithoutTrace(person, `POST ${base()}/letters/${letter.id}/send`, body, letter.version),
      )
  })

  it('as the carer who agreed is refused', async () => {
    const stranger = await buildGuardian(pair().second.child)
    const body = {
      purpose: 'video',
      guardianId: stranger.id,
      basis: 'parental_responsibility',
      method: 'paper',
      expiresOn: null,
      note: null,
    }
    expect([404, 422]).toContain(await refusedWithoutTrace('T1', `POST ${base()}/consents`, body))
  })

  it('as the delivery of a letter is refused', async () => {
    const { first, second } = pair()
    const [own, other] = [
      await buildLetter(first.child, first.therapist, 'queued'),
      await buildLetter(second.child, second.therapist, 'queued'),
    ]
    const carer = second.guardians.get('GX')
    if (!carer) throw new Error('The second child has a carer')
    const failed = await buildDelivery(other, carer, 'failed')
    const path = `POST ${base()}/letters/${own.id}/deliveries/${failed.id}/retry`
    expect(await refusedWithoutTrace('L', path, {})).toBe(404)
  })

  it('as the child a referral is joined to is refused to a therapist who does not hold that child', async () => {
    const referral = await buildReferral(personOf(scene, 'AD').user, 'new', {
      givenName: `Neutral${randomUUID().slice(0, 8)}`,
    })
    const body = decision({ existingChildId: childOf(scene, 'first').child.id })
    const path = `POST /api/referrals/${referral.id}/accept`
    expect([404, 422]).toContain(await refusedWithoutTrace('T2', path, body, referral.version))
  })
})

describe('one carer', () => {
  it('never opens a letter, its print or its link that went to another carer of the same child', async () => {
    const { child, therapist, guardians } = childOf(scene, 'first')
    const letter = await buildLetter(child, therapist, 'sent')
    const other = guardians.get('teacher and carer')
    if (!other) throw new Error('The first child has this carer')
    const delivery = await buildDelivery(letter, other, 'sent')
    for (const path of [`letters/${letter.id}`, `letters/${letter.id}/pdf`, `deliveries/${delivery.id}`]) {
      expect((await ask('G1', `GET /api/my/${path}`)).status).toBe(404)
      expect((await ask('teacher and carer', `GET /api/my/${path}`)).status).toBe(200)
    }
  })

  it('never withdraws what another carer agreed to for letters to themselves', async () => {
    const { child, therapist, guardians } = childOf(scene, 'first')
    const guardianId = guardians.get('teacher and carer')?.id ?? null
    const consent = await giveConsent(child, 'email_link', therapist, { guardianId })
    const path = `POST /api/my/children/${child.id}/consents/${consent.id}/withdraw`
    expect(await refusedWithoutTrace('G1', path, { reason: null })).toBe(404)
  })

  it('changes their own contact and nobody else’s', async () => {
    const { child, guardians } = childOf(scene, 'first')
    const own = guardians.get('G1')
    const rowsOf = () =>
      database().query('SELECT id, phone, address FROM guardians WHERE childId = ? AND id <> ? ORDER BY id', [
        child.id,
        own?.id,
      ])
    const before = await rowsOf()
    const body = { phone: own?.phone ?? null, address: own?.address ?? null }
    const changed = await ask('G1', `PUT /api/my/children/${child.id}/contact`, body, own?.version)
    expect(changed.status).toBe(200)
    expect(await rowsOf()).toEqual(before)
  })
})

describe('a teacher', () => {
  it('never answers advice that has ended, or that was given about another pupil', async () => {
    const { child, therapist } = childOf(scene, 'first')
    const ended = await buildAdvice(child, therapist, { endedAt: new Date(), endedById: therapist.id })
    const path = `POST /api/pupils/${child.id}/advice/${ended.id}/replies`
    expect([404, 409]).toContain(await refusedWithoutTrace('E1', path, { reply: 'done', reason: null }))
  })
})

const firstAllowed = async (row: AccessRow): Promise<ReadyCall> => {
  const callers: Caller[] = row.area === 'open' ? ['nobody'] : personKeys
  for (const target of targetsOf(row))
    for (const caller of callers)
      if (expected(row, caller, target) === 'ok') return prepareCall(scene, row, caller, target)
  throw new Error(`Nobody may call ${row.route}`)
}

const sent = accessRows.filter((row) => !row.route.startsWith('GET'))

/** Names that would give somebody more than the form asks for. */
const smuggled = {
  id: randomUUID(),
  childId: randomUUID(),
  authorId: randomUUID(),
  role: 'administrator',
  state: 'signed',
  signedAt: '2026-01-01T00:00:00Z',
  version: 99,
}

describe('a body', () => {
  it.each(sent.map((row) => [row.route, row] as const))(
    '%s refuses fields its form does not have, and writes nothing',
    async (_route, row) => {
      const call = await firstAllowed(row)
      // What is sent without a form is not read at all.
      if (Object.keys(call.body ?? {}).length === 0) return
      const extra = Object.fromEntries(
        Object.entries(smuggled).filter(([key]) => !Object.keys(call.body ?? {}).includes(key)),
      )
      const before = await checksums()
      const answer = await perform(wire, scene, { ...call, body: { ...call.body, ...extra } })
      expect(answer.status, answer.body.toString()).toBe(422)
      expect(await checksums()).toEqual(before)
      await call.after?.()
    },
  )

  it.each(sent.map((row) => [row.route, row] as const))(
    '%s names each field that has the wrong type, and writes nothing',
    async (_route, row) => {
      const call = await firstAllowed(row)
      const before = await checksums()
      const problems: string[] = []
      for (const key of Object.keys(call.body ?? {})) {
        const answer = await perform(wire, scene, { ...call, body: { ...call.body, [key]: { odd: [true] } } })
        const fields = answer.status === 422 ? Object.keys(JSON.parse(answer.body.toString()).fields) : []
        if (!fields.some((field) => field.startsWith(key)))
          problems.push(`${key}: ${answer.status} ${answer.body.toString().slice(0, 200)}`)
      }
      expect(problems).toEqual([])
      expect(await checksums()).toEqual(before)
      await call.after?.()
    },
  )
})
