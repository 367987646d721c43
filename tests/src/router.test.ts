import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it } from 'vitest'
import { createMemoryHistory, createRouter, type RouteRecordRaw } from 'vue-router'
import type { Role } from '../../shared/roles.ts'
import { guard } from '../../src/router/index.ts'
import { homeFor, routes } from '../../src/router/routes.ts'
import { person, sessionOf } from '../support/sessions.ts'
import { fakeWire } from '../support/wire.ts'

const flat = (records: readonly RouteRecordRaw[]): RouteRecordRaw[] =>
  records.flatMap((record) => [record, ...flat(record.children ?? [])])
const pages = flat(routes).filter(({ name }) => name !== 'home' && name !== 'child')

/** The real addresses and the real guard, with empty pages. */
const bare = (records: readonly RouteRecordRaw[]): RouteRecordRaw[] =>
  records.map((record) => {
    const component = { render: () => null }
    return { ...record, component, children: bare(record.children ?? []) } as RouteRecordRaw
  })

async function arriveAt(address: string, roles: Role[] | null) {
  setActivePinia(createPinia())
  fakeWire({ status: 200, body: sessionOf(roles && person('ada', roles)) })
  const router = createRouter({ history: createMemoryHistory(), routes: bare(routes) })
  router.beforeEach(guard)
  await router.push(address)
  return router.currentRoute.value
}

beforeEach(() => setActivePinia(createPinia()))

describe('addresses', () => {
  it('gives every page a name of its own for the browser tab', () => {
    const titles = pages.map(({ meta }) => meta?.title)
    expect(titles).not.toContain(undefined)
    expect(new Set(titles).size).toBe(pages.length)
  })

  it('opens only the sign-in pages and the missing page to people who are not signed in', () => {
    const open = pages.filter(({ meta }) => meta?.open).map(({ name }) => name)
    expect(open).toEqual([
      'sign-in',
      'forgot-password',
      'reset-password',
      'invitation',
      'answer-link',
      'not-found',
    ])
  })

  it('sends somebody who is not signed in to sign in, and remembers where they wanted to go', async () => {
    const at = await arriveAt('/children/c1/goals', null)
    expect([at.name, at.query.to]).toEqual(['sign-in', '/children/c1/goals'])
  })

  it.each([
    [['therapist'], 'today'],
    [['administrator'], 'today'],
    [['clinicLead', 'teacher'], 'today'],
    [['teacher', 'guardian'], 'classes'],
    [['guardian'], 'my-children'],
  ] satisfies [Role[], string][])('takes %j home to %s', async (roles, home) => {
    expect(homeFor(roles)).toEqual({ name: home })
    expect((await arriveAt('/', roles)).name).toBe(home)
    expect((await arriveAt('/sign-in', roles)).name).toBe(home)
  })

  // The access matrix for whole pages; what a page may show is decided by the server.
  it.each([
    ['/caseload', ['therapist', 'clinicLead']],
    ['/register', ['administrator']],
    ['/review', ['clinicLead']],
    ['/settings', ['clinicLead', 'administrator']],
    ['/people', ['clinicLead', 'administrator']],
    ['/referrals/new', ['clinicLead', 'administrator']],
    ['/children/c1/glance', ['therapist', 'clinicLead', 'administrator']],
    ['/my-child/c1', ['guardian']],
    ['/letter/d1', ['guardian']],
    ['/classes/k1/pupils/c1', ['teacher']],
  ] satisfies [string, Role[]][])('opens %s to %j only', async (address, allowed) => {
    const all: Role[] = ['therapist', 'clinicLead', 'administrator', 'guardian', 'teacher']
    const admitted: Role[] = []
    for (const role of all) if ((await arriveAt(address, [role])).name !== 'forbidden') admitted.push(role)
    expect(admitted).toEqual(allowed)
  })
})
