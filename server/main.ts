import { fileURLToPath } from 'node:url'
import type { SessionView } from '../shared/users.ts'
import { createApp } from './app.ts'
import { closeDatabase, openDatabase } from './dataSource.ts'
import { readEnv, type Env } from './env.ts'
import { logger } from './logger.ts'
import { openTransport } from './mail/transport.ts'
import { demoSignIns } from './seeds/demo.ts'
import { firstAdministratorAddress, firstAdministratorLink } from './services/firstAdministrator.ts'
import { openAuditChain } from './services/audit.ts'
import { hasAccounts } from './services/health.ts'
import { setMailSender } from './services/outbox.ts'
import { startOutboxWorker } from './services/outboxWorker.ts'
import { databaseProblems } from './setup/checkDatabase.ts'
import { clearHalfMadeDemo } from './setup/halfMadeDemo.ts'
import { migrateDatabase } from './setup/migrateDatabase.ts'
import { listen, loadSessionSecret, prepareDatabase, prepareMail, printBlock } from './setup/lifecycle.ts'
import { runSeed } from './setup/seedProcess.ts'
import { SetUpError } from './setup/setUpError.ts'
import { createShutdown, type Shutdown } from './setup/shutdown.ts'

const isBundle = import.meta.url.endsWith('.js')
const clientDir = fileURLToPath(new URL('../dist', import.meta.url))

const openClinic = async (env: Env, shutdown: Shutdown) => {
  const addresses = await prepareDatabase(env, shutdown)
  if (env.demo && env.database === null && addresses.migrate) await clearHalfMadeDemo(addresses.migrate)
  if (addresses.migrate) await migrateDatabase(addresses.migrate, addresses.app)
  const dataSource = await openDatabase(addresses.app)
  shutdown.add('the database connections', closeDatabase)
  const problems = await databaseProblems(dataSource)
  if (problems.length > 0)
    throw new SetUpError(`The database is not as it must be:\n- ${problems.join('\n- ')}`)
  if (env.demo && !(await hasAccounts())) {
    console.log('Making the demo clinic (first start only) …')
    await runSeed({ access: addresses.app, chain: env.instance, appUrl: env.appUrl })
  }
  await openAuditChain(env.instance)
}

const signInLines = (signIns: SessionView['demoSignIns']) =>
  signIns.map(({ role, name, email, password }) => `  ${role.padEnd(14)} ${email}  ${password}  (${name})`)

const start = async (shutdown: Shutdown) => {
  const env = readEnv(process.env)
  logger.level = env.logLevel
  await openClinic(env, shutdown)
  const { smtpUrl, inboxUrl } = await prepareMail(env, shutdown)
  const signIns = env.demo ? demoSignIns() : []
  const app = createApp({
    appUrl: env.appUrl,
    sessionSecret: loadSessionSecret(env),
    demo: env.demo,
    inboxUrl,
    demoSignIns: signIns,
    clientDir: isBundle ? clientDir : null,
  })
  await listen(app, env, shutdown)
  setMailSender({ name: 'Fanflower', address: env.mailFrom })
  const worker = startOutboxWorker(openTransport(smtpUrl), env.appUrl)
  shutdown.add('the outbox', worker.stop)
  const firstLink = env.demo ? null : await firstAdministratorLink(env.appUrl)
  printBlock([
    `Fanflower is running at ${env.appUrl}`,
    ...(inboxUrl ? [`E-mails arrive in the inbox at ${inboxUrl}`] : []),
    ...(signIns.length > 0
      ? ['', 'Demo clinic with invented people. Sign in as', ...signInLines(signIns)]
      : []),
    ...(firstLink
      ? [
          '',
          'Nobody has an account yet. The first administrator begins here (works once, for 72 hours):',
          firstLink,
          `Afterwards sign in as ${firstAdministratorAddress}, and invite yourself and others under People.`,
        ]
      : []),
    '',
    'Stop with Ctrl-C.',
  ])
}

const shutdown = createShutdown()
start(shutdown).catch((error: unknown) => shutdown.fail(error))
process.on('unhandledRejection', (error) => void shutdown.fail(error))
