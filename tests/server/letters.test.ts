import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { database } from '../../server/dataSource.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { approvedLetter, letterScene, queuedLetter, readyText } from '../support/letters.ts'

beforeAll(startApp)
afterAll(stopApp)

const outboxOf = (recipient: string) =>
  database().query(
    'SELECT state, kind, messageId, CONVERT(mime USING utf8mb4) AS mime FROM outbox_messages WHERE recipient = ?',
    [recipient],
  )

describe('a progress letter', () => {
  it('is assembled from the record with the source of each fact, and gaps where the record has nothing', async () => {
    const { as, base } = await letterScene()
    const response = await as.post(base).send({ kind: 'progress' })
    expect(response.status).toBe(201)
    expect(response.body.state).toBe('draft')
    const strengths = response.body.sections.find((section: { id: string }) => section.id === 'strengths')
    expect(strengths.text).toContain('Builds tall towers.')
    expect(response.body.facts).toContainEqual(
      expect.objectContaining({
        section: 'strengths',
        text: 'Tells good jokes',
        source: expect.stringContaining('At a glance'),
      }),
    )
    expect(
      response.body.checks.findings.some((finding: { level: string }) => finding.level === 'blocked'),
    ).toBe(true)
  })

  it('cannot be approved while a blocked phrase stands in it', async () => {
    const { as, base } = await letterScene()
    const { body: letter } = await as.post(base).send({ kind: 'progress' })
    const sections = readyText.sections.map((section) =>
      section.id === 'changes' ? { ...section, text: 'Wrenna still writes with the wrong hand.' } : section,
    )
    const { body: changed } = await as
      .put(`${base}/${letter.id}`)
      .set('If-Match', `"${letter.version}"`)
      .send({ ...readyText, sections })
    const refused = await as
      .post(`${base}/${letter.id}/approve`)
      .set('If-Match', `"${changed.version}"`)
      .send({ overrides: [{ phrase: 'wrong hand', reason: 'I want it so' }] })
    expect(refused.status).toBe(422)
    expect(JSON.stringify(refused.body.fields)).toContain('wrong hand')
  })

  it('keeps text, PDF and hash of what was approved, and refuses a later change of the text', async () => {
    const scene = await letterScene()
    const letter = await approvedLetter(scene)
    const pdf = await scene.as
      .get(`${scene.base}/${letter.id}/pdf`)
      .buffer(true)
      .parse((res, done) => {
        const parts: Buffer[] = []
        res.on('data', (part: Buffer) => parts.push(part))
        res.on('end', () => done(null, Buffer.concat(parts)))
      })
    expect(pdf.headers['content-type']).toBe('application/pdf')
    expect(
      createHash('sha256')
        .update(pdf.body as Buffer)
        .digest('hex'),
    ).toBe(letter.pdf?.sha256)
    const change = await scene.as
      .put(`${scene.base}/${letter.id}`)
      .set('If-Match', `"${letter.version}"`)
      .send(readyText)
    expect(change.status).toBe(409)
    await expect(
      database().query("UPDATE letters SET content = '{}' WHERE id = ?", [letter.id]),
    ).rejects.toThrow(/only a draft/)
    await expect(
      database().query('DELETE FROM letter_versions WHERE letterId = ?', [letter.id]),
    ).rejects.toThrow(/denied/)
  })

  it('of a newly qualified author waits for the lead, who approves or gives it back with what to change', async () => {
    const scene = await letterScene({ newlyQualified: true })
    const lead = await signedInAs(await buildUser('clinicLead'))
    const { body: letter } = await scene.as.post(scene.base).send({ kind: 'progress' })
    const { body: changed } = await scene.as
      .put(`${scene.base}/${letter.id}`)
      .set('If-Match', `"${letter.version}"`)
      .send(readyText)
    const own = await scene.as
      .post(`${scene.base}/${letter.id}/approve`)
      .set('If-Match', `"${changed.version}"`)
      .send({ overrides: [] })
    expect(own.status).toBe(409)
    const { body: submitted } = await scene.as
      .post(`${scene.base}/${letter.id}/submit`)
      .set('If-Match', `"${changed.version}"`)
      .send()
    expect(submitted.state).toBe('awaiting_approval')
    const { body: returned } = await lead
      .post(`${scene.base}/${letter.id}/return`)
      .set('If-Match', `"${submitted.version}"`)
      .send({ reason: 'Name the school’s part too' })
    expect(returned).toMatchObject({ state: 'draft', returnedReason: 'Name the school’s part too' })
    const { body: again } = await scene.as
      .post(`${scene.base}/${letter.id}/submit`)
      .set('If-Match', `"${returned.version}"`)
      .send()
    const approved = await lead
      .post(`${scene.base}/${letter.id}/approve`)
      .set('If-Match', `"${again.version}"`)
      .send({ overrides: [] })
    expect(approved.body.state).toBe('approved')
    expect(approved.body.approver).not.toBe(approved.body.author)
  })

  it('answers a stale save with what is stored, and one without a version with 428', async () => {
    const { as, base } = await letterScene()
    const { body: letter } = await as.post(base).send({ kind: 'progress' })
    await as.put(`${base}/${letter.id}`).set('If-Match', `"${letter.version}"`).send(readyText)
    const stale = await as
      .put(`${base}/${letter.id}`)
      .set('If-Match', `"${letter.version}"`)
      .send({ ...readyText, salutation: 'Hello' })
    expect(stale.status).toBe(409)
    expect(stale.body.current).toMatchObject({ salutation: 'Dear parent', version: letter.version + 1 })
    expect((await as.put(`${base}/${letter.id}`).send(readyText)).status).toBe(428)
  })
})

describe('who may', () => {
  it.each([
    ['another therapist', 'therapist', 404],
    ['an administrator', 'administrator', 404],
    ['a teacher', 'teacher', 404],
    ['somebody else’s carer', 'guardian', 404],
  ] as const)('%s finds no letter there', async (_who, role, status) => {
    const scene = await letterScene()
    const { body: letter } = await scene.as.post(scene.base).send({ kind: 'progress' })
    const other = await signedInAs(await buildUser(role))
    const absent = await other.get(`${scene.base}/00000000-0000-4000-8000-000000000000`)
    const real = await other.get(`${scene.base}/${letter.id}`)
    expect(real.status).toBe(status)
    expect({ ...real.body, requestId: '' }).toEqual({ ...absent.body, requestId: '' })
  })

  it('the lead reads a draft but does not write one', async () => {
    const scene = await letterScene()
    const { body: letter } = await scene.as.post(scene.base).send({ kind: 'progress' })
    const lead = await signedInAs(await buildUser('clinicLead'))
    expect((await lead.get(`${scene.base}/${letter.id}`)).status).toBe(200)
    expect(
      (await lead.put(`${scene.base}/${letter.id}`).set('If-Match', `"${letter.version}"`).send(readyText))
        .status,
    ).toBe(403)
  })

  it('a letter is not found under another child of the same therapist', async () => {
    const scene = await letterScene()
    const { body: letter } = await scene.as.post(scene.base).send({ kind: 'progress' })
    const sibling = await buildChild({ therapist: scene.therapist })
    expect((await scene.as.get(`/api/children/${sibling.id}/letters/${letter.id}`)).status).toBe(404)
  })
})

describe('sending', () => {
  it('queues one e-mail for each carer, in the act itself, without a name or clinical word in its head', async () => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    expect(letter.state).toBe('queued')
    const mails = await outboxOf(scene.guardianUser.email)
    expect(mails).toHaveLength(1)
    const [head] = mails[0].mime.split('\r\n\r\n')
    for (const word of ['Wrenna', scene.child.familyName, 'hand', 'therapy']) expect(head).not.toContain(word)
    expect(mails[0].mime).toContain(`/letter/${letter.deliveries[0]?.id}`)
  })

  it('happens once however often the button is pressed', async () => {
    const scene = await letterScene()
    const letter = await approvedLetter(scene)
    const press = () =>
      scene.as
        .post(`${scene.base}/${letter.id}/send`)
        .set('If-Match', `"${letter.version}"`)
        .send({ guardianIds: [scene.guardian.id] })
    const answers = await Promise.all([press(), press(), press()])
    expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409, 409])
    expect(await outboxOf(scene.guardianUser.email)).toHaveLength(1)
  })

  it.each([
    ['without consent to e-mail', { consent: false }, /No consent to e-mail/],
    ['who is restricted', { guardian: { restricted: true } }, /may not be written to/],
    ['whom it is not safe to contact', { guardian: { safeToContact: false } }, /not safe/],
    ['without an address', { guardian: { email: null } }, /No e-mail address/],
  ])('is refused to a carer %s', async (_what, setting, why) => {
    const scene = await letterScene()
    const letter = await approvedLetter(scene)
    const { consent = true, guardian = {} } = setting as { consent?: boolean; guardian?: object }
    const other = await buildGuardian(scene.child, await buildUser('guardian'), guardian)
    if (consent) await giveConsent(scene.child, 'email_link', scene.therapist, { guardianId: other.id })
    const refused = await scene.as
      .post(`${scene.base}/${letter.id}/send`)
      .set('If-Match', `"${letter.version}"`)
      .send({ guardianIds: [other.id] })
    expect(refused.status).toBe(422)
    expect(refused.body.fields.guardianIds).toMatch(why)
    const after = await scene.as.get(`${scene.base}/${letter.id}`)
    expect(after.body.state).toBe('approved')
  })

  it('refuses two carers who share one inbox', async () => {
    const scene = await letterScene()
    const letter = await approvedLetter(scene)
    const second = await buildGuardian(scene.child, await buildUser('guardian'), {
      email: scene.guardian.email,
    })
    await giveConsent(scene.child, 'email_link', scene.therapist, { guardianId: second.id })
    const refused = await scene.as
      .post(`${scene.base}/${letter.id}/send`)
      .set('If-Match', `"${letter.version}"`)
      .send({ guardianIds: [scene.guardian.id, second.id] })
    expect(refused.status).toBe(422)
    expect(refused.body.fields.guardianIds).toMatch(/share one e-mail address/)
  })

  it('refuses a carer of another child', async () => {
    const scene = await letterScene()
    const letter = await approvedLetter(scene)
    const stranger = await letterScene()
    const refused = await scene.as
      .post(`${scene.base}/${letter.id}/send`)
      .set('If-Match', `"${letter.version}"`)
      .send({ guardianIds: [stranger.guardian.id] })
    expect(refused.status).toBe(404)
  })

  it('can be recalled while the e-mail has not left', async () => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    const recalled = await scene.as
      .post(`${scene.base}/${letter.id}/recall`)
      .set('If-Match', `"${letter.version}"`)
      .send()
    expect(recalled.body).toMatchObject({ state: 'recalled', deliveries: [{ state: 'cancelled' }] })
    expect((await outboxOf(scene.guardianUser.email))[0].state).toBe('cancelled')
  })
})
