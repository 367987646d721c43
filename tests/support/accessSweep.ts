import { randomUUID } from 'node:crypto'
import { database } from '../../server/dataSource.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import type { AccessRow, Expected, Standing } from '../server/accessFixture.ts'
import { accountCalls } from './accessCalls/account.ts'
import { answerCalls } from './accessCalls/answers.ts'
import type { Call, Calls } from './accessCalls/call.ts'
import { childCalls } from './accessCalls/child.ts'
import { formCalls } from './accessCalls/forms.ts'
import { historyCalls } from './accessCalls/histories.ts'
import { conclusionCalls } from './accessCalls/conclusions.ts'
import { letterCalls } from './accessCalls/letters.ts'
import { measureCalls } from './accessCalls/measures.ts'
import { recordCalls } from './accessCalls/record.ts'
import { roomCalls } from './accessCalls/rooms.ts'
import { parts, personKeys, standingOf, type ChildKey, type PersonKey } from './accessPeople.ts'
import { childOf, personOf, type Scene } from './accessScene.ts'
import type { Answer, Wire } from './accessWire.ts'

const calls: Calls = {
  ...accountCalls,
  ...childCalls,
  ...recordCalls,
  ...formCalls,
  ...historyCalls,
  ...measureCalls,
  ...conclusionCalls,
  ...letterCalls,
  ...roomCalls,
  ...answerCalls,
}

/** Names of parameters do not matter: only where they stand. */
export const routeKey = (route: string) => route.replace(/:\w+/g, ':id')
const prepareOf = new Map(Object.entries(calls).map(([route, prepare]) => [routeKey(route), prepare]))

/** `crossed`: the own child in the address, with something of another child behind it. */
export const targets = ['own', 'other', 'absent', 'crossed'] as const
export type Target = (typeof targets)[number]
export type Caller = PersonKey | 'nobody'

/** Who teaches the class of which child now. */
const teaches: Partial<Record<PersonKey, readonly ChildKey[]>> = {
  E1: ['first'],
  'teacher and carer': ['first'],
  EX: ['second', 'grown'],
  'E0 withdrawn': ['withdrawn', 'expired', 'never'],
  'E0 expired': ['withdrawn', 'expired', 'never'],
  'E0 never': ['withdrawn', 'expired', 'never'],
}

const standingByRole = (person: PersonKey): Standing => {
  const roles: readonly string[] = parts[person].roles
  if (roles.includes('clinicLead')) return 'L'
  return roles.includes('administrator') ? 'AD' : 'T2'
}

export const childFor = (caller: Caller, target: Target): ChildKey =>
  target === 'other' ? 'second' : caller === 'nobody' ? 'first' : parts[caller].own

const standing = (row: AccessRow, person: PersonKey, child: ChildKey): Standing =>
  row.bound === 'queue' || row.bound === 'clinic' ? standingByRole(person) : standingOf(person, child)

/** What the matrix says this call answers. */
export const expected = (row: AccessRow, caller: Caller, target: Target): Expected => {
  if (row.area === 'open') return 'ok'
  if (caller === 'nobody' || caller === 'disabled') return 401
  const roles: readonly string[] = parts[caller].roles
  if (Array.isArray(row.area) && !row.area.some((role: string) => roles.includes(role))) return 403
  if (row.bound === null) return 'ok'
  if (target === 'absent') return 404
  const child = childFor(caller, target)
  const own: Expected =
    row.bound === 'class'
      ? teaches[caller]?.includes(child)
        ? 'ok'
        : 404
      : row.ok.includes(standing(row, caller, child))
        ? 'ok'
        : row.refused.includes(standing(row, caller, child))
          ? 403
          : 404
  return target === 'crossed' && own === 'ok' ? 404 : own
}

export const relationOf: Partial<Record<Standing, ChildRelation>> = {
  T1: 'assignedTherapist',
  L: 'clinicLead',
  E1: 'teacher',
  G1: 'guardian',
  AD: 'administrator',
}

const ofAChild: readonly AccessRow['bound'][] = ['child', 'letter', 'task', 'referral']

export interface ReadyCall extends Call {
  caller: Caller
  target: Target
  method: string
  path: string
  /** Null where no child stands in the address. */
  childId: string | null
  /** The child whose thing is addressed, in whatever way; null for the absent and for what is no child's. */
  about: string | null
  standing: Standing | null
}

/** Links and sign-ins are throttled by address, passwords cost time, and neither depends on who one is. */
const wayIn: readonly Caller[] = ['T1', 'G1', 'disabled', 'nobody']
export const callersOf = (row: AccessRow): readonly Caller[] =>
  row.bound === null && /^POST .*(sign-|password|confirm)/.test(row.route) ? wayIn : [...personKeys, 'nobody']

/** Which targets make sense for a route: nothing is absent where nothing particular is addressed. */
export const targetsOf = (row: AccessRow): readonly Target[] => {
  if (row.bound === null) return ['own']
  const behind = row.route.split('/:').length > 2
  return row.bound === 'child' && behind
    ? targets
    : row.bound === 'queue' || row.bound === 'clinic'
      ? ['own', 'absent']
      : ['own', 'other', 'absent']
}

/** Writes what the call needs and puts its address together. `shared` keeps what several denied callers may share. */
export const prepareCall = async (
  scene: Scene,
  row: AccessRow,
  caller: Caller,
  target: Target,
  shared: Map<string, Call> = new Map(),
): Promise<ReadyCall> => {
  const prepare = prepareOf.get(routeKey(row.route))
  if (!prepare) throw new Error(`No valid call is written for ${row.route}`)
  const key = childFor(caller, target)
  const person = personOf(scene, caller === 'nobody' ? 'T1' : caller)
  const stands = caller === 'nobody' ? null : standing(row, caller, key)
  const behindKey = target === 'crossed' ? (key === 'second' ? 'first' : 'second') : key
  const on = {
    scene,
    person,
    child: childOf(scene, behindKey),
    standing: standing(row, person.key, behindKey),
  }
  const allowed = expected(row, caller, target) === 'ok'
  const sharedKey = `${behindKey} ${row.bound === 'letter' ? caller : on.standing === 'L' ? 'L' : ''}`
  const call = (!allowed && shared.get(sharedKey)) || (await prepare(on))
  if (!allowed) shared.set(sharedKey, call)

  const childId = target === 'absent' ? randomUUID() : childOf(scene, key).child.id
  const [method = '', pattern = ''] = row.route.split(' ')
  const ids = target === 'absent' ? [randomUUID(), randomUUID()] : [...(call.ids ?? [])]
  const path = pattern
    .replace(':childId', childId)
    .replace(/:\w+/g, () =>
      row.route.includes(':figure') ? (call.ids?.[0] ?? '') : (ids.shift() ?? 'missing'),
    )
  return {
    ...call,
    instead: allowed ? call.instead : undefined,
    caller,
    target,
    method,
    path: call.query ? `${path}?${call.query}` : path,
    childId: pattern.includes(':childId') ? childId : null,
    about: target === 'absent' || !ofAChild.includes(row.bound) ? null : childId,
    standing: stands,
  }
}

export const perform = (wire: Wire, scene: Scene, call: ReadyCall): Promise<Answer> => {
  const { method, path, version, body, file, caller } = call
  const { user, cookie } =
    call.instead ?? (caller === 'nobody' ? { user: { id: 'none' }, cookie: [] } : personOf(scene, caller))
  return wire.ask({ method, path, version, body, file, userId: user.id, cookie })
}

const unwatched = ['audit_entries', 'audit_heads', 'user_sessions', 'throttles']

/** One checksum over the rows of each table that a refused call must leave alone. */
export const checksums = async (): Promise<Record<string, string>> => {
  const tables = (await database().query(
    `SELECT TABLE_NAME AS name FROM information_schema.TABLES
      WHERE TABLE_SCHEMA = DATABASE() AND TABLE_TYPE = 'BASE TABLE'`,
  )) as { name: string }[]
  const watched = tables.map(({ name }) => name).filter((name) => !unwatched.includes(name))
  const sums = (await database().query(
    `CHECKSUM TABLE ${watched.map((name) => `\`${name}\``).join(', ')} EXTENDED`,
  )) as { Table: string; Checksum: string | null }[]
  return Object.fromEntries(sums.map(({ Table, Checksum }) => [Table, String(Checksum)]))
}

export interface Trace {
  requestId: string
  actorId: string | null
  action: string
  childId: string | null
  relation: string | null
  result: 'allowed' | 'denied'
  detail: string | null
}

/** The audit entries of some requests. */
export const tracesOf = async (requestIds: readonly string[]): Promise<Map<string, Trace[]>> => {
  const rows =
    requestIds.length === 0
      ? []
      : ((await database().query(
          'SELECT requestId, actorId, action, childId, relation, result, detail FROM audit_entries WHERE requestId IN (?)',
          [requestIds],
        )) as Trace[])
  const traces = new Map<string, Trace[]>()
  for (const row of rows) traces.set(row.requestId, [...(traces.get(row.requestId) ?? []), row])
  return traces
}
