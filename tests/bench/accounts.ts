import { median, post } from './servers.ts'

const timed = async (request: () => Promise<Response>, status: number): Promise<number> => {
  const started = performance.now()
  const response = await request()
  await response.text()
  if (response.status !== status) throw new Error(`Answered ${response.status} instead of ${status}`)
  return performance.now() - started
}

/** Median times in ms of the answers about addresses that have an account and those that have none, asked in turns. */
const compare = async (
  name: string,
  tries: number,
  status: number,
  ask: (email: string) => Promise<Response>,
  known: (n: number) => string,
) => {
  const times = { known: [] as number[], unknown: [] as number[] }
  for (let n = 0; n < tries; n += 1) {
    times.known.push(await timed(() => ask(known(n)), status))
    times.unknown.push(await timed(() => ask(`nobody${n}@harrowmere.example`), status))
  }
  return { name, tries, known: median(times.known), unknown: median(times.unknown) }
}

/**
 * Whether the time of an answer tells who has an account: wrong passwords and reset requests, 195 and 100 times each.
 * The server's clock must run fast enough for the limits by the minute and hour not to count.
 */
export const measureAccounts = async (url: string) => [
  await compare(
    'sign-in, wrong password',
    195,
    401,
    (email) => post(`${url}/api/sign-in`, { email, password: 'not this password', sharedComputer: false }),
    // Thirty-nine accounts, five times each: the sixth failure would be slowed down.
    (n) => `therapist${1 + (n % 39)}@harrowmere.example`,
  ),
  await compare(
    'password reset',
    100,
    204,
    (email) => post(`${url}/api/password-resets`, { email }),
    (n) => `therapist${1 + (n % 39)}@harrowmere.example`,
  ),
]
