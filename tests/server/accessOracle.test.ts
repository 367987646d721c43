import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { closeDatabase } from '../../server/dataSource.ts'
import type { PersonKey } from '../support/accessPeople.ts'
import { buildScene, childOf, personOf, type Scene } from '../support/accessScene.ts'
import { expected, perform, prepareCall, type ReadyCall } from '../support/accessSweep.ts'
import { openWire, type Wire } from '../support/accessWire.ts'
import { buildAdvice, buildReferral } from '../support/clinicRows.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { buildChild, buildGuardian, giveConsent } from '../support/factories.ts'
import { buildNote } from '../support/records.ts'
import { buildDelivery, buildLetter } from '../support/storedLetters.ts'
import { buildTask } from '../support/tasks.ts'
import { accessRows, type Expected } from './accessFixture.ts'

/* That the clinic knows a child is health data too: no list, count, search or odd spelling of an address tells it. */

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

const read = async (as: PersonKey, path: string): Promise<string> => {
  const { user, cookie } = personOf(scene, as)
  const answer = await wire.ask({ method: 'GET', path, userId: user.id, cookie })
  return `${answer.status} ${answer.body.toString('utf8').replaceAll(answer.requestId, '')}`
}

/** Everything in which a child out of reach could show, for those who must not know of it. */
const windows = (): [PersonKey, string][] => {
  const teacherRoom = (classId: string) => ['/api/classes', `/api/classes/${classId}/pupils?size=100`]
  const staffRoom = [
    ...['/api/today', '/api/caseload?show=all&size=100', '/api/caseload?search=Hidden&show=all'],
    ...['/api/children/find?q=Hidden', '/api/children/find?q=FF-2026-9'],
    ...['/api/letters?size=100', '/api/letters?search=Hidden', '/api/referrals?size=100'],
    ...['/api/referrals?search=Hidden', '/api/referrals?status=accepted', '/api/therapists'],
    ...['/api/schools?size=100', '/api/class-choices'],
  ]
  const as = (person: PersonKey, paths: string[]) => paths.map((path): [PersonKey, string] => [person, path])
  return [
    ...as('T2', staffRoom),
    ...as('E0 never', teacherRoom(childOf(scene, 'never').schoolClass.id)),
    ...as('EX', teacherRoom(childOf(scene, 'second').schoolClass.id)),
    ...as('GX', ['/api/my/children']),
    ...as('G0 restricted', ['/api/my/children']),
  ]
}

describe('a child who joins the clinic', () => {
  it('changes no answer to a therapist who does not hold them, nor to teachers and carers they are not shared with', async () => {
    const seen = async () => {
      const answers: Record<string, string> = {}
      for (const [person, path] of windows()) answers[`${person} ${path}`] = await read(person, path)
      return answers
    }
    const before = await seen()
    const { therapist, schoolClass } = childOf(scene, 'never')
    const child = await buildChild({
      therapist,
      schoolClassId: schoolClass.id,
      givenName: 'Hidden',
      familyName: 'Hiddenfamily',
      recordNumber: 'FF-2026-9901',
      nextReviewOn: '2026-01-01',
    })
    const guardian = await buildGuardian(child)
    await giveConsent(child, 'assessment_treatment', therapist)
    await buildNote(child, therapist, 'draft')
    await buildDelivery(await buildLetter(child, therapist, 'sent'), guardian, 'failed')
    await buildAdvice(child, therapist)
    await buildTask({ childId: child.id, assigneeId: therapist.id })
    await buildReferral(personOf(scene, 'AD').user, 'accepted', {
      child,
      givenName: 'Hidden',
      familyName: 'Hiddenfamily',
      classId: schoolClass.id,
    })
    expect(await seen()).toEqual(before)
  })
})

/** Other spellings of one address; the rule behind it must be the same. */
const spellings: [string, (call: ReadyCall) => ReadyCall][] = [
  ['HEAD', (call) => ({ ...call, method: 'HEAD' })],
  ['a slash at the end', (call) => ({ ...call, path: call.path.replace(/(\?|$)/, '/$1') })],
  [
    'capitals',
    (call) => ({ ...call, path: call.path.replace(/^\/api\/[a-z]+/, (part) => part.toUpperCase()) }),
  ],
  ['an encoded letter', (call) => ({ ...call, path: call.path.replace('/api/', '/%61pi/') })],
  ['doubled slashes', (call) => ({ ...call, path: call.path.replace('/api/', '/api//') })],
  [
    'a doubled query key',
    (call) => ({ ...call, path: `${call.path}${call.query ? '&' : '?'}page=1&page=1` }),
  ],
]

const reads = accessRows.filter((row) => row.route.startsWith('GET') && row.area !== 'open')
const keptOut: PersonKey[] = ['T2', 'E1', 'E0 never', 'G0 restricted', 'AD']

/** One refused read for each route and person, with what it answers in its plain spelling. */
const refusedReads = async (): Promise<[ReadyCall, Expected][]> => {
  const found: [ReadyCall, Expected][] = []
  for (const row of reads) {
    const shared = new Map<string, ReadyCall>()
    for (const person of keptOut) {
      const wanted = expected(row, person, 'own')
      if (wanted !== 'ok') found.push([await prepareCall(scene, row, person, 'own', shared), wanted])
    }
  }
  return found
}

describe('another spelling of an address', () => {
  let refused: [ReadyCall, Expected][]
  beforeAll(async () => {
    refused = await refusedReads()
  })

  it.each(spellings)('with %s lets nobody in who is kept out otherwise', async (_name, respell) => {
    const problems = await Promise.all(
      refused.map(async ([plain, wanted]) => {
        const call = respell(plain)
        const { status } = await perform(wire, scene, call)
        // A spelling that leads nowhere is a 404 for everybody.
        return [wanted, 404].includes(status)
          ? []
          : [`${call.caller} ${call.method} ${call.path}: ${status} instead of ${wanted}`]
      }),
    )
    expect(problems.flat()).toEqual([])
  })
})
