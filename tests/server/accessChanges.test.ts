import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { consentPurposes } from '../../shared/consents.ts'
import { addDays } from '../../shared/days.ts'
import { now, setClock } from '../../server/clock.ts'
import { closeDatabase, database } from '../../server/dataSource.ts'
import type { PersonKey } from '../support/accessPeople.ts'
import { buildScene, childOf, personOf, type Scene, type SceneChild } from '../support/accessScene.ts'
import { openWire, type Answer, type Wire } from '../support/accessWire.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { signedInAs } from '../support/app.ts'

/* What ends ends with the very next request, with the cookie that worked a moment ago. */

let wire: Wire
let scene: Scene

beforeAll(async () => {
  await openClinicDatabase()
  wire = await openWire()
  scene = await buildScene()
})
afterEach(() => setClock(() => new Date()))
afterAll(async () => {
  await wire.close()
  await closeDatabase()
})

const ask = (as: PersonKey, route: string, body?: object, version?: number): Promise<Answer> => {
  const [method = '', path = ''] = route.split(' ')
  const { user, cookie } = personOf(scene, as)
  return wire.ask({ method, path, body, version, userId: user.id, cookie })
}
const json = (answer: Answer) => JSON.parse(answer.body.toString())
const statuses = async (as: PersonKey, paths: string[]) =>
  Promise.all(paths.map(async (path) => (await ask(as, `GET ${path}`)).status))

const all = (paths: string[], status: number) => paths.map(() => status)
const record = ({ child }: SceneChild) =>
  ['', '/glance', '/session-notes', '/letters', '/goals', '/samples', '/consents', '/access-history'].map(
    (part) => `/api/children/${child.id}${part}`,
  )

describe('the next request', () => {
  it('of a teacher fails when the family has stopped sharing', async () => {
    const { child } = childOf(scene, 'first')
    const paths = [`/api/pupils/${child.id}`]
    expect(await statuses('E1', paths)).toEqual(all(paths, 200))
    const given = json(await ask('L', `GET /api/children/${child.id}/consents`)) as {
      id: string
      purpose: string
      inForce: boolean
    }[]
    for (const consent of given.filter(
      ({ purpose, inForce }) => inForce && purpose.startsWith('share_school'),
    ))
      expect(
        (
          await ask('L', `POST /api/children/${child.id}/consents/${consent.id}/withdraw`, {
            reason: 'The family asked to stop',
          })
        ).status,
      ).toBe(204)
    expect(await statuses('E1', paths)).toEqual(all(paths, 404))
    expect((json(await ask('E1', 'GET /api/classes')) as { sharedPupils: number }[])[0]?.sharedPupils).toBe(0)
  })

  it('of a teacher fails when the child has moved to another class', async () => {
    const { child } = childOf(scene, 'second')
    expect((await ask('EX', `GET /api/pupils/${child.id}`)).status).toBe(200)
    const identity = json(await ask('AD', `GET /api/children/${child.id}/identity`))
    const { id: _id, recordNumber: _number, version, can: _can, ...fields } = identity
    const moved = await ask(
      'AD',
      `PUT /api/children/${child.id}/identity`,
      { ...fields, classId: (await buildClass()).id },
      version,
    )
    expect(moved.status, moved.body.toString()).toBe(200)
    expect((await ask('EX', `GET /api/pupils/${child.id}`)).status).toBe(404)
  })

  it('of a therapist fails when the case went to a colleague', async () => {
    const given = childOf(scene, 'second')
    expect(await statuses('T2', record(given))).toEqual(all(record(given), 200))
    const allocated = await ask('L', `POST /api/children/${given.child.id}/allocation`, {
      therapistId: scene.newlyQualified.id,
      reason: 'Room in the diary',
    })
    expect(allocated.status).toBe(204)
    expect(await statuses('T2', record(given))).toEqual(all(record(given), 404))
  })

  it('of a carer fails when they were restricted', async () => {
    const { child, guardians } = childOf(scene, 'first')
    expect((await ask('G1', `GET /api/my/children/${child.id}`)).status).toBe(200)
    const restricted = await ask(
      'T1',
      `POST /api/children/${child.id}/guardians/${guardians.get('G1')?.id}/restrict`,
      { restricted: true, reason: 'The court says so' },
    )
    expect(restricted.status).toBe(204)
    expect((await ask('G1', `GET /api/my/children/${child.id}`)).status).toBe(404)
    expect(json(await ask('G1', 'GET /api/my/children'))).toEqual([])
  })

  it('of an administrator who lost the role, and of anybody whose account was closed, fails', async () => {
    const { user } = personOf(scene, 'AD')
    const other = await signedInAs(await buildUser('administrator'))
    const listed = (await other.get(`/api/users?search=${user.email}`)).body as {
      rows: { version: number }[]
    }
    const changed = await other
      .patch(`/api/users/${user.id}`)
      .set('If-Match', `"${listed.rows[0]?.version}"`)
      .send({ roles: ['teacher'], newlyQualified: false })
    expect(changed.status).toBe(200)
    expect([401, 403]).toContain((await ask('AD', 'GET /api/children')).status)
    const closed = await other.post(`/api/users/${personOf(scene, 'T1').user.id}/disable`).send()
    expect([closed.status, (await ask('T1', 'GET /api/caseload')).status]).toEqual([204, 401])
  })
})

describe('a consent to share with the school', () => {
  it('holds to the millisecond before it ends, and not at its end', async () => {
    const { schoolClass, therapist } = childOf(scene, 'never')
    const child = await buildChild({ therapist, schoolClassId: schoolClass.id })
    const start = new Date(now().getTime() + 60_000)
    const end = new Date(start.getTime() + 60_000)
    await giveConsent(child, 'share_school_goals', therapist, { at: start, expiresAt: end })
    const statusAt = async (moment: number) => {
      setClock(() => new Date(moment))
      return (await ask('E0 never', `GET /api/pupils/${child.id}`)).status
    }
    expect([
      await statusAt(start.getTime() - 1),
      await statusAt(start.getTime()),
      await statusAt(end.getTime() - 1),
      await statusAt(end.getTime()),
    ]).toEqual([404, 200, 200, 404])
  })

  it('is any of the four that name the school, and none of the others', async () => {
    const { schoolClass, therapist } = childOf(scene, 'never')
    const statuses = await Promise.all(
      consentPurposes.map(async (purpose) => {
        const child = await buildChild({ therapist, schoolClassId: schoolClass.id })
        await giveConsent(child, purpose, therapist)
        return [purpose, (await ask('E0 never', `GET /api/pupils/${child.id}`)).status]
      }),
    )
    const opened = statuses.filter(([, status]) => status === 200).map(([purpose]) => purpose)
    expect(opened).toEqual([
      'share_school_seating',
      'share_school_goals',
      'share_school_samples',
      'share_school_observation',
    ])
  })
})

describe('a carer’s own room', () => {
  it('closes on the day the child turns eighteen', async () => {
    const today = now().toISOString().slice(0, 10)
    // On a leap day the birthday is kept the day before: that day exists eighteen years earlier.
    const eighteenYearsAgo = `${Number(today.slice(0, 4)) - 18}${today.slice(4).replace('-02-29', '-02-28')}`
    const { user } = personOf(scene, 'GX')
    const child = await buildChild({ birthDate: addDays(eighteenYearsAgo, 1) })
    await buildGuardian(child, user)
    expect((await ask('GX', `GET /api/my/children/${child.id}`)).status).toBe(200)
    await database().query('UPDATE children SET birthDate = ? WHERE id = ?', [eighteenYearsAgo, child.id])
    expect((await ask('GX', `GET /api/my/children/${child.id}`)).status).toBe(404)
  })
})
