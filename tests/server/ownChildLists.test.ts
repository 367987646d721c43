import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Role } from '../../shared/roles.ts'
import type { User } from '../../server/entities/User.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser } from '../support/factories.ts'
import { buildLetter } from '../support/storedLetters.ts'
import { buildTask } from '../support/tasks.ts'

/*
 * A person meets their own child as family only, and a child whose record was closed to them not at all: lists must
 * leave out what a single page would refuse.
 */

beforeAll(startApp)
afterAll(stopApp)

/** A child that waits for everything a list could show, under a family name that nobody else has. */
const waitingChild = async (familyName: string, therapist: User, author: User) => {
  const child = await buildChild({ therapist, familyName, nextReviewOn: '2026-01-05' })
  await buildLetter(child, author, 'awaiting_approval')
  await buildTask({
    childId: child.id,
    assigneeId: therapist.id,
    dueOn: '2026-01-05',
    text: `Call ${familyName}`,
  })
  return child
}

describe('lists of members of staff', () => {
  it.each<[Role, string[]]>([
    ['therapist', ['/api/caseload?show=all', '/api/letters', '/api/today', '/api/children/find?q=Lark']],
    ['clinicLead', ['/api/caseload?show=all', '/api/letters', '/api/today', '/api/children/find?q=Lark']],
    ['administrator', ['/api/children?search=Lark', '/api/children/find?q=Lark']],
  ])('of a %s show neither their own child nor one closed to them', async (role, paths) => {
    const viewer = await buildUser(role)
    const author = await buildUser('therapist')
    const holder = role === 'therapist' ? viewer : author
    const names = { shown: `Larkshown${role}`, own: `Larkown${role}`, closed: `Larkclosed${role}` }
    await waitingChild(names.shown, holder, author)
    await buildGuardian(await waitingChild(names.own, holder, author), viewer)
    await buildGuardian(await waitingChild(names.closed, holder, author), viewer, { restricted: true })
    const who = await signedInAs(viewer)
    for (const path of paths) {
      const { status, body } = await who.get(path)
      const text = JSON.stringify(body)
      expect([path, status, text.includes(names.shown)]).toEqual([path, 200, true])
      expect([path, text.includes(names.own), text.includes(names.closed)]).toEqual([path, false, false])
    }
  })
})
