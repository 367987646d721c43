import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import { cutOffSets, handUseFormV1, type HandUseAnswer } from '../../shared/handUse.ts'
import { scoreForm } from '../../shared/formScores.ts'
import type { HandProfileView } from '../../shared/handProfile.ts'
import type { Informant } from '../../shared/questionnaires.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { formNamed, sidesDetails } from '../support/handEvidence.ts'
import { buildMeasure, pegsDetails, reachingDetails } from '../support/measures.ts'
import { buildQuestionnaire } from '../support/records.ts'

let therapist: User
let anna: Client
let child: Child

beforeAll(async () => {
  await startApp()
  therapist = await buildUser('therapist')
  anna = await signedInAs(therapist)
})
afterAll(stopApp)

beforeEach(async () => {
  child = await buildChild({ therapist, birthDate: '2018-05-04' })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const path = (of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/hand-profile`
const profile = async (who: Client = anna): Promise<HandProfileView> => {
  const response = await who.get(path())
  expect(response.status, response.text).toBe(200)
  return response.body
}

const answers = (...given: HandUseAnswer[]) =>
  Object.fromEntries(handUseFormV1.items.map(({ id }, index) => [id, given[index] ?? given.at(-1) ?? null]))

const answeredBy = (informant: Informant, answeredOn: string, ...given: HandUseAnswer[]) =>
  buildQuestionnaire(child, therapist, {
    locked: true,
    informant,
    answeredOn,
    answers: answers(...given),
    score: scoreForm(formNamed('hand-use-10'), answers(...given), cutOffSets[0]),
  })
const reached = (measuredOn: string, hand: 'left' | 'right', more: object = {}) =>
  buildMeasure(child, therapist, {
    locked: true,
    kind: 'reaching',
    measuredOn,
    details: reachingDetails(() => hand),
    ...more,
  })

describe('the hand profile', () => {
  it('puts questionnaires, reaching, skill, foot and eyes on one line, each with what it opens to', async () => {
    const asked = await answeredBy('guardian', '2026-03-03', 'left')
    const reaching = await reached('2026-03-04', 'left')
    await buildMeasure(child, therapist, {
      locked: true,
      kind: 'pegs',
      measuredOn: '2026-03-04',
      details: pegsDetails([14, 14.2, 13.8], [16, 16.2, 15.8]),
    })
    await buildMeasure(child, therapist, {
      locked: true,
      kind: 'sides',
      measuredOn: '2026-03-04',
      details: sidesDetails('right', 'right'),
    })
    const { lateralLine, statements, measures, questionnaires } = await profile()
    expect(lateralLine.map(({ aspect, side, latest }) => [aspect, side, latest])).toEqual([
      ['preference', 'left', true],
      ['reaching', 'left', true],
      ['skill', 'left', true],
      ['foot', 'right', true],
      ['eye_far', 'right', true],
      ['eye_near', 'right', true],
    ])
    expect(lateralLine[0]).toMatchObject({ source: { kind: 'questionnaire', id: asked.id }, chance: null })
    expect(lateralLine[1]).toMatchObject({
      value: -100,
      source: { kind: 'measure', id: reaching.id },
      chance: { low: expect.closeTo(-42.857, 3), high: expect.closeTo(42.857, 3) },
    })
    expect(lateralLine[2]?.interval?.high).toBeLessThan(0)
    for (const { opens } of lateralLine) {
      expect(opens.formula).not.toBe('')
      expect(opens.worked).toContain('=')
      expect(opens.raw.length).toBeGreaterThan(0)
      expect(opens.citation).not.toBe('')
      expect(opens.cautions.length).toBeGreaterThan(0)
    }
    expect(statements.map(({ kind }) => kind)).toContain('agrees')
    expect(
      statements.some(({ text }) => text.includes('The child chooses the left hand and the right foot')),
    ).toBe(true)
    expect([measures.length, questionnaires.length]).toEqual([3, 1])
  })

  it('draws neither what is begun nor what a locked newer one took the place of, but lists both', async () => {
    const old = await reached('2025-03-04', 'right')
    const corrected = await reached('2026-03-04', 'left', { replacesId: old.id })
    await buildMeasure(child, therapist, { locked: false, kind: 'tapping' })
    const { lateralLine, measures } = await profile()
    expect(lateralLine.map(({ source }) => source.id)).toEqual([corrected.id])
    expect(measures).toHaveLength(3)
  })

  it('keeps an earlier occasion on the line, lighter, and compares the two figure by figure', async () => {
    const old = await reached('2025-03-04', 'right')
    const now = await reached('2026-03-04', 'left')
    const { lateralLine, occasions } = await profile()
    expect(lateralLine.map(({ source, latest }) => [source.id, latest])).toEqual([
      [now.id, true],
      [old.id, false],
    ])
    expect(occasions.measures).toMatchObject([
      { before: { measureId: old.id, on: '2025-03-04' }, after: { measureId: now.id, on: '2026-03-04' } },
    ])
    expect(occasions.measures[0]?.lines[0]).toEqual({ label: 'Left reaches', before: '0', after: '21' })
  })

  it('compares two occasions of a form activity by activity', async () => {
    await answeredBy('guardian', '2025-03-03', 'right', 'left')
    await answeredBy('guardian', '2026-03-03', 'left')
    const { occasions } = await profile()
    expect(occasions.forms[0]?.counts).toMatchObject({ changed: 1, same: 9 })
    expect(occasions.forms[0]?.reliable.used).toBe(false)
  })

  it('sets informants side by side and points out three activities told differently', async () => {
    await answeredBy('guardian', '2026-03-03', 'left')
    await answeredBy('teacher', '2026-03-01', 'right', 'right', 'right', 'left')
    const { informants, statements } = await profile()
    expect(informants[0]?.columns.map(({ informant }) => informant)).toEqual(['guardian', 'teacher'])
    expect(informants[0]?.pairs[0]).toMatchObject({ compared: 10, discrepancies: 3, pointedOut: true })
    expect(statements.some(({ text }) => text.includes('3 of 10 activities'))).toBe(true)
  })

  it('shows the same rows, without their openings, at a glance', async () => {
    await answeredBy('guardian', '2026-03-03', 'left')
    await reached('2026-03-04', 'left')
    const { lateralLine } = await profile()
    const glance = await anna.get(`/api/children/${child.id}/glance`)
    expect(glance.body.lateralLine).toEqual(lateralLine.map(({ opens: _opens, ...row }) => row))
  })

  it('is empty for a new record and says why nothing can be added without consent', async () => {
    expect(await profile()).toMatchObject({
      lateralLine: [],
      statements: [],
      blocked: null,
      can: { add: true },
    })
    child = await buildChild({ therapist })
    const { blocked, can } = await profile()
    expect(blocked).toContain('consent')
    expect(can.add).toBe(false)
  })

  it('leaves one audit entry that names every questionnaire and measure that was shown', async () => {
    const asked = await answeredBy('guardian', '2026-03-03', 'left')
    const reaching = await reached('2026-03-04', 'left')
    await profile()
    const entries: { action: string; detail: string }[] = await database().query(
      'SELECT action, detail FROM audit_entries WHERE childId = ?',
      [child.id],
    )
    expect(entries.map(({ action }) => action)).toEqual(['handProfile.read'])
    expect(JSON.stringify(entries[0]?.detail)).toContain(asked.id)
    expect(JSON.stringify(entries[0]?.detail)).toContain(reaching.id)
  })
})

describe('who sees the hand profile', () => {
  it('is the therapist who holds the child and the clinic lead', async () => {
    await reached('2026-03-04', 'left')
    const lead = await signedInAs(await buildUser('clinicLead'))
    const shown = await profile(lead)
    expect(shown.lateralLine).toHaveLength(1)
    expect(shown.can.add).toBe(false)
    expect(shown.measures[0]?.can).toEqual({ change: false, lock: false, replace: false })
  })

  it('answers 404 to everybody else, the same as for a child that does not exist', async () => {
    const guardian = await buildUser('guardian')
    await buildGuardian(child, guardian)
    const absent = await anna.get(`/api/children/${randomUUID()}/hand-profile`)
    for (const other of [
      guardian,
      ...(await Promise.all([buildUser('therapist'), buildUser('administrator')])),
    ]) {
      const response = await (await signedInAs(other)).get(path())
      expect([response.status, response.body.code], other.roles[0]).toEqual([404, 'not_found'])
      expect(response.body.message).toBe(absent.body.message)
    }
  })
})
