import { staffRoles, type Role } from '../../shared/roles.ts'
import { closedStates } from '../../shared/episodes.ts'
import { isId } from '../../shared/fields.ts'
import type { Viewer } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { seesEveryAccount } from '../policies/users.ts'
import { runsAt } from './inForce.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { count, flag, fromJson, likePattern, selectOne, type SqlParameters } from './sql.ts'

export interface AccountRow {
  id: string
  displayName: string
  email: string
  roles: Role[]
  newlyQualified: boolean
  hasPassword: boolean
  disabledAt: Date | null
  lastSignInAt: Date | null
  version: number
}

type StoredAccount = Omit<AccountRow, 'roles' | 'newlyQualified' | 'hasPassword'> & {
  roles: string
  newlyQualified: number
  hasPassword: number
}

const columns = `u.id, u.displayName, u.email, u.roles, u.newlyQualified, u.passwordHash IS NOT NULL AS hasPassword,
  u.disabledAt, u.lastSignInAt, u.version`

const toAccount = (row: StoredAccount): AccountRow => ({
  ...row,
  roles: fromJson<Role[]>(row.roles),
  newlyQualified: flag(row.newlyQualified),
  hasPassword: flag(row.hasPassword),
})

const colleague = `(${[...staffRoles, 'teacher'].map((role) => `JSON_CONTAINS(u.roles, '"${role}"')`).join(' OR ')})`

// One carer never learns another's address, and an administrator with a child here is that child's carer first.
const otherCarer = `EXISTS (SELECT 1 FROM guardians vg JOIN guardians og ON og.childId = vg.childId
  WHERE vg.userId = :viewer AND og.userId = u.id AND u.id <> :viewer)`

/** A lead sees colleagues and teachers; that somebody is a carer here is for administrators only. */
const reach = (viewer: Viewer): string =>
  seesEveryAccount(viewer) ? `(${colleague} OR NOT ${otherCarer})` : colleague

export const listUsers = async (
  viewer: Viewer,
  { search, role }: { search: string | null; role: Role | null },
  slice: PageSlice,
): Promise<PageOf<AccountRow>> => {
  const parameters: SqlParameters = {
    viewer: viewer.id,
    ...(search !== null && { word: likePattern(search) }),
    ...(role !== null && { role: JSON.stringify(role) }),
  }
  const narrowed = [
    ...(search === null ? [] : ['(u.displayName LIKE :word OR u.email LIKE :word)']),
    ...(role === null ? [] : ['JSON_CONTAINS(u.roles, :role)']),
  ]
  const found = await selectPage<StoredAccount>(
    {
      select: columns,
      from: `FROM users u WHERE ${[reach(viewer), ...narrowed].join(' AND ')}`,
      orderBy: 'u.disabledAt IS NOT NULL, u.displayName, u.id',
      parameters,
    },
    slice,
  )
  return { total: found.total, rows: found.rows.map(toAccount) }
}

/** The account, as far as the viewer may know of it; locked inside a transaction. */
export const findUser = async (viewer: Viewer, id: string, tx?: Tx): Promise<AccountRow | null> => {
  if (!isId(id)) return null
  const row = await selectOne<StoredAccount>(
    `SELECT ${columns} FROM users u WHERE u.id = :id AND ${reach(viewer)} ${tx ? 'FOR UPDATE' : ''}`,
    { id, viewer: viewer.id },
    tx,
  )
  return row && toAccount(row)
}

/** Children with an open episode whom this person holds now. */
export const countOpenCases = async (tx: Tx, userId: string): Promise<number> => {
  const row = await selectOne<{ cases: string }>(
    `SELECT COUNT(DISTINCT a.childId) AS cases FROM assignments a JOIN episodes e ON e.childId = a.childId
     WHERE a.therapistId = :userId AND ${runsAt('a')}
       AND e.state NOT IN (:closed)`,
    { userId, now: now(), closed: closedStates },
    tx,
  )
  return count(row?.cases ?? '0')
}
