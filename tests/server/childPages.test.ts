import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { AlertPage } from '../../shared/alerts.ts'
import type { AnswerRequestPage } from '../../shared/answerRequests.ts'
import { redFlagUrgencies, type RedFlagUrgency } from '../../shared/redFlagRows.ts'
import { database } from '../../server/dataSource.ts'
import { Alert } from '../../server/entities/Alert.ts'
import { startApp, stopApp } from '../support/app.ts'
import { askingScene, buildRequest, requestsPath, type AskingScene } from '../support/answers.ts'
import { insertRow } from '../support/insertRow.ts'

beforeAll(startApp)
afterAll(stopApp)

const hoursAgo = (hours: number) => new Date(Date.now() - hours * 3_600_000)

const buildAlert = ({ child, holder }: AskingScene, hours: number, urgency: RedFlagUrgency, acted = false) =>
  insertRow(Alert, {
    id: randomUUID(),
    childId: child.id,
    flag: `sign-${hours}`,
    text: `A sign of ${hours} hours ago`,
    level: 'due',
    urgency,
    advice: null,
    holdsBooking: false,
    origin: 'therapist',
    originId: null,
    raisedAt: hoursAgo(hours),
    raisedById: holder.id,
    actedAt: acted ? new Date() : null,
    actedById: acted ? holder.id : null,
    action: acted ? 'Called the family' : null,
  })

describe('a list of one child that grows', () => {
  it('of warning signs comes in pages: the open and urgent ones first, with the count of all that are open', async () => {
    const scene = await askingScene()
    for (let hours = 1; hours <= 28; hours += 1) await buildAlert(scene, hours, 'ask', true)
    await buildAlert(scene, 40, 'ask')
    await buildAlert(scene, 50, 'same_day')
    await buildAlert(scene, 30, 'ask')
    const read = async (query = '') =>
      (await scene.therapist.get(`/api/children/${scene.child.id}/alerts${query}`)).body as AlertPage
    const first = await read()
    expect(first).toMatchObject({ total: 31, page: 1, size: 25, open: 3 })
    expect(first.rows).toHaveLength(25)
    expect(first.rows.slice(0, 4).map(({ flag }) => flag)).toEqual([
      'sign-50',
      'sign-30',
      'sign-40',
      'sign-1',
    ])
    const second = await read('?page=2')
    expect(second).toMatchObject({ total: 31, page: 2, open: 3 })
    expect(second.rows.map(({ flag }) => flag)).toEqual(
      [23, 24, 25, 26, 27, 28].map((hours) => `sign-${hours}`),
    )
    expect(await read('?page=3')).toMatchObject({ rows: [], total: 31, open: 3 })
    const bad = await scene.therapist.get(`/api/children/${scene.child.id}/alerts?size=101`)
    expect(bad.status).toBe(422)
    // The trail names what was shown, and nothing else.
    const [entry] = await database().query(
      "SELECT detail FROM audit_entries WHERE childId = ? AND action = 'alerts.list' ORDER BY position LIMIT 1 OFFSET 1",
      [scene.child.id],
    )
    expect(JSON.parse(entry.detail).ids).toEqual(second.rows.map(({ id }) => id))
  })

  it('puts every urgency in the order of the clinic’s table', async () => {
    const scene = await askingScene()
    for (const [index, urgency] of redFlagUrgencies.toReversed().entries())
      await buildAlert(scene, index + 1, urgency)
    const { body } = await scene.therapist.get(`/api/children/${scene.child.id}/alerts`)
    expect((body as AlertPage).rows.map(({ urgency }) => urgency)).toEqual([...redFlagUrgencies])
  })

  it('of what was asked comes in pages, the newest first, with the count of all that can still be answered', async () => {
    const scene = await askingScene()
    const asked = (hours: number, given: object = {}) =>
      buildRequest(scene.child, scene.holder, {
        guardianId: scene.grandfather.id,
        link: true,
        askedAt: hoursAgo(hours),
        ...given,
      })
    for (let hours = 1; hours <= 24; hours += 1) await asked(hours, { cancelledAt: hoursAgo(0) })
    await asked(25, { expiresAt: hoursAgo(1) })
    const oldest = (await asked(27)).request
    await asked(26, { answeredAt: hoursAgo(1) })
    const read = async (query = '') =>
      (await scene.therapist.get(`${requestsPath(scene.child)}${query}`)).body as AnswerRequestPage
    const first = await read()
    expect(first).toMatchObject({ total: 27, page: 1, size: 25, waiting: 1 })
    expect(first.rows.map(({ state }) => state)).toEqual([
      ...Array.from({ length: 24 }, () => 'cancelled'),
      'expired',
    ])
    const second = await read('?page=2')
    expect(second.rows.map(({ state }) => state)).toEqual(['answered', 'waiting'])
    expect(second.rows[1]).toMatchObject({ id: oldest.id, can: { cancel: true } })
  })
})
