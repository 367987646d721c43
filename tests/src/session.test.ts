import { createPinia, setActivePinia } from 'pinia'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { http } from '../../src/api/http.ts'
import { useSessionStore } from '../../src/stores/session.ts'
import { person, sessionOf } from '../support/sessions.ts'
import { fakeWire, refusal } from '../support/wire.ts'

beforeEach(() => setActivePinia(createPinia()))
afterEach(() => vi.useRealTimers())

const ada = person('ada', ['therapist', 'guardian'])
const bea = person('bea', ['clinicLead'])
const given = { email: 'x@example.org', password: 'secret', sharedComputer: false }
const ignored = (request: Promise<unknown>) => request.catch(() => undefined)

describe('session store', () => {
  it('asks once who is signed in, however many wait for it', async () => {
    const { sent } = fakeWire({ status: 200, body: sessionOf(ada) })
    const session = useSessionStore()
    await Promise.all([session.load(), session.load()])
    expect(sent).toHaveLength(1)
    expect(session.state).toBe('signedIn')
  })

  it('lets a failed first question be asked again', async () => {
    fakeWire('cut', { status: 200, body: sessionOf(null) })
    const session = useSessionStore()
    await expect(session.load()).rejects.toThrow(/cannot be reached/)
    await session.load()
    expect(session.state).toBe('signedOut')
  })

  it('knows the roles of the person and nobody else’s', async () => {
    fakeWire({ status: 200, body: sessionOf(ada) })
    const session = useSessionStore()
    expect(session.can('therapist')).toBe(false)
    await session.load()
    expect(session.can('therapist')).toBe(true)
    expect(session.can('clinicLead', 'guardian')).toBe(true)
    expect(session.can('administrator')).toBe(false)
  })

  it('covers the page and keeps the person when any request is answered 401', async () => {
    fakeWire({ status: 200, body: sessionOf(ada) }, refusal(401, 'signed_out'))
    const session = useSessionStore()
    await session.load()
    await ignored(http.get('/today'))
    expect(session.state).toBe('ended')
    expect(session.user?.id).toBe('ada')
    expect(session.endsAt).toBeNull()
  })

  it('does not take a wrong password for the end of a sign-in', async () => {
    fakeWire({ status: 200, body: sessionOf(ada) }, refusal(401, 'sign_in_failed'))
    const session = useSessionStore()
    await session.load()
    await ignored(http.post('/me/password', {}))
    expect(session.state).toBe('signedIn')
  })

  it('covers the page when somebody else is signed in in this browser', async () => {
    fakeWire({ status: 200, body: sessionOf(ada) }, refusal(409, 'session_changed'))
    const session = useSessionStore()
    await session.load()
    await ignored(http.put('/notes/1', {}))
    expect(session.state).toBe('replaced')
    expect(session.user?.id).toBe('ada')
  })

  it('never takes another person into a page made for this one', async () => {
    fakeWire({ status: 200, body: sessionOf(ada) }, { status: 200, body: sessionOf(bea) })
    const session = useSessionStore()
    await session.load()
    await session.check()
    expect(session.state).toBe('replaced')
    expect(session.user?.id).toBe('ada')
    expect(session.can('clinicLead')).toBe(false)
  })

  it('goes on when the same person signs in again, and says so once', async () => {
    const { sent } = fakeWire(
      { status: 200, body: sessionOf(ada) },
      refusal(401, 'signed_out'),
      { status: 200, body: sessionOf(ada) },
      { status: 200, body: {} },
    )
    const session = useSessionStore()
    await session.load()
    await ignored(http.get('/today'))
    expect(await session.signIn(given)).toBe('same')
    expect(session.state).toBe('signedIn')
    expect(session.resumed).toBe(1)
    await http.post('/notes', {})
    expect(sent[2]?.headers.get('X-Fanflower-User')).toBe('none')
    expect(sent[3]?.headers.get('X-Fanflower-User')).toBe('ada')
  })

  it('keeps the page covered when another person signs in on it', async () => {
    fakeWire({ status: 200, body: sessionOf(ada) }, refusal(401, 'signed_out'), {
      status: 200,
      body: sessionOf(bea),
    })
    const session = useSessionStore()
    await session.load()
    await ignored(http.get('/today'))
    expect(await session.signIn(given)).toBe('other')
    expect(session.state).toBe('ended')
    expect(session.user?.id).toBe('ada')
    expect(session.resumed).toBe(0)
  })

  it('counts what a person does as activity, but not background polls', async () => {
    vi.useFakeTimers()
    fakeWire({ status: 200, body: sessionOf(ada, 600) }, { status: 200, body: {} })
    const session = useSessionStore()
    await session.load()
    const first = session.endsAt ?? 0
    vi.advanceTimersByTime(60_000)
    await http.get('/today', { background: true })
    expect(session.endsAt).toBe(first)
    await http.get('/today')
    expect(session.endsAt).toBe(first + 60_000)
  })
})
