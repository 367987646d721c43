import type { ChildProcess } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { cpus, tmpdir } from 'node:os'
import { join } from 'node:path'
import autocannon from 'autocannon'
import { createConnection } from 'mysql2/promise'
import { connectionOptions } from '../../server/setup/databaseAccess.ts'
import { startMariaDb } from '../../server/setup/mariadb.ts'
import { migrateDatabase } from '../../server/setup/migrateDatabase.ts'
import { measureAccounts } from './accounts.ts'
import { childWithConsent, fillClinic } from './data.ts'
import { median, signIn, startServer } from './servers.ts'
import { fillHandProfile } from './handProfile.ts'
import { measureScoring } from './scoring.ts'
import { measureUploads } from './uploads.ts'

/*
 * Speed as ratios within one run, because machines differ: the caseload page against the least a server could do with
 * the same duties, and against itself with a tenth of the children; the hand profile against the same rows read by plain
 * SQL. Servers take turns, so that drift hits both.
 */
const seconds = Number(process.env.SECONDS ?? 4)
const rounds = 3

interface Reading {
  p50: number
  p99: number
  perSecond: number
}

const measure = async (targets: { name: string; url: string; cookie?: string }[], connections: number) => {
  const readings = new Map<string, Reading[]>()
  for (let round = 0; round < rounds; round += 1)
    for (const { name, url, cookie } of targets) {
      const result = await autocannon({
        url,
        connections,
        duration: seconds,
        headers: cookie ? { cookie } : {},
      })
      if (result.non2xx > 0 || result.errors > 0)
        throw new Error(`${name}: ${result.non2xx} refusals, ${result.errors} errors`)
      const reading = { p50: result.latency.p50, p99: result.latency.p99, perSecond: result.requests.average }
      readings.set(name, [...(readings.get(name) ?? []), reading])
    }
  return targets.map(({ name }) => {
    const all = readings.get(name) ?? []
    return {
      name,
      connections,
      p50: median(all.map((r) => r.p50)),
      p99: median(all.map((r) => r.p99)),
      perSecond: Math.round(median(all.map((r) => r.perSecond))),
    }
  })
}

const scoring = measureScoring()
console.table(scoring)
const slowest = Math.max(...scoring.map(({ p99Ms }) => p99Ms))
console.log(`scoring of any form, p99 at most ${slowest.toFixed(2)} ms (bar 5)`)

const folder = mkdtempSync(join(tmpdir(), 'fanflower-bench-'))
const mariadb = await startMariaDb({
  dataDir: folder,
  port: null,
  durability: 'full',
  databases: 'bench\\_%',
})
const children: ChildProcess[] = []
try {
  const prepare = async (name: string, count: number) => {
    const { database: _, ...server } = connectionOptions(mariadb.access('migrate', name))
    const owner = await createConnection(server)
    await owner.query(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`)
    await owner.end()
    await migrateDatabase(mariadb.access('migrate', name), mariadb.access('app', name))
    await fillClinic(mariadb.access('migrate', name), count)
    return mariadb.access('app', name)
  }
  const [full, tenth] = [await prepare('bench_full', 5000), await prepare('bench_tenth', 500)]
  const floor = await startServer('./floorServer.ts', full)
  const app = await startServer('./appServer.ts', full)
  const small = await startServer('./appServer.ts', tenth)
  children.push(floor.child, app.child, small.child)
  const therapist = await signIn(app.url)
  const page = '/api/caseload?size=25'
  const targets = [
    { name: 'floor', url: floor.url },
    { name: 'caseload, 5000 children', url: `${app.url}${page}`, cookie: therapist.cookie },
    { name: 'caseload, 500 children', url: `${small.url}${page}`, cookie: (await signIn(small.url)).cookie },
  ]
  const results = [...(await measure(targets, 1)), ...(await measure(targets, 20))]
  console.log(`${cpus().length} cores, Node ${process.version}, ${rounds} rounds of ${seconds} s, medians`)
  console.table(results)
  const of = (name: string, connections: number) =>
    results.find((row) => row.name === name && row.connections === connections)
  for (const connections of [1, 20]) {
    const [least, whole, part] = targets.map(({ name }) => of(name, connections))
    console.log(
      `c=${connections}: caseload ÷ floor in requests per second = ${((whole?.perSecond ?? 0) / (least?.perSecond ?? 1)).toFixed(2)}`,
    )
    console.log(
      `c=${connections}: 5000 ÷ 500 children in p50 = ${((whole?.p50 ?? 0) / (part?.p50 || 1)).toFixed(2)}`,
    )
  }

  const profiled = await childWithConsent(mariadb.access('migrate', 'bench_full'))
  await fillHandProfile(mariadb.access('migrate', 'bench_full'), profiled)
  const profiles = await measure(
    [
      { name: 'rows of a hand profile by plain SQL', url: `${floor.url}/?child=${profiled}` },
      {
        name: 'hand profile',
        url: `${app.url}/api/children/${profiled}/hand-profile`,
        cookie: therapist.cookie,
      },
    ],
    1,
  )
  console.table(profiles)
  const [plain, profile] = profiles
  console.log(
    `hand profile ÷ plain SQL in time for a page = ${((plain?.perSecond ?? 0) / (profile?.perSecond ?? 1)).toFixed(2)} (bar 2.5)`,
  )

  const fast = await startServer('./appServer.ts', full, { BENCH_TIME_FACTOR: '4000' })
  children.push(fast.child)
  for (const { name, tries, known, unknown } of await measureAccounts(fast.url))
    console.log(
      `${name}, ${tries} times each: known ÷ unknown address in median time = ${(known / unknown).toFixed(3)}`,
    )
  fast.child.kill()

  const uploads = await measureUploads({
    server: app,
    ...therapist,
    childId: profiled,
  })
  console.log(`uploads answered ${JSON.stringify(uploads.answers)}`)
  console.log(`20 uploads over the limit: memory rose by ${uploads.overLimitRise.toFixed(2)} × the limit`)
  console.log(
    `five bombs, then five of 39 megapixels at once: by ${uploads.decodedRise.toFixed(2)} × the limit`,
  )
  console.log(`caseload beside them: p99 ÷ idle p50 = ${(uploads.besideP99 / uploads.idleP50).toFixed(1)}`)
} finally {
  children.forEach((child) => child.kill())
  await mariadb.stop()
  rmSync(folder, { recursive: true, force: true })
}
