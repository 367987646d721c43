import { createServer } from 'node:http'
import { createApp } from '../../server/app.ts'
import { setClock } from '../../server/clock.ts'
import { openDatabase } from '../../server/dataSource.ts'
import { openAuditChain } from '../../server/services/audit.ts'
import type { DatabaseAccess } from '../../server/setup/databaseAccess.ts'

// Time may run faster here, so that limits by the minute do not end a measurement of single answers.
const factor = Number(process.env.BENCH_TIME_FACTOR ?? 1)
const begun = Date.now()
if (factor !== 1) setClock(() => new Date(begun + (Date.now() - begun) * factor))

const access = JSON.parse(process.env.BENCH_ACCESS ?? '{}') as DatabaseAccess
await openDatabase(access)
await openAuditChain('bench')
const app = createApp({
  appUrl: 'http://127.0.0.1',
  sessionSecret: 'x'.repeat(40),
  demo: false,
  inboxUrl: null,
  demoSignIns: [],
  clientDir: null,
})
const server = createServer(app)
server.listen(0, '127.0.0.1', () => process.send?.({ port: (server.address() as { port: number }).port }))
