import type { LetterState } from '../../../shared/letters.ts'
import { database } from '../../../server/dataSource.ts'
import type { Guardian } from '../../../server/entities/Guardian.ts'
import { buildDelivery, buildLetter, letterText } from '../storedLetters.ts'
import { authorOf, type Calls, type On } from './call.ts'

/** The caller's own carer row where they have one, else the first. */
const carerOf = ({ child, person }: On): Guardian => {
  const carer = child.guardians.get(person.key) ?? [...child.guardians.values()][0]
  if (!carer) throw new Error('The child has no carer')
  return carer
}

const letterIn = async (on: On, state: LetterState) => {
  const letter = await buildLetter(on.child.child, authorOf(on), state)
  return { letter, ids: [letter.id], version: letter.version }
}

const stored =
  (state: LetterState, body: object | null = {}) =>
  async (on: On) => {
    const { ids, version } = await letterIn(on, state)
    return { ids, version, ...(body && { body }) }
  }

const received = async (on: On) => {
  const { letter } = await letterIn(on, 'sent')
  const delivery = await buildDelivery(letter, carerOf(on), 'sent')
  return { letter, delivery }
}

const path = (rest: string) => rest.replace('…', '/api/children/:childId')

/** Letters, from the first draft to a carer's reading. */
export const letterCalls: Calls = {
  'GET /api/letters': () => ({ query: 'size=100' }),
  [path('GET …/letters')]: () => ({ query: 'size=100' }),
  [path('POST …/letters')]: () => ({ body: { kind: 'progress' } }),
  [path('GET …/letters/:id')]: stored('draft', null),
  [path('PUT …/letters/:id')]: stored('draft', letterText('Swims well')),
  [path('DELETE …/letters/:id')]: stored('draft', null),
  [path('POST …/letters/:id/check')]: stored('draft', letterText('Swims well')),
  [path('POST …/letters/:id/submit')]: async ({ child, standing, person }) => {
    const author = standing === 'T1' ? person.user : child.therapist
    const letter = await buildLetter(child.child, author, 'draft')
    const mark = (newlyQualified: boolean) =>
      database().query('UPDATE users SET newlyQualified = ? WHERE id = ?', [newlyQualified, author.id])
    // Only the newly qualified hand a letter over.
    if (standing !== 'T1') return { ids: [letter.id], version: letter.version, body: {} }
    await mark(true)
    return { ids: [letter.id], version: letter.version, body: {}, after: () => mark(false) }
  },
  [path('POST …/letters/:id/approve')]: (on) =>
    stored(on.standing === 'L' ? 'awaiting_approval' : 'draft', { overrides: [] })(on),
  [path('POST …/letters/:id/return')]: stored('awaiting_approval', {
    reason: 'Name the school’s part too',
  }),
  [path('POST …/letters/:id/take-back')]: stored('approved'),
  [path('POST …/letters/:id/send')]: async (on) => ({
    ...(await stored('approved', null)(on)),
    body: { guardianIds: [carerOf(on).id] },
  }),
  [path('POST …/letters/:id/recall')]: async (on) => {
    const { letter, ids, version } = await letterIn(on, 'queued')
    await buildDelivery(letter, carerOf(on), 'queued')
    return { ids, version, body: {} }
  },
  [path('GET …/letters/:id/pdf')]: stored('approved', null),
  [path('POST …/letters/:id/deliveries/:id/retry')]: async (on) => {
    const { letter, version } = await letterIn(on, 'queued')
    const delivery = await buildDelivery(letter, carerOf(on), 'failed')
    return { ids: [letter.id, delivery.id], version, body: {} }
  },

  'GET /api/my/letters/:id': async (on) => ({ ids: [(await received(on)).letter.id] }),
  'GET /api/my/letters/:id/pdf': async (on) => ({ ids: [(await received(on)).letter.id] }),
  'GET /api/my/deliveries/:id': async (on) => ({ ids: [(await received(on)).delivery.id] }),
}
