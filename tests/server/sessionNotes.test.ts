import { createHash, randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Goal } from '../../server/entities/Goal.ts'
import type { User } from '../../server/entities/User.ts'
import type { NoteDraft, NoteView } from '../../shared/sessionNotes.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { alsoHeldBy, noteDraft } from '../support/notes.ts'

beforeAll(startApp)
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

let therapist: User
let lead: Client
let anna: Client
let child: Child

beforeAll(async () => {
  setClock(() => new Date('2026-06-10T13:00:00Z'))
  therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  anna = await signedInAs(therapist)
  lead = await signedInAs(await buildUser('clinicLead', { displayName: 'Ines Valderrama' }))
})

beforeEach(async () => {
  child = await buildChild({ therapist })
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/session-notes${path}`
const created = async (given: Partial<NoteDraft> = {}, by = anna, of = child): Promise<NoteView> => {
  const response = await by.post(at('', of)).send(noteDraft(given))
  expect(response.status, response.text).toBe(201)
  return response.body
}
const put = (id: string, version: number, given: Partial<NoteDraft> = {}, by = anna, of = child) =>
  by
    .put(at(`/${id}`, of))
    .set('If-Match', `"${version}"`)
    .send(noteDraft(given))
const sign = (id: string, version: number, lateReason: string | null = null, by = anna, of = child) =>
  by
    .post(at(`/${id}/sign`, of))
    .set('If-Match', `"${version}"`)
    .send({ confirmed: true, lateReason })
const signed = async (
  given: Partial<NoteDraft> = {},
  lateReason: string | null = null,
): Promise<NoteView> => {
  const { id, version } = await created(given)
  const response = await sign(id, version, lateReason)
  expect(response.status, response.text).toBe(200)
  return response.body
}
const one = async (id: string): Promise<NoteView> => (await anna.get(at(`/${id}`))).body
const countersign = (id: string, version: number, by: Client) =>
  by
    .post(at(`/${id}/countersign`))
    .set('If-Match', `"${version}"`)
    .send({})

describe('a session note', () => {
  it('is drafted, saved as revisions, signed and then closed', async () => {
    const first = await created({ observed: '', meaning: '', plan: '' })
    expect(first).toMatchObject({
      author: 'Adaeze Nwosu-Reid',
      state: 'draft',
      version: 1,
      revisions: 1,
      signedAt: null,
      can: { change: true, sign: true, countersign: false, addAddendum: false, discard: true },
    })
    const second = await put(first.id, 1)
    expect(second.body).toMatchObject({ version: 2, revisions: 2, plan: noteDraft().plan })

    const revisions = await anna.get(at(`/${first.id}/revisions`))
    expect(
      revisions.body.map((text: { revision: number; plan: string }) => [text.revision, text.plan]),
    ).toEqual([
      [2, noteDraft().plan],
      [1, ''],
    ])

    const closed = await sign(first.id, 2)
    expect(closed.status).toBe(200)
    expect(closed.body).toMatchObject({
      state: 'signed',
      signedBy: 'Adaeze Nwosu-Reid',
      signedAt: '2026-06-10T13:00:00.000Z',
      lateEntry: false,
      can: { change: false, sign: false, countersign: false, addAddendum: true, discard: false },
    })
    for (const refused of [
      await put(first.id, 3),
      await sign(first.id, 3),
      await anna.delete(at(`/${first.id}`)),
    ])
      expect([refused.status, refused.body.code]).toEqual([409, 'closed'])
  })

  it('is signed with the SHA-256 of its canonical text, in the capacity, time and zone of the signing', async () => {
    const note = await signed({ said: 'Çiçek said “مرحبا” 🌻', present: null })
    const draft = noteDraft()
    // Written out by hand: version word, note, child, then the parts in the order of the trade.
    const canonical = JSON.stringify([
      'fanflower-note.v1', note.id, child.id, '2026-06-10', '10:00', 45, 'session', null, 'willing',
      'Çiçek said “مرحبا” 🌻', draft.observed, draft.meaning, draft.plan, [],
    ]) // prettier-ignore
    expect(note.textHash).toBe(createHash('sha256').update(canonical).digest('hex'))
    const [row] = (await database().query('SELECT * FROM note_signatures WHERE noteId = ?', [note.id])) as {
      signedRole: string
      timeZone: string
      kind: string
      signedById: string
    }[]
    expect(row).toMatchObject({
      kind: 'author',
      signedRole: 'therapist',
      timeZone: 'Europe/London',
      signedById: therapist.id,
    })
  })

  it('keeps when the session ended in UTC, also across a change of clock', async () => {
    const ends = async (given: Partial<NoteDraft>) => {
      const { id } = await created(given)
      const [row] = (await database().query('SELECT endedAt FROM session_notes WHERE id = ?', [id])) as {
        endedAt: Date
      }[]
      return row?.endedAt.toISOString()
    }
    expect(await ends({})).toBe('2026-06-10T09:45:00.000Z')
    expect(await ends({ heldOn: '2026-01-12' })).toBe('2026-01-12T10:45:00.000Z')
    expect(await ends({ heldOn: '2026-03-29', startTime: '00:30', minutes: 60 })).toBe(
      '2026-03-29T01:30:00.000Z',
    )
  })

  it('shows the plan of the signed session before', async () => {
    await signed({ heldOn: '2026-05-20', plan: 'Older plan' }, 'was ill')
    await signed({ heldOn: '2026-05-27', plan: 'Turn the page, then look at the grip' }, 'was ill')
    await created({ heldOn: '2026-06-03', plan: 'Not signed' })
    const { previousPlan } = await created()
    expect(previousPlan).toEqual({ heldOn: '2026-05-27', text: 'Turn the page, then look at the grip' })
  })

  it.each([
    ['observed', { observed: '  ' }],
    ['meaning', { meaning: '' }],
    ['plan', { plan: '\n' }],
  ])('cannot be signed without %s, and says so beside the field', async (field, given) => {
    const { id } = await created(given)
    const refused = await sign(id, 1)
    expect(refused.status).toBe(422)
    expect(Object.keys(refused.body.fields)).toEqual([field])
    expect(await one(id)).toMatchObject({ state: 'draft', version: 1 })
  })

  it('cannot be signed unconfirmed, nor before its session began', async () => {
    const { id } = await created()
    const unconfirmed = await anna
      .post(at(`/${id}/sign`))
      .set('If-Match', '"1"')
      .send({ confirmed: false, lateReason: null })
    expect(unconfirmed.body.fields.confirmed).toMatch(/about this child/)
    const early = await created({ startTime: '14:01' })
    expect((await sign(early.id, 1)).body.fields.startTime).toMatch(/not begun/)
  })

  it('is marked as a late entry with its reason when signed on a later day', async () => {
    const { id } = await created({ heldOn: '2026-06-07' })
    expect((await sign(id, 1)).body.fields.lateReason).toMatch(/earlier day/)
    expect((await sign(id, 1, '  ')).status).toBe(422)
    const late = await sign(id, 1, 'Notes taken on paper during a power cut')
    expect(late.body).toMatchObject({
      lateEntry: true,
      lateReason: 'Notes taken on paper during a power cut',
    })
    const list = await anna.get(at())
    expect(list.body.rows[0]).toMatchObject({ id, lateEntry: true })
  })

  it('is no late entry on the day itself, whatever reason was typed', async () => {
    expect(await signed({}, 'not needed')).toMatchObject({ lateEntry: false, lateReason: null })
  })

  it('keeps every character as it was typed', async () => {
    const said = '  “Ça va”, 👩‍👧 \u202eabc, e\u0301, \n\n\tтак  '
    const { id } = await created({ said })
    expect((await one(id)).said).toBe(said)
  })

  it.each([
    ['a session to come', { heldOn: '2026-06-11' }, 'heldOn'],
    ['a session before birth', { heldOn: '2016-06-11' }, 'heldOn'],
    ['a day that cannot be', { heldOn: '2026-06-31' }, 'heldOn'],
    ['a time that cannot be', { startTime: '25:10' }, 'startTime'],
    ['half a minute', { minutes: 12.5 }, 'minutes'],
    ['text for minutes', { minutes: '45' }, 'minutes'],
    ['text that is too long', { said: 'x'.repeat(20_001) }, 'said'],
    ['a control character', { plan: 'a\u0000b' }, 'plan'],
    ['a state of its own', { state: 'signed' }, 'form'],
    ['another author', { authorId: randomUUID() }, 'form'],
  ])('names the field when a draft has %s', async (_what, given, field) => {
    const { id } = await created()
    const refused = await put(id, 1, given as Partial<NoteDraft>)
    expect(refused.status).toBe(422)
    expect(Object.keys(refused.body.fields)).toEqual([field])
    expect((await one(id)).version).toBe(1)
  })

  it('names only goals of this child', async () => {
    const goal = (of: Child) => ({
      id: randomUUID(),
      childId: of.id,
      details: {
        activity: 'Writes a shopping list that others can read',
        childVoice: 'I want it readable',
        levels: ['one', 'two', 'three', 'four', 'five'],
        baseline: -2,
        importance: 2,
        difficulty: 2,
        targetOn: '2026-09-01',
      },
      setOn: '2026-06-01',
      endedOn: null,
      outcome: null,
      setById: therapist.id,
      createdAt: new Date('2026-06-01T09:00:00Z'),
    })
    const other = await buildChild({ therapist })
    const [mine, theirs] = [goal(child), goal(other)]
    await database().manager.insert(Goal, [mine, theirs])
    expect((await created({ goalIds: [mine.id] })).goalIds).toEqual([mine.id])
    const refused = await anna.post(at()).send(noteDraft({ goalIds: [mine.id, theirs.id] }))
    expect(refused.body.fields.goalIds).toMatch(/does not belong to this child/)
  })

  it('is created once when twenty equal requests come at a time; the same key with other words is refused', async () => {
    const key = randomUUID()
    const send = (given: Partial<NoteDraft> = {}) =>
      anna.post(at()).set('Idempotency-Key', key).send(noteDraft(given))
    const answers = await Promise.all(Array.from({ length: 20 }, () => send()))
    expect(new Set(answers.map((answer) => answer.status))).toEqual(new Set([201]))
    expect(new Set(answers.map((answer) => answer.body.id)).size).toBe(1)
    expect((await send({ plan: 'Other words' })).status).toBe(422)
    expect((await anna.get(at())).body.total).toBe(1)
  })
})

describe('the list of notes', () => {
  it('pages, the latest session first, without discarded drafts', async () => {
    const days = ['2026-06-01', '2026-06-03', '2026-06-02']
    const notes = await Promise.all(days.map((heldOn) => created({ heldOn, plan: `Plan of ${heldOn}` })))
    await anna.delete(at(`/${notes[0]?.id}`))
    const first = await anna.get(at('?page=1&size=1'))
    expect(first.body).toMatchObject({ total: 2, page: 1, size: 1 })
    expect(first.body.rows).toEqual([
      {
        id: notes[1]?.id,
        heldOn: '2026-06-03',
        type: 'session',
        minutes: 45,
        author: 'Adaeze Nwosu-Reid',
        state: 'draft',
        lateEntry: false,
        addenda: 0,
        summary: 'Plan of 2026-06-03',
      },
    ])
    expect((await anna.get(at('?page=2&size=1'))).body.rows[0].heldOn).toBe('2026-06-02')
    expect((await anna.get(at('?page=3&size=1'))).body.rows).toEqual([])
    expect((await anna.get(at('?size=0'))).status).toBe(422)
  })
})

describe('a note by a newly qualified therapist', () => {
  let rohan: Client
  let rohansUser: User
  let note: NoteView

  beforeEach(async () => {
    rohansUser = await buildUser('therapist', { newlyQualified: true })
    rohan = await signedInAs(rohansUser)
    child = await buildChild({ therapist: rohansUser })
    const { id } = await created({}, rohan)
    note = (await sign(id, 1, null, rohan)).body
  })

  it('waits for its countersignature, closed already, and the lead gives it', async () => {
    expect(note).toMatchObject({
      state: 'awaiting_countersignature',
      can: { change: false, countersign: false },
    })
    expect((await put(note.id, note.version, {}, rohan)).body.code).toBe('closed')
    expect((await lead.get(at(`/${note.id}`))).body.can.countersign).toBe(true)
    expect((await countersign(note.id, 1, lead)).body.code).toBe('stale')
    const done = await countersign(note.id, note.version, lead)
    expect(done.body).toMatchObject({
      state: 'signed',
      countersignedBy: 'Ines Valderrama',
      countersignedAt: '2026-06-10T13:00:00.000Z',
      textHash: note.textHash,
    })
    expect((await countersign(note.id, done.body.version, lead)).body.code).toBe('closed')
  })

  it('is countersigned by another experienced therapist who holds the child, and by nobody else', async () => {
    const junior = await buildUser('therapist', { newlyQualified: true })
    const stranger = await signedInAs(await buildUser('therapist'))
    await alsoHeldBy(child, junior)
    await alsoHeldBy(child, therapist)
    expect((await countersign(note.id, note.version, rohan)).status).toBe(403)
    expect((await countersign(note.id, note.version, await signedInAs(junior))).status).toBe(403)
    expect((await countersign(note.id, note.version, stranger)).status).toBe(404)
    expect((await anna.get(at(`/${note.id}`))).body.can.countersign).toBe(true)
    expect((await countersign(note.id, note.version, anna)).body.state).toBe('signed')
  })

  it('is never countersigned by its author, even as clinic lead', async () => {
    await database().query('UPDATE users SET roles = ?, newlyQualified = 0 WHERE id = ?', [
      JSON.stringify(['therapist', 'clinicLead']),
      rohansUser.id,
    ])
    await database().query('UPDATE assignments SET endedAt = ? WHERE therapistId = ?', [
      new Date('2026-06-10T12:00:00Z'),
      rohansUser.id,
    ])
    const asLead = await rohan.get(at(`/${note.id}`))
    expect([asLead.status, asLead.body.can.countersign]).toEqual([200, false])
    expect((await countersign(note.id, note.version, rohan)).status).toBe(403)
  })

  it('has one winner when two people countersign at once', async () => {
    await alsoHeldBy(child, therapist)
    const answers = await Promise.all([
      countersign(note.id, note.version, lead),
      countersign(note.id, note.version, anna),
    ])
    expect(answers.map((answer) => answer.status).toSorted()).toEqual([200, 409])
  })
})

describe('an addendum', () => {
  it('is added to a signed note by its therapist and by the lead, and the signed text stays', async () => {
    const note = await signed()
    const first = await anna
      .post(at(`/${note.id}/addenda`))
      .send({ text: 'The page was turned 25 degrees, not 20.' })
    expect(first.status).toBe(201)
    setClock(() => new Date('2026-06-10T13:01:00Z'))
    await lead.post(at(`/${note.id}/addenda`)).send({ text: 'Read and discussed in supervision.' })
    setClock(() => new Date('2026-06-10T13:00:00Z'))
    const shown = await one(note.id)
    expect(shown.addenda.map(({ text, by }) => [by, text])).toEqual([
      ['Adaeze Nwosu-Reid', 'The page was turned 25 degrees, not 20.'],
      ['Ines Valderrama', 'Read and discussed in supervision.'],
    ])
    expect(shown).toMatchObject({ observed: note.observed, textHash: note.textHash, version: note.version })
    expect((await anna.get(at())).body.rows[0].addenda).toBe(2)
  })

  it('is refused on a draft, when empty, and made once for one key', async () => {
    const draft = await created()
    expect((await anna.post(at(`/${draft.id}/addenda`)).send({ text: 'Too early' })).body.code).toBe(
      'not_signed',
    )
    const note = await signed()
    expect((await anna.post(at(`/${note.id}/addenda`)).send({ text: '  ' })).body.fields.text).toBeDefined()
    const key = randomUUID()
    for (let time = 0; time < 2; time += 1)
      await anna
        .post(at(`/${note.id}/addenda`))
        .set('Idempotency-Key', key)
        .send({ text: 'Said once' })
    expect((await one(note.id)).addenda).toHaveLength(1)
  })
})

describe('discarding a draft', () => {
  it('takes it off the pages; a late save is told so and the texts stay in the database', async () => {
    const { id } = await created()
    expect((await anna.delete(at(`/${id}`))).status).toBe(204)
    expect((await anna.get(at(`/${id}`))).status).toBe(404)
    expect((await anna.get(at(`/${id}/revisions`))).status).toBe(404)
    expect((await put(id, 2)).body).toMatchObject({
      code: 'closed',
      message: expect.stringContaining('still on this page'),
    })
    expect(await database().query('SELECT revision FROM note_revisions WHERE noteId = ?', [id])).toHaveLength(
      1,
    )
  })

  it('is the author’s alone, also when another therapist holds the child', async () => {
    const { id } = await created()
    const colleague = await buildUser('therapist')
    await alsoHeldBy(child, colleague)
    const other = await signedInAs(colleague)
    expect((await other.get(at(`/${id}`))).body.can).toMatchObject({
      change: true,
      sign: false,
      discard: false,
    })
    expect((await other.delete(at(`/${id}`))).status).toBe(403)
    expect((await sign(id, 1, null, other)).status).toBe(403)
    expect((await one(id)).state).toBe('draft')
  })
})

describe('what each state of a note allows', () => {
  type State = 'draft' | 'awaiting' | 'signed' | 'discarded'
  const acts = ['save', 'sign', 'countersign', 'add', 'discard'] as const
  const allowed: Record<State, Record<(typeof acts)[number], number>> = {
    draft: { save: 200, sign: 200, countersign: 409, add: 409, discard: 204 },
    awaiting: { save: 409, sign: 409, countersign: 200, add: 201, discard: 409 },
    signed: { save: 409, sign: 409, countersign: 409, add: 201, discard: 409 },
    discarded: { save: 409, sign: 409, countersign: 409, add: 409, discard: 409 },
  }
  const table = Object.entries(allowed).flatMap(([state, row]) =>
    acts.map((act) => [state as State, act, row[act]] as const),
  )
  let junior: Client
  let held: Child

  beforeAll(async () => {
    const user = await buildUser('therapist', { newlyQualified: true })
    junior = await signedInAs(user)
    held = await buildChild({ therapist: user })
  })

  const brought = async (state: State): Promise<NoteView> => {
    const note = await created({}, junior, held)
    if (state === 'discarded') await junior.delete(at(`/${note.id}`, held))
    if (state === 'awaiting' || state === 'signed') await sign(note.id, 1, null, junior, held)
    if (state === 'signed')
      await lead
        .post(at(`/${note.id}/countersign`, held))
        .set('If-Match', '"2"')
        .send({})
    return note
  }
  const rowsOf = (id: string) =>
    Promise.all(
      [
        'session_notes WHERE id',
        'note_revisions WHERE noteId',
        'note_signatures WHERE noteId',
        'note_addenda WHERE noteId',
      ].map((from) => database().query(`SELECT * FROM ${from} = ?`, [id])),
    )

  it.each(table)('%s, then %s: %i', async (state, act, expected) => {
    const { id } = await brought(state)
    const before = JSON.stringify(await rowsOf(id))
    const version = { draft: 1, discarded: 2, awaiting: 2, signed: 3 }[state]
    const attempt = {
      save: () => put(id, version, { plan: 'Another plan' }, junior, held),
      sign: () => sign(id, version, null, junior, held),
      countersign: () =>
        lead
          .post(at(`/${id}/countersign`, held))
          .set('If-Match', `"${version}"`)
          .send({}),
      add: () => junior.post(at(`/${id}/addenda`, held)).send({ text: 'One thing more' }),
      discard: () => junior.delete(at(`/${id}`, held)),
    }[act]
    const response = await attempt()
    expect(response.status, response.text).toBe(expected)
    const after = JSON.stringify(await rowsOf(id))
    if (expected === 409) expect(after).toBe(before)
    else expect(after).not.toBe(before)
  })
})

describe('who may see and write notes', () => {
  it('lets a therapist who took over go on with a draft and sign it once they wrote in it', async () => {
    const { id } = await created()
    const colleague = await buildUser('therapist')
    await alsoHeldBy(child, colleague)
    const other = await signedInAs(colleague)
    expect((await put(id, 1, { plan: 'Plan as agreed at handover' }, other)).status).toBe(200)
    const done = await sign(id, 2, null, other)
    expect(done.body).toMatchObject({
      state: 'signed',
      author: 'Adaeze Nwosu-Reid',
      signedBy: colleague.displayName,
    })
  })

  it('lets the clinic lead read drafts and refuses the lead’s writing', async () => {
    const { id } = await created()
    expect((await lead.get(at(`/${id}`))).body.can).toEqual({
      change: false,
      sign: false,
      countersign: false,
      addAddendum: false,
      discard: false,
    })
    expect((await lead.get(at(`/${id}/revisions`))).status).toBe(200)
    const attempts = [
      lead.post(at()).send(noteDraft()),
      put(id, 1, {}, lead),
      sign(id, 1, null, lead),
      lead.delete(at(`/${id}`)),
    ]
    for (const attempt of attempts) expect((await attempt).status).toBe(403)
  })

  it('looks like nothing to everybody else', async () => {
    const { id } = await signed()
    const teacher = await buildUser('teacher')
    const schoolClass = await buildClass(teacher)
    await database().query('UPDATE children SET schoolClassId = ? WHERE id = ?', [schoolClass.id, child.id])
    await giveConsent(child, 'share_school_goals', therapist)
    const mother = await buildUser('guardian')
    await buildGuardian(child, mother)
    for (const other of [await buildUser('therapist'), await buildUser('administrator'), teacher, mother]) {
      const client = await signedInAs(other)
      const answers = [
        await client.get(at()),
        await client.get(at(`/${id}`)),
        await client.get(at(`/${id}/revisions`)),
        await client.post(at()).send(noteDraft()),
        await put(id, 2, {}, client),
        await sign(id, 2, null, client),
        await countersign(id, 2, client),
        await client.post(at(`/${id}/addenda`)).send({ text: 'Hello' }),
        await client.delete(at(`/${id}`)),
      ]
      for (const answer of answers)
        expect([answer.status, answer.body.code], other.roles[0]).toEqual([404, 'not_found'])
    }
  })

  it('finds a note only under its own child, so a save with the wrong child writes nowhere', async () => {
    const twin = await buildChild({ therapist, givenName: child.givenName, familyName: child.familyName })
    const mine = await created({ plan: 'Plan for the first' })
    const theirs = await created({ plan: 'Plan for the second' }, anna, twin)
    const crossed = [
      await put(mine.id, 1, { plan: 'Crossed' }, anna, twin),
      await put(theirs.id, 1, { plan: 'Crossed' }, anna, child),
      await sign(mine.id, 1, null, anna, twin),
      await anna.get(at(`/${mine.id}`, twin)),
      await anna.get(at(`/${mine.id}/revisions`, twin)),
      await anna.delete(at(`/${mine.id}`, twin)),
    ]
    expect(crossed.map((answer) => answer.status)).toEqual([404, 404, 404, 404, 404, 404])
    expect((await one(mine.id)).plan).toBe('Plan for the first')
    expect((await anna.get(at(`/${theirs.id}`, twin))).body).toMatchObject({
      plan: 'Plan for the second',
      version: 1,
    })
  })

  it('leaves an audit entry for each act, with the hash of what was signed', async () => {
    const note = await signed()
    await anna.get(at(`/${note.id}`))
    await anna.get(at())
    const entries = (await database().query(
      'SELECT action, detail FROM audit_entries WHERE childId = ? ORDER BY position',
      [child.id],
    )) as { action: string; detail: unknown }[]
    expect(entries.map((entry) => entry.action)).toEqual([
      'sessionNote.created',
      'sessionNote.signed',
      'sessionNote.read',
      'sessionNotes.list',
    ])
    expect(JSON.stringify(entries[1]?.detail)).toContain(note.textHash)
  })
})

describe('the database', () => {
  it('refuses to change or remove what was signed, whatever the application asks', async () => {
    const { id } = await signed()
    const attempts = [
      'UPDATE session_notes SET summary = "x" WHERE id = ?',
      'UPDATE session_notes SET state = "draft" WHERE id = ?',
      'DELETE FROM session_notes WHERE id = ?',
      'UPDATE note_revisions SET content = "{}" WHERE noteId = ?',
      'DELETE FROM note_revisions WHERE noteId = ?',
      'UPDATE note_signatures SET lateReason = "x" WHERE noteId = ?',
      'DELETE FROM note_signatures WHERE noteId = ?',
      'UPDATE note_addenda SET text = "x" WHERE noteId = ?',
    ]
    for (const attempt of attempts) await expect(database().query(attempt, [id]), attempt).rejects.toThrow()
    expect(await one(id)).toMatchObject({ state: 'signed', version: 2 })
  })
})
