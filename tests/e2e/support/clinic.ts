import { spawn } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import type { Role } from '../../../shared/roles.ts'
import type { SessionView } from '../../../shared/users.ts'
import { findFreePort } from '../../../server/setup/processes.ts'

export type SignIn = SessionView['demoSignIns'][number]

export interface Clinic {
  url: string
  inboxUrl: string
  signIns: Record<Role, SignIn>
  /** Resident memory of the server process in MB. */
  memory: () => number
  stop: () => Promise<void>
}

/** Starts the built product the way `npm start` does, with a data folder and ports of its own and the demo clinic. */
export const startClinic = async (): Promise<Clinic> => {
  const dataDir = mkdtempSync(join(tmpdir(), 'fanflower-e2e-'))
  const [port, inboxPort, databasePort] = [await findFreePort(), await findFreePort(), await findFreePort()]
  const url = `http://localhost:${port}`
  const server = spawn(process.execPath, ['--enable-source-maps', 'dist-server/main.js'], {
    env: {
      ...process.env,
      VITEST: '',
      NODE_ENV: 'production',
      DATA_DIR: dataDir,
      PORT: String(port),
      INBOX_PORT: String(inboxPort),
      DB_PORT: String(databasePort),
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  })
  let output = ''
  server.stdout.on('data', (chunk: Buffer) => (output += chunk.toString()))
  server.stderr.on('data', (chunk: Buffer) => (output += chunk.toString()))
  const ended = new Promise<void>((resolve) => server.once('exit', () => resolve()))
  const stop = async () => {
    server.kill('SIGTERM')
    await ended
    rmSync(dataDir, { recursive: true, force: true })
  }
  const until = Date.now() + 90_000
  while (!output.includes('Fanflower is running')) {
    if (server.exitCode !== null || Date.now() > until)
      throw new Error(`The clinic did not start:\n${output}`)
    await pause(100)
  }
  const session = (await (await fetch(`${url}/api/session`)).json()) as SessionView
  const signIns = Object.fromEntries(session.demoSignIns.map((signIn) => [signIn.role, signIn])) as Record<
    Role,
    SignIn
  >
  const memory = () => residentMegabytes(server.pid ?? 0)
  return { url, inboxUrl: session.clinic.inboxUrl ?? '', signIns, memory, stop }
}

const residentMegabytes = (pid: number) =>
  Number(/VmRSS:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1] ?? Number.NaN) / 1024
