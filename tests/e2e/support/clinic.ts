import { spawn } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { findFreePort } from '../../../server/setup/processes.ts'

/** Where a running clinic is reached. */
export interface ClinicAddress {
  url: string
  inboxUrl: string
  /** Process id of the server; null for a clinic that somebody else started. */
  pid: number | null
}

export interface Clinic extends ClinicAddress {
  stop: () => Promise<void>
}

// Seeding takes some 20 s on a quiet machine, several times that on a busy one.
const patienceInMs = 240_000

/** Starts the built product the way `npm start` does (the same flags as start.sh), with a data folder and ports of its own and the demo clinic. */
export const startClinic = async (): Promise<Clinic> => {
  const dataDir = mkdtempSync(join(tmpdir(), 'fanflower-e2e-'))
  const [port, inboxPort, databasePort] = [await findFreePort(), await findFreePort(), await findFreePort()]
  const flags = ['--max-semi-space-size=8', '--enable-source-maps']
  const server = spawn(process.execPath, [...flags, 'dist-server/main.js'], {
    env: {
      ...process.env,
      VITEST: '',
      NODE_ENV: 'production',
      MALLOC_ARENA_MAX: '2',
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
  const until = Date.now() + patienceInMs
  while (!output.includes('Fanflower is running')) {
    if (server.exitCode !== null || Date.now() > until) {
      await stop()
      throw new Error(`The clinic did not start:\n${output}`)
    }
    await pause(100)
  }
  return {
    url: `http://localhost:${port}`,
    inboxUrl: `http://localhost:${inboxPort}`,
    pid: server.pid ?? null,
    stop,
  }
}

/** Resident memory of a process in MB. */
export const residentMegabytes = (pid: number): number =>
  Number(/VmRSS:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1] ?? Number.NaN) / 1024
