import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { routeTable } from '../../server/middleware/checkPolicies.ts'
import { closeDatabase } from '../../server/dataSource.ts'
import { allWords, forbiddenWords } from '../support/accessCanaries.ts'
import { buildScene, type Scene } from '../support/accessScene.ts'
import {
  callersOf,
  checksums,
  expected,
  perform,
  prepareCall,
  relationOf,
  routeKey,
  targetsOf,
  tracesOf,
  type Caller,
  type ReadyCall,
  type Target,
  type Trace,
} from '../support/accessSweep.ts'
import { openWire, type Answer, type Wire } from '../support/accessWire.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { accessRows, type AccessRow } from './accessFixture.ts'

/*
 * Every route of the live table, as everybody the access matrix names, for the own child, another child, an absent id
 * and the own child with something of another behind it. A holder of an emergency grant joins when grants are built.
 */

let wire: Wire
let scene: Scene
let live: Set<string>

beforeAll(async () => {
  await openClinicDatabase()
  wire = await openWire()
  live = new Set(routeTable(wire.app).map(({ method, path }) => routeKey(`${method} ${path}`)))
  scene = await buildScene()
})
afterAll(async () => {
  await wire.close()
  await closeDatabase()
})

const name = (call: ReadyCall) => `${call.caller}, ${call.target}`
const text = (answer: Answer) => answer.body.toString('utf8')
const withoutRequestId = (answer: Answer) => text(answer).replaceAll(answer.requestId, '')
const wordsIn = (answer: Answer, words: readonly string[]) => {
  const body = text(answer)
  return words.filter((word) => word !== '' && body.includes(word))
}
const brief = (answer: Answer) => `${answer.status} ${text(answer).slice(0, 160)}`

type Pair = readonly [Caller, Target]

interface Done {
  call: ReadyCall
  answer: Answer
}

/** Refused calls go out together; no row of the clinic may differ afterwards. */
const refusedProblems = async (row: AccessRow, list: readonly Pair[]): Promise<string[]> => {
  const shared = new Map<string, ReadyCall>()
  const calls: ReadyCall[] = []
  for (const [caller, target] of list) calls.push(await prepareCall(scene, row, caller, target, shared))
  const before = await checksums()
  const done: Done[] = await Promise.all(
    calls.map(async (call) => ({ call, answer: await perform(wire, scene, call) })),
  )
  const problems: string[] = []
  const after = await checksums()
  for (const table of Object.keys(before))
    if (before[table] !== after[table]) problems.push(`a refused call changed ${table}`)

  const traces = await tracesOf(done.map(({ answer }) => answer.requestId))
  const words = allWords(scene)
  for (const { call, answer } of done) {
    const wanted = expected(row, call.caller, call.target)
    if (answer.status !== wanted) {
      problems.push(`${name(call)}: expected ${wanted}, got ${brief(answer)}`)
      continue
    }
    const told = wordsIn(answer, words)
    if (told.length > 0) problems.push(`${name(call)}: the refusal tells ${told.join(', ')}`)
    const absent = done.find(
      (other) => other.call.caller === call.caller && other.call.target === 'absent' && wanted !== 401,
    )
    if (
      absent &&
      absent.answer.status === wanted &&
      withoutRequestId(absent.answer) !== withoutRequestId(answer)
    )
      problems.push(`${name(call)}: differs from the answer to an absent id: ${text(answer)}`)
    if (wanted === 401) continue
    const entries = traces.get(answer.requestId) ?? []
    if (entries.length !== 1 || entries[0]?.result !== 'denied')
      problems.push(`${name(call)}: ${entries.length} audit entries for a refusal`)
    else if (entries[0].childId !== call.childId)
      problems.push(`${name(call)}: the refusal is recorded for child ${entries[0].childId}`)
  }
  return problems
}

const uuid = /[0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12}/g

/** Rows of a list of which the trail names neither the row nor the child it leads to. */
const unrecordedRows = (answer: Answer, detail: string): number => {
  if (!String(answer.headers['content-type']).startsWith('application/json')) return 0
  const body = JSON.parse(text(answer) || 'null') as unknown
  const rows = Array.isArray(body) ? body : (body as { rows?: unknown } | null)?.rows
  if (!Array.isArray(rows)) return 0
  const named = rows.map((row) => JSON.stringify(row).match(uuid) ?? []).filter((ids) => ids.length > 0)
  return named.filter((ids) => !ids.some((id) => detail.includes(id))).length
}

/** Allowed calls each meet a fresh thing. Reads go out together, changes one after the other. */
const performAllowed = async (row: AccessRow, list: readonly Pair[]): Promise<Done[]> => {
  const done: Done[] = []
  if (row.route.startsWith('GET')) {
    const calls: ReadyCall[] = []
    for (const [caller, target] of list) calls.push(await prepareCall(scene, row, caller, target))
    return Promise.all(calls.map(async (call) => ({ call, answer: await perform(wire, scene, call) })))
  }
  for (const [caller, target] of list) {
    const call = await prepareCall(scene, row, caller, target)
    done.push({ call, answer: await perform(wire, scene, call) })
    await call.after?.()
  }
  return done
}

const allowedProblems = async (row: AccessRow, list: readonly Pair[]): Promise<string[]> => {
  const done = await performAllowed(row, list)
  const traces = await tracesOf(done.map(({ answer }) => answer.requestId))
  return done.flatMap(({ call, answer }) => {
    if (answer.status < 200 || answer.status > 299)
      return [`${name(call)}: expected to be allowed, got ${brief(answer)}`]
    const words = call.caller === 'nobody' ? allWords(scene) : forbiddenWords(scene, call.caller)
    const told = wordsIn(answer, words).map((word) => `${name(call)}: the answer tells ${word}`)
    return [...told, ...trailProblems(row, call, answer, traces.get(answer.requestId) ?? [])]
  })
}

/** An allowed call leaves as many entries as the fixture says, under the right child and in the relation that was used. */
const trailProblems = (row: AccessRow, call: ReadyCall, answer: Answer, entries: Trace[]): string[] => {
  if (row.entries === 0) return []
  const problems: string[] = []
  if (entries.length !== row.entries)
    problems.push(`${entries.length} audit entries: ${entries.map((entry) => entry.action).join(', ')}`)
  const unrecorded = unrecordedRows(answer, entries.map((entry) => entry.detail ?? '').join(' '))
  if (call.method === 'GET' && unrecorded > 0) problems.push(`shows ${unrecorded} rows that are not recorded`)
  const relation = call.standing && relationOf[call.standing]
  for (const entry of entries) {
    if (entry.result !== 'allowed') problems.push('recorded as denied')
    if (call.about !== null && entry.childId !== call.about)
      problems.push(`${entry.action} is recorded for child ${entry.childId}`)
    if (call.childId !== null && entry.relation !== relation)
      problems.push(`${entry.action} names the relation ${entry.relation}, not ${relation}`)
  }
  return problems.map((problem) => `${name(call)}: ${problem}`)
}

describe('the fixture', () => {
  it('names every route of the app, and no other', () => {
    expect(accessRows.map((row) => routeKey(row.route)).sort()).toEqual([...live].sort())
  })
})

describe('access', () => {
  it.each(accessRows.map((row) => [row.route, row] as const))(
    '%s answers everybody as the matrix says',
    async (_route, row) => {
      const pairs: Pair[] = callersOf(row).flatMap((caller) =>
        targetsOf(row).map((target): Pair => [caller, target]),
      )
      const isAllowed = ([caller, target]: Pair) => expected(row, caller, target) === 'ok'
      const problems = [
        ...(await refusedProblems(
          row,
          pairs.filter((pair) => !isAllowed(pair)),
        )),
        ...(await allowedProblems(row, pairs.filter(isAllowed))),
      ]
      expect(problems).toEqual([])
    },
  )
})
