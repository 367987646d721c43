import { fork, type ChildProcess } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import type { DatabaseAccess } from '../../server/setup/databaseAccess.ts'
import { benchEmail, benchPassword } from './data.ts'

export interface BenchServer {
  child: ChildProcess
  url: string
}

/** Starts one of the servers of the bench as a process of its own. */
export const startServer = async (
  file: string,
  access: DatabaseAccess,
  settings: Record<string, string> = {},
): Promise<BenchServer> => {
  const child = fork(fileURLToPath(new URL(file, import.meta.url)), {
    execArgv: ['--import', 'tsx'],
    env: { ...process.env, NODE_ENV: 'test', BENCH_ACCESS: JSON.stringify(access), ...settings },
  })
  const { port } = await new Promise<{ port: number }>((resolve, reject) => {
    child.once('message', (message) => resolve(message as { port: number }))
    child.once('exit', () => reject(new Error(`${file} did not start`)))
  })
  return { child, url: `http://127.0.0.1:${port}` }
}

/** A JSON request as our own pages make it. */
export const post = (url: string, body: object): Promise<Response> =>
  fetch(url, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', 'X-Fanflower-User': 'none' },
    body: JSON.stringify(body),
  })

/** Signs the first therapist in; answers the cookies and whose they are. */
export const signIn = async (url: string): Promise<{ cookie: string; userId: string }> => {
  const response = await post(`${url}/api/sign-in`, {
    email: benchEmail,
    password: benchPassword,
    sharedComputer: false,
  })
  if (response.status !== 200) throw new Error(`Sign-in failed: ${response.status}`)
  const { user } = (await response.json()) as { user: { id: string } }
  const cookie = response.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ')
  return { cookie, userId: user.id }
}

export const median = (values: number[]): number =>
  values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)] ?? Number.NaN
