import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import type { AccessPage } from '../../shared/auditEntries.ts'
import { guardianSchema } from '../../shared/guardians.ts'
import { emptyHistory } from '../../shared/histories.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { hashToken } from '../../server/services/accounts.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import {
  aDayPasses,
  asked,
  askByLink,
  askingScene,
  birthDate,
  byLink,
  linkToken,
  requestsPath,
  seenRequest,
  someAnswers,
  tasksOf,
} from '../support/answers.ts'
import { buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { startMail } from '../support/mail.ts'

beforeAll(startApp)
afterAll(stopApp)
// Everybody in these tests calls from one address, which may try so often a minute.
afterEach(async () => {
  setClock(() => new Date())
  await database().query('UPDATE throttles SET failures = 0, blockedUntil = NULL')
})

const linkScene = async () => {
  const scene = await askingScene()
  const request = await askByLink(scene)
  const email = scene.grandfather.email ?? ''
  return { ...scene, request, email, token: await linkToken(email) }
}
const answers = () => ({ answers: someAnswers(), comment: null })
const draft = (given: object) => ({ ...answers(), ...given })
type LinkScene = Awaited<ReturnType<typeof linkScene>>

/** Saves by the link and answers the version to go on from. */
const saved = async (scene: LinkScene, given: object = {}): Promise<number> => {
  const response = await byLink.save(scene.token, 0, draft(given))
  expect(response.status, response.text).toBe(200)
  return response.body.version
}

/** What the answers of a family left in the trail, apart from what the clinic did. */
const trailOf = ({ child }: Pick<LinkScene, 'child'>) =>
  database().query(
    `SELECT action, result, actorId, relation FROM audit_entries
     WHERE childId = ? AND (action LIKE 'answerLink.%' OR action LIKE 'history.%' OR action LIKE 'questionnaire.%'
       OR action LIKE 'alert.%')
     ORDER BY position`,
    [child.id],
  ) as Promise<{ action: string; result: string; actorId: string | null; relation: string | null }[]>

/** Words that a refusal may not hold. */
const tells = (scene: LinkScene, text: string) =>
  [scene.child.givenName, scene.child.familyName, scene.grandfather.name, birthDate, scene.child.id].filter(
    (word) => text.includes(word),
  )

describe('a link', () => {
  it('stands in the fragment of the configured address, and only its hash is stored', async () => {
    const scene = await linkScene()
    expect(scene.token).toMatch(/^[A-Za-z0-9_-]{43}$/)
    const [row] = await database().query(
      'SELECT tokenHash, expiresAt, askedAt FROM answer_requests WHERE id = ?',
      [scene.request.id],
    )
    expect(row.tokenHash.equals(hashToken(scene.token))).toBe(true)
    expect(row.expiresAt.getTime() - row.askedAt.getTime()).toBe(28 * 86_400_000)
    const [dump] = await database().query(
      'SELECT COUNT(*) AS n FROM answer_requests WHERE CAST(tokenHash AS CHAR) LIKE ?',
      [`%${scene.token}%`],
    )
    expect(Number(dump.n)).toBe(0)
  })

  it('is in no row of the outbox once its e-mail was delivered, withdrawn or replaced', async () => {
    const delivered = await linkScene()
    const withdrawn = await linkScene()
    const replaced = await linkScene()
    const cancel = await withdrawn.therapist
      .post(requestsPath(withdrawn.child, `/${withdrawn.request.id}/cancel`))
      .set('If-Match', `"${withdrawn.request.version}"`)
      .send({})
    expect(cancel.status).toBe(204)
    await database().query('UPDATE answer_requests SET mailId = NULL WHERE id = ?', [replaced.request.id])
    const mail = await startMail()
    try {
      await mail.deliver()
      expect((await mail.messages(delivered.email))[0]?.text).toContain(delivered.token)
      expect(await mail.messages(withdrawn.email)).toEqual([])
      expect(await mail.messages(replaced.email)).toEqual([])
    } finally {
      await mail.stop()
    }
    for (const { email } of [delivered, withdrawn, replaced]) {
      const rows = await database().query(
        'SELECT LENGTH(mime) AS bytes FROM outbox_messages WHERE recipient = ?',
        [email],
      )
      expect(rows.map(({ bytes }: { bytes: unknown }) => Number(bytes))).toEqual([0])
    }
    expect((await byLink.open(delivered.token)).status).toBe(200)
  })

  it('opens as often as one likes, keeps answers, is sent once and then closed', async () => {
    const scene = await linkScene()
    for (let time = 0; time < 5; time += 1) expect((await byLink.open(scene.token)).status).toBe(200)
    const { body: page } = await byLink.open(scene.token)
    expect(page).toMatchObject({ version: 0, askedOf: 'Ambrose Tilling', asks: 'questionnaire' })
    const version = await saved(scene, { comment: 'Half way' })
    expect((await byLink.open(scene.token)).body.comment).toBe('Half way')
    const stale = await byLink.save(scene.token, 0, answers())
    expect([stale.status, stale.body.current.comment]).toEqual([409, 'Half way'])
    expect((await byLink.send(scene.token, version)).status).toBe(204)
    for (const again of [
      await byLink.open(scene.token),
      await byLink.save(scene.token, version, answers()),
      await byLink.send(scene.token, version),
    ]) {
      expect([again.status, again.body.code]).toEqual([410, 'link_ended'])
      expect(tells(scene, again.text)).toEqual([])
    }
    const [stored] = await database().query(
      'SELECT informant, guardianId, startedById, lockedById, lockedAt FROM questionnaire_responses WHERE requestId = ?',
      [scene.request.id],
    )
    expect(stored).toMatchObject({
      informant: 'guardian',
      guardianId: scene.grandfather.id,
      startedById: null,
      lockedById: null,
    })
    expect(stored.lockedAt).not.toBeNull()
    expect(await seenRequest(scene, scene.request.id)).toMatchObject({ state: 'answered', byLink: true })
    expect(await tasksOf(scene.child)).toContainEqual({ kind: 'answers_back', assigneeId: scene.holder.id })
  })

  it('keeps the comment when a save names none, and takes it away when told to', async () => {
    const scene = await linkScene()
    const first = await saved(scene, { comment: 'Half way' })
    const second = await byLink.save(scene.token, first, { answers: someAnswers() })
    expect([second.status, second.body.comment]).toEqual([200, 'Half way'])
    const third = await byLink.save(scene.token, second.body.version, answers())
    expect([third.status, third.body.comment]).toEqual([200, null])
  })

  it('takes one of twenty sends that arrive together: one 204, nineteen 410', async () => {
    const scene = await linkScene()
    const version = await saved(scene)
    const all = await Promise.all(Array.from({ length: 20 }, () => byLink.send(scene.token, version)))
    const statuses = all.map(({ status }) => status).sort()
    expect(statuses).toEqual([204, ...Array.from({ length: 19 }, () => 410)])
    expect((await tasksOf(scene.child)).filter(({ kind }) => kind === 'answers_back')).toHaveLength(1)
  })

  it('takes one of twenty sends of a history that arrive together', async () => {
    const scene = await askingScene()
    await askByLink(scene, { asks: 'history' })
    const token = await linkToken(scene.grandfather.email ?? '')
    const history = { ...emptyHistory, enjoys: 'Digging in the garden' }
    const saved = await byLink.save(token, 0, { history })
    expect(saved.status, saved.text).toBe(200)
    const all = await Promise.all(Array.from({ length: 20 }, () => byLink.send(token, saved.body.version)))
    expect(all.map(({ status }) => status).sort()).toEqual([204, ...Array.from({ length: 19 }, () => 410)])
  })

  it('answers alike, and tells nothing, for a wrong birth date and for a link that never was', async () => {
    const scene = await linkScene()
    const wrong = await byLink.open(scene.token, '2018-05-05')
    const unknown = await byLink.open('a'.repeat(43))
    const without = ({ body }: typeof wrong) => ({ ...body, requestId: null })
    expect([wrong.status, unknown.status]).toEqual([410, 410])
    expect(without(wrong)).toEqual(without(unknown))
    expect(tells(scene, wrong.text)).toEqual([])
    expect((await byLink.open(scene.token)).status).toBe(200)
  })

  it('holds guesses at the birth date back after five, also when they come at once', async () => {
    const scene = await linkScene()
    const guesses = await Promise.all(
      Array.from({ length: 12 }, (_, day) => byLink.open(scene.token, `2017-03-${String(day + 10)}`)),
    )
    const statuses = guesses.map(({ status }) => status)
    expect(statuses.filter((status) => status === 410)).toHaveLength(6)
    expect(statuses.filter((status) => status === 429)).toHaveLength(6)
    expect(guesses.find(({ status }) => status === 429)?.headers['retry-after']).toBeTruthy()
    const right = await byLink.open(scene.token)
    expect(right.status).toBe(429)
    expect(tells(scene, right.text)).toEqual([])
    const later = new Date(Date.now() + 120_000)
    setClock(() => later)
    expect((await byLink.open(scene.token)).status).toBe(200)
  })

  it('gives the therapist a task after ten wrong birth dates, also over several links of one request', async () => {
    const scene = await linkScene()
    const guess = async (token: string, day: number) => {
      await database().query('UPDATE throttles SET failures = 0, blockedUntil = NULL')
      expect((await byLink.open(token, `2017-05-${day}`)).status).toBe(410)
    }
    for (const day of [10, 11, 12, 13]) await guess(scene.token, day)
    await aDayPasses(scene.request.id)
    await scene.therapist.post(requestsPath(scene.child, `/${scene.request.id}/remind`)).send({})
    const newer = await linkToken(scene.email)
    for (const day of [14, 15, 16, 17, 18]) await guess(newer, day)
    expect(await tasksOf(scene.child)).toEqual([])
    await guess(newer, 19)
    expect(await tasksOf(scene.child)).toEqual([{ kind: 'answer_link_guessed', assigneeId: scene.holder.id }])
    for (const day of [20, 21]) await guess(newer, day)
    expect(await tasksOf(scene.child)).toHaveLength(1)
  })

  it.each([
    ['corrected', { email: 'right@harrowmere.example' }, 'address'],
    ['removed', { email: null }, 'address'],
    ['marked as not safe to contact', { safeToContact: false }, 'contact'],
  ] as const)(
    'ends for good when the carer’s address is %s, and the list says so',
    async (_what, change, why) => {
      const scene = await linkScene()
      const path = `/api/children/${scene.child.id}/guardians/${scene.grandfather.id}`
      const { body: carers } = await scene.therapist.get(`/api/children/${scene.child.id}/guardians`)
      const carer = carers.find(({ id }: { id: string }) => id === scene.grandfather.id)
      const details = Object.fromEntries(
        Object.keys(guardianSchema.fields).map((field) => [field, carer[field] ?? null]),
      )
      const put = (body: object, version: number) =>
        scene.therapist.put(path).set('If-Match', `"${version}"`).send(body)
      // Another change leaves the link alone.
      const renamed = await put({ ...details, phone: '01632 960 111' }, carer.version)
      expect(renamed.status, renamed.text).toBe(200)
      expect((await byLink.open(scene.token)).status).toBe(200)
      const changed = await put({ ...details, ...change }, renamed.body.version)
      expect(changed.status, changed.text).toBe(200)
      expect((await byLink.open(scene.token)).status).toBe(410)
      expect(await seenRequest(scene, scene.request.id)).toMatchObject({
        state: 'cancelled',
        cancelledWhy: why,
        can: { remind: false },
      })
      const mails = await database().query(
        'SELECT state, LENGTH(mime) AS bytes FROM outbox_messages WHERE recipient = ?',
        [scene.email],
      )
      expect(
        mails.map(({ state, bytes }: { state: string; bytes: unknown }) => [state, Number(bytes)]),
      ).toEqual([['cancelled', 0]])
      const trail = await database().query(
        "SELECT action, relation FROM audit_entries WHERE objectId = ? AND action = 'answerRequest.link_ended'",
        [scene.request.id],
      )
      expect(trail).toEqual([{ action: 'answerRequest.link_ended', relation: 'assignedTherapist' }])
    },
  )

  it('stays ended when its carer was restricted and the restriction is lifted', async () => {
    const scene = await linkScene()
    const restrict = (who: Client, restricted: boolean) =>
      who
        .post(`/api/children/${scene.child.id}/guardians/${scene.grandfather.id}/restrict`)
        .send({ restricted, reason: 'Court order' })
    expect((await restrict(scene.therapist, true)).status).toBeLessThan(300)
    const lead = await signedInAs(await buildUser('clinicLead'))
    const lifted = await restrict(lead, false)
    expect(lifted.status, lifted.text).toBeLessThan(300)
    expect((await byLink.open(scene.token)).status).toBe(410)
    expect(await seenRequest(scene, scene.request.id)).toMatchObject({ cancelledWhy: 'contact' })
  })

  it('goes to an address that somebody confirmed, or to that of the carer’s own sign-in', async () => {
    const scene = await askingScene()
    const post = (given: object) =>
      scene.therapist.post(requestsPath(scene.child)).send({ ...asked({ byLink: true }), ...given })
    for (const addressConfirmed of [undefined, false]) {
      const refused = await post({ guardianId: scene.grandfather.id, addressConfirmed })
      expect(refused.status).toBe(422)
      expect(refused.body.fields).toHaveProperty('addressConfirmed')
    }
    expect((await post({ guardianId: scene.grandfather.id, addressConfirmed: true })).status).toBe(201)
    await database().query('UPDATE guardians SET email = ? WHERE id = ?', [
      scene.carer.email,
      scene.mother.id,
    ])
    expect((await post({ guardianId: scene.mother.id, addressConfirmed: undefined })).status).toBe(201)
  })

  it('gives no guesses back when the carer opens it in between', async () => {
    const scene = await linkScene()
    const guess = async (day: number) => (await byLink.open(scene.token, `2017-04-${day}`)).status
    for (const day of [10, 11, 12, 13, 14]) expect(await guess(day)).toBe(410)
    expect((await byLink.open(scene.token)).status).toBe(200)
    expect([await guess(15), await guess(16)]).toEqual([410, 429])
  })

  it.each([0, true, [], {}, null])('answers 422 when the token is %j', async (token) => {
    for (const call of [
      client().post('/api/answer-links/open').send({ token, birthDate }),
      client()
        .put('/api/answer-links')
        .send({ token, birthDate, version: 0, ...answers() }),
      client().post('/api/answer-links/send').send({ token, birthDate, version: 0 }),
    ])
      expect((await call).status).toBe(422)
  })

  it('refuses a body that is not JSON and a request from another site', async () => {
    const scene = await linkScene()
    const body = { token: scene.token, birthDate }
    expect(
      (await client().post('/api/answer-links/open').set('Sec-Fetch-Site', 'cross-site').send(body)).status,
    ).toBe(403)
    expect((await client().post('/api/answer-links/open').type('form').send(body)).status).toBe(415)
  })

  it('does not open in a browser where somebody else is signed in; the carer themself may be', async () => {
    const scene = await linkScene()
    for (const other of [scene.asCarer, scene.therapist, scene.asTeacher])
      expect((await byLink.open(scene.token, birthDate, other)).status).toBe(410)
    const mothers = await askByLink(scene, { guardianId: scene.mother.id })
    const token = await linkToken(scene.carer.email)
    expect((await byLink.open(token, birthDate, scene.asCarer)).body.requestId).toBe(mothers.id)
    expect((await byLink.open(token, birthDate, scene.therapist)).status).toBe(410)
  })

  it.each([
    [
      'withdrawn',
      async (scene: LinkScene) =>
        scene.therapist
          .post(requestsPath(scene.child, `/${scene.request.id}/cancel`))
          .set('If-Match', `"${scene.request.version}"`)
          .send({}),
    ],
    [
      '28 days old',
      async () => {
        const later = new Date(Date.now() + 28 * 86_400_000 + 1)
        setClock(() => later)
      },
    ],
    [
      'of a carer who was restricted',
      async (scene: LinkScene) =>
        database().query('UPDATE guardians SET restricted = 1 WHERE id = ?', [scene.grandfather.id]),
    ],
    [
      'of a carer whom it is no longer safe to contact',
      async (scene: LinkScene) =>
        database().query('UPDATE guardians SET safeToContact = 0 WHERE id = ?', [scene.grandfather.id]),
    ],
    [
      'of a carer whose link ended',
      async (scene: LinkScene) =>
        database().query('UPDATE guardians SET endedAt = ? WHERE id = ?', [
          new Date('2026-01-01'),
          scene.grandfather.id,
        ]),
    ],
    [
      'of a child who is of age now',
      async (scene: LinkScene) =>
        database().query('UPDATE children SET birthDate = ? WHERE id = ?', ['2005-05-04', scene.child.id]),
    ],
    [
      'of a family that takes back consent',
      async (scene: LinkScene) => {
        const [given] = await database().query(
          "SELECT id FROM consents WHERE childId = ? AND purpose = 'assessment_treatment'",
          [scene.child.id],
        )
        await giveConsent(scene.child, 'assessment_treatment', scene.holder, {
          kind: 'withdrawn',
          withdrawsId: given.id,
        })
      },
    ],
  ])('answers 410 and shows nothing when it is %s', async (_what, change) => {
    const scene = await linkScene()
    await change(scene)
    const [{ birthDate: born }] = await database().query('SELECT birthDate FROM children WHERE id = ?', [
      scene.child.id,
    ])
    for (const answer of [
      await byLink.open(scene.token, born),
      await client()
        .put('/api/answer-links')
        .send({ token: scene.token, birthDate: born, version: 0, ...answers() }),
      await client().post('/api/answer-links/send').send({ token: scene.token, birthDate: born, version: 0 }),
    ]) {
      expect([answer.status, answer.body.code]).toEqual([410, 'link_ended'])
      expect(tells(scene, answer.text)).toEqual([])
    }
    const [row] = await database().query(
      'SELECT COUNT(*) AS n FROM questionnaire_responses WHERE requestId = ?',
      [scene.request.id],
    )
    expect(Number(row.n)).toBe(0)
  })

  it('is replaced by the one of a reminder, and keeps what was answered', async () => {
    const scene = await linkScene()
    const version = await saved(scene, { comment: 'Half way' })
    await aDayPasses(scene.request.id)
    const remind = await scene.therapist
      .post(requestsPath(scene.child, `/${scene.request.id}/remind`))
      .send({})
    expect(remind.status).toBe(204)
    expect((await byLink.open(scene.token)).status).toBe(410)
    const token = await linkToken(scene.email)
    expect((await byLink.open(token)).body).toMatchObject({ comment: 'Half way', version })
  })

  it('leaves a trail without a name: opened, saved, sent and refused, under the child', async () => {
    const scene = await linkScene()
    await byLink.open(scene.token)
    await byLink.open(scene.token, '2011-01-01')
    await byLink.send(scene.token, await saved(scene))
    expect(await trailOf(scene)).toEqual([
      { action: 'answerLink.opened', result: 'allowed', actorId: null, relation: 'guardian' },
      { action: 'answerLink.refused', result: 'denied', actorId: null, relation: null },
      { action: 'answerLink.saved', result: 'allowed', actorId: null, relation: 'guardian' },
      { action: 'questionnaire.locked', result: 'allowed', actorId: null, relation: 'guardian' },
      { action: 'answerLink.sent', result: 'allowed', actorId: null, relation: 'guardian' },
    ])
  })

  it('leaves one entry for each save of a history, beside the signs it raises, and says who answered', async () => {
    const scene = await askingScene()
    await askByLink(scene, { asks: 'history' })
    const token = await linkToken(scene.grandfather.email ?? '')
    const history = { ...emptyHistory, enjoys: 'Digging in the garden', dropsThings: 'yes' as const }
    const first = await byLink.save(token, 0, { history })
    const second = await byLink.save(token, first.body.version, { history })
    expect((await byLink.send(token, second.body.version)).status).toBe(204)
    expect((await trailOf(scene)).map(({ action }) => action)).toEqual([
      'alert.raised',
      'answerLink.saved',
      'answerLink.saved',
      'history.locked',
      'answerLink.sent',
    ])
    const seen = await scene.therapist.get(`/api/children/${scene.child.id}/access-history?size=100`)
    const lines = (seen.body as AccessPage).rows.map(({ who, action }) => `${who} · ${action}`)
    expect(lines).toContain('Parent or carer, by e-mail link · Questions by e-mail link: saved')
    expect(lines).toContain('Parent or carer, by e-mail link · History: signed or sent')
    // The mother sees nothing of what another carer did.
    const { body: hers } = await scene.asCarer.get(`/api/children/${scene.child.id}/access-history?size=100`)
    expect((hers as AccessPage).rows.map(({ who }) => who)).not.toContain('Parent or carer, by e-mail link')
    expect((hers as AccessPage).rows.length).toBeGreaterThan(0)
  })

  it('of one child opens nothing of another, even with that child’s birth date', async () => {
    const scene = await linkScene()
    const other = await linkScene()
    await database().query('UPDATE children SET birthDate = ? WHERE id = ?', ['2017-07-07', other.child.id])
    expect((await byLink.open(scene.token, '2017-07-07')).status).toBe(410)
    const second = await buildGuardian(scene.child, null, { email: 'second@harrowmere.example' })
    await askByLink(scene, { guardianId: second.id })
    const token = await linkToken('second@harrowmere.example')
    await byLink.save(scene.token, 0, draft({ comment: 'Only the grandfather wrote this' }))
    expect((await byLink.open(token)).text).not.toContain('Only the grandfather')
  })

  it('does not open for somebody signed in with an account that a page was not made for', async () => {
    const scene = await linkScene()
    const cookie = scene.asCarer.cookie
    const refused = await byLink.open(scene.token, birthDate, client('none', cookie))
    expect(refused.status).toBe(410)
    expect((await signedInAs(scene.carer)).userId).toBe(scene.carer.id)
  })
})
