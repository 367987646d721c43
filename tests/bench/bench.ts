import { fork, type ChildProcess } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { cpus, tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import autocannon from 'autocannon'
import { createConnection } from 'mysql2/promise'
import { connectionOptions, type DatabaseAccess } from '../../server/setup/databaseAccess.ts'
import { startMariaDb } from '../../server/setup/mariadb.ts'
import { migrateDatabase } from '../../server/setup/migrateDatabase.ts'
import { benchEmail, benchPassword, fillClinic } from './data.ts'

/*
 * Speed as ratios within one run, because machines differ: the caseload page against the least a server could do with
 * the same duties, and against itself with a tenth of the children. Servers take turns, so that drift hits both.
 */
const seconds = Number(process.env.SECONDS ?? 4)
const rounds = 3

const start = async (file: string, access: DatabaseAccess): Promise<{ child: ChildProcess; url: string }> => {
  const child = fork(fileURLToPath(new URL(file, import.meta.url)), {
    execArgv: ['--import', 'tsx'],
    env: { ...process.env, NODE_ENV: 'test', BENCH_ACCESS: JSON.stringify(access) },
  })
  const { port } = await new Promise<{ port: number }>((resolve, reject) => {
    child.once('message', (message) => resolve(message as { port: number }))
    child.once('exit', () => reject(new Error(`${file} did not start`)))
  })
  return { child, url: `http://127.0.0.1:${port}` }
}

const signIn = async (url: string): Promise<string> => {
  const response = await fetch(`${url}/api/sign-in`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', 'X-Fanflower-User': 'none' },
    body: JSON.stringify({ email: benchEmail, password: benchPassword, sharedComputer: false }),
  })
  if (response.status !== 200) throw new Error(`Sign-in failed: ${response.status} ${await response.text()}`)
  return response.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ')
}

interface Reading {
  p50: number
  p99: number
  perSecond: number
}

const median = (values: number[]) =>
  values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)] ?? Number.NaN

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
  const floor = await start('./floorServer.ts', full)
  const app = await start('./appServer.ts', full)
  const small = await start('./appServer.ts', tenth)
  children.push(floor.child, app.child, small.child)
  const page = '/api/caseload?size=25'
  const targets = [
    { name: 'floor', url: floor.url },
    { name: 'caseload, 5000 children', url: `${app.url}${page}`, cookie: await signIn(app.url) },
    { name: 'caseload, 500 children', url: `${small.url}${page}`, cookie: await signIn(small.url) },
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
} finally {
  children.forEach((child) => child.kill())
  await mariadb.stop()
  rmSync(folder, { recursive: true, force: true })
}
