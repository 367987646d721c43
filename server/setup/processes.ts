import { readFileSync } from 'node:fs'
import { createServer } from 'node:net'
import { setTimeout as wait } from 'node:timers/promises'

/**
 * When the kernel started the process, in clock ticks since boot; null when it is gone.
 * A killed process that nobody has collected (a zombie, usual in containers without an init) counts as gone, although
 * it still answers to signal 0.
 */
export function kernelStartTime(pid: number): string | null {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8')
    // The name in brackets may itself hold blanks and brackets, so fields are counted after the last one.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    return fields[0] === 'Z' || fields[0] === 'X' ? null : (fields[19] ?? null)
  } catch {
    return null
  }
}

/** "pid:kernel start time": names one process for good, where a bare pid is used again sooner or later. */
export const processMark = (pid: number): string => `${pid}:${kernelStartTime(pid) ?? ''}`

/** The pid in such a mark while that very process lives, else null. */
export function livingProcess(mark: string): number | null {
  const pid = Number(mark.trim().split(':')[0])
  return Number.isInteger(pid) && pid > 0 && kernelStartTime(pid) !== null && processMark(pid) === mark.trim()
    ? pid
    : null
}

/** The arguments a process was started with; empty when it is gone. */
export function commandLine(pid: number): string[] {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').filter(Boolean)
  } catch {
    return []
  }
}

/** Asks a process to end and waits; after `patience` milliseconds it is killed. */
export async function endProcess(pid: number, patience: number): Promise<void> {
  const mark = processMark(pid)
  const signal = (name: NodeJS.Signals) => {
    if (livingProcess(mark) !== null) process.kill(pid, name)
  }
  signal('SIGTERM')
  for (const until = performance.now() + patience; livingProcess(mark) !== null; await wait(20)) {
    if (performance.now() > until) {
      signal('SIGKILL')
      await wait(200)
      return
    }
  }
}

/** True when nothing listens on this loopback port. */
export function isPortFree(port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const probe = createServer()
    probe.once('error', () => resolve(false))
    probe.listen(port, '127.0.0.1', () => probe.close(() => resolve(true)))
  })
}

/** A loopback port nobody uses at the moment. */
export function findFreePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', reject)
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address()
      probe.close(() =>
        address !== null && typeof address === 'object'
          ? resolve(address.port)
          : reject(new Error('The system gave no port.')),
      )
    })
  })
}
