import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import { formsOfTheStart } from '../../server/migrations/1764580000000-formsOfTheStart.ts'
import type { FormDefinition, FormView } from '../../shared/forms.ts'
import type { HandUseAnswer } from '../../shared/handUse.ts'
import type { QuestionnaireView } from '../../shared/questionnaires.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildUser, giveConsent } from '../support/factories.ts'

beforeAll(startApp)
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

let lead: Client
let therapist: User
let anna: Client
let child: Child

beforeAll(async () => {
  setClock(() => new Date('2026-06-10T09:00:00Z'))
  lead = await signedInAs(await buildUser('clinicLead'))
  therapist = await buildUser('therapist')
  anna = await signedInAs(therapist)
})

beforeEach(async () => {
  // Editions are never removed: each test begins with the first ones alone in use.
  await database().query('UPDATE questionnaire_forms SET retiredAt = IF(edition = 1, NULL, NOW(6))')
  child = await buildChild({ therapist })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const all = async (client = anna): Promise<FormView[]> => (await client.get('/api/forms')).body
const inUse = async () => (await all()).filter(({ retiredAt }) => retiredAt === null).map(({ id }) => id)
const retire = (id: string) => lead.post(`/api/forms/${id}/retire`).send({})
const restore = (id: string) => lead.post(`/api/forms/${id}/restore`).send({})
const wordsOf = (key: string): FormDefinition => {
  const form = formsOfTheStart.find((candidate) => candidate.key === key)
  if (!form) throw new Error(`There is no form ${key}`)
  return structuredClone(form.definition)
}
let made = 0
/** Words that no edition has yet. */
const reworded = (key: string, more: Partial<FormDefinition> = {}): FormDefinition => {
  made += 1
  return { ...wordsOf(key), purpose: `What it is for, told in another way for the ${made}th time.`, ...more }
}
const publish = (key: string, definition: object) => lead.post('/api/forms').send({ key, definition })
const published = async (key: string, definition = reworded(key)): Promise<FormView> => {
  const response = await publish(key, definition)
  expect(response.status, response.text).toBe(201)
  return response.body
}

const at = (path = '') => `/api/children/${child.id}/questionnaires${path}`
const start = (formId: string, more: object = {}) =>
  anna.post(at()).send({
    formId,
    informant: 'child_demonstrated',
    respondentName: null,
    answeredOn: '2026-06-09',
    replacesId: null,
    ...more,
  })
const begun = async (formId: string, more: object = {}): Promise<QuestionnaireView> => {
  const response = await start(formId, more)
  expect(response.status, response.text).toBe(201)
  return response.body
}
const save = (
  { id, version, cutOffSet, form, informant }: QuestionnaireView,
  given: HandUseAnswer[],
  more = {},
) =>
  anna
    .put(at(`/${id}`))
    .set('If-Match', `"${version}"`)
    .send({
      informant,
      respondentName: null,
      answeredOn: '2026-06-09',
      answers: Object.fromEntries(
        form.definition.items.map((item, index) => [item.id, given[index] ?? null]),
      ),
      cutOffSet,
      comment: null,
      ...more,
    })
const locked = async (
  formId: string,
  given: HandUseAnswer[],
  more: object = {},
): Promise<QuestionnaireView> => {
  const saved = await save(await begun(formId, more), given)
  expect(saved.status, saved.text).toBe(200)
  const response = await anna
    .post(at(`/${saved.body.id}/lock`))
    .set('If-Match', `"${saved.body.version}"`)
    .send({})
  expect(response.status, response.text).toBe(200)
  return response.body
}

describe('the clinic’s forms', () => {
  it('are six at the start, each with its words, its source and who may answer, for all staff to see', async () => {
    for (const client of [anna, lead, await signedInAs(await buildUser('administrator'))])
      expect((await all(client)).filter(({ edition }) => edition === 1)).toHaveLength(6)
    expect(await inUse()).toEqual([
      'hand-use-10.v1',
      'seven-task.v1',
      'short-4.v1',
      'shown-8.v1',
      'ten-task.v1',
      'ten-task-count.v1',
    ])
    const first = (await all()).find(({ id }) => id === 'ten-task.v1')
    expect(first).toEqual({
      id: 'ten-task.v1',
      key: 'ten-task',
      edition: 1,
      definition: wordsOf('ten-task'),
      retiredAt: null,
    })
  })

  it('are no business of teachers and carers, and only the lead changes them', async () => {
    for (const role of ['teacher', 'guardian'] as const)
      expect((await (await signedInAs(await buildUser(role))).get('/api/forms')).status).toBe(403)
    for (const client of [anna, await signedInAs(await buildUser('administrator'))]) {
      const tried = [
        await client.post('/api/forms').send({ key: 'short-4', definition: reworded('short-4') }),
        await client.post('/api/forms/short-4.v1/retire').send({}),
        await client.post('/api/forms/short-4.v1/restore').send({}),
      ]
      expect(tried.map(({ status }) => status)).toEqual([403, 403, 403])
    }
    expect(await inUse()).toContain('short-4.v1')
  })
})

describe('retiring a form', () => {
  it('keeps anybody from beginning with it until it is brought back', async () => {
    expect((await retire('shown-8.v1')).body).toMatchObject({ retiredAt: '2026-06-10T09:00:00.000Z' })
    const refused = await start('shown-8.v1')
    expect([refused.status, refused.body.fields.formId]).toEqual([422, expect.stringMatching(/retired/)])
    expect((await restore('shown-8.v1')).body.retiredAt).toBeNull()
    await begun('shown-8.v1')
  })

  it('lets what was begun with it be answered and locked', async () => {
    const draft = await begun('shown-8.v1')
    await retire('shown-8.v1')
    const saved = await save(draft, Array(8).fill('left'))
    expect(saved.body.form).toMatchObject({ id: 'shown-8.v1', retiredAt: '2026-06-10T09:00:00.000Z' })
    const done = await anna
      .post(at(`/${draft.id}/lock`))
      .set('If-Match', `"${saved.body.version}"`)
      .send({})
    expect(done.status, done.text).toBe(200)
    expect(done.body.score).toMatchObject({ total: 24, quotient: -100, direction: 'left' })
  })

  it('is refused twice over, and for a form nobody knows', async () => {
    await retire('shown-8.v1')
    expect((await retire('shown-8.v1')).body.code).toBe('closed')
    expect((await restore('short-4.v1')).body.code).toBe('closed')
    expect([(await retire('short-4.v99')).status, (await restore('nothing')).status]).toEqual([404, 404])
  })

  it('leaves an entry of who did it', async () => {
    await retire('short-4.v1')
    const [entry] = (await database().query(
      "SELECT action, objectId, roles FROM audit_entries WHERE action LIKE 'form.%' ORDER BY position DESC LIMIT 1",
    )) as object[]
    expect(entry).toEqual({ action: 'form.retired', objectId: 'short-4.v1', roles: 'clinicLead' })
  })
})

describe('a new edition', () => {
  it('takes the place of the one in use, whose text stays as it was answered', async () => {
    const old = await locked('short-4.v1', Array(4).fill('strong_left'))
    const newer = await published('short-4')
    expect(newer).toMatchObject({ key: 'short-4', retiredAt: null })
    const editions = (await all()).filter(({ key }) => key === 'short-4')
    expect(editions.filter(({ retiredAt }) => retiredAt === null).map(({ id }) => id)).toEqual([newer.id])
    expect((await anna.get(at(`/${old.id}`))).body.form.definition).toEqual(wordsOf('short-4'))
    expect((await restore('short-4.v1')).body).toMatchObject({ code: 'duplicate' })
  })

  it('may answer for the one before: a response is replaced by one to the same form only', async () => {
    const old = await locked('short-4.v1', Array(4).fill('strong_left'))
    const newer = await published('short-4')
    const other = await start('seven-task.v1', { replacesId: old.id })
    expect([other.status, other.body.fields.formId]).toEqual([422, expect.stringMatching(/same form/)])
    const again = await locked(newer.id, Array(4).fill('strong_right'), { replacesId: old.id })
    expect(again).toMatchObject({ replacesId: old.id, form: { id: newer.id }, score: { quotient: 100 } })
  })

  it('made twice at once is made once', async () => {
    const words = reworded('short-4')
    const answers = await Promise.all([publish('short-4', words), publish('short-4', words)])
    expect(answers.map(({ status }) => status).toSorted()).toEqual([201, 409])
  })

  const changed = (key: string, change: (words: FormDefinition) => void) => {
    const words = reworded(key)
    change(words)
    return words
  }
  it.each([
    ['another method', (w: FormDefinition) => (w.scoring = 'one_mark'), 'definition.scoring'],
    ['another set of answers', (w: FormDefinition) => w.options.pop(), 'definition.options'],
    ['other cut-offs', (w: FormDefinition) => (w.cutOffSet = 'sixty'), 'definition.cutOffSet'],
    ['an activity less', (w: FormDefinition) => w.items.pop(), 'definition.items'],
    [
      'a caution left out',
      (w: FormDefinition) => (w.items[3]!.caution = null),
      'definition.items[3].caution',
    ],
    [
      'no words for the child',
      (w: FormDefinition) => (w.items[0]!.childLabel = ''),
      'definition.items[0].childLabel',
    ],
    [
      'an activity without words',
      (w: FormDefinition) => (w.items[1]!.label = ' '),
      'definition.items[1].label',
    ],
    ['no source', (w: FormDefinition) => (w.citation = ''), 'definition.citation'],
    ['nobody to answer', (w: FormDefinition) => (w.informants = []), 'definition.informants'],
    ['no caution at all', (w: FormDefinition) => (w.cautions = []), 'definition.cautions'],
    ['a title that is too long', (w: FormDefinition) => (w.title = 'x'.repeat(81)), 'definition.title'],
  ] as [string, (words: FormDefinition) => unknown, string][])(
    'is refused beside the field with %s',
    async (_what, change, field) => {
      const response = await publish(
        'ten-task',
        changed('ten-task', (words) => change(words)),
      )
      expect(response.status, response.text).toBe(422)
      expect(Object.keys(response.body.fields)).toContain(field)
      expect(await inUse()).toContain('ten-task.v1')
    },
  )

  it('is refused for a form nobody knows, with a field nobody knows, and with words that are there already', async () => {
    expect((await publish('juggling', reworded('short-4'))).body.fields).toHaveProperty('key')
    expect((await publish('short-4', { ...reworded('short-4'), norms: [] })).status).toBe(422)
    expect((await publish('short-4', wordsOf('short-4'))).body.code).toBe('duplicate')
  })

  it('belongs to a form of exactly that name, though the database takes one for the other', async () => {
    const alike = ['SHORT-4', 'short-4 ', 'Shört-4']
    for (const key of alike) {
      const [found] = await database().query(
        'SELECT COUNT(*) AS n FROM questionnaire_forms WHERE formKey = ?',
        [key],
      )
      expect(Number(found.n), key).toBeGreaterThan(0)
      const refused = await publish(key, reworded('short-4'))
      expect([refused.status, refused.body.fields], key).toEqual([422, { key: expect.any(String) }])
      expect((await start(`${key}.v1`)).body.fields, key).toHaveProperty('formId')
    }
    expect((await all()).map((form) => form.key)).not.toContain('SHORT-4')
  })

  it('is kept by the database: no edition is changed or removed', async () => {
    await expect(
      database().query("UPDATE questionnaire_forms SET definition = '{}' WHERE id = 'ten-task.v1'"),
    ).rejects.toThrow(/never changed/)
    await expect(
      database().query("DELETE FROM questionnaire_forms WHERE id = 'ten-task.v1'"),
    ).rejects.toThrow(/never removed|denied/)
  })
})

describe('a response to any form', () => {
  // Worked by hand: two marks 2·10 left; one mark 10 left; mean of −100; sum 8·3 = 24, 100 (16 − 24) / 8.
  it.each([
    ['hand-use-10.v1', 10, 'strong_left', { method: 'edinburgh_style', left: 20, right: 0, total: null }],
    ['ten-task.v1', 10, 'strong_left', { method: 'two_marks', left: 20, right: 0, total: null }],
    ['ten-task-count.v1', 10, 'left', { method: 'one_mark', left: 10, right: 0, total: null }],
    ['seven-task.v1', 7, 'strong_left', { method: 'two_marks', left: 14, right: 0, total: null }],
    ['short-4.v1', 4, 'strong_left', { method: 'mean_of_five', left: null, right: null, total: null }],
    ['shown-8.v1', 8, 'left', { method: 'demonstrated_actions', left: null, right: null, total: 24 }],
  ] as [string, number, HandUseAnswer, object][])(
    'is begun blank, answered, and locked with the score of its own method: %s',
    async (formId, count, answer, marks) => {
      const blank = await begun(formId)
      expect(Object.values(blank.answers)).toEqual(Array(count).fill(null))
      expect(blank.score).toMatchObject({ answered: 0, unanswered: count, quotient: null })
      const { score, form } = await locked(formId, Array(count).fill(answer))
      expect(form.id).toBe(formId)
      expect(score).toMatchObject({ ...marks, formVersion: formId, quotient: -100, standing: 'scorable' })
    },
  )

  it('is read with the bounds of its own form, else with the clinic’s', async () => {
    const sets = async (id: string) => (await begun(id)).cutOffSet
    expect([await sets('short-4.v1'), await sets('shown-8.v1'), await sets('ten-task.v1')]).toEqual([
      'sixty',
      'sign-only',
      'clinic-40',
    ])
    // Mean 50 is mixed by the bounds of 60 (values and bounds from memory), and would be right by 40.
    expect((await locked('short-4.v1', Array(4).fill('right'))).score).toMatchObject({
      quotient: 50,
      direction: 'mixed',
    })
  })

  it.each([
    ['an answer the form does not offer', { cut_clay: 'strong_left' }, 'answers.cut_clay'],
    ['an activity of another form', { broom: 'left' }, 'answers.broom'],
    ['a name out of the language itself', { constructor: 'left' }, 'answers.constructor'],
  ])('is refused beside the item with %s', async (_what, more, field) => {
    const draft = await begun('shown-8.v1')
    const response = await save(draft, [], { answers: { ...draft.answers, ...more } })
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
    expect((await anna.get(at(`/${draft.id}`))).body.version).toBe(1)
  })

  it('is begun with a known form and by somebody who may answer it', async () => {
    const fields = async (formId: string, informant: string) =>
      Object.keys((await start(formId, { informant })).body.fields ?? {})
    expect(await fields('juggling.v1', 'therapist')).toEqual(['formId'])
    expect(await fields('', 'therapist')).toEqual(['formId'])
    expect(await fields('shown-8.v1', 'guardian')).toEqual(['informant'])
    expect(await fields('ten-task.v1', 'teacher')).toEqual(['informant'])
    const draft = await begun('ten-task.v1')
    const moved = await save(draft, [], { informant: 'teacher' })
    expect([moved.status, Object.keys(moved.body.fields)]).toEqual([422, ['informant']])
  })
})
