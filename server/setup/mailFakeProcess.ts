import { spawn } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { endProcess } from './processes.ts'
import { SetUpError } from './setUpError.ts'

/** In the bundle the fake lies beside this code; during development both are sources. */
const isBundle = import.meta.url.endsWith('.js')
const entry = fileURLToPath(
  new URL(isBundle ? './mailFake.js' : '../../fake-services/mail/main.ts', import.meta.url),
)

/**
 * Starts the mail fake as a process of its own, reached by its addresses only, and waits until it listens.
 * It ends with `stop`, or by itself when this process dies.
 */
export async function startMailFakeProcess(inboxPort: number) {
  // Detached: after Ctrl-C in a terminal the last mail is still handed over before the fake is stopped.
  const child = spawn(process.execPath, [...(isBundle ? [] : ['--import', 'tsx']), entry], {
    detached: true,
    stdio: ['ignore', 'ignore', 'pipe', 'ipc'],
    env: { ...process.env, SMTP_PORT: '0', INBOX_PORT: String(inboxPort) },
  })
  let complaint = ''
  child.stderr?.on('data', (chunk: Buffer) => (complaint += chunk.toString()))
  const addresses = await new Promise<{ smtpUrl: string; inboxUrl: string }>((resolve, reject) => {
    child.once('message', (message) => resolve(message as { smtpUrl: string; inboxUrl: string }))
    child.once('error', reject)
    child.once('close', () => reject(new SetUpError(complaint.trim() || 'The mail fake did not start.')))
  })
  // Neither the process nor its channel may keep the server alive.
  child.unref()
  child.channel?.unref()
  return {
    ...addresses,
    stop: async () => {
      if (child.pid !== undefined) await endProcess(child.pid, 5_000)
    },
  }
}
