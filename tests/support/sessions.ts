import type { Role } from '../../shared/roles.ts'
import type { SessionUser, SessionView } from '../../shared/users.ts'

/** Invented people as the server would present them. */
export const person = (id: string, roles: Role[] = ['therapist']): SessionUser => ({
  id,
  displayName: `Person ${id}`,
  email: `${id}@example.org`,
  roles,
  workingHand: 'left',
  theme: 'light',
  newlyQualified: false,
})

export const sessionOf = (user: SessionUser | null, idleSecondsLeft: number | null = 1800): SessionView => ({
  user,
  clinic: {
    name: 'Test clinic',
    timeZone: 'Europe/London',
    today: '2026-03-03',
    demo: false,
    inboxUrl: null,
  },
  idleSecondsLeft: user ? idleSecondsLeft : null,
  demoSignIns: [],
})
