import { createHash } from 'node:crypto'
import { createServer } from 'node:http'
import { createPool } from 'mysql2/promise'
import { connectionOptions, type DatabaseAccess } from '../../server/setup/databaseAccess.ts'

/*
 * The least a server could do for a page with the same duties: plain node:http and mysql2, a session look-up, prepared
 * SELECTs (the caseload's 25 rows, or with ?child= the rows of a hand profile), and an audit entry chained in groups that
 * is durable before the answer.
 */
const access = JSON.parse(process.env.BENCH_ACCESS ?? '{}') as DatabaseAccess
const pool = createPool({
  ...connectionOptions(access),
  connectionLimit: 10,
  dateStrings: ['DATE'],
  timezone: 'Z',
})
const sessionKey = createHash('sha256').update('bench').digest()

let waiting: { entry: unknown[]; done: () => void }[] = []
let flushing = false
const flush = async () => {
  if (flushing) return
  flushing = true
  while (waiting.length > 0) {
    const group = waiting
    waiting = []
    const connection = await pool.getConnection()
    await connection.beginTransaction()
    const [[head]] = (await connection.query(
      "SELECT position, hash FROM audit_heads WHERE chain = 'floor' FOR UPDATE",
    )) as never as [[{ position: number; hash: Buffer }]]
    let { position, hash } = head
    const rows = group.map(({ entry }) => {
      const previous = hash
      position += 1
      hash = createHash('sha256')
        .update(previous)
        .update(JSON.stringify([position, ...entry]))
        .digest()
      return [
        'floor',
        position,
        new Date(),
        null,
        'therapist',
        null,
        'caseload.list',
        null,
        null,
        null,
        'allowed',
        'bench',
        JSON.stringify(entry),
        previous,
        hash,
      ]
    })
    await connection.query(
      `INSERT INTO audit_entries (chain, position, at, actorId, roles, relation, action, objectType, objectId, childId,
        result, requestId, detail, previousHash, hash) VALUES ?`,
      [rows],
    )
    await connection.query("UPDATE audit_heads SET position = ?, hash = ? WHERE chain = 'floor'", [
      position,
      hash,
    ])
    await connection.commit()
    connection.release()
    group.forEach(({ done }) => done())
  }
  flushing = false
}

await pool.query("INSERT IGNORE INTO audit_heads (chain, position, hash) VALUES ('floor', 0, ?)", [
  Buffer.alloc(32),
])
const [[therapist]] = (await pool.query(
  "SELECT id FROM users WHERE email = 'therapist0@harrowmere.example'",
)) as never as [[{ id: string }]]

type Rows = { id: string }[]

const caseload = async (): Promise<Rows> => {
  const [rows] = (await pool.execute(
    `SELECT c.id, c.recordNumber, c.givenName, c.familyName, c.birthDate, e.state FROM assignments a
     JOIN children c ON c.id = a.childId JOIN episodes e ON e.childId = c.id
     WHERE a.therapistId = ? AND a.endedAt IS NULL ORDER BY c.familyName, c.id LIMIT 25`,
    [therapist.id],
  )) as never as [Rows]
  return rows
}

/** The rows that a hand profile is made from, of a child whom the therapist holds. */
const handProfile = async (childId: string): Promise<Rows> => {
  const [held] = (await pool.execute(
    'SELECT id FROM assignments WHERE childId = ? AND therapistId = ? AND endedAt IS NULL',
    [childId, therapist.id],
  )) as never as [Rows]
  if (held.length === 0) return []
  const [responses] = (await pool.execute(
    `SELECT q.*, f.formKey, f.edition, f.definition FROM questionnaire_responses q
     JOIN questionnaire_forms f ON f.id = q.formVersion WHERE q.childId = ? ORDER BY q.answeredOn DESC, q.id`,
    [childId],
  )) as never as [Rows]
  const [measures] = (await pool.execute(
    'SELECT m.* FROM measures m WHERE m.childId = ? ORDER BY m.measuredOn DESC, m.id',
    [childId],
  )) as never as [Rows]
  return [...responses, ...measures]
}

const server = createServer((req, res) => {
  const answer = async () => {
    await pool.execute('SELECT data FROM user_sessions WHERE idHash = ?', [sessionKey])
    const childId = new URL(req.url ?? '/', 'http://floor').searchParams.get('child')
    const rows = await (childId === null ? caseload() : handProfile(childId))
    await new Promise<void>((done) => {
      waiting.push({ entry: rows.map((row) => row.id), done })
      void flush()
    })
    res.setHeader('Content-Type', 'application/json')
    res.end(JSON.stringify({ rows, total: rows.length }))
  }
  void answer()
})
server.listen(0, '127.0.0.1', () => process.send?.({ port: (server.address() as { port: number }).port }))
