import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ClinicSettingsView } from '../../shared/settings.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildUser } from '../support/factories.ts'

let lead: Client
let administrator: Client

beforeAll(async () => {
  await startApp()
  lead = await signedInAs(await buildUser('clinicLead'))
  administrator = await signedInAs(await buildUser('administrator'))
})
afterAll(stopApp)

const read = async (who: Client) => (await who.get('/api/settings')).body as ClinicSettingsView

const changed = ({ version: _version, can: _can, ...settings }: ClinicSettingsView, given: object) => ({
  ...settings,
  ...given,
})

describe('clinic settings', () => {
  it('are read by lead and administrator and changed by the lead, each version once', async () => {
    const before = await read(administrator)
    expect([before.waitTargetWeeks, before.version, before.can.change]).toEqual([18, 0, false])
    const save = (version: number, waitTargetWeeks: number) =>
      lead.put('/api/settings').set('If-Match', `"${version}"`).send(changed(before, { waitTargetWeeks }))

    const saved = await save(0, 20)
    expect([saved.status, saved.body.waitTargetWeeks, saved.body.version]).toEqual([200, 20, 1])
    const late = await save(0, 30)
    expect([late.status, late.body.code, late.body.current.waitTargetWeeks]).toEqual([409, 'stale', 20])
    expect((await save(1, 22)).body.version).toBe(2)
    expect((await read(lead)).waitTargetWeeks).toBe(22)
  })

  it.each([
    ['waitTargetWeeks', 0],
    ['reviewWeeks', 12.5],
    ['unsignedSoonHours', '24'],
    ['timeZone', 'Mars/Olympus'],
    ['cutOffSet', 'none of ours'],
    ['clinicName', ''],
  ])('refuse %s = %j beside the field', async (field, value) => {
    const current = await read(lead)
    const response = await lead
      .put('/api/settings')
      .set('If-Match', `"${current.version}"`)
      .send(changed(current, { [field]: value }))
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
    expect((await read(lead)).version).toBe(current.version)
  })

  it('are closed to therapists and, for changing, to administrators', async () => {
    const therapist = await signedInAs(await buildUser('therapist'))
    expect((await therapist.get('/api/settings')).status).toBe(403)
    const current = await read(administrator)
    const response = await administrator
      .put('/api/settings')
      .set('If-Match', `"${current.version}"`)
      .send(changed(current, {}))
    expect(response.status).toBe(403)
  })
})
