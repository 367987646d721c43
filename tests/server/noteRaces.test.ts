import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { NoteDraft, NoteRevisionView, NoteView } from '../../shared/sessionNotes.ts'
import { canonicalNote } from '../../shared/sessionNotes.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildUser } from '../support/factories.ts'
import { alsoHeldBy, noteDraft } from '../support/notes.ts'

let child: Child
let anna: Client
let tomasz: Client

beforeAll(async () => {
  await startApp()
  setClock(() => new Date('2026-06-10T13:00:00Z'))
  const [first, second] = [await buildUser('therapist'), await buildUser('therapist')]
  child = await buildChild({ therapist: first })
  await alsoHeldBy(child, second)
  anna = await signedInAs(first)
  tomasz = await signedInAs(second)
})
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

const at = (path = '') => `/api/children/${child.id}/session-notes${path}`
const created = async (): Promise<NoteView> => (await anna.post(at()).send(noteDraft())).body
const put = (by: Client, id: string, version: number, given: Partial<NoteDraft>) =>
  by
    .put(at(`/${id}`))
    .set('If-Match', `"${version}"`)
    .send(noteDraft(given))
const sign = (by: Client, id: string, version: number) =>
  by
    .post(at(`/${id}/sign`))
    .set('If-Match', `"${version}"`)
    .send({ confirmed: true, lateReason: null })
const one = async (id: string): Promise<NoteView> => (await anna.get(at(`/${id}`))).body
const revisionsOf = async (id: string): Promise<NoteRevisionView[]> =>
  (await anna.get(at(`/${id}/revisions`))).body

describe('two people writing one note', () => {
  it('loses no accepted text in 50 rounds, and the loser gets the winner’s text', async () => {
    const { id } = await created()
    const accepted: string[] = []
    let refused = 0
    let version = 1
    for (let round = 1; round <= 50; round += 1) {
      const texts = [`Anna, round ${round}`, `Tomasz, round ${round}`]
      const answers = await Promise.all([
        put(anna, id, version, { plan: texts[0] }),
        put(tomasz, id, version, { plan: texts[1] }),
      ])
      const winner = answers.findIndex((answer) => answer.status === 200)
      const loser = answers[1 - winner]
      expect(answers.map((answer) => answer.status).toSorted()).toEqual([200, 409])
      expect(answers[winner]?.body).toMatchObject({ plan: texts[winner], version: version + 1 })
      expect(loser?.body).toMatchObject({
        code: 'stale',
        current: { plan: texts[winner], version: version + 1 },
      })
      accepted.push(texts[winner] ?? '')
      refused += 1
      version += 1
    }
    expect(accepted.length + refused).toBe(100)
    const kept = await revisionsOf(id)
    expect(kept.map((revision) => revision.plan).toReversed()).toEqual([noteDraft().plan, ...accepted])
    expect(kept.map((revision) => revision.revision).toReversed()).toEqual(kept.map((_, index) => index + 1))
    expect(await one(id)).toMatchObject({ plan: accepted.at(-1), version: 51 })
  })
})

describe('signing at the same moment', () => {
  it('has one winner of two in 20 notes, and one signature each', async () => {
    for (let round = 0; round < 20; round += 1) {
      const { id } = await created()
      const answers = await Promise.all([sign(anna, id, 1), sign(anna, id, 1)])
      expect(answers.map((answer) => [answer.status, answer.body.code ?? 'ok']).toSorted()).toEqual([
        [200, 'ok'],
        [409, 'closed'],
      ])
      expect(await database().query('SELECT id FROM note_signatures WHERE noteId = ?', [id])).toHaveLength(1)
      expect(await one(id)).toMatchObject({ state: 'signed', version: 2 })
    }
  })

  it('signs exactly the text of the hash when somebody saves at once, in 30 notes', async () => {
    const outcomes = { signed: 0, saved: 0 }
    for (let round = 0; round < 30; round += 1) {
      const { id } = await created()
      const edited = `Saved while signing, round ${round}`
      // Alternating who is sent first, so that either may win.
      const [saving, signing] =
        round % 2 === 0
          ? await Promise.all([put(tomasz, id, 1, { plan: edited }), sign(anna, id, 1)])
          : (await Promise.all([sign(anna, id, 1), put(tomasz, id, 1, { plan: edited })])).toReversed()
      const after = await one(id)
      if (signing?.status === 200) {
        outcomes.signed += 1
        expect(saving?.body.code).toBe('closed')
        expect(after).toMatchObject({ state: 'signed', plan: noteDraft().plan, revisions: 1 })
        const hash = createHash('sha256')
          .update(canonicalNote(id, child.id, noteDraft()))
          .digest('hex')
        expect(after.textHash).toBe(hash)
      } else {
        outcomes.saved += 1
        expect(signing?.body).toMatchObject({ code: 'stale', current: { plan: edited, version: 2 } })
        expect(after).toMatchObject({ state: 'draft', plan: edited, textHash: null })
      }
    }
    // Who wins a round is luck; that exactly one of the two did was checked in each.
    expect(outcomes.signed + outcomes.saved).toBe(30)
  })
})
