import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import type { AnswerPage } from '../../shared/answerRequests.ts'
import type { FormScore } from '../../shared/forms.ts'
import { emptyHistory } from '../../shared/histories.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { fromJson } from '../../server/queries/sql.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import {
  aDayPasses,
  ask,
  asked,
  askByLink,
  askingScene,
  askMother,
  askTeacher,
  formId,
  ownPage,
  pupilPage,
  put,
  requestsPath,
  saveAndSend,
  seenRequest,
  send,
  someAnswers,
  tasksOf,
} from '../support/answers.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { mailsTo } from '../support/invitations.ts'

beforeAll(startApp)
afterAll(stopApp)
afterEach(() => setClock(() => new Date()))

const storedResponses = (childId: string): Promise<{ [column: string]: unknown }[]> =>
  database().query('SELECT * FROM questionnaire_responses WHERE childId = ?', [childId])

describe('asking for answers', () => {
  it('writes to the carer without the child’s name, and lists the request as waiting', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    expect(request).toMatchObject({ state: 'waiting', reminders: 0, byLink: false, answerId: null })
    const [mail] = await mailsTo(scene.carer.email)
    expect([mail?.kind, mail?.state]).toEqual(['answer_request', 'queued'])
    expect(mail?.text).toContain(`/my-child/${scene.child.id}/answer/${request.id}`)
    for (const word of [scene.child.givenName, scene.child.familyName, 'hand', 'therap', 'assessment'])
      expect(mail?.text.split('\r\n\r\n').slice(1).join(' ').toLowerCase()).not.toContain(word.toLowerCase())
  })

  it('asks once when the same form is sent twice, and answers 409 for a second open request', async () => {
    const scene = await askingScene()
    const create = (key: string) =>
      scene.therapist
        .post(requestsPath(scene.child))
        .set('Idempotency-Key', key)
        .send(asked({ guardianId: scene.mother.id }))
    const [first, second] = await Promise.all([create('double-click-1'), create('double-click-1')])
    expect([first.status, second.status]).toEqual([201, 201])
    expect(first.body.id).toBe(second.body.id)
    expect(await mailsTo(scene.carer.email)).toHaveLength(1)
    expect((await create('another-time-1')).body.code).toBe('duplicate')
    await ask(scene, { guardianId: scene.mother.id, asks: 'history' })
  })

  it.each([
    ['restricted', { restricted: true }],
    ['not safe to contact', { safeToContact: false }],
    ['ended', { endedAt: new Date('2020-01-01') }],
    ['without an address', { email: null }],
  ])('answers 422 beside the carer when they are %s', async (_what, given) => {
    const scene = await askingScene()
    const carer = await buildGuardian(scene.child, null, { email: 'other@harrowmere.example', ...given })
    const response = await scene.therapist
      .post(requestsPath(scene.child))
      .send(asked({ guardianId: carer.id, byLink: true }))
    expect(response.status).toBe(422)
    expect(response.body.fields.guardianId).toBeTruthy()
    expect(await mailsTo('other@harrowmere.example')).toEqual([])
  })

  it('answers 422 for a carer of another child, for one without a sign-in, and for a teacher of another class', async () => {
    const scene = await askingScene()
    const other = await askingScene()
    const refused = async (body: object) =>
      (await scene.therapist.post(requestsPath(scene.child)).send(body)).body.fields
    expect(await refused(asked({ guardianId: other.mother.id }))).toHaveProperty('guardianId')
    expect(await refused(asked({ guardianId: scene.grandfather.id }))).toMatchObject({
      guardianId: expect.stringContaining('does not sign in'),
    })
    expect(await refused(asked({ answerer: 'teacher', teacherId: other.teacher.id }))).toHaveProperty(
      'teacherId',
    )
    expect(
      await refused(asked({ answerer: 'teacher', teacherId: scene.teacher.id, byLink: true })),
    ).toHaveProperty('byLink')
    expect(await refused(asked({ guardianId: scene.mother.id, formId: 'no-such-form.v1' }))).toHaveProperty(
      'formId',
    )
    expect(
      await refused(asked({ asks: 'history', answerer: 'teacher', teacherId: scene.teacher.id })),
    ).toHaveProperty('answerer')
  })

  it('needs consent to assessment, and to sharing what school sees before a teacher is asked', async () => {
    const scene = await askingScene(false)
    const toMother = () =>
      scene.therapist.post(requestsPath(scene.child)).send(asked({ guardianId: scene.mother.id }))
    const toTeacher = () =>
      scene.therapist
        .post(requestsPath(scene.child))
        .send(asked({ answerer: 'teacher', teacherId: scene.teacher.id }))
    expect((await toMother()).body.code).toBe('consent_needed')
    await giveConsent(scene.child, 'assessment_treatment', scene.holder)
    expect((await toMother()).status).toBe(201)
    await giveConsent(scene.child, 'share_school_seating', scene.holder)
    expect((await toTeacher()).body.code).toBe('consent_needed')
    await giveConsent(scene.child, 'share_school_observation', scene.holder)
    expect((await toTeacher()).status).toBe(201)
  })

  it('is for the therapist and the lead: everybody else finds nothing', async () => {
    const scene = await askingScene()
    await askMother(scene)
    const body = asked({ guardianId: scene.mother.id })
    const lead = await signedInAs(await buildUser('clinicLead'))
    expect((await lead.get(requestsPath(scene.child))).body.rows[0].can).toEqual({
      cancel: true,
      remind: true,
    })
    for (const role of ['therapist', 'administrator'] as const) {
      const other = await signedInAs(await buildUser(role))
      expect((await other.get(requestsPath(scene.child))).status).toBe(404)
      expect((await other.post(requestsPath(scene.child)).send(body)).status).toBe(404)
    }
    expect((await scene.asCarer.get(requestsPath(scene.child))).status).toBe(404)
  })

  it('is the lead’s where no therapist holds the child yet: asked, reminded, withdrawn, and back to the lead', async () => {
    const scene = await askingScene(true, { waiting: true })
    const lead = await signedInAs(await buildUser('clinicLead'))
    const choices = await lead.get(`/api/children/${scene.child.id}/answer-choices`)
    expect(choices.body.guardians).toHaveLength(2)
    const byLead = { ...scene, therapist: lead }
    const ofMother = await askMother(byLead)
    const ofTeacher = await askTeacher(byLead)
    await aDayPasses(ofTeacher.id)
    expect((await lead.post(requestsPath(scene.child, `/${ofTeacher.id}/remind`)).send({})).status).toBe(204)
    const { version } = await seenRequest(byLead, ofTeacher.id)
    const withdrawn = await lead
      .post(requestsPath(scene.child, `/${ofTeacher.id}/cancel`))
      .set('If-Match', `"${version}"`)
      .send({})
    expect(withdrawn.status).toBe(204)
    await saveAndSend(scene.asCarer, ownPage(scene.child, ofMother.id), {
      answers: someAnswers(),
      comment: null,
    })
    const { answerId } = await seenRequest(byLead, ofMother.id)
    expect((await lead.get(`/api/children/${scene.child.id}/questionnaires/${answerId}`)).status).toBe(200)
    expect(
      await database().query('SELECT kind, assigneeId, forRole FROM tasks WHERE childId = ?', [
        scene.child.id,
      ]),
    ).toEqual([{ kind: 'answers_back', assigneeId: null, forRole: 'clinicLead' }])
  })

  it('offers whom one can ask, with the reason beside those one cannot', async () => {
    const scene = await askingScene()
    await buildGuardian(scene.child, null, { name: 'Unsafe Carer', safeToContact: false })
    const { body } = await scene.therapist.get(`/api/children/${scene.child.id}/answer-choices`)
    expect(body.blocked).toBeNull()
    expect(body.forms.map((form: { id: string }) => form.id)).toContain(formId)
    expect(body.guardians).toHaveLength(3)
    // Carers who were added in the same moment have no order.
    expect(body.guardians).toEqual(
      expect.arrayContaining([
        {
          id: scene.mother.id,
          name: scene.mother.name,
          refused: null,
          byLink: true,
          signedIn: true,
          email: scene.mother.email,
          verified: true,
        },
        {
          id: scene.grandfather.id,
          name: 'Ambrose Tilling',
          refused: null,
          byLink: true,
          signedIn: false,
          email: scene.grandfather.email,
          verified: false,
        },
        expect.objectContaining({ refused: expect.stringContaining('not safe'), byLink: false }),
      ]),
    )
    expect(body.teachers).toEqual([{ id: scene.teacher.id, name: scene.teacher.displayName }])
  })

  it('is withdrawn with the version seen, once; what is queued does not leave and the page is closed', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const cancel = (version?: number) => {
      const call = scene.therapist.post(requestsPath(scene.child, `/${request.id}/cancel`))
      return (version === undefined ? call : call.set('If-Match', `"${version}"`)).send({})
    }
    expect((await cancel()).status).toBe(428)
    const stale = await cancel(7)
    expect([stale.status, stale.body.current.id]).toEqual([409, request.id])
    expect((await cancel(request.version)).status).toBe(204)
    expect((await cancel(request.version + 1)).body.code).toBe('closed')
    expect(await seenRequest(scene, request.id)).toMatchObject({
      state: 'cancelled',
      can: { cancel: false, remind: false },
    })
    expect((await mailsTo(scene.carer.email))[0]?.state).toBe('cancelled')
    expect((await scene.asCarer.get(ownPage(scene.child, request.id))).status).toBe(410)
    expect((await scene.asCarer.get('/api/my/to-answer')).body).toEqual([])
  })

  it('says that the time is over after 28 days, and lets one ask again', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const later = new Date(Date.now() + 28 * 86_400_000 + 1000)
    setClock(() => later)
    const carer = await signedInAs(scene.carer)
    const therapist = await signedInAs(scene.holder)
    expect((await carer.get(ownPage(scene.child, request.id))).body.code).toBe('link_ended')
    expect((await therapist.get(requestsPath(scene.child))).body.rows[0].state).toBe('expired')
    await askMother({ ...scene, therapist })
  })
})

describe('answering signed in', () => {
  it('is kept as one goes, tells a second device, is sent once and then closed for good', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const path = ownPage(scene.child, request.id)
    const [line] = (await scene.asCarer.get('/api/my/to-answer')).body
    expect(line).toMatchObject({ id: request.id, childId: scene.child.id, begun: false })
    const page: AnswerPage = (await scene.asCarer.get(path)).body
    expect(page).toMatchObject({ version: 0, asks: 'questionnaire', history: null, urgent: [] })
    expect(page.form?.id).toBe(formId)
    expect(Object.values(page.answers ?? {}).every((answer) => answer === null)).toBe(true)

    const half = { ...page.answers, scissors: 'left' }
    const saved = await put(scene.asCarer, path, 0, { answers: half, comment: 'Thinks about it' })
    expect(saved.status, saved.text).toBe(200)
    const first: number = saved.body.version
    expect(await seenRequest(scene, request.id)).toMatchObject({ state: 'begun' })
    const other = await put(scene.asCarer, path, 0, { answers: someAnswers(), comment: null })
    expect([other.status, other.body.code]).toEqual([409, 'stale'])
    expect(other.body.current).toMatchObject({ version: first, answers: half, comment: 'Thinks about it' })
    expect((await scene.asCarer.put(path).send({ answers: half, comment: null })).status).toBe(428)

    const full = await put(scene.asCarer, path, first, { answers: someAnswers(), comment: null })
    const second: number = full.body.version
    expect(second).toBeGreaterThan(first)
    expect((await send(scene.asCarer, path, first)).body.code).toBe('stale')
    expect((await send(scene.asCarer, path, second)).status).toBe(204)
    expect((await send(scene.asCarer, path, second)).status).toBe(410)
    expect((await put(scene.asCarer, path, second, { answers: half, comment: null })).status).toBe(410)
    const [stored] = await storedResponses(scene.child.id)
    expect(stored).toMatchObject({
      informant: 'guardian',
      guardianId: scene.mother.id,
      startedById: scene.carer.id,
      lockedById: scene.carer.id,
      requestId: request.id,
    })
    expect(stored?.lockedAt).not.toBeNull()
    expect(fromJson<FormScore>(stored?.score as string).quotient).toBe(-100)
    expect(await seenRequest(scene, request.id)).toMatchObject({ state: 'answered', answerId: stored?.id })
    expect(await tasksOf(scene.child)).toContainEqual({ kind: 'answers_back', assigneeId: scene.holder.id })
    await expect(
      database().query('UPDATE questionnaire_responses SET comment = ? WHERE id = ?', ['later', stored?.id]),
    ).rejects.toThrow(/locked/)
  })

  it('does not exist for another carer of the same child, a teacher, or a carer of another child', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const father = await buildUser('guardian')
    await buildGuardian(scene.child, father, { relation: 'father' })
    const asFather = await signedInAs(father)
    const stranger = await askingScene()
    const path = ownPage(scene.child, request.id)
    for (const [who, at] of [
      [asFather, path],
      [stranger.asCarer, path],
      [scene.asCarer, ownPage(stranger.child, request.id)],
      [scene.asTeacher, pupilPage(scene.child, request.id)],
    ] as const) {
      expect((await who.get(at)).status).toBe(404)
      expect((await put(who, at, 0, { answers: someAnswers(), comment: null })).status).toBe(404)
      expect((await send(who, at, 0)).status).toBe(404)
    }
    expect((await asFather.get('/api/my/to-answer')).body).toEqual([])
    expect(await storedResponses(scene.child.id)).toEqual([])
  })

  it('lets a teacher answer on their own page, which holds nothing a carer answered', async () => {
    const scene = await askingScene()
    const mothers = await askMother(scene)
    const canary = 'Larkspurword only her mother wrote'
    await put(scene.asCarer, ownPage(scene.child, mothers.id), 0, {
      answers: someAnswers(),
      comment: canary,
    })
    const request = await askTeacher(scene)
    const [mail] = await mailsTo(scene.teacher.email)
    const path = `/classes/${scene.schoolClass.id}/pupils/${scene.child.id}/answer/${request.id}`
    expect(mail?.text).toContain(path)
    const lines = await scene.asTeacher.get('/api/pupils/to-answer')
    expect(lines.body).toHaveLength(1)
    const page = await scene.asTeacher.get(pupilPage(scene.child, request.id))
    expect(page.status).toBe(200)
    expect(page.text + lines.text).not.toContain(canary)
    const at = pupilPage(scene.child, request.id)
    await saveAndSend(scene.asTeacher, at, { answers: someAnswers(), comment: 'Seen in class' })
    const seen = await scene.asCarer.get(ownPage(scene.child, mothers.id))
    expect(seen.text).not.toContain('Seen in class')
    expect((await storedResponses(scene.child.id)).map(({ informant }) => informant).sort()).toEqual([
      'guardian',
      'teacher',
    ])
  })

  it('closes to a teacher the moment the family takes back that school tells what it sees', async () => {
    const scene = await askingScene()
    await giveConsent(scene.child, 'share_school_seating', scene.holder)
    const request = await askTeacher(scene)
    const [consent] = (await database().query(
      "SELECT id FROM consents WHERE childId = ? AND purpose = 'share_school_observation'",
      [scene.child.id],
    )) as { id: string }[]
    await giveConsent(scene.child, 'share_school_observation', scene.holder, {
      kind: 'withdrawn',
      withdrawsId: consent?.id,
    })
    expect((await scene.asTeacher.get(pupilPage(scene.child, request.id))).status).toBe(404)
    expect((await scene.asTeacher.get('/api/pupils/to-answer')).body).toEqual([])
  })

  it('closes when consent to assessment is withdrawn', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const [consent] = (await database().query(
      "SELECT id FROM consents WHERE childId = ? AND purpose = 'assessment_treatment'",
      [scene.child.id],
    )) as { id: string }[]
    await giveConsent(scene.child, 'assessment_treatment', scene.holder, {
      kind: 'withdrawn',
      withdrawsId: consent?.id,
    })
    const path = ownPage(scene.child, request.id)
    expect((await scene.asCarer.get(path)).status).toBe(410)
    expect((await put(scene.asCarer, path, 0, { answers: someAnswers(), comment: null })).status).toBe(410)
  })

  it('names what is wrong with answers of another form, and keeps nothing of it', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const path = ownPage(scene.child, request.id)
    const wrong = async (body: object) => (await put(scene.asCarer, path, 0, body)).body.fields
    expect(await wrong({ answers: { ...someAnswers(), juggles: 'left' }, comment: null })).toHaveProperty([
      'answers.juggles',
    ])
    expect(
      await wrong({ answers: { ...someAnswers(), scissors: 'sometimes' }, comment: null }),
    ).toHaveProperty(['answers.scissors'])
    expect(await wrong({ answers: [], comment: null })).toHaveProperty('answers')
    expect(await wrong({})).toHaveProperty('answers')
    expect(await wrong({ answers: someAnswers(), comment: null, more: 1 })).toBeTruthy()
    expect((await send(scene.asCarer, path, 0)).status).toBe(422)
    expect(await storedResponses(scene.child.id)).toEqual([])
  })

  it('completes on an edition that was retired after answering had begun', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const path = ownPage(scene.child, request.id)
    const begun = await put(scene.asCarer, path, 0, { answers: someAnswers(), comment: null })
    await database().query('UPDATE questionnaire_forms SET retiredAt = ? WHERE id = ?', [new Date(), formId])
    try {
      expect((await scene.asCarer.get(path)).body.form.retiredAt).not.toBeNull()
      const done = { answers: someAnswers(), comment: 'Done' }
      await saveAndSend(scene.asCarer, path, done, begun.body.version)
      const again = await scene.therapist
        .post(requestsPath(scene.child))
        .send(asked({ guardianId: scene.grandfather.id, byLink: true }))
      expect(again.body.fields).toHaveProperty('formId')
    } finally {
      await database().query('UPDATE questionnaire_forms SET retiredAt = NULL WHERE id = ?', [formId])
    }
  })

  it('keeps one of two first saves that arrive together, and tells the other', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const path = ownPage(scene.child, request.id)
    const answers = await Promise.all(
      ['phone', 'tablet'].map((comment) => put(scene.asCarer, path, 0, { answers: someAnswers(), comment })),
    )
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(await storedResponses(scene.child.id)).toHaveLength(1)
  })
})

describe('a history answered at home', () => {
  it('raises a same-day sign at once, with words for the family, and is closed when sent', async () => {
    const scene = await askingScene()
    const request = await ask(scene, { asks: 'history', guardianId: scene.mother.id })
    const path = ownPage(scene.child, request.id)
    const history = { ...emptyHistory, handChanged: 'yes', newWeakness: 'yes', faceDroop: 'yes' }
    const saved = await put(scene.asCarer, path, 0, { history })
    expect(saved.status, saved.text).toBe(200)
    expect(saved.body.urgent.length).toBeGreaterThan(0)
    const alerts = await database().query('SELECT urgency FROM alerts WHERE childId = ?', [scene.child.id])
    expect(alerts).toContainEqual({ urgency: 'same_day' })
    expect((await send(scene.asCarer, path, saved.body.version)).body.fields).toHaveProperty([
      'history.enjoys',
    ])
    const done = await put(scene.asCarer, path, saved.body.version, {
      history: { ...history, enjoys: 'Building bridges of blocks' },
    })
    expect((await send(scene.asCarer, path, done.body.version)).status).toBe(204)
    const [stored] = await database().query('SELECT lockedAt, informant FROM histories WHERE childId = ?', [
      scene.child.id,
    ])
    expect(stored.informant).toBe('guardian')
    expect(stored.lockedAt).not.toBeNull()
    const trail = await database().query(
      `SELECT action, relation, actorId FROM audit_entries
       WHERE childId = ? AND (action LIKE 'history.%' OR action IN ('answerRequest.saved', 'answerRequest.answered'))
       ORDER BY position`,
      [scene.child.id],
    )
    expect(trail).toEqual(
      ['answerRequest.saved', 'answerRequest.saved', 'history.locked', 'answerRequest.answered'].map(
        (action) => ({
          action,
          relation: 'guardian',
          actorId: scene.carer.id,
        }),
      ),
    )
  })
})

it('an unknown child’s request list stays closed', async () => {
  const scene = await askingScene()
  const other = await buildChild()
  await askByLink(scene)
  expect((await scene.therapist.get(requestsPath(other))).status).toBe(404)
})
