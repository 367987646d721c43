import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import type { ConclusionView } from '../../shared/conclusions.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildConclusion } from '../support/conclusions.ts'
import { buildChild, buildUser, giveConsent } from '../support/factories.ts'
import { buildMeasure, reachingDetails } from '../support/measures.ts'
import { alsoHeldBy } from '../support/notes.ts'
import { buildQuestionnaire } from '../support/records.ts'
import { reportContent } from '../support/reports.ts'

let therapist: User
let second: User
let anna: Client
let tomasz: Client

beforeAll(async () => {
  await startApp()
  setClock(() => new Date('2026-06-10T13:00:00Z'))
  therapist = await buildUser('therapist')
  second = await buildUser('therapist')
  anna = await signedInAs(therapist)
  tomasz = await signedInAs(second)
})
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

const assessed = async () => {
  const child = await buildChild({ therapist, state: 'assessing' })
  await alsoHeldBy(child, second)
  await giveConsent(child, 'assessment_treatment', therapist)
  const { id } = await buildQuestionnaire(child, therapist, { locked: true })
  await buildMeasure(child, therapist, { locked: true, kind: 'reaching', details: reachingDetails() })
  const content = reportContent({ evidence: [{ kind: 'questionnaire', id }] })
  return { child, content }
}
const at = (child: Pick<Child, 'id'>, path = '') => `/api/children/${child.id}/conclusions${path}`
const sign = (by: Client, child: Pick<Child, 'id'>, id: string) =>
  by
    .post(at(child, `/${id}/sign`))
    .set('If-Match', '"1"')
    .send({ confirmed: true })

describe('a conclusion under several hands', () => {
  it('is signed once by twenty requests at once, moves the episode once and leaves one entry', async () => {
    const { child, content } = await assessed()
    const { id } = await buildConclusion(child, therapist, 'draft', content)
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, n) => sign(n % 2 === 0 ? anna : tomasz, child, id)),
    )
    const codes = answers.map(({ status, body }) => (status === 200 ? 'signed' : String(body.code)))
    expect(codes.filter((code) => code === 'signed')).toHaveLength(1)
    expect(new Set(codes.filter((code) => code !== 'signed'))).toEqual(new Set(['closed']))
    const count = async (sql: string, ...values: string[]) =>
      Number(((await database().query(sql, values)) as { n: string }[])[0]?.n)
    expect(
      await count('SELECT COUNT(*) AS n FROM episode_changes WHERE episodeId = ?', child.episodeId),
    ).toBe(1)
    expect(
      await count(
        "SELECT COUNT(*) AS n FROM audit_entries WHERE objectId = ? AND action = 'conclusion.signed'",
        id,
      ),
    ).toBe(1)
  }, 30_000)

  it('keeps what was signed or what was saved, never a mixture, in 12 rounds', async () => {
    for (let round = 0; round < 12; round += 1) {
      const { child, content } = await assessed()
      const { id } = await buildConclusion(child, therapist, 'draft', content)
      const edited = `Saved while signing, round ${round}`
      const save = () =>
        tomasz
          .put(at(child, `/${id}`))
          .set('If-Match', '"1"')
          .send({ ...content, strengths: edited })
      // Alternating who is sent first, so that either may win.
      const [saving, signing] =
        round % 2 === 0
          ? await Promise.all([save(), sign(anna, child, id)])
          : (await Promise.all([sign(anna, child, id), save()])).toReversed()
      const after: ConclusionView = (await anna.get(at(child, `/${id}`))).body
      if (signing?.status === 200) {
        expect(saving?.body).toMatchObject({ code: 'closed' })
        expect(after).toMatchObject({ state: 'signed', content: { strengths: content.strengths } })
      } else {
        expect(saving?.status).toBe(200)
        expect(signing?.body).toMatchObject({ code: 'stale', current: { content: { strengths: edited } } })
        expect(after).toMatchObject({ state: 'draft', version: 2, content: { strengths: edited } })
      }
    }
  }, 30_000)

  it('is begun once by ten requests at once', async () => {
    const { child } = await assessed()
    const answers = await Promise.all(
      Array.from({ length: 10 }, () => anna.post(at(child)).send({ replacesId: null })),
    )
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(1)
    expect(answers.filter(({ body }) => body.code === 'duplicate')).toHaveLength(9)
  })

  it('is replaced once by ten requests at once', async () => {
    const { child } = await assessed()
    const earlier = await buildConclusion(child, therapist, 'signed')
    const answers = await Promise.all(
      Array.from({ length: 10 }, () => anna.post(at(child)).send({ replacesId: earlier.id })),
    )
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(1)
    expect(answers.filter(({ body }) => body.code === 'duplicate')).toHaveLength(9)
  })
})
