import { afterEach, describe, expect, it } from 'vitest'
import { http, HttpProblem, stateUser, watchAnswers, type Answer } from '../../src/api/http.ts'
import { fakeWire, refusal } from '../support/wire.ts'

const caught = async (request: Promise<unknown>): Promise<HttpProblem> => {
  try {
    await request
  } catch (error) {
    if (error instanceof HttpProblem) return error
    throw error
  }
  throw new Error('The request was not refused')
}

afterEach(() => {
  stateUser(null)
  watchAnswers(() => {})
})

describe('http', () => {
  it('states "none" before and the person after somebody is known, on every request', async () => {
    const { sent } = fakeWire({ status: 200, body: [] })
    await http.get('/letters')
    stateUser('4f6c')
    await http.post('/letters', {})
    expect(sent.map(({ headers }) => headers.get('X-Fanflower-User'))).toEqual(['none', '4f6c'])
  })

  it('leaves empty query values out and repeats lists', async () => {
    const { sent } = fakeWire({ status: 200, body: {} })
    await http.get('/caseload', { query: { page: 2, search: '', sort: null, state: ['waiting', 'active'] } })
    expect(sent[0]?.path).toBe('/api/caseload?page=2&state=waiting&state=active')
  })

  it('quotes the version and sends the key of a versioned write', async () => {
    const { sent } = fakeWire({ status: 200, body: {} })
    await http.put('/children/1', { a: 1 }, { ifMatch: 7, idempotencyKey: 'k-1' })
    expect(sent[0]?.headers.get('If-Match')).toBe('"7"')
    expect(sent[0]?.headers.get('Idempotency-Key')).toBe('k-1')
    expect(sent[0]?.headers.get('Content-Type')).toBe('application/json')
    expect(sent[0]?.body).toEqual({ a: 1 })
  })

  it('throws the named problem with its fields and the seconds to wait', async () => {
    fakeWire({
      ...refusal(429, 'slow_down', { fields: { email: 'Wait' } }),
      headers: { 'Retry-After': '30' },
    })
    const problem = await caught(http.post('/sign-in', {}))
    expect(problem.status).toBe(429)
    expect(problem.problem.code).toBe('slow_down')
    expect(problem.problem.fields).toEqual({ email: 'Wait' })
    expect(problem.retryAfter).toBe(30)
  })

  it('says that a write is not saved and still on the page when the connection breaks', async () => {
    fakeWire('cut')
    const problem = await caught(http.post('/letters', {}))
    expect(problem.status).toBe(0)
    expect(problem.message).toMatch(/not saved yet.*still on this page/)
  })

  it('answers a page of a proxy with a plain problem instead of a parse error', async () => {
    fakeWire({ status: 502, body: '<html>Bad gateway</html>' })
    const problem = await caught(http.get('/today'))
    expect([problem.status, problem.problem.code]).toEqual([502, 'unexpected'])
  })

  it('gives undefined for an answer without content', async () => {
    fakeWire({ status: 204 })
    expect(await http.delete('/letters/1')).toBeUndefined()
  })

  it('tells the listener status and code, and marks background polls', async () => {
    const heard: Answer[] = []
    watchAnswers((answer) => heard.push(answer))
    const { sent } = fakeWire({ status: 200, body: {} }, refusal(401, 'signed_out'))
    await http.get('/session', { background: true })
    await caught(http.get('/today'))
    expect(heard).toEqual([
      { status: 200, code: null, background: true },
      { status: 401, code: 'signed_out', background: false },
    ])
    expect(sent[0]?.headers.get('X-Fanflower-Background')).toBe('1')
    expect(sent[1]?.headers.has('X-Fanflower-Background')).toBe(false)
  })
})
