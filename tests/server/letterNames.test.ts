import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { LetterFinding } from '../../shared/letters.ts'
import { database } from '../../server/dataSource.ts'
import { Child } from '../../server/entities/Child.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser } from '../support/factories.ts'
import { letterScene, readyText, type LetterScene } from '../support/letters.ts'

/*
 * The rule is this clinic's own: no letter names another child. A whole name stops the letter; a name that many
 * people share asks for a reason.
 */

let scene: LetterScene
let address: string
let lead: Client
const schoolClass = { id: '' }

beforeAll(async () => {
  await startApp()
  schoolClass.id = (await buildClass()).id
  scene = await letterScene()
  await database().manager.update(Child, { id: scene.child.id }, { schoolClassId: schoolClass.id })
  lead = await signedInAs(await buildUser('clinicLead'))
  const { body: letter } = await scene.as.post(scene.base).send({ kind: 'progress' })
  address = `${scene.base}/${letter.id}`
})
afterAll(stopApp)

/** Levels of what is found in a letter that says this, by phrase. */
const findingsOf = async (says: string, who: Client = scene.as): Promise<Record<string, string>> => {
  const sections = readyText.sections.map((section) =>
    section.id === 'changes' ? { ...section, text: says } : section,
  )
  const { status, body } = await who.post(`${address}/check`).send({ ...readyText, sections })
  expect(status).toBe(200)
  return Object.fromEntries(
    (body.findings as LetterFinding[])
      .filter(({ section, phrase }) => section === 'changes' && phrase !== null)
      .map(({ phrase, level }) => [phrase, level]),
  )
}

describe('the name of another child in a letter', () => {
  it('is blocked when whole and discouraged when alone, for a classmate whom somebody else sees', async () => {
    await buildChild({
      therapist: await buildUser('therapist'),
      givenName: 'Ottoline',
      preferredName: 'Tully',
      familyName: 'Quickthorn',
      schoolClassId: schoolClass.id,
    })
    for (const who of [scene.as, lead]) {
      expect(await findingsOf('She sits beside Ottoline Quickthorn.', who)).toEqual({
        'Ottoline Quickthorn': 'blocked',
      })
      expect(await findingsOf('She sits beside tully  quickthorn.', who)).toEqual({
        'tully  quickthorn': 'blocked',
      })
      expect(await findingsOf('She sits beside Ottoline, and Tully helps.', who)).toEqual({
        Ottoline: 'discouraged',
        Tully: 'discouraged',
      })
    }
  })

  it('stops the approval, with or without a reason', async () => {
    await buildChild({ givenName: 'Peregrine', familyName: 'Ashgrove', schoolClassId: schoolClass.id })
    const { body: letter } = await scene.as.post(scene.base).send({ kind: 'progress' })
    const sections = readyText.sections.map((section) =>
      section.id === 'changes' ? { ...section, text: 'She shares a desk with Peregrine Ashgrove.' } : section,
    )
    const { body: changed } = await scene.as
      .put(`${scene.base}/${letter.id}`)
      .set('If-Match', `"${letter.version}"`)
      .send({ ...readyText, sections })
    const refused = await scene.as
      .post(`${scene.base}/${letter.id}/approve`)
      .set('If-Match', `"${changed.version}"`)
      .send({ overrides: [{ phrase: 'Peregrine Ashgrove', reason: 'The family knows them' }] })
    expect([refused.status, refused.body.code]).toEqual([422, 'letter_not_ready'])
    expect(JSON.stringify(refused.body.fields)).toContain('Peregrine Ashgrove')
  })

  it('is found for the rest of the therapist’s caseload and for a brother or sister, also by the lead', async () => {
    await buildChild({ therapist: scene.therapist, givenName: 'Caspian', familyName: 'Hollowell' })
    const sibling = await buildChild({ givenName: 'Marigold', familyName: scene.child.familyName })
    await buildGuardian(sibling, scene.guardianUser)
    for (const who of [scene.as, lead])
      expect(await findingsOf(`Caspian Hollowell and Marigold ${scene.child.familyName}.`, who)).toEqual({
        'Caspian Hollowell': 'blocked',
        [`Marigold ${scene.child.familyName}`]: 'blocked',
      })
  })

  it('is not looked for among children who have nothing to do with this one', async () => {
    await buildChild({
      therapist: await buildUser('therapist'),
      givenName: 'Zephyrine',
      familyName: 'Oakhanger',
    })
    expect(await findingsOf('Zephyrine Oakhanger wrote the book we read.', lead)).toEqual({})
  })

  it('does not count when it is this child’s own too', async () => {
    const { givenName, familyName } = scene.child
    await buildChild({ givenName, familyName, schoolClassId: schoolClass.id })
    await buildChild({ givenName: 'Wrenna', familyName, schoolClassId: schoolClass.id })
    expect(await findingsOf(`${givenName} ${familyName}, whom all call Wrenna ${familyName}.`)).toEqual({})
  })

  it('is found however many children the caseload has', async () => {
    const others = await buildMany(600)
    const last = others.toSorted().at(-1) ?? ''
    expect(await findingsOf(`We met ${last} and ${others[0]}.`)).toEqual({
      [last]: 'blocked',
      [others[0] ?? '']: 'blocked',
    })
  })
})

/** Whole names of so many more children of the class, written in one go. */
const buildMany = async (count: number): Promise<string[]> => {
  const pattern = await buildChild({ schoolClassId: schoolClass.id, givenName: 'Many', familyName: 'Zero' })
  const { episodeId: _episode, ...row } = pattern
  const rows = Array.from({ length: count }, (_, index) => ({
    ...row,
    id: randomUUID(),
    recordNumber: `FF-2025-${String(index).padStart(4, '0')}`,
    givenName: `Kin${index}`,
    familyName: `Fold${index}`,
  }))
  await database().manager.insert(Child, rows)
  return rows.map(({ givenName, familyName }) => `${givenName} ${familyName}`)
}
