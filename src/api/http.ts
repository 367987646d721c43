import type { Problem } from '@shared/problems.ts'

/** A refused or failed request. `status` is 0 when no answer came at all. */
export class HttpProblem extends Error {
  readonly status: number
  readonly problem: Problem
  /** Seconds to wait before trying again, as the server asked; null when it did not. */
  readonly retryAfter: number | null

  constructor(status: number, problem: Problem, retryAfter: number | null = null) {
    super(problem.message)
    this.name = 'HttpProblem'
    this.status = status
    this.problem = problem
    this.retryAfter = retryAfter
  }
}

type QueryValue = string | number | boolean | null | undefined

export interface ReadOptions {
  /** Empty values (null, undefined, '') are left out of the address. A list repeats its name. */
  query?: Record<string, QueryValue | readonly QueryValue[]>
  /** A poll nobody asked for: it does not extend the sign-in. */
  background?: boolean
  signal?: AbortSignal
}

export interface WriteOptions {
  /** Version the change was made from; a newer one on the server answers 409 `stale`. */
  ifMatch?: number
  /** The same key sent again gets the same answer instead of a second row. */
  idempotencyKey?: string
  background?: boolean
  signal?: AbortSignal
}

export interface UploadOptions {
  /** Called with the sent share, 0 to 1. */
  onProgress?: (share: number) => void
  signal?: AbortSignal
  idempotencyKey?: string
}

/** What the session store hears of every answer. */
export interface Answer {
  status: number
  code: string | null
  background: boolean
}

const patienceInMs = 30_000

let statedUser = 'none'
let listener: (answer: Answer) => void = () => {}

/** For whom this page was made. Sent with every request, so that a page of one person never saves as another. */
export const stateUser = (userId: string | null) => {
  statedUser = userId ?? 'none'
}

/** One listener (the session store) learns from answers that a sign-in ended or was extended. */
export const watchAnswers = (heard: (answer: Answer) => void) => {
  listener = heard
}

/** A new key for `Idempotency-Key`: make it when the form opens, not when the button is pressed. */
export const newIdempotencyKey = () => crypto.randomUUID()

const localProblem = (code: string, message: string): Problem => ({ code, message, requestId: '' })

const unreachable = (write: boolean) =>
  new HttpProblem(
    0,
    localProblem(
      'unreachable',
      write
        ? 'Fanflower cannot be reached, so this is not saved yet. It is still on this page: check the connection and try again.'
        : 'Fanflower cannot be reached. Check the connection and try again.',
    ),
  )

const tooSlow = (write: boolean) =>
  new HttpProblem(
    0,
    localProblem(
      'no_answer',
      write
        ? 'No answer came within 30 seconds, so it is not certain that this was saved. Look before you send it again.'
        : 'No answer came within 30 seconds. Try again.',
    ),
  )

function addressOf(path: string, query: ReadOptions['query']): string {
  const search = new URLSearchParams()
  for (const [name, given] of Object.entries(query ?? {})) {
    for (const value of Array.isArray(given) ? given : [given]) {
      if (value !== null && value !== undefined && value !== '') search.append(name, String(value))
    }
  }
  const text = search.toString()
  return `/api${path}${text === '' ? '' : `?${text}`}`
}

const isProblem = (value: unknown): value is Problem =>
  typeof value === 'object' && value !== null && 'code' in value && 'message' in value

function parse(text: string): unknown {
  if (text === '') return undefined
  try {
    return JSON.parse(text)
  } catch {
    // A proxy in between may answer in its own words; the status still says what happened.
    return undefined
  }
}

const secondsOf = (header: string | null) => {
  const seconds = header === null ? Number.NaN : Number(header)
  return Number.isFinite(seconds) ? seconds : null
}

/** Turns status and text into the value or the named problem, and tells the listener. */
function settle<T>(status: number, text: string, retryAfter: string | null, background: boolean): T {
  const content = parse(text)
  const refused = status < 200 || status > 299
  const problem = isProblem(content)
    ? content
    : localProblem('unexpected', `The server answered in a way this page does not understand (${status}).`)
  listener({ status, code: refused ? problem.code : null, background })
  if (refused) throw new HttpProblem(status, problem, secondsOf(retryAfter))
  return content as T
}

function headersFor({ ifMatch, idempotencyKey, background }: WriteOptions): Headers {
  const headers = new Headers({ Accept: 'application/json', 'X-Fanflower-User': statedUser })
  if (ifMatch !== undefined) headers.set('If-Match', `"${ifMatch}"`)
  if (idempotencyKey !== undefined) headers.set('Idempotency-Key', idempotencyKey)
  if (background) headers.set('X-Fanflower-Background', '1')
  return headers
}

async function send<T>(method: string, address: string, body: unknown, options: WriteOptions): Promise<T> {
  const write = method !== 'GET'
  const headers = headersFor(options)
  if (write) headers.set('Content-Type', 'application/json')
  const patience = AbortSignal.timeout(patienceInMs)
  const signal = options.signal ? AbortSignal.any([options.signal, patience]) : patience
  try {
    const response = await fetch(address, {
      method,
      headers,
      signal,
      credentials: 'same-origin',
      cache: 'no-store',
      body: write ? JSON.stringify(body === undefined ? {} : body) : undefined,
    })
    const text = await response.text()
    return settle<T>(response.status, text, response.headers.get('Retry-After'), options.background ?? false)
  } catch (error) {
    if (error instanceof HttpProblem || options.signal?.aborted) throw error
    throw patience.aborted ? tooSlow(write) : unreachable(write)
  }
}

/** Multipart through XMLHttpRequest: fetch cannot report how much has been sent. */
function upload<T>(path: string, form: FormData, options: UploadOptions): Promise<T> {
  return new Promise<T>((resolve, reject) => {
    const request = new XMLHttpRequest()
    const abort = () => request.abort()
    const finish = (act: () => void) => {
      options.signal?.removeEventListener('abort', abort)
      act()
    }
    request.open('POST', `/api${path}`)
    headersFor(options).forEach((value, name) => request.setRequestHeader(name, value))
    request.upload.addEventListener('progress', (event) => {
      if (event.lengthComputable) options.onProgress?.(event.loaded / event.total)
    })
    request.addEventListener('load', () =>
      finish(() => {
        try {
          resolve(
            settle<T>(request.status, request.responseText, request.getResponseHeader('Retry-After'), false),
          )
        } catch (error) {
          reject(error)
        }
      }),
    )
    request.addEventListener('error', () => finish(() => reject(unreachable(true))))
    request.addEventListener('abort', () => finish(() => reject(new DOMException('Stopped', 'AbortError'))))
    options.signal?.addEventListener('abort', abort)
    if (options.signal?.aborted) reject(new DOMException('Stopped', 'AbortError'))
    else request.send(form)
  })
}

/**
 * The one HTTP client. Paths are given without `/api`. Every verb throws `HttpProblem` when refused or unanswered,
 * and the browser's `AbortError` when the caller's signal stopped it.
 */
export const http = {
  get: <T>(path: string, { query, ...options }: ReadOptions = {}) =>
    send<T>('GET', addressOf(path, query), undefined, options),
  post: <T = void>(path: string, body?: unknown, options: WriteOptions = {}) =>
    send<T>('POST', addressOf(path, undefined), body, options),
  put: <T = void>(path: string, body?: unknown, options: WriteOptions = {}) =>
    send<T>('PUT', addressOf(path, undefined), body, options),
  patch: <T = void>(path: string, body?: unknown, options: WriteOptions = {}) =>
    send<T>('PATCH', addressOf(path, undefined), body, options),
  delete: <T = void>(path: string, body?: unknown, options: WriteOptions = {}) =>
    send<T>('DELETE', addressOf(path, undefined), body, options),
  upload: <T>(path: string, form: FormData, options: UploadOptions = {}) => upload<T>(path, form, options),
}
