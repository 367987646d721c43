import { createServer } from 'node:http'
import { createApp } from '../../server/app.ts'
import { openDatabase } from '../../server/dataSource.ts'
import { openAuditChain } from '../../server/services/audit.ts'
import type { DatabaseAccess } from '../../server/setup/databaseAccess.ts'

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
