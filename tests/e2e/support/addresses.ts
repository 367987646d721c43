import type { RouteRecordRaw } from 'vue-router'
import { routes } from '../../../src/router/routes.ts'
import { roles, type Role } from '../../../shared/roles.ts'
import type { Person } from './browser.ts'

/** A page as somebody opens it: the name of its route and an address with real ids in it. */
export interface Screen {
  name: string
  address: string
}

/** Who comes to a page: a role, or 'nobody' before signing in. */
export type Visitor = Role | 'nobody'
export const visitors: readonly Visitor[] = ['nobody', ...roles]

const isPage = (route: RouteRecordRaw) => !route.redirect && typeof route.name === 'string'
const open = (route: RouteRecordRaw): readonly Visitor[] => {
  if (route.meta?.open) return ['nobody']
  return route.meta?.roles ?? roles
}
const flat = routes.flatMap((route) => [
  ...(isPage(route) ? [{ name: String(route.name), visitors: open(route) }] : []),
  ...(route.children ?? []).map((child) => ({ name: String(child.name), visitors: open(route) })),
])

/** Names of the routes a visitor may open, as the router has them. */
export const routesFor = (visitor: Visitor): string[] =>
  flat.filter((route) => route.visitors.includes(visitor)).map(({ name }) => name)

interface Listed {
  rows: { id: string }[]
}
const reader = ({ page, url }: Person) => {
  const get = async <T>(path: string): Promise<T> =>
    (await (await page.request.get(`${url}/api${path}`)).json()) as T
  const firstId = async (path: string) => (await get<Listed>(path)).rows[0]?.id ?? 'none'
  return { get, firstId }
}

/** A child of the demo with something in every section of the record. */
const richChild = 'Mateo Quispe-Arnold'

const childScreens = async (staff: Person): Promise<Screen[]> => {
  const { get } = reader(staff)
  const found = await get<{ id: string }[]>(`/children/find?q=${encodeURIComponent(richChild)}`)
  const childId = found[0]?.id ?? 'none'
  const { sections } = await get<{ sections: string[] }>(`/children/${childId}`)
  const screens: Screen[] = sections.map((section) => ({
    name: `child-${section}`,
    address: `/children/${childId}/${section}`,
  }))
  const add = (name: string, ...addresses: string[]) =>
    screens.push(...addresses.map((address) => ({ name, address: `/children/${childId}/${address}` })))
  if (!sections.includes('sessions')) {
    // A section that is not open to this role says so in words.
    add('child-sessions', 'sessions')
    return screens
  }
  const profile = await get<{ questionnaires: { id: string }[] }>(`/children/${childId}/hand-profile`)
  const notes = await get<Listed>(`/children/${childId}/session-notes`)
  const letters = await get<Listed>(`/children/${childId}/letters`)
  add('questionnaire', ...profile.questionnaires.slice(0, 1).map(({ id }) => `questionnaires/${id}`))
  const histories = await get<{ id: string }[]>(`/children/${childId}/histories`)
  // One that is written down and one that is not there: either way the page says what to do.
  add('history', `histories/${histories[0]?.id ?? childId}`)
  const measures = await get<{ id: string; kind: string; lockedAt: string | null }[]>(
    `/children/${childId}/measures`,
  )
  add('measure', ...measures.map(({ id }) => `measures/${id}`))
  const conclusions = await get<{ id: string }[]>(`/children/${childId}/conclusions`)
  // A child without one shows the page that says so.
  add('conclusion', `conclusions/${conclusions[0]?.id ?? childId}`)
  add('session-note', 'sessions/new', ...notes.rows.slice(0, 1).map(({ id }) => `sessions/${id}`))
  add('letter', ...letters.rows.slice(0, 1).map(({ id }) => `letters/${id}`))
  return screens
}

const simple = (...addresses: [name: string, address: string][]): Screen[] =>
  addresses.map(([name, address]) => ({ name, address }))

const staffScreens = async (staff: Person, managers: boolean): Promise<Screen[]> => {
  const { firstId } = reader(staff)
  return [
    ...simple(
      ['today', '/today'],
      ['referrals', '/referrals'],
      ['referral-new', '/referrals/new'],
      ['referral', `/referrals/${await firstId('/referrals?status=new')}`],
      ['schools', '/schools'],
      ['profile', '/profile'],
      ['forbidden', '/forbidden'],
    ),
    ...(managers ? simple(['settings', '/settings'], ['people', '/people']) : []),
    ...(await childScreens(staff)),
  ]
}

const therapistScreens = async (therapist: Person): Promise<Screen[]> => {
  const { get } = reader(therapist)
  const { rows } = await get<{ rows: { id: string; childId: string; state: string }[] }>(
    '/letters?state=draft',
  )
  const drafts = rows.slice(0, 1).map(({ id, childId }) => ({
    name: 'letter',
    address: `/children/${childId}/letters/${id}`,
  }))
  return [...simple(['caseload', '/caseload'], ['letters', '/letters']), ...drafts]
}

const guardianScreens = async (guardian: Person): Promise<Screen[]> => {
  const { get } = reader(guardian)
  const childId = (await get<{ id: string }[]>('/my/children'))[0]?.id ?? 'none'
  const { letters } = await get<{ letters: { id: string }[] }>(`/my/children/${childId}`)
  const toAnswer = await get<{ id: string; childId: string }[]>('/my/to-answer')
  const asked = toAnswer.filter((request) => request.childId === childId)
  return simple(
    ['my-children', '/my-child'],
    ['my-child', `/my-child/${childId}`],
    ['received-letter', `/my-child/${childId}/letters/${letters[0]?.id}`],
    // No such questions, or closed ones: either way the page says in words what to do.
    ['my-answers', `/my-child/${childId}/answer/${asked[0]?.id ?? childId}`],
    // No such delivery, or one whose link has ended: either way the page says in words what to do.
    ['delivery', `/letter/${childId}`],
    ['profile', '/profile'],
    ['forbidden', '/forbidden'],
  )
}

const teacherScreens = async (teacher: Person): Promise<Screen[]> => {
  const { get } = reader(teacher)
  // The class with questions to answer: its pupils have advice to show.
  const classes = await get<{ id: string; unanswered: number }[]>('/classes')
  const classId = classes.find(({ unanswered }) => unanswered > 0)?.id ?? 'none'
  const pupils = await get<{ rows: { id: string; unanswered: number }[] }>(`/classes/${classId}/pupils`)
  const asked = (await get<{ id: string; childId: string }[]>('/pupils/to-answer'))[0]
  const pupilId = pupils.rows.find(({ unanswered }) => unanswered > 0)?.id ?? 'none'
  return simple(
    ['classes', '/classes'],
    ['class', `/classes/${classId}`],
    ['pupil', `/classes/${classId}/pupils/${pupilId}`],
    [
      'pupil-answers',
      `/classes/${classId}/pupils/${asked?.childId ?? pupilId}/answer/${asked?.id ?? pupilId}`,
    ],
    ['profile', '/profile'],
    ['forbidden', '/forbidden'],
  )
}

/** Every page a visitor may open, with ids read over the API under the visitor's own sign-in. */
export const screensOf = async (visitor: Visitor, person: Person): Promise<Screen[]> => {
  const allowed = routesFor(visitor)
  const screens = await everyScreen(visitor, person)
  return screens.filter(({ name }) => allowed.includes(name))
}

const everyScreen = async (visitor: Visitor, person: Person): Promise<Screen[]> => {
  switch (visitor) {
    case 'nobody':
      return simple(
        ['sign-in', '/sign-in'],
        ['forgot-password', '/forgot-password'],
        ['reset-password', '/reset-password#not-a-real-token'],
        ['invitation', '/invitation#not-a-real-token'],
        ['answer-link', '/answer#not-a-real-token'],
        ['not-found', '/no-such-page'],
      )
    case 'therapist':
      return [...(await staffScreens(person, false)), ...(await therapistScreens(person))]
    case 'clinicLead':
      return [
        ...(await staffScreens(person, true)),
        ...(await therapistScreens(person)),
        ...simple(['review', '/review'], ['review-list', '/review/waiting'], ['forms', '/forms']),
      ]
    case 'administrator':
      return [...(await staffScreens(person, true)), ...simple(['register', '/register'])]
    case 'guardian':
      return guardianScreens(person)
    case 'teacher':
      return teacherScreens(person)
  }
}
