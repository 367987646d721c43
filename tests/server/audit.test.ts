import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createDataSource, database } from '../../server/dataSource.ts'
import { actorFor } from '../../server/access/actor.ts'
import { canonicalEntry, recordAudit } from '../../server/services/audit.ts'
import { transact } from '../../server/services/transact.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import { testDatabaseAccess } from '../support/database.ts'
import { buildChild, buildUser } from '../support/factories.ts'
import { letterScene } from '../support/letters.ts'

beforeAll(startApp)
afterAll(stopApp)

const asOwner = async (sql: string) => {
  const owner = createDataSource(testDatabaseAccess().migrate)
  await owner.initialize()
  try {
    await owner.query(sql)
  } finally {
    await owner.destroy()
  }
}

interface StoredEntry {
  position: number
  at: Date
  actorId: string | null
  roles: string
  relation: string | null
  action: string
  objectType: string | null
  objectId: string | null
  childId: string | null
  result: 'allowed' | 'denied'
  requestId: string
  detail: string | null
  previousHash: Buffer
  hash: Buffer
}

const chainOf = (name: string): Promise<StoredEntry[]> =>
  database().query('SELECT * FROM audit_entries WHERE chain = ? ORDER BY position', [name])

describe('the audit trail', () => {
  it('keeps one unbroken chain while ten writers and readers add to it', async () => {
    const user = await buildUser('therapist')
    const actor = () =>
      actorFor(
        { id: user.id, displayName: user.displayName, roles: user.roles, newlyQualified: false },
        'request',
      )
    const writer = async () => {
      for (let n = 0; n < 40; n += 1) {
        await recordAudit(actor(), { action: 'test.read' })
        await transact(actor(), async (tx, record) => {
          await tx.query('UPDATE users SET displayName = ? WHERE id = ?', [`Name ${n}`, user.id])
          record({ action: 'test.write' })
        })
      }
    }
    await Promise.all(Array.from({ length: 10 }, writer))
    const entries = await chainOf('test')
    expect(entries.filter((entry) => entry.action.startsWith('test.'))).toHaveLength(800)
    let previous = Buffer.alloc(32)
    entries.forEach((entry, index) => {
      expect(entry.position).toBe(index + 1)
      expect(entry.previousHash.equals(previous)).toBe(true)
      const expected = createHash('sha256')
        .update(previous)
        .update(canonicalEntry(entry, entry.position))
        .digest()
      expect(entry.hash.equals(expected)).toBe(true)
      previous = Buffer.from(entry.hash)
    })
  }, 60_000)

  it.each([
    ['UPDATE', "UPDATE audit_entries SET action = 'other'"],
    ['DELETE', 'DELETE FROM audit_entries'],
    ['TRUNCATE', 'TRUNCATE audit_entries'],
    ['REPLACE', 'REPLACE INTO audit_entries SELECT * FROM audit_entries LIMIT 1'],
    ['DROP TRIGGER', 'DROP TRIGGER audit_entries_keep'],
  ])('refuses %s to the running server', async (_what, sql) => {
    await expect(database().query(sql)).rejects.toThrow(/denied/)
  })

  it('refuses change and removal even to the owner, by trigger', async () => {
    await expect(asOwner("UPDATE audit_entries SET action = 'other'")).rejects.toThrow(/written once/)
    await expect(asOwner('DELETE FROM audit_entries')).rejects.toThrow(/never removed/)
  })

  it('has exactly one entry for each answer with a child’s data, with who, relation, what and the request', async () => {
    const scene = await letterScene()
    const response = await scene.as.get(scene.base)
    const rows = await database().query('SELECT * FROM audit_entries WHERE requestId = ?', [
      response.headers['x-request-id'],
    ])
    expect(rows).toHaveLength(1)
    expect(rows[0]).toMatchObject({
      actorId: scene.therapist.id,
      relation: 'assignedTherapist',
      action: 'letters.listOfChild',
      childId: scene.child.id,
      result: 'allowed',
    })
  })

  it('has an entry for each denial, and one for a refused sign-in', async () => {
    const child = await buildChild()
    const other = await signedInAs(await buildUser('therapist'))
    const denied = await other.get(`/api/children/${child.id}/letters`)
    expect(denied.status).toBe(404)
    const rows = await database().query('SELECT result, detail FROM audit_entries WHERE requestId = ?', [
      denied.headers['x-request-id'],
    ])
    expect(rows).toHaveLength(1)
    expect(rows[0].result).toBe('denied')
    expect(rows[0].detail).toContain(child.id)
  })

  it('closes reading and writing when it cannot be written', async () => {
    const scene = await letterScene()
    await asOwner('REVOKE INSERT ON audit_entries FROM fanflower_app@127.0.0.1')
    try {
      const read = await scene.as.get(scene.base)
      expect(read.status).toBe(503)
      expect(read.headers['retry-after']).toBeDefined()
      expect(JSON.stringify(read.body)).not.toContain(scene.child.recordNumber)
      const [before] = await database().query('SELECT COUNT(*) AS n FROM letters')
      expect((await scene.as.post(scene.base).send({ kind: 'progress' })).status).toBe(503)
      const [after] = await database().query('SELECT COUNT(*) AS n FROM letters')
      expect(after.n).toBe(before.n)
    } finally {
      await asOwner('GRANT INSERT ON audit_entries TO fanflower_app@127.0.0.1')
    }
    expect((await scene.as.get(scene.base)).status).toBe(200)
  })
})
