import { execFileSync } from 'node:child_process'
import { randomUUID } from 'node:crypto'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { AnswerRequest } from '../../server/entities/AnswerRequest.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Conclusion } from '../../server/entities/Conclusion.ts'
import { EpisodeChange } from '../../server/entities/EpisodeChange.ts'
import { Task } from '../../server/entities/Task.ts'
import type { User } from '../../server/entities/User.ts'
import type {
  ConclusionCheck,
  ConclusionContent,
  ConclusionView,
  EvidenceLink,
} from '../../shared/conclusions.ts'
import { emptyConclusion } from '../../shared/conclusions.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildAlert } from '../support/clinicRows.ts'
import { buildConclusion } from '../support/conclusions.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { insertRow } from '../support/insertRow.ts'
import { buildMeasure, pegsDetails, reachingDetails } from '../support/measures.ts'
import { alsoHeldBy } from '../support/notes.ts'
import { buildNote, buildObservation, buildQuestionnaire } from '../support/records.ts'

const folder = mkdtempSync(join(tmpdir(), 'conclusions-'))
beforeAll(startApp)
afterAll(async () => {
  setClock(() => new Date())
  rmSync(folder, { recursive: true, force: true })
  await stopApp()
})

let therapist: User
let leadUser: User
let anna: Client
let lead: Client
let child: Child & { episodeId: string }
let evidence: EvidenceLink[]

beforeAll(async () => {
  setClock(() => new Date('2026-06-10T13:00:00Z'))
  therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  leadUser = await buildUser('clinicLead', { displayName: 'Ines Valderrama' })
  anna = await signedInAs(therapist)
  lead = await signedInAs(leadUser)
})

/** A child with a questionnaire and observed reaching, both plainly to the left. */
const assessed = async (by: User = therapist) => {
  const made = await buildChild({ therapist: by, state: 'assessing' })
  await giveConsent(made, 'assessment_treatment', by)
  const form = await buildQuestionnaire(made, by, { locked: true })
  const reaching = await buildMeasure(made, by, {
    locked: true,
    kind: 'reaching',
    details: reachingDetails(),
  })
  const links: EvidenceLink[] = [
    { kind: 'questionnaire', id: form.id },
    { kind: 'measure', id: reaching.id },
  ]
  return { made, links }
}

beforeEach(async () => {
  const { made, links } = await assessed()
  child = made
  evidence = links
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/conclusions${path}`
const full = (given: Partial<ConclusionContent> = {}): ConclusionContent => ({
  handPreference: 'left_settled',
  confidence: 'high',
  evidence,
  strengths: 'Draws maps and tells what is on them.',
  mattersToChild: 'To finish the comic.',
  reasoning: 'Asked and seen, the left hand is chosen throughout.',
  plan: 'advice',
  planDetail: 'Page turned clockwise; scissors made for the left hand.',
  aboutDisagreements: null,
  ...given,
})
const started = async (by = anna, of = child): Promise<ConclusionView> => {
  const response = await by.post(at('', of)).send({ replacesId: null })
  expect(response.status, response.text).toBe(201)
  return response.body
}
const put = (id: string, version: number, given: Partial<ConclusionContent> = {}, by = anna, of = child) =>
  by
    .put(at(`/${id}`, of))
    .set('If-Match', `"${version}"`)
    .send(full(given))
const written = async (
  given: Partial<ConclusionContent> = {},
  by = anna,
  of = child,
): Promise<ConclusionView> => {
  const { id, version } = await started(by, of)
  const response = await put(id, version, given, by, of)
  expect(response.status, response.text).toBe(200)
  return response.body
}
const act = (
  name: 'sign' | 'countersign',
  id: string,
  version: number,
  by = anna,
  body: object = { confirmed: true },
) =>
  by
    .post(at(`/${id}/${name}`))
    .set('If-Match', `"${version}"`)
    .send(body)
const one = async (id: string, by = anna): Promise<ConclusionView> => (await by.get(at(`/${id}`))).body
const check = async (id: string, by = anna): Promise<ConclusionCheck> => {
  const response = await by.get(at(`/${id}/check`))
  expect(response.status, response.text).toBe(200)
  return response.body
}
const signed = async (given: Partial<ConclusionContent> = {}): Promise<ConclusionView> => {
  const { id, version } = await written(given)
  const response = await act('sign', id, version)
  expect(response.status, response.text).toBe(200)
  return response.body
}
const stateOf = async (): Promise<string> => {
  const [row] = (await database().query('SELECT state FROM episodes WHERE childId = ?', [child.id])) as {
    state: string
  }[]
  return row?.state ?? ''
}
const pdfText = (pdf: Buffer): string => {
  const file = join(folder, `${randomUUID()}.pdf`)
  writeFileSync(file, pdf)
  return execFileSync('pdftotext', [file, '-'], { encoding: 'utf8' }).replace(/\s+/g, ' ')
}
const bytesOf = (by: Client, id: string, of = child) =>
  by
    .get(at(`/${id}/report.pdf`, of))
    .buffer(true)
    .parse((response, done) => {
      const chunks: Buffer[] = []
      response.on('data', (chunk: Buffer) => chunks.push(chunk))
      response.on('end', () => done(null, Buffer.concat(chunks)))
    })

describe('a conclusion', () => {
  it('is begun empty, saved, signed with its evidence, closes the assessment and is then closed itself', async () => {
    const first = await started()
    expect(first).toMatchObject({
      author: 'Adaeze Nwosu-Reid',
      state: 'draft',
      content: emptyConclusion,
      evidence: null,
      version: 1,
      can: { change: true, sign: true, countersign: false, replace: false, discard: true, report: false },
    })
    const saved = await put(first.id, 1)
    expect(saved.body).toMatchObject({ version: 2, content: full() })
    const answer = await act('sign', first.id, 2)
    expect(answer.status, answer.text).toBe(200)
    expect(answer.body).toMatchObject({
      state: 'signed',
      signedAt: '2026-06-10T13:00:00.000Z',
      countersignedAt: null,
      content: full(),
      can: { change: false, sign: false, replace: true, discard: false, report: true },
    })
    expect(answer.body.evidence).toMatchObject({ age: '8 y 1 m', contradictions: [] })
    expect(answer.body.evidence.lateralLine.map((row: { value: number }) => row.value)).toEqual([-100, -100])
    expect(answer.body.evidence.evidence.map(({ words }: { words: string }) => words)).toEqual([
      'Hand use in ten everyday activities, Therapist saw it, 21 May 2026: −100.0, 10 activities answered',
      'Reaching across the midline, 21 May 2026: 21 left, 0 right',
    ])
    expect(answer.body.evidence.citations.join(' ')).toContain('Oldfield')
    expect(await stateOf()).toBe('formulated')
    const [change] = await database().manager.findBy(EpisodeChange, { episodeId: child.episodeId })
    expect(change).toMatchObject({
      fromState: 'assessing',
      toState: 'formulated',
      reason: 'The conclusion of the assessment was signed',
      byId: therapist.id,
    })
    expect((await put(first.id, 3)).body).toMatchObject({ code: 'closed' })
    expect((await act('sign', first.id, 3)).body).toMatchObject({ code: 'closed' })
    expect((await anna.delete(at(`/${first.id}`)).set('If-Match', '"3"')).body).toMatchObject({
      code: 'closed',
    })
    expect(await one(first.id)).toMatchObject({ state: 'signed', content: full() })
  })

  it('waits while a warning sign that holds booking is open, names it, and prints none of it', async () => {
    const { id, version } = await written()
    await buildAlert(child, 'Spoonword is told')
    const pressing = await buildAlert(child, 'The other hand is often held in a fist.')
    await database().query('UPDATE alerts SET holdsBooking = 1 WHERE id = ?', [pressing.id])
    expect((await check(id)).warningSigns).toEqual(['The other hand is often held in a fist.'])
    const refused = await act('sign', id, version)
    expect(refused.status).toBe(422)
    expect(Object.keys(refused.body.fields)).toEqual(['warningSigns'])
    expect(refused.body.fields.warningSigns).toMatch(/comes first.*held in a fist.*what was done/)
    expect(await one(id)).toMatchObject({ state: 'draft', version })

    const done = { action: 'The paediatrician sees the child on Friday' }
    await anna.post(`/api/children/${child.id}/alerts/${pressing.id}/action`).send(done)
    expect((await check(id)).warningSigns).toEqual([])
    expect((await act('sign', id, version)).status).toBe(200)
    expect(await stateOf()).toBe('formulated')
    const printed = pdfText((await bytesOf(anna, id)).body as Buffer)
    for (const words of ['fist', 'Spoonword', 'paediatrician']) expect(printed).not.toContain(words)
  })

  it.each(['active', 'consented', 'discharged'] as const)(
    'is signed and leaves an episode that is “%s” where it is',
    async (state) => {
      await database().query('UPDATE episodes SET state = ? WHERE childId = ?', [state, child.id])
      await signed()
      expect(await stateOf()).toBe(state)
    },
  )

  it('is signed though consent was taken back, and the episode then does not move on by itself', async () => {
    await database().query(
      `INSERT INTO consents (id, childId, guardianId, purpose, kind, withdrawsId, basis, method, givenByName, at, expiresAt,
         reason, recordedById, recordedAt)
       SELECT UUID(), childId, guardianId, purpose, 'withdrawn', id, basis, method, givenByName, at, NULL, 'Asked to',
         recordedById, recordedAt FROM consents WHERE childId = ?`,
      [child.id],
    )
    await signed()
    expect(await stateOf()).toBe('assessing')
  })

  it('has one draft for a child: a second is refused and names the first', async () => {
    const { id } = await started()
    const second = await anna.post(at()).send({ replacesId: null })
    expect(second.status).toBe(409)
    expect(second.body).toMatchObject({ code: 'duplicate', current: { id } })
  })

  it('is begun once when the same request comes twice', async () => {
    const key = randomUUID()
    const ask = () => anna.post(at()).set('Idempotency-Key', key).send({ replacesId: null })
    const answers = [await ask(), await ask()]
    expect(answers.map(({ status }) => status)).toEqual([201, 201])
    expect(answers[1]?.body.id).toBe(answers[0]?.body.id)
  })

  it('refuses an older version and gives back what is stored', async () => {
    const { id } = await started()
    await put(id, 1, { strengths: 'Stored first' })
    const late = await put(id, 1, { strengths: 'Written at the same time' })
    expect(late.status).toBe(409)
    expect(late.body).toMatchObject({
      code: 'stale',
      current: { version: 2, content: { strengths: 'Stored first' } },
    })
    expect((await anna.delete(at(`/${id}`)).set('If-Match', '"1"')).body).toMatchObject({ code: 'stale' })
    expect((await act('sign', id, 1)).body).toMatchObject({ code: 'stale' })
  })

  it.each(['put', 'delete'] as const)('answers 428 to a %s that names no version', async (method) => {
    const { id } = await started()
    expect((await anna[method](at(`/${id}`)).send(full())).status).toBe(428)
    expect((await anna.post(at(`/${id}/sign`)).send({ confirmed: true })).status).toBe(428)
  })

  it.each([
    ['an unknown preference', { handPreference: 'left' }, 'handPreference'],
    ['a text that is too long', { strengths: 'x'.repeat(4001) }, 'strengths'],
    ['evidence of an unknown kind', { evidence: [{ kind: 'letter', id: randomUUID() }] }, 'evidence'],
    ['an id that is none', { evidence: [{ kind: 'measure', id: '1 OR 1=1' }] }, 'evidence'],
    ['a field it does not know', { diagnosis: 'DCD' }, 'diagnosis'],
  ])('answers 422 beside the field to %s', async (_what, given, field) => {
    const { id } = await started()
    const answer = await anna
      .put(at(`/${id}`))
      .set('If-Match', '"1"')
      .send({ ...full(), ...given })
    expect(answer.status).toBe(422)
    expect(JSON.stringify(answer.body)).toContain(field)
    expect(await one(id)).toMatchObject({ version: 1, content: emptyConclusion })
  })

  it('keeps emoji, accents and right-to-left text as written while it is a draft', async () => {
    const strengths = 'Zoë 🌟 נועם e\u0301 — «ok»'
    const { id } = await written({ strengths })
    expect((await one(id)).content.strengths).toBe(strengths)
  })

  it('is discarded as a draft, and another can then be begun', async () => {
    const { id, version } = await written()
    expect((await anna.delete(at(`/${id}`)).set('If-Match', `"${version}"`)).status).toBe(204)
    expect((await anna.get(at(`/${id}`))).status).toBe(404)
    await started()
  })

  it('is gone on with by another therapist of the child, whose conclusion it is once they sign', async () => {
    const { id, version } = await written()
    const tomasz = await buildUser('therapist', { displayName: 'Tomasz Wilk' })
    await alsoHeldBy(child, tomasz)
    const answer = await act('sign', id, version, await signedInAs(tomasz))
    expect(answer.body).toMatchObject({ state: 'signed', author: 'Tomasz Wilk' })
  })
})

describe('a settled label under six', () => {
  it.each([
    ['2020-06-11', 1],
    ['2020-06-10', 0],
  ])(
    'of a child born on %s asks %d question that must be answered before it is signed',
    async (born, asked) => {
      await database().query('UPDATE children SET birthDate = ? WHERE id = ?', [born, child.id])
      const { id, version } = await written()
      const questions = (await check(id)).contradictions.filter((words) =>
        words.includes('Scharoun & Bryden 2014'),
      )
      expect(questions).toHaveLength(asked)
      const answer = await act('sign', id, version)
      expect([answer.status, Object.keys(answer.body.fields ?? {})]).toEqual(
        asked === 1 ? [422, ['aboutDisagreements']] : [200, []],
      )
    },
  )
})

describe('evidence', () => {
  it('is offered in words: what is locked or signed, newest first, without drafts and replaced ones', async () => {
    const { id } = await started()
    const older = await buildMeasure(child, therapist, {
      locked: true,
      kind: 'pegs',
      details: pegsDetails([20, 21, 22], [25, 26, 27]),
    })
    await buildMeasure(child, therapist, {
      locked: true,
      kind: 'pegs',
      details: pegsDetails([19, 20, 21], [25, 26, 27]),
      replacesId: older.id,
      measuredOn: '2026-06-01',
    })
    await buildQuestionnaire(child, therapist, { locked: false })
    await buildObservation(child, therapist)
    await buildNote(child, therapist, 'signed', { heldOn: '2026-06-09', type: 'assessment' })
    await buildNote(child, therapist, 'draft')
    const { evidenceChoices } = await check(id)
    expect(evidenceChoices.map(({ words }) => words)).toEqual([
      'Note of assessment, 9 Jun 2026',
      'Moving pegs, 1 Jun 2026: left hand 20.0 s, right hand 26.0 s',
      'Reaching across the midline, 21 May 2026: 21 left, 0 right',
      'Hand use in ten everyday activities, Therapist saw it, 21 May 2026: −100.0, 10 activities answered',
      'Writing observed, 21 May 2026: wrote with the left hand',
    ])
  })

  it('cannot be another child’s, a draft or nothing at all, and each is refused alike', async () => {
    const { links } = await assessed()
    const { id } = await started()
    const draft = await buildMeasure(child, therapist, { locked: false, kind: 'sides' })
    const chosen: EvidenceLink[] = [
      links[0] as EvidenceLink,
      links[1] as EvidenceLink,
      { kind: 'measure', id: draft.id },
      { kind: 'measure', id: randomUUID() },
      // Right id, wrong kind.
      { kind: 'history', id: evidence[0]?.id ?? '' },
    ]
    const answers = []
    for (const link of chosen) answers.push(await put(id, 1, { evidence: [link] }))
    for (const answer of answers) {
      expect(answer.status).toBe(422)
      expect(answer.body.fields).toEqual(answers[0]?.body.fields)
    }
    expect(await one(id)).toMatchObject({ version: 1, content: { evidence: [] } })
  })

  it('may stay though a newer one took its place since, and says so', async () => {
    const { id } = await written()
    const [, reaching] = evidence
    await buildMeasure(child, therapist, {
      locked: true,
      kind: 'reaching',
      details: reachingDetails((place) => (place > 5 ? 'right' : 'left')),
      replacesId: reaching?.id ?? '',
    })
    const { evidenceChoices } = await check(id)
    expect(evidenceChoices.map(({ words }) => words)).toEqual(
      expect.arrayContaining([
        'Reaching across the midline, 21 May 2026: 21 left, 0 right (a newer one took its place)',
        'Reaching across the midline, 21 May 2026: 15 left, 6 right',
      ]),
    )
    expect((await put(id, 2, { strengths: 'Still saved' })).status).toBe(200)
  })

  it('is kept once when it is chosen twice', async () => {
    const [first] = evidence
    const { content } = await written({ evidence: [first, first] as EvidenceLink[] })
    expect(content.evidence).toEqual([first])
  })
})

describe('signing', () => {
  it('says beside each field what is missing', async () => {
    const { id } = await started()
    const expected = [
      ...['handPreference', 'confidence', 'evidence', 'strengths', 'mattersToChild', 'reasoning', 'plan'],
    ].toSorted()
    expect(Object.keys((await check(id)).missing).toSorted()).toEqual(expected)
    const answer = await act('sign', id, 1)
    expect(answer.status).toBe(422)
    expect(Object.keys(answer.body.fields).toSorted()).toEqual(expected)
    expect(await one(id)).toMatchObject({ state: 'draft', version: 1 })
  })

  it.each([{}, { confirmed: false }, { confirmed: 'true' }, { confirm: true }])(
    'needs the person’s confirmation, and %o is none',
    async (body) => {
      const { id, version } = await written()
      expect((await act('sign', id, version, anna, body)).status).toBe(422)
      expect(await one(id)).toMatchObject({ state: 'draft' })
    },
  )

  it('is refused while the measures disagree and nothing is said about it, and keeps what was said', async () => {
    const { id, version } = await written({ handPreference: 'right_settled' })
    const { contradictions, missing } = await check(id)
    expect(contradictions.length).toBeGreaterThan(0)
    expect(missing).toHaveProperty('aboutDisagreements')
    const refused = await act('sign', id, version)
    expect(Object.keys(refused.body.fields)).toEqual(['aboutDisagreements'])
    const saved = await put(id, version, {
      handPreference: 'right_settled',
      aboutDisagreements: 'At home the right hand is asked for.',
    })
    const answer = await act('sign', id, saved.body.version)
    expect(answer.body).toMatchObject({ state: 'signed', evidence: { contradictions } })
  })

  it('is refused while a measure or a questionnaire is begun, names them, and goes once they are discarded', async () => {
    const { id, version } = await written()
    const pegs = await buildMeasure(child, therapist, {
      locked: false,
      kind: 'pegs',
      measuredOn: '2026-06-09',
    })
    const form = await buildQuestionnaire(child, therapist, { locked: false, answeredOn: '2026-06-08' })
    expect((await check(id)).unfinished).toEqual([
      {
        kind: 'questionnaire',
        id: form.id,
        words: 'Hand use in ten everyday activities (therapist saw it), begun for 8 Jun 2026',
      },
      { kind: 'measure', id: pegs.id, words: 'Moving pegs, begun for 9 Jun 2026' },
    ])
    const refused = await act('sign', id, version)
    expect(refused.status).toBe(422)
    expect(refused.body.fields.unfinished).toContain('Moving pegs, begun for 9 Jun 2026')
    await database().query('DELETE FROM measures WHERE id = ?', [pegs.id])
    await database().query('DELETE FROM questionnaire_responses WHERE id = ?', [form.id])
    expect((await act('sign', id, version)).status).toBe(200)
  })

  it('does not wait for answers to a request that was cancelled', async () => {
    const { id, version } = await written()
    const guardian = await buildGuardian(child)
    const request = await insertRow(AnswerRequest, {
      id: randomUUID(),
      childId: child.id,
      asks: 'questionnaire',
      formId: 'hand-use-10.v1',
      answerer: 'guardian',
      guardianId: guardian.id,
      teacherId: null,
      tokenHash: null,
      askedAt: new Date('2026-06-01T09:00:00Z'),
      askedById: therapist.id,
      expiresAt: new Date('2026-06-29T09:00:00Z'),
      reminders: 0,
      answeredAt: null,
      cancelledAt: null,
    })
    await buildQuestionnaire(child, therapist, {
      locked: false,
      informant: 'guardian',
      requestId: request.id,
    })
    expect((await act('sign', id, version)).body.fields.unfinished).toContain(
      'wait or withdraw the questions',
    )
    await database().query('UPDATE answer_requests SET cancelledAt = ? WHERE id = ?', [
      new Date(),
      request.id,
    ])
    expect((await act('sign', id, version)).status).toBe(200)
  })

  it.each([
    ['a plan to change hands', { planDetail: 'Switch him to the right hand.' }, 'planDetail'],
    [
      'advice to write with the other hand',
      { planDetail: 'Write with the right hand at school.' },
      'planDetail',
    ],
    ['a change of hand among the reasons', { reasoning: 'She should become right-handed.' }, 'reasoning'],
    ['a blocked word', { strengths: 'Not as clumsy as it looked.' }, 'strengths'],
  ])('refuses %s with kind words beside the field', async (_what, given, field) => {
    const { id, version } = await written(given)
    expect((await check(id)).findings).toEqual([expect.objectContaining({ field, level: 'blocked' })])
    const answer = await act('sign', id, version)
    expect(answer.status).toBe(422)
    expect(Object.keys(answer.body.fields)).toEqual([field])
  })

  it('takes what was once asked of the child as history, and points out words without stopping', async () => {
    const { id, version } = await written({
      reasoning: 'At age five he was asked to switch to the right hand. He failed to see why.',
    })
    expect((await check(id)).findings).toEqual([
      expect.objectContaining({ field: 'reasoning', level: 'discouraged', phrase: 'failed' }),
    ])
    expect((await act('sign', id, version)).status).toBe(200)
  })

  it('refuses characters that no font of the report has, naming them', async () => {
    const { id, version } = await written({ strengths: 'Well done 🌟' })
    const answer = await act('sign', id, version)
    expect(answer.status).toBe(422)
    expect(answer.body).toMatchObject({ code: 'unprintable' })
    expect(answer.body.message).toContain('🌟')
  })

  it('leaves an entry for each act and reading', async () => {
    const { id } = await signed()
    await one(id)
    await check(id)
    await bytesOf(anna, id)
    const entries = (await database().query(
      "SELECT action, detail FROM audit_entries WHERE objectId = ? AND objectType = 'conclusion' ORDER BY at, position",
      [id],
    )) as { action: string; detail: string | null }[]
    expect(entries.map(({ action }) => action)).toEqual([
      'conclusion.started',
      'conclusion.changed',
      'conclusion.signed',
      'conclusion.read',
      'conclusion.check_read',
      'conclusion.report_opened',
    ])
    expect(JSON.stringify(entries)).not.toContain('comic')
  })
})

describe('a conclusion by a newly qualified therapist', () => {
  let junior: User
  let june: Client
  beforeEach(async () => {
    junior = await buildUser('therapist', { newlyQualified: true, displayName: 'June Carrow' })
    await alsoHeldBy(child, junior)
    june = await signedInAs(junior)
  })
  const handedIn = async () => {
    const { id, version } = await written({}, june)
    const answer = await act('sign', id, version, june)
    expect(answer.status, answer.text).toBe(200)
    return answer.body as ConclusionView
  }

  it('waits for the lead, who has a task, countersigns on purpose and so closes the assessment', async () => {
    const waiting = await handedIn()
    expect(waiting).toMatchObject({
      state: 'awaiting_countersignature',
      can: { change: false, sign: false, countersign: false, discard: false, report: false },
    })
    expect(await stateOf()).toBe('assessing')
    const [task] = await database().manager.findBy(Task, { childId: child.id })
    expect(task).toMatchObject({ forRole: 'clinicLead', doneAt: null, dueOn: '2026-06-17' })
    const ticked = await lead.post(`/api/tasks/${task?.id}/finish`)
    expect([ticked.status, ticked.body.code]).toEqual([409, 'answer_needed'])
    expect((await bytesOf(june, waiting.id)).status).toBe(409)

    expect((await act('countersign', waiting.id, waiting.version, lead, {})).status).toBe(422)
    expect((await act('countersign', waiting.id, 1, lead)).body).toMatchObject({ code: 'stale' })
    expect((await one(waiting.id, lead)).can.countersign).toBe(true)
    const answer = await act('countersign', waiting.id, waiting.version, lead)
    expect(answer.body).toMatchObject({
      state: 'signed',
      author: 'June Carrow',
      countersignedBy: 'Ines Valderrama',
      countersignedAt: '2026-06-10T13:00:00.000Z',
      can: { report: true },
    })
    expect(await stateOf()).toBe('formulated')
    const [done] = await database().manager.findBy(Task, { childId: child.id })
    expect(done?.doneById).toBe(leadUser.id)
    expect((await act('countersign', waiting.id, waiting.version + 1, lead)).body).toMatchObject({
      code: 'closed',
    })
  })

  it('is countersigned by an experienced therapist of the child too, never by the author', async () => {
    const waiting = await handedIn()
    expect((await act('countersign', waiting.id, waiting.version, june)).status).toBe(403)
    expect((await act('countersign', waiting.id, waiting.version, anna)).body).toMatchObject({
      state: 'signed',
    })
  })

  it('is not countersigned while a pressing warning sign that came since waits for somebody', async () => {
    const waiting = await handedIn()
    const raised = await anna
      .post(`/api/children/${child.id}/alerts`)
      .send({ flag: 'walk-changed', words: 'Drags the left foot since Monday' })
    expect(raised.status, raised.text).toBe(201)
    const refused = await act('countersign', waiting.id, waiting.version, lead)
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, ['warningSigns']])
    await anna
      .post(`/api/children/${child.id}/alerts/${raised.body.id}/action`)
      .send({ action: 'Seen at the hospital the same day' })
    expect((await act('countersign', waiting.id, waiting.version, lead)).body.state).toBe('signed')
  })

  it('is not countersigned before it is signed', async () => {
    const { id, version } = await written({}, june)
    expect((await act('countersign', id, version, lead)).body).toMatchObject({ code: 'closed' })
  })
})

describe('a newer conclusion', () => {
  it('starts from the signed text, takes its place once, and leaves it unchanged', async () => {
    const earlier = await signed()
    const begun = await anna.post(at()).send({ replacesId: earlier.id })
    expect(begun.status, begun.text).toBe(201)
    expect(begun.body).toMatchObject({ replacesId: earlier.id, content: full() })
    expect(await one(earlier.id)).toMatchObject({
      state: 'signed',
      replacedById: begun.body.id,
      can: { replace: false },
    })
    await put(begun.body.id, 1, { confidence: 'medium' })
    expect((await act('sign', begun.body.id, 2)).status).toBe(200)
    const again = await anna.post(at()).send({ replacesId: earlier.id })
    expect(again.body).toMatchObject({ code: 'duplicate' })
    expect((await one(earlier.id)).content.confidence).toBe('high')
    const list: ConclusionView[] = (await lead.get(at())).body
    expect(list.map(({ id }) => id).toSorted()).toEqual([earlier.id, begun.body.id].toSorted())
  })

  it('cannot take the place of a draft, of another child’s or of none', async () => {
    const { made } = await assessed()
    const theirs = await buildConclusion(made, therapist, 'signed')
    const waiting = await buildConclusion(child, therapist, 'awaiting_countersignature')
    expect((await anna.post(at()).send({ replacesId: theirs.id })).status).toBe(404)
    expect((await anna.post(at()).send({ replacesId: randomUUID() })).status).toBe(404)
    expect((await anna.post(at()).send({ replacesId: waiting.id })).body).toMatchObject({
      code: 'not_signed',
    })
    expect((await anna.post(at()).send({ replacesId: 'x' })).status).toBe(422)
  })
})

describe('the report', () => {
  it('is a PDF under a name of our own, the same bytes whenever it is opened', async () => {
    const { id } = await signed()
    const answer = await bytesOf(anna, id)
    expect(answer.status).toBe(200)
    expect(answer.headers['content-type']).toBe('application/pdf')
    expect(answer.headers['content-disposition']).toBe('inline; filename="assessment-report-2026-06-10.pdf"')
    const text = pdfText(answer.body)
    expect(text).toContain(
      `About ${child.givenName} ${child.familyName}. Our reference: ${child.recordNumber}`,
    )
    expect(text).toContain('Left-handed, settled.')
    expect(text).toContain('Adaeze Nwosu-Reid')
    expect(text).not.toContain('Countersigned')

    // Whatever happens on the record afterwards stays out of it.
    await buildMeasure(child, therapist, {
      locked: true,
      kind: 'reaching',
      details: reachingDetails(() => 'right'),
    })
    await database().query("UPDATE children SET familyName = 'Changed' WHERE id = ?", [child.id])
    expect(((await bytesOf(lead, id)).body as Buffer).equals(answer.body)).toBe(true)
  })

  it('is not printed from a draft', async () => {
    const { id } = await written()
    const answer = await anna.get(at(`/${id}/report.pdf`))
    expect(answer.status).toBe(409)
    expect(answer.body).toMatchObject({ code: 'not_signed' })
  })
})

describe('who may not', () => {
  it('shows a conclusion to nobody but the child’s therapist and the lead, who writes nothing', async () => {
    const { id, version } = await signed()
    const teacher = await buildUser('teacher')
    const schoolClass = await buildClass(teacher)
    await database().query('UPDATE children SET schoolClassId = ? WHERE id = ?', [schoolClass.id, child.id])
    const carer = await buildUser('guardian')
    await buildGuardian(child, carer)
    const others = [
      await signedInAs(await buildUser('therapist')),
      await signedInAs(await buildUser('administrator')),
      await signedInAs(teacher),
      await signedInAs(carer),
    ]
    for (const other of others)
      for (const path of ['', `/${id}`, `/${id}/check`, `/${id}/report.pdf`])
        expect((await other.get(at(path))).status).toBe(404)
    expect((await client().get(at())).status).toBe(401)
    expect((await lead.post(at()).send({ replacesId: null })).status).toBe(403)
    expect((await put(id, version, {}, lead)).status).toBe(403)
    expect((await act('sign', id, version, lead)).status).toBe(403)
  })

  it('finds nothing of another child under this child’s address', async () => {
    const { made } = await assessed()
    const theirs = await buildConclusion(made, therapist, 'signed')
    for (const path of ['', '/check', '/report.pdf'])
      expect((await anna.get(at(`/${theirs.id}${path}`))).status).toBe(404)
    expect((await put(theirs.id, 1)).status).toBe(404)
    expect((await act('sign', theirs.id, 1)).status).toBe(404)
  })

  it('keeps the app account itself from changing or removing what is signed', async () => {
    const { id } = await signed()
    const refused = /signed conclusion is closed/
    const update = (patch: string) => database().query(`UPDATE conclusions SET ${patch} WHERE id = ?`, [id])
    await expect(update("content = '{}'")).rejects.toThrow(refused)
    await expect(update("state = 'draft'")).rejects.toThrow(refused)
    await expect(update('evidence = NULL')).rejects.toThrow(refused)
    await expect(database().query('DELETE FROM conclusions WHERE id = ?', [id])).rejects.toThrow(refused)
  })

  it('keeps the app account from changing one that waits for its countersignature', async () => {
    const { id } = await buildConclusion(child, therapist, 'awaiting_countersignature')
    const refused = /waiting for its countersignature is closed/
    const update = (patch: string) => database().query(`UPDATE conclusions SET ${patch} WHERE id = ?`, [id])
    await expect(update("content = '{}'")).rejects.toThrow(refused)
    await expect(update("state = 'draft'")).rejects.toThrow(refused)
    await expect(update(`state = 'signed', authorId = '${leadUser.id}'`)).rejects.toThrow(refused)
    await expect(database().query('DELETE FROM conclusions WHERE id = ?', [id])).rejects.toThrow(/closed/)
    expect(await database().manager.findOneByOrFail(Conclusion, { id })).toMatchObject({
      state: 'awaiting_countersignature',
    })
  })
})
