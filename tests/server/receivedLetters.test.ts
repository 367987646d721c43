import { createHash, randomUUID } from 'node:crypto'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { MyChildView } from '../../shared/family.ts'
import type { ReceivedLetter } from '../../shared/letters.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { Consent } from '../../server/entities/Consent.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { LetterDelivery } from '../../server/entities/LetterDelivery.ts'
import { LetterVersion } from '../../server/entities/LetterVersion.ts'
import { Task } from '../../server/entities/Task.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { approvedLetter, letterScene, queuedLetter, readyText, type LetterScene } from '../support/letters.ts'
import { startMail, type Mail } from '../support/mail.ts'

let mail: Mail
beforeAll(async () => {
  await startApp()
  mail = await startMail()
})
afterAll(async () => {
  await mail.stop()
  await stopApp()
})
afterEach(() => setClock(() => new Date()))

let scene: LetterScene
let carer: Client
beforeEach(async () => {
  scene = await letterScene()
  carer = await signedInAs(scene.guardianUser)
})

const deliveryOf = (letterId: string) => database().manager.findOneByOrFail(LetterDelivery, { letterId })
const childSeen = async (): Promise<MyChildView> =>
  (await carer.get(`/api/my/children/${scene.child.id}`)).body
const sentLetter = async () => {
  const letter = await queuedLetter(scene)
  await mail.deliver()
  const delivery = await deliveryOf(letter.id)
  expect(delivery.state).toBe('sent')
  return { ...letter, deliveryId: delivery.id, linkEndsAt: delivery.linkEndsAt }
}
const pdfFrom = (as: Client, letterId: string) =>
  as
    .get(`/api/my/letters/${letterId}/pdf`)
    .buffer(true)
    .parse((res, done) => {
      const parts: Buffer[] = []
      res.on('data', (part: Buffer) => parts.push(part))
      res.on('end', () => done(null, Buffer.concat(parts)))
    })
const entriesOf = (letterId: string): Promise<{ action: string; relation: string; actorId: string }[]> =>
  database().query(
    "SELECT action, relation, actorId FROM audit_entries WHERE objectId = ? AND relation = 'guardian' ORDER BY position",
    [letterId],
  )

describe('a letter on its way', () => {
  it('cannot be opened before it has left, and can as soon as it has', async () => {
    const letter = await queuedLetter(scene)
    const delivery = await deliveryOf(letter.id)
    const paths = [
      `/api/my/letters/${letter.id}`,
      `/api/my/letters/${letter.id}/pdf`,
      `/api/my/deliveries/${delivery.id}`,
    ]
    for (const path of paths) expect((await carer.get(path)).status).toBe(404)
    expect((await childSeen()).letters).toEqual([])
    await mail.deliver()
    for (const path of paths) expect((await carer.get(path)).status).toBe(200)
  })

  it('that is only a draft or approved does not exist for its carer', async () => {
    const { body: draft } = await scene.as.post(scene.base).send({ kind: 'progress' })
    const approved = await approvedLetter(scene)
    for (const { id } of [draft, approved])
      expect((await carer.get(`/api/my/letters/${id}`)).status).toBe(404)
  })
})

describe('a letter that arrived', () => {
  it('is read as text, first counted as new and then as read, with an entry for each reading', async () => {
    const letter = await sentLetter()
    const before = await carer.get('/api/my/children')
    expect(before.body).toMatchObject([{ id: scene.child.id, unreadLetters: 1 }])
    expect((await childSeen()).letters).toMatchObject([{ id: letter.id, kind: 'progress', openedAt: null }])

    const read = await carer.get(`/api/my/letters/${letter.id}`)
    expect(read.status).toBe(200)
    expect(Object.keys(read.body).toSorted()).toEqual([
      'author',
      'childId',
      'childName',
      'clinic',
      'id',
      'kind',
      'salutation',
      'sections',
      'sentAt',
    ])
    expect(read.body as ReceivedLetter).toMatchObject({
      childName: `Wrenna ${scene.child.familyName}`,
      author: scene.therapist.displayName,
      salutation: readyText.salutation,
      sections: readyText.sections,
    })
    const { openedAt } = await deliveryOf(letter.id)
    expect(openedAt).not.toBeNull()

    await carer.get(`/api/my/letters/${letter.id}`)
    expect(await deliveryOf(letter.id)).toMatchObject({ state: 'opened', openedAt })
    expect((await childSeen()).letters[0]?.openedAt).toBe(openedAt?.toISOString())
    expect((await carer.get('/api/my/children')).body).toMatchObject([{ unreadLetters: 0 }])
    expect(await entriesOf(letter.id)).toEqual([
      { action: 'letter.opened', relation: 'guardian', actorId: scene.guardianUser.id },
      { action: 'letter.read', relation: 'guardian', actorId: scene.guardianUser.id },
    ])
    const shownToStaff = await scene.as.get(`${scene.base}/${letter.id}`)
    expect(shownToStaff.body.deliveries).toMatchObject([
      { state: 'opened', openedAt: openedAt?.toISOString() },
    ])
  })

  it('comes from what was approved, not from the text of the letter row', async () => {
    const letter = await sentLetter()
    const delivery = await deliveryOf(letter.id)
    const approved = await database().manager.findOneByOrFail(LetterVersion, { id: delivery.letterVersionId })
    const version = {
      ...approved,
      id: randomUUID(),
      content: { ...approved.content, salutation: 'Dear reader of what was approved' },
      pdf: Buffer.from('%PDF-1.7 as approved'),
    }
    await database().manager.insert(LetterVersion, version)
    await database().manager.update(LetterDelivery, { id: delivery.id }, { letterVersionId: version.id })
    expect((await carer.get(`/api/my/letters/${letter.id}`)).body.salutation).toBe(
      'Dear reader of what was approved',
    )
    expect((await pdfFrom(carer, letter.id)).body).toEqual(version.pdf)
  })

  it('leaves out headings that nothing follows, as the print does', async () => {
    const letter = await sentLetter()
    const delivery = await deliveryOf(letter.id)
    const approved = await database().manager.findOneByOrFail(LetterVersion, { id: delivery.letterVersionId })
    const [first] = approved.content.sections
    const version = {
      ...approved,
      id: randomUUID(),
      content: {
        ...approved.content,
        sections: [first, { id: 'work' as const, heading: 'Empty', text: ' \n' }].filter(
          (part) => part !== undefined,
        ),
      },
      pdf: Buffer.from('%PDF'),
    }
    await database().manager.insert(LetterVersion, version)
    await database().manager.update(LetterDelivery, { id: delivery.id }, { letterVersionId: version.id })
    expect((await carer.get(`/api/my/letters/${letter.id}`)).body.sections).toEqual([first])
  })

  it('gives the PDF byte for byte as approved, shown in place, under a name that says nothing', async () => {
    const letter = await sentLetter()
    const pdf = await pdfFrom(carer, letter.id)
    expect(pdf.headers['content-type']).toBe('application/pdf')
    expect(pdf.headers['content-disposition']).toBe('attachment; filename="letter.pdf"')
    expect(
      createHash('sha256')
        .update(pdf.body as Buffer)
        .digest('hex'),
    ).toBe(letter.pdf?.sha256)
    expect((await deliveryOf(letter.id)).state).toBe('opened')
  })

  it('that came as an attachment is under the child’s page too', async () => {
    await giveConsent(scene.child, 'email_attachment', scene.therapist, { guardianId: scene.guardian.id })
    const letter = await sentLetter()
    expect((await deliveryOf(letter.id)).channel).toBe('attachment')
    expect((await carer.get(`/api/my/letters/${letter.id}`)).status).toBe(200)
  })

  it('does not exist for anybody else: other carer, stranger, absent id alike; staff have their own way', async () => {
    const letter = await sentLetter()
    const other = await buildUser('guardian')
    await buildGuardian(scene.child, other, { relation: 'father' })
    const stranger = await buildUser('guardian')
    const paths = (letterId: string, deliveryId: string) => [
      `/api/my/letters/${letterId}`,
      `/api/my/letters/${letterId}/pdf`,
      `/api/my/deliveries/${deliveryId}`,
    ]
    const absent = await Promise.all(paths(randomUUID(), randomUUID()).map((path) => carer.get(path)))
    for (const as of [await signedInAs(other), await signedInAs(stranger)]) {
      const refused = await Promise.all(paths(letter.id, letter.deliveryId).map((path) => as.get(path)))
      expect(refused.map(({ status }) => status)).toEqual([404, 404, 404])
      expect(refused.map(({ body }) => ({ ...body, requestId: '' }))).toEqual(
        absent.map(({ body }) => ({ ...body, requestId: '' })),
      )
    }
    for (const path of paths(letter.id, letter.deliveryId))
      expect((await scene.as.get(path)).status).toBe(403)
    for (const path of paths('x', "' OR 1=1")) expect((await carer.get(path)).status).toBe(404)
    expect((await deliveryOf(letter.id)).state).toBe('sent')
  })

  it('carries nothing of the other household', async () => {
    const letter = await sentLetter()
    const other = await buildUser('guardian', { displayName: 'Falk Otherhome' })
    await buildGuardian(scene.child, other, { phone: '0161 496 0777', address: '12 Canary Wharf Lane' })
    const read = await carer.get(`/api/my/letters/${letter.id}`)
    for (const canary of ['Otherhome', '0161 496 0777', 'Canary', other.email])
      expect(read.text).not.toContain(canary)
  })
})

describe('the link of the e-mail', () => {
  it('names the letter and the child until its fourteen days are over, to the millisecond', async () => {
    const letter = await sentLetter()
    // 14 × 24 hours after queueing: the duty of the e-mail's own words.
    const delivery = await deliveryOf(letter.id)
    expect(delivery.linkEndsAt.getTime() - delivery.createdAt.getTime()).toBe(14 * 86_400_000)
    const path = `/api/my/deliveries/${letter.deliveryId}`
    expect((await carer.get(path)).body).toEqual({ letterId: letter.id, childId: scene.child.id })

    const signIn = async (moment: number) => {
      setClock(() => new Date(moment))
      return signedInAs(scene.guardianUser)
    }
    const end = delivery.linkEndsAt.getTime()
    expect((await (await signIn(end - 1)).get(path)).status).toBe(200)
    const later = await signIn(end)
    const over = await later.get(path)
    expect([over.status, over.body.code]).toEqual([410, 'link_ended'])
    expect((await later.get(`/api/my/letters/${letter.id}`)).status).toBe(200)
  })

  it('has ended once the letter was recalled', async () => {
    const letter = await queuedLetter(scene)
    const { id } = await deliveryOf(letter.id)
    const recalled = await scene.as
      .post(`${scene.base}/${letter.id}/recall`)
      .set('If-Match', `"${letter.version}"`)
      .send()
    expect(recalled.status).toBe(200)
    expect((await carer.get(`/api/my/deliveries/${id}`)).status).toBe(410)
    expect((await carer.get(`/api/my/letters/${letter.id}`)).status).toBe(404)
    expect((await childSeen()).letters).toEqual([])
  })

  it('has ended, and the letter with it, when it was recalled while the e-mail was being handed over', async () => {
    const letter = await queuedLetter(scene)
    const { id, outboxMessageId } = await deliveryOf(letter.id)
    // As the sender marks a message it has in hand, and as it settles one that went through.
    await database().query("UPDATE outbox_messages SET state = 'sending' WHERE id = ?", [outboxMessageId])
    const recalled = await scene.as
      .post(`${scene.base}/${letter.id}/recall`)
      .set('If-Match', `"${letter.version}"`)
      .send()
    expect(recalled.body.deliveries).toMatchObject([{ state: 'queued' }])
    await database().query("UPDATE outbox_messages SET state = 'sent', sentAt = NOW(6) WHERE id = ?", [
      outboxMessageId,
    ])
    await database().manager.update(LetterDelivery, { id }, { state: 'sent' })
    expect((await carer.get(`/api/my/letters/${letter.id}`)).status).toBe(404)
    expect((await carer.get(`/api/my/letters/${letter.id}/pdf`)).status).toBe(404)
    expect((await carer.get(`/api/my/deliveries/${id}`)).status).toBe(410)
    expect((await childSeen()).letters).toEqual([])
    expect((await carer.get('/api/my/children')).body).toMatchObject([{ unreadLetters: 0 }])
  })

  it.each<[string, Partial<Guardian>]>([
    ['restricted', { restricted: true }],
    ['ended', { endedAt: new Date(0) }],
    ['unverified', { verifiedAt: null }],
  ])('does not exist for a carer who is %s, even when it is over', async (_what, change) => {
    const letter = await sentLetter()
    await database().manager.update(Guardian, { id: scene.guardian.id }, change)
    const path = `/api/my/deliveries/${letter.deliveryId}`
    expect((await carer.get(path)).status).toBe(404)
    expect((await carer.get(`/api/my/letters/${letter.id}`)).status).toBe(404)
    expect((await carer.get(`/api/my/letters/${letter.id}/pdf`)).status).toBe(404)
    setClock(() => letter.linkEndsAt)
    expect((await (await signedInAs(scene.guardianUser)).get(path)).status).toBe(404)
  })
})

describe('stopping a consent while a letter waits', () => {
  const stop = async (purpose: 'email_link' | 'assessment_treatment' | 'video') => {
    const consent = await database().manager.findOneByOrFail(Consent, { childId: scene.child.id, purpose })
    const answer = await carer
      .post(`/api/my/children/${scene.child.id}/consents/${consent.id}/withdraw`)
      .send({ reason: null })
    expect(answer.status).toBe(204)
  }

  it.each(['email_link', 'assessment_treatment'] as const)(
    '(%s) cancels it: nothing is handed to the mail server, and the therapist is told',
    async (purpose) => {
      const letter = await queuedLetter(scene)
      const { id } = await deliveryOf(letter.id)
      await stop(purpose)
      await mail.deliver()
      expect(await mail.messages(scene.guardianUser.email)).toEqual([])
      expect((await deliveryOf(letter.id)).state).toBe('cancelled')
      expect((await carer.get(`/api/my/deliveries/${id}`)).status).toBe(410)
      const tasks = await database().manager.findBy(Task, { childId: scene.child.id })
      expect(tasks.map((task) => [task.kind, task.assigneeId])).toEqual([
        ['consent_withdrawn', scene.therapist.id],
      ])
    },
  )

  it('(another purpose) lets it go', async () => {
    await giveConsent(scene.child, 'video', scene.therapist)
    const letter = await queuedLetter(scene)
    await stop('video')
    await mail.deliver()
    expect(await mail.messages(scene.guardianUser.email)).toHaveLength(1)
    expect((await carer.get(`/api/my/letters/${letter.id}`)).status).toBe(200)
  })
})
