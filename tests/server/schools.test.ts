import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { randomUUID } from 'node:crypto'
import type { SchoolView } from '../../shared/schools.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildUser } from '../support/factories.ts'
import type { User } from '../../server/entities/User.ts'

let administrator: Client
let therapist: Client
let teacher: User

beforeAll(async () => {
  await startApp()
  administrator = await signedInAs(await buildUser('administrator'))
  therapist = await signedInAs(await buildUser('therapist'))
  teacher = await buildUser('teacher', { displayName: 'Greta Fenwick' })
})
afterAll(stopApp)

const addSchool = async (name: string, town: string | null = 'Harrowmere') => {
  const response = await administrator.post('/api/schools').send({ name, town })
  expect(response.status).toBe(201)
  return response.body as SchoolView
}

const classOf = (schoolId: string, given: object = {}) => ({
  schoolId,
  name: 'Otter',
  schoolYear: 2026,
  ages: '7–8',
  teacherId: null,
  ...given,
})

describe('schools', () => {
  it('lists a new school with its classes to every member of staff, and says who may change it', async () => {
    const school = await addSchool('Ashbank Primary')
    const made = await administrator.post('/api/classes').send(classOf(school.id, { teacherId: teacher.id }))
    expect(made.status).toBe(201)

    const seen = await therapist.get('/api/schools?search=ashbank')
    expect(seen.body).toMatchObject({
      total: 1,
      page: 1,
      rows: [
        {
          name: 'Ashbank Primary',
          town: 'Harrowmere',
          classes: [{ name: 'Otter', schoolYear: 2026, teacher: { id: teacher.id, name: 'Greta Fenwick' } }],
          can: { change: false },
        },
      ],
    })
    expect((await administrator.get('/api/schools?search=ashbank')).body.rows[0].can.change).toBe(true)
    const choices = await therapist.get('/api/class-choices')
    expect(choices.body).toContainEqual({ id: made.body.id, label: 'Ashbank Primary, Otter (2026/27)' })
  })

  it('pages on the server and counts a page past the end correctly', async () => {
    for (const letter of ['A', 'B', 'C']) await addSchool(`Paged ${letter}`)
    const second = await therapist.get('/api/schools?search=Paged&size=2&page=2')
    expect(second.body).toMatchObject({ total: 3, page: 2, size: 2 })
    expect(second.body.rows.map((row: SchoolView) => row.name)).toEqual(['Paged C'])
    expect((await therapist.get('/api/schools?search=Paged&size=2&page=9')).body).toMatchObject({
      total: 3,
      rows: [],
    })
    expect((await therapist.get('/api/schools?page=0')).body).toMatchObject({
      code: 'invalid',
      fields: { page: expect.any(String) },
    })
  })

  it('takes search signs as text: a percent sign finds no school', async () => {
    expect((await therapist.get('/api/schools?search=%25')).body.total).toBe(0)
  })

  it('answers the same school when the same form is sent twice', async () => {
    const key = randomUUID()
    const send = () =>
      administrator.post('/api/schools').set('Idempotency-Key', key).send({ name: 'Sent Twice', town: null })
    const [first, second] = [await send(), await send()]
    expect(second.status).toBe(201)
    expect(second.body.id).toBe(first.body.id)
  })

  it('puts a taken name beside the field, for schools and for classes of one year', async () => {
    const school = await addSchool('Only Once')
    const again = await administrator.post('/api/schools').send({ name: 'only once', town: null })
    expect([again.status, Object.keys(again.body.fields)]).toEqual([422, ['name']])

    await administrator.post('/api/classes').send(classOf(school.id))
    const twin = await administrator.post('/api/classes').send(classOf(school.id))
    expect([twin.status, Object.keys(twin.body.fields)]).toEqual([422, ['name']])
    const nextYear = await administrator.post('/api/classes').send(classOf(school.id, { schoolYear: 2027 }))
    expect(nextYear.status).toBe(201)
  })

  it('changes the teacher of a class, once for each version', async () => {
    const school = await addSchool('Handover School')
    const { body } = await administrator
      .post('/api/classes')
      .send(classOf(school.id, { teacherId: teacher.id }))
    const next = await buildUser('teacher')
    const save = (version: number) =>
      administrator
        .put(`/api/classes/${body.id}`)
        .set('If-Match', `"${version}"`)
        .send(classOf(school.id, { teacherId: next.id, ages: null }))

    expect((await administrator.put(`/api/classes/${body.id}`).send(classOf(school.id))).status).toBe(428)
    expect((await save(1)).status).toBe(200)
    const late = await save(1)
    expect([late.status, late.body.code, late.body.current.teacher.id]).toEqual([409, 'stale', next.id])
    const shown = await therapist.get('/api/schools?search=Handover')
    expect(shown.body.rows[0].classes[0].teacher.id).toBe(next.id)
  })

  it.each([
    ['a school that is not there', { schoolId: randomUUID() }, 'schoolId'],
    ['a teacher who is none', { teacherId: 'therapist' }, 'teacherId'],
    ['a year as text', { schoolYear: '2026' }, 'schoolYear'],
    ['no name', { name: '  ' }, 'name'],
  ])('refuses a class with %s and names the field', async (_what, given, field) => {
    const school = await addSchool(`Refusing ${field}`)
    const teacherId = 'teacherId' in given ? therapist.userId : null
    const response = await administrator
      .post('/api/classes')
      .send({ ...classOf(school.id), ...given, teacherId })
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
  })

  it('is closed to others: 403 for a therapist who writes, a teacher and a parent who read, 401 signed out', async () => {
    const parent = await signedInAs(await buildUser('guardian'))
    const classTeacher = await signedInAs(teacher)
    const forms = [
      therapist.post('/api/schools').send({ name: 'Not mine', town: null }),
      therapist.post('/api/classes').send(classOf(randomUUID())),
      therapist.put(`/api/classes/${randomUUID()}`).set('If-Match', '"1"').send(classOf(randomUUID())),
      parent.get('/api/schools'),
      classTeacher.get('/api/schools'),
      classTeacher.get('/api/class-choices'),
    ]
    for (const form of forms) expect((await form).status).toBe(403)
    expect((await client().get('/api/schools')).status).toBe(401)
    expect(
      (
        await administrator
          .put(`/api/classes/${randomUUID()}`)
          .set('If-Match', '"1"')
          .send(classOf(randomUUID()))
      ).status,
    ).toBe(404)
  })
})
