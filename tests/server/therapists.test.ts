import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { now } from '../../server/clock.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import { buildChild, buildUser } from '../support/factories.ts'

beforeAll(async () => {
  await startApp()
})
afterAll(stopApp)

describe('the list of therapists', () => {
  it('names active therapists by name with their open cases, discharged children not counted', async () => {
    const anna = await buildUser('therapist', { displayName: 'Anna Able' })
    await buildUser('therapist', { displayName: 'Bo Busy', roles: ['therapist', 'clinicLead'] })
    await buildUser('therapist', { displayName: 'Cas Gone', disabledAt: now() })
    await buildChild({ therapist: anna, state: 'active' })
    await buildChild({ therapist: anna, state: 'waiting' })
    await buildChild({ therapist: anna, state: 'discharged' })
    const administrator = await signedInAs(await buildUser('administrator'))
    const listed = (await administrator.get('/api/therapists')).body as {
      displayName: string
      openCases: number
    }[]
    expect(listed.map(({ displayName, openCases }) => [displayName, openCases])).toEqual([
      ['Anna Able', 2],
      ['Bo Busy', 0],
    ])
  })

  it('tells a therapist no colleague’s number of cases', async () => {
    const therapist = await signedInAs(await buildUser('therapist'))
    const listed = (await therapist.get('/api/therapists')).body as { openCases: number | null }[]
    expect(new Set(listed.map(({ openCases }) => openCases))).toEqual(new Set([null]))
  })

  it('is for staff only', async () => {
    const teacher = await signedInAs(await buildUser('teacher'))
    expect((await teacher.get('/api/therapists')).status).toBe(403)
  })
})
