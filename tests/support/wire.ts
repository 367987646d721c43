import { afterEach, vi } from 'vitest'

/** One request as it left the client. */
export interface SentRequest {
  method: string
  path: string
  headers: Headers
  body: unknown
}

interface Reply {
  status: number
  body?: unknown
  headers?: Record<string, string>
}

/** A reply, 'cut' for a connection that breaks, or a function of the request. */
type Scripted = Reply | 'cut' | ((request: SentRequest) => Reply | 'cut' | Promise<Reply | 'cut'>)

/**
 * The network, replaced at `fetch`: answers each request with the next scripted reply (the last one again when they
 * run out) and keeps what was sent.
 */
export function fakeWire(...replies: Scripted[]) {
  const sent: SentRequest[] = []
  const queue = [...replies]
  vi.stubGlobal('fetch', async (address: string, init: RequestInit = {}) => {
    const request: SentRequest = {
      method: init.method ?? 'GET',
      path: address,
      headers: new Headers(init.headers),
      body: typeof init.body === 'string' ? (JSON.parse(init.body) as unknown) : undefined,
    }
    sent.push(request)
    const next = queue.length > 1 ? queue.shift() : queue[0]
    const reply = typeof next === 'function' ? await next(request) : next
    if (reply === undefined || reply === 'cut') throw new TypeError('Failed to fetch')
    const { status, body, headers } = reply
    return new Response(body === undefined ? null : JSON.stringify(body), {
      status,
      headers: { 'Content-Type': 'application/json', ...headers },
    })
  })
  return { sent, then: (...more: Scripted[]) => queue.push(...more) }
}

afterEach(() => {
  vi.unstubAllGlobals()
})

/** A refusal in the server's one shape. */
export const refusal = (status: number, code: string, more: object = {}): Reply => ({
  status,
  body: { code, message: `Refused: ${code}`, requestId: 'test', ...more },
})
