import { randomUUID } from 'node:crypto'
import { hash } from '@node-rs/argon2'
import { createConnection, type Connection } from 'mysql2/promise'
import { connectionOptions, type DatabaseAccess } from '../../server/setup/databaseAccess.ts'

export const benchPassword = 'harbour-lantern-otter-42'
export const benchEmail = 'therapist0@harrowmere.example'

/** Children a therapist holds, so that a page is as full in a small clinic as in a large one. */
const heldByEach = 125
const notesEach = 5

const insert = async (connection: Connection, table: string, columns: string[], rows: unknown[][]) => {
  for (let start = 0; start < rows.length; start += 2000)
    await connection.query(`INSERT INTO ${table} (${columns.join(', ')}) VALUES ?`, [
      rows.slice(start, start + 2000),
    ])
}

/** Fills an empty migrated database with so many children, 125 for each therapist, each with notes. */
export const fillClinic = async (access: DatabaseAccess, children: number): Promise<void> => {
  const therapists = Math.ceil(children / heldByEach)
  const connection = await createConnection({ ...connectionOptions(access), timezone: 'Z' })
  const at = new Date('2026-09-01T09:00:00Z')
  const passwordHash = await hash(benchPassword)
  const users = Array.from({ length: therapists }, () => randomUUID())
  await insert(
    connection,
    'users',
    ['id', 'email', 'displayName', 'roles', 'passwordHash', 'newlyQualified', 'createdAt', 'version'],
    users.map((id, n) => [
      id,
      `therapist${n}@harrowmere.example`,
      `Therapist ${n}`,
      '["therapist"]',
      passwordHash,
      0,
      at,
      1,
    ]),
  )
  const ids = Array.from({ length: children }, () => randomUUID())
  const holder = (n: number) => users[n % therapists]
  await insert(
    connection,
    'children',
    [
      'id',
      'recordNumber',
      'givenName',
      'familyName',
      'birthDate',
      'scriptDirection',
      'lookedAfter',
      'consentsForSelf',
      'createdAt',
      'version',
    ],
    ids.map((id, n) => [
      id,
      `FF-2026-${String(n).padStart(4, '0')}`,
      `Given${n}`,
      `Family${n % 997}`,
      `20${10 + (n % 10)}-0${1 + (n % 9)}-1${n % 10}`,
      'ltr',
      0,
      0,
      at,
      1,
    ]),
  )
  await insert(
    connection,
    'episodes',
    ['id', 'childId', 'state', 'receivedOn', 'priority', 'createdAt', 'version'],
    ids.map((id) => [randomUUID(), id, 'active', '2026-06-01', 'routine', at, 1]),
  )
  await insert(
    connection,
    'assignments',
    ['id', 'childId', 'therapistId', 'startedAt', 'reason'],
    ids.map((id, n) => [randomUUID(), id, holder(n), at, 'allocated']),
  )
  await insert(
    connection,
    'session_notes',
    [
      'id',
      'childId',
      'authorId',
      'heldOn',
      'startTime',
      'minutes',
      'endedAt',
      'type',
      'state',
      'summary',
      'createdAt',
      'version',
    ],
    ids.flatMap((id, n) =>
      Array.from({ length: notesEach }, (_, week) => [
        randomUUID(),
        id,
        holder(n),
        `2026-09-0${1 + week}`,
        '10:00',
        45,
        at,
        'session',
        'draft',
        'Next: the same again',
        at,
        1,
      ]),
    ),
  )
  await connection.query('ANALYZE TABLE children, episodes, assignments, session_notes, users')
  await connection.end()
}

/** A child of the first therapist whose family lets the clinic keep pictures of its work. */
export const childWithConsent = async (access: DatabaseAccess): Promise<string> => {
  const connection = await createConnection({ ...connectionOptions(access), timezone: 'Z' })
  const [rows] = await connection.query(
    `SELECT a.childId, a.therapistId FROM assignments a JOIN users u ON u.id = a.therapistId WHERE u.email = ? LIMIT 1`,
    [benchEmail],
  )
  const [held] = rows as { childId: string; therapistId: string }[]
  if (!held) throw new Error('The first therapist of the bench holds nobody')
  const at = new Date('2026-06-01T09:00:00Z')
  for (const purpose of ['assessment_treatment', 'store_work_samples'])
    await connection.query(
      `INSERT INTO consents (id, childId, purpose, kind, basis, method, givenByName, at, recordedById, recordedAt)
       VALUES (?, ?, ?, 'given', 'parental_responsibility', 'paper', 'A parent', ?, ?, ?)`,
      [randomUUID(), held.childId, purpose, at, held.therapistId, at],
    )
  await connection.end()
  return held.childId
}
