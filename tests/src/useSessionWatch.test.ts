import { flushPromises } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { useSessionWatch } from '../../src/composables/useSessionWatch.ts'
import { useSessionStore } from '../../src/stores/session.ts'
import { inPage } from '../support/mounted.ts'
import { person, sessionOf } from '../support/sessions.ts'
import { fakeWire, type SentRequest } from '../support/wire.ts'

const idleLimit = 1800

beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
})

/** A server that ends a sign-in after half an hour without activity. Background questions are no activity. */
function idleServer() {
  let lastSeen = performance.now()
  const left = () => Math.max(0, idleLimit - (performance.now() - lastSeen) / 1000)
  return {
    touch: () => {
      lastSeen = performance.now()
    },
    reply: (request: SentRequest) => {
      if (left() > 0 && !request.headers.has('X-Fanflower-Background')) lastSeen = performance.now()
      return { status: 200, body: sessionOf(left() > 0 ? person('ada') : null, Math.floor(left())) }
    },
  }
}

async function signedIn() {
  const server = idleServer()
  const wire = fakeWire(server.reply)
  const page = await inPage(() => {
    const session = useSessionStore()
    return { session, watched: useSessionWatch() }
  })
  await page.result.session.load()
  await flushPromises()
  return { ...page.result, server, wire }
}

const pass = async (seconds: number) => {
  await vi.advanceTimersByTimeAsync(seconds * 1000)
  await flushPromises()
}

describe('useSessionWatch', () => {
  it('warns at least two minutes before the sign-in ends, after asking in the background', async () => {
    const { watched, wire } = await signedIn()
    await pass(idleLimit - 181)
    expect(watched.warning.value).toBe(false)
    expect(wire.sent).toHaveLength(1)
    await pass(3)
    expect(watched.warning.value).toBe(true)
    expect(watched.secondsLeft.value).toBeGreaterThanOrEqual(120)
    expect(wire.sent[1]?.headers.get('X-Fanflower-Background')).toBe('1')
  })

  it('disturbs nobody who is active in another tab', async () => {
    const { watched, server } = await signedIn()
    await pass(idleLimit - 400)
    server.touch()
    await pass(300)
    expect(watched.warning.value).toBe(false)
    await pass(idleLimit - 500)
    expect(watched.warning.value).toBe(false)
    await pass(200)
    expect(watched.warning.value).toBe(true)
  })

  it('takes the warning back when the person extends, for the whole time again', async () => {
    const { watched } = await signedIn()
    await pass(idleLimit - 100)
    expect(watched.warning.value).toBe(true)
    await watched.extend()
    expect(watched.warning.value).toBe(false)
    await pass(idleLimit - 200)
    expect(watched.warning.value).toBe(false)
  })

  it('covers the page when the time has run out', async () => {
    const { session, watched } = await signedIn()
    await pass(idleLimit + 25)
    expect(session.state).toBe('ended')
    expect(watched.warning.value).toBe(false)
  })

  it('says so when extending does not reach the server, and keeps warning', async () => {
    const { watched, wire } = await signedIn()
    await pass(idleLimit - 100)
    wire.then('cut')
    fakeWire('cut')
    await watched.extend()
    expect(watched.problem.value).toMatch(/cannot be reached/)
    expect(watched.warning.value).toBe(true)
  })
})
