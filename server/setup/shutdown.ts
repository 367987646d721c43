import { SetUpError } from './setUpError.ts'

type Stop = () => Promise<unknown> | unknown

/** How long all the stopping together may take before the process ends regardless, in milliseconds. */
const patience = 15_000

export type Shutdown = {
  /** Registers something that was started. What was started last is stopped first. */
  add: (name: string, stop: Stop) => void
  /** Stops everything, then ends the process with this code. Later calls change nothing. */
  run: (code: number) => Promise<void>
  /** For a start that failed: prints the reason, stops what already runs and ends with 1. */
  fail: (error: unknown) => Promise<void>
}

/**
 * Takes charge of SIGINT and SIGTERM. Register MariaDB, then the connections, then HTTP: they end in the reverse order,
 * so requests under way still find their database.
 */
export function createShutdown(): Shutdown {
  const started: { name: string; stop: Stop }[] = []
  let running = false

  const run = async (code: number) => {
    // npm passes on the same Ctrl-C that the terminal already sent, so a second signal means nothing.
    if (running) return
    running = true
    setTimeout(() => {
      console.error('Stopping took too long; ending anyway.')
      process.exit(1)
    }, patience).unref()
    let failed = false
    for (const { name, stop } of started.reverse()) {
      try {
        await stop()
      } catch (error) {
        failed = true
        console.error(`${name} did not stop cleanly: ${(error as Error).message}`)
      }
    }
    process.exit(failed ? 1 : code)
  }

  const fail = (error: unknown) => {
    console.error(startUpMessage(error))
    return run(1)
  }

  process.on('SIGINT', () => void run(0))
  process.on('SIGTERM', () => void run(0))
  return { add: (name, stop) => started.push({ name, stop }), run, fail }
}

/** A fault the user can mend is its message alone; anything else is a fault of ours and needs its stack. */
export function startUpMessage(error: unknown): string {
  if (error instanceof SetUpError) return `Fanflower cannot start.\n${error.message}`
  return `Fanflower cannot start.\n${error instanceof Error ? (error.stack ?? error.message) : String(error)}`
}
