import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { closeDatabase } from '../../server/dataSource.ts'
import type { PersonKey } from '../support/accessPeople.ts'
import { buildScene, childOf, personOf, type Scene } from '../support/accessScene.ts'
import { expected, perform, prepareCall } from '../support/accessSweep.ts'
import { openWire, type Wire } from '../support/accessWire.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { accessRows } from './accessFixture.ts'

/* What each role gets of what it may open: the key sets of the access matrix's projections, written by hand. */

let wire: Wire
let scene: Scene

beforeAll(async () => {
  await openClinicDatabase()
  wire = await openWire()
  scene = await buildScene()
})
afterAll(async () => {
  await wire.close()
  await closeDatabase()
})

const rowOf = (route: string) => {
  const row = accessRows.find((candidate) => candidate.route === route)
  if (!row) throw new Error(`The fixture does not know ${route}`)
  return row
}

/** What this person gets for their own child, as an object. */
const answerTo = async (person: PersonKey, route: string): Promise<unknown> => {
  const answer = await perform(wire, scene, await prepareCall(scene, rowOf(route), person, 'own'))
  expect(answer.status, answer.body.toString()).toBe(200)
  return JSON.parse(answer.body.toString())
}

/** Names of all fields, however deep; a list counts through its items. */
const keysOf = (value: unknown, path = ''): string[] => {
  if (Array.isArray(value)) return value.flatMap((item) => keysOf(item, path))
  if (value === null || typeof value !== 'object') return [path]
  return Object.entries(value).flatMap(([key, inner]) =>
    Array.isArray(inner) && inner.length === 0
      ? [path ? `${path}.${key}` : key]
      : keysOf(inner, path ? `${path}.${key}` : key),
  )
}
const keySet = (value: unknown) => [...new Set(keysOf(value))].sort()

const page = (...keys: string[]) => [...keys.map((key) => `rows.${key}`), 'page', 'size', 'total'].sort()
const under = (name: string, ...keys: string[]) => keys.map((key) => `${name}.${key}`)

/** Display name, class, writing hand, advice given and shared goals (r1). */
const pupil = [
  ...['id', 'name', 'className', 'writingHand', 'goals'],
  ...under('advice', 'id', 'itemId', 'text', 'because', 'caution', 'checkBy', 'publishedOn', 'endedOn'),
  ...under('advice.reply', 'answer', 'reason', 'by', 'at'),
  ...under('advice.can', 'reply', 'end'),
].sort()

/** The own child's identity, what is shared, own letters and own contact (r2). */
const ownChild = [
  ...['id', 'name', 'birthDate', 'school', 'therapist', 'goals'],
  ...under('clinic', 'name', 'phone', 'emergencyText'),
  ...under('letters', 'id', 'childId', 'kind', 'sentAt', 'openedAt'),
  ...under('consents', 'purpose', 'label', 'consequence', 'inForce', 'consentId', 'givenBy', 'givenAt'),
  ...under('consents.can', 'give', 'withdraw'),
  ...under('ownContact', 'name', 'email', 'phone', 'address', 'version'),
].sort()

const identity = [
  ...['id', 'recordNumber', 'version', 'givenName', 'familyName', 'preferredName', 'birthDate'],
  ...['homeLanguages', 'interpreterLanguage', 'scriptDirection', 'classId', 'lookedAfter', 'consentsForSelf'],
  'can.change',
].sort()

const table: [string, PersonKey, string, string[]][] = [
  ['a teacher gets of a pupil', 'E1', 'GET /api/pupils/:childId', pupil],
  [
    'a teacher gets of a class',
    'E1',
    'GET /api/classes/:id/pupils',
    page('id', 'name', 'writingHand', 'advice', 'unanswered', 'changedOn'),
  ],
  [
    'a teacher gets of the classes',
    'E1',
    'GET /api/classes',
    ['id', 'name', 'school', 'schoolYear', 'sharedPupils', 'unanswered'].sort(),
  ],
  ['a carer gets of the child', 'G1', 'GET /api/my/children/:childId', ownChild],
  [
    'a carer gets of the children',
    'G1',
    'GET /api/my/children',
    ['id', 'name', 'therapist', 'unreadLetters'].sort(),
  ],
  [
    'a carer gets of a letter',
    'G1',
    'GET /api/my/letters/:id',
    [
      ...['id', 'childId', 'childName', 'kind', 'sentAt', 'author', 'salutation'],
      ...under('sections', 'id', 'heading', 'text'),
      ...under('clinic', 'name', 'address', 'phone'),
    ].sort(),
  ],
  ['a carer gets of a link', 'G1', 'GET /api/my/deliveries/:id', ['childId', 'letterId']],
  [
    'a carer gets of who opened the record',
    'G1',
    'GET /api/children/:childId/access-history',
    page('id', 'at', 'who', 'relation', 'action', 'result'),
  ],
  [
    'an administrator gets of the register',
    'AD',
    'GET /api/children',
    page('id', 'recordNumber', 'name', 'birthDate', 'school', 'className', 'therapist', 'carers'),
  ],
  [
    'an administrator finds',
    'AD',
    'GET /api/children/find',
    ['id', 'recordNumber', 'name', 'birthDate', 'school'].sort(),
  ],
  ['an administrator gets of the identity', 'AD', 'GET /api/children/:childId/identity', identity],
  ['a therapist gets of colleagues', 'T2', 'GET /api/therapists', ['id', 'displayName', 'openCases'].sort()],
  [
    'a lead gets of people',
    'L',
    'GET /api/users',
    page(
      ...['id', 'displayName', 'email', 'roles', 'newlyQualified', 'state', 'lastSignInAt', 'version'],
      ...under('can', 'change', 'disable', 'enable'),
    ),
  ],
]

describe('what', () => {
  it.each(table)('%s is exactly what the matrix gives', async (_what, person, route, keys) => {
    expect(keySet(await answerTo(person, route))).toEqual(keys)
  })
})

/** Field names that hold something clinical. */
const clinicalFields = [
  ...[
    'said',
    'observed',
    'meaning',
    'plan',
    'summary',
    'textHash',
    'assent',
    'lastNote',
    'addenda',
    'revisions',
  ],
  ...['answers', 'score', 'quotient', 'lateralLine', 'questionnaires', 'cutOffSet', 'standing', 'strength'],
  ...['levels', 'ratings', 'baseline', 'latestLevel', 'baselineScore', 'samples', 'lettersPerMinute', 'grip'],
  ...['painBefore', 'painAfter', 'deskType', 'strengths', 'nextReviewOn', 'lastSeenOn', 'facts', 'checks'],
  ...['findings', 'needs', 'alerts', 'state', 'episodeId', 'triggeredBy'],
]

/** Fields with something in them: null and empty lists tell nothing. */
const filled = (value: unknown): string[] => {
  if (Array.isArray(value)) return value.flatMap(filled)
  if (value === null || typeof value !== 'object') return []
  return Object.entries(value).flatMap(([key, inner]) => [
    ...(inner === null || (Array.isArray(inner) && inner.length === 0) ? [] : [key]),
    ...filled(inner),
  ])
}

/** Where a clinical name means something else: the state of an account, the clinic’s choice of cut-offs, own answers. */
const notClinicalHere: Record<string, string[]> = {
  'GET /api/users': ['state'],
  'GET /api/settings': ['cutOffSet'],
  'GET /api/forms': ['cutOffSet'],
  'GET /api/my/children/:childId/answer-requests/:id': ['answers'],
  'GET /api/pupils/:childId/answer-requests/:id': ['answers'],
}

describe('nothing clinical', () => {
  it.each(['AD', 'E1', 'EX', 'G1', 'GX', 'teacher and carer'] as const)(
    'is in any list or page that %s may open',
    async (person) => {
      const problems: string[] = []
      for (const row of accessRows.filter((candidate) => candidate.route.startsWith('GET'))) {
        if (row.area === 'open' || expected(row, person, 'own') !== 'ok') continue
        const answer = await perform(wire, scene, await prepareCall(scene, row, person, 'own'))
        if (!String(answer.headers['content-type']).startsWith('application/json')) continue
        const allowed = notClinicalHere[row.route] ?? []
        const fields = new Set(filled(JSON.parse(answer.body.toString())))
        const told = clinicalFields.filter((field) => fields.has(field) && !allowed.includes(field))
        if (told.length > 0) problems.push(`${row.route}: ${told.join(', ')}`)
      }
      expect(problems).toEqual([])
    },
  )
})

describe('a child’s header', () => {
  it('tells an administrator no state and no alert, and opens family pages only', async () => {
    expect(await answerTo('AD', 'GET /api/children/:childId')).toMatchObject({
      state: null,
      alerts: [],
      sections: ['family'],
    })
  })
})

describe('the queue of referrals', () => {
  it('shows a therapist neither name, birth date nor school of a child who is not theirs', async () => {
    await prepareCall(scene, rowOf('POST /api/referrals/:id/accept'), 'T2', 'own')
    const list = (await answerTo('T2', 'GET /api/referrals')) as {
      rows: { status: string; childName: null; birthDate: null; school: null; ageBand: string }[]
    }
    const queued = list.rows.filter((row) => row.status === 'new')
    expect(queued.length).toBeGreaterThan(0)
    for (const row of queued) expect(row).toMatchObject({ childName: null, birthDate: null, school: null })
  })
})

describe('a carer', () => {
  it('learns of no other carer’s consent to letters, and of no restriction', async () => {
    const { id } = childOf(scene, 'first').child
    const { user, cookie } = personOf(scene, 'G1')
    const answer = await wire.ask({ method: 'GET', path: `/api/my/children/${id}`, userId: user.id, cookie })
    const { consents } = JSON.parse(answer.body.toString()) as {
      consents: { purpose: string; givenBy: string | null }[]
    }
    expect(consents.filter((consent) => consent.purpose === 'email_link')).toHaveLength(1)
    expect(answer.body.toString()).not.toMatch(/restrict/i)
  })
})
