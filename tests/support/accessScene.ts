import sharp from 'sharp'
import { consentPurposes, perGuardianPurposes } from '../../shared/consents.ts'
import { addDays } from '../../shared/days.ts'
import { now } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { Assignment } from '../../server/entities/Assignment.ts'
import type { Child } from '../../server/entities/Child.ts'
import { ClassTeacher } from '../../server/entities/ClassTeacher.ts'
import type { Guardian } from '../../server/entities/Guardian.ts'
import type { SchoolClass } from '../../server/entities/SchoolClass.ts'
import type { User } from '../../server/entities/User.ts'
import { randomUUID } from 'node:crypto'
import { childKeys, parts, personKeys, type ChildKey, type PersonKey } from './accessPeople.ts'
import { signedInAs } from './app.ts'
import { buildAdvice, buildAlert, buildReferral, buildReply } from './clinicRows.ts'
import { buildConclusion } from './conclusions.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from './factories.ts'
import { insertRow } from './insertRow.ts'
import { buildHistory } from './histories.ts'
import { buildMeasure } from './measures.ts'
import { buildGoal, buildNote, buildObservation, buildQuestionnaire, buildSample } from './records.ts'
import { buildTask } from './tasks.ts'
import { buildDelivery, buildLetter, letterText } from './storedLetters.ts'

/** Words of a child's record that occur nowhere else, by what they belong to. */
export interface Canaries {
  name: string[]
  recordNumber: string[]
  /** Names of the carers. */
  carers: string[]
  /** E-mail, phone and address of each carer, by the person who may see their own. */
  contacts: Partial<Record<PersonKey | 'noAccount', string[]>>
  clinical: string[]
  goals: string[]
  advice: string[]
  letters: string[]
  referral: string[]
}

export interface Person {
  key: PersonKey
  user: User
  cookie: string[]
}

export interface SceneChild {
  key: ChildKey
  child: Child & { episodeId: string }
  schoolClass: SchoolClass
  therapist: User
  guardians: Map<PersonKey | 'noAccount', Guardian>
  canaries: Canaries
}

export interface Scene {
  people: Map<PersonKey, Person>
  children: Map<ChildKey, SceneChild>
  /** A therapist whose notes and letters need a colleague. */
  newlyQualified: User
  picture: Buffer
}

export const personOf = (scene: Scene, key: PersonKey): Person => {
  const person = scene.people.get(key)
  if (!person) throw new Error(`Nobody is called ${key}`)
  return person
}

export const childOf = (scene: Scene, key: ChildKey): SceneChild => {
  const child = scene.children.get(key)
  if (!child) throw new Error(`No child is called ${key}`)
  return child
}

const today = () => now().toISOString().slice(0, 10)

const buildSceneChild = async (
  key: ChildKey,
  therapist: User,
  schoolClass: SchoolClass,
  carers: [PersonKey | 'noAccount', User | null, Partial<Guardian>][],
): Promise<SceneChild> => {
  const name = [`Quill${key}`, `Marsh${key}`, `Pip${key}`]
  const child = await buildChild({
    therapist,
    givenName: name[0],
    familyName: name[1],
    preferredName: name[2],
    recordNumber: `FF-2026-8${childKeys.indexOf(key)}77`,
    birthDate: key === 'grown' ? addDays(today(), -366 * 19) : addDays(today(), -366 * 8),
    schoolClassId: schoolClass.id,
    nextReviewOn: addDays(today(), 30),
    strengths: `Strengthword${key}`,
  })
  const guardians: SceneChild['guardians'] = new Map()
  const contacts: Canaries['contacts'] = {}
  for (const [index, [owner, user, given]] of carers.entries()) {
    const number = `01632 96${childKeys.indexOf(key)}${100 + index}`
    const guardian = await buildGuardian(child, user, {
      name: `Wren${key}${index}`,
      // Who also works here keeps a private address for their child's letters.
      email: user?.roles.join() === 'guardian' ? user.email : `contact-${key}-${index}@harrowmere.example`,
      phone: number,
      address: `${index} Larkspurlane${key}`,
      ...given,
    })
    guardians.set(owner, guardian)
    contacts[owner] = [guardian.email ?? '', number, `${index} Larkspurlane${key}`]
  }
  return {
    key,
    child,
    schoolClass,
    therapist,
    guardians,
    canaries: {
      name,
      recordNumber: [child.recordNumber],
      carers: carers.map((_, index) => `Wren${key}${index}`),
      contacts,
      clinical: [
        ...['Strengthword', 'Saidword', 'Planword', 'Signedword', 'Commentword', 'Alertword', 'Observedword'],
        ...['Sampleword', 'Taskword', 'Concludedword', 'Enjoysword'],
      ].map((word) => word + key),
      goals: [`Goalword${key}`],
      advice: [`Becauseword${key}`, `Replyword${key}`],
      letters: [`Draftword${key}`, `Approvedword${key}`, `Sentword${key}`],
      referral: [`Referredword${key}`],
    },
  }
}

/** One of everything that a record can hold. */
const fillRecord = async (of: SceneChild, teacher: User, office: User, picture: Buffer): Promise<void> => {
  const { child, therapist, key } = of
  const carer = [...of.guardians.values()][0]
  if (!carer) throw new Error('Every child of the scene has a carer')
  await buildQuestionnaire(child, therapist, { locked: false, comment: `Commentword${key}` })
  await buildQuestionnaire(child, therapist, { locked: true, comment: `Commentword${key}` })
  await buildMeasure(child, therapist, { locked: true, kind: 'sides', comment: `Commentword${key}` })
  await buildHistory(child, therapist, { locked: true, details: { enjoys: `Enjoysword${key}` } })
  await buildObservation(child, therapist, { note: `Observedword${key}` })
  await buildNote(child, therapist, 'draft', { said: `Saidword${key}`, plan: `Planword${key}` })
  await buildNote(child, therapist, 'signed', { plan: `Signedword${key}` })
  await buildSample(child, therapist, picture, { note: `Sampleword${key}` })
  await buildConclusion(child, therapist, 'signed', { strengths: `Concludedword${key}` })
  await buildGoal(child, therapist, { childVoice: `I want Goalword${key}` })
  await buildLetter(child, therapist, 'draft', letterText(`Draws Draftword${key}`))
  await buildLetter(child, therapist, 'approved', letterText(`Draws Approvedword${key}`))
  const sent = await buildLetter(child, therapist, 'sent', letterText(`Draws Sentword${key}`))
  await buildDelivery(sent, carer, 'sent')
  const advice = await buildAdvice(child, therapist, { because: `Elbows meet, Becauseword${key}` })
  await buildReply(advice, teacher, { reply: 'cannot', reason: `Replyword${key}` })
  await buildAlert(child, `Alertword${key}`)
  await buildTask({ childId: child.id, assigneeId: therapist.id, text: `Taskword${key}` })
  await buildReferral(office, 'accepted', {
    child,
    givenName: child.givenName,
    familyName: child.familyName,
    preferredName: child.preferredName,
    birthDate: child.birthDate,
    classId: of.schoolClass.id,
    reason: `Asked to look at Referredword${key}`,
  })
}

const alsoTeaches = (schoolClass: SchoolClass, teacher: User, endedAt: Date | null = null) =>
  insertRow(ClassTeacher, {
    id: randomUUID(),
    schoolClassId: schoolClass.id,
    teacherId: teacher.id,
    startedAt: now(),
    endedAt,
  })

const holds = (of: SceneChild, therapist: User, endedAt: Date | null = null) =>
  insertRow(Assignment, {
    id: randomUUID(),
    childId: of.child.id,
    therapistId: therapist.id,
    startedAt: now(),
    endedAt,
    reason: 'shared',
  })

const consentsOf = async (of: SceneChild, recordedBy: User) => {
  for (const purpose of consentPurposes) {
    const toSchool = purpose.startsWith('share_school')
    if (toSchool && of.key === 'never') continue
    if (perGuardianPurposes.includes(purpose)) {
      if (purpose === 'email_attachment') continue
      for (const guardian of of.guardians.values())
        await giveConsent(of.child, purpose, recordedBy, { guardianId: guardian.id })
      continue
    }
    const given = await giveConsent(of.child, purpose, recordedBy, {
      expiresAt: toSchool && of.key === 'expired' ? new Date(now().getTime() - 1000) : null,
    })
    if (toSchool && of.key === 'withdrawn')
      await giveConsent(of.child, purpose, recordedBy, { kind: 'withdrawn', withdrawsId: given.id })
  }
}

export const buildScene = async (): Promise<Scene> => {
  const people: Scene['people'] = new Map()
  for (const key of personKeys) {
    const user = await buildUser(parts[key].roles[0] ?? 'therapist', { roles: [...parts[key].roles] })
    people.set(key, { key, user, cookie: (await signedInAs(user)).cookie })
  }
  const user = (key: PersonKey): User => {
    const person = people.get(key)
    if (!person) throw new Error(`Nobody is called ${key}`)
    return person.user
  }
  const newlyQualified = await buildUser('therapist', { newlyQualified: true })
  const sharing = await buildClass(user('E1'))
  const elsewhere = await buildClass(user('EX'))
  const notSharing = await buildClass(user('E0 withdrawn'))
  await alsoTeaches(sharing, user('teacher and carer'))
  await alsoTeaches(sharing, user('EX former class'), now())
  await alsoTeaches(notSharing, user('E0 expired'))
  await alsoTeaches(notSharing, user('E0 never'))

  const first = await buildSceneChild('first', user('T1'), sharing, [
    ['G1', user('G1'), {}],
    ['G0 restricted', user('G0 restricted'), { restricted: true, courtOrder: true }],
    ['G0 unverified', user('G0 unverified'), { verifiedAt: null }],
    ['G0 ended', user('G0 ended'), { endedAt: now() }],
    ['teacher and carer', user('teacher and carer'), {}],
    ['lead and carer', user('lead and carer'), {}],
    ['restricted lead', user('restricted lead'), { restricted: true }],
    ['restricted administrator', user('restricted administrator'), { restricted: true }],
    ['noAccount', null, {}],
  ])
  const second = await buildSceneChild('second', user('T2'), elsewhere, [
    ['GX', user('GX'), {}],
    ['noAccount', null, {}],
  ])
  const unshared = await Promise.all(
    (['withdrawn', 'expired', 'never'] as const).map((key) =>
      buildSceneChild(key, user('T1'), notSharing, [['noAccount', null, {}]]),
    ),
  )
  const grown = await buildSceneChild('grown', user('T1'), elsewhere, [
    ['G0 child of age', user('G0 child of age'), {}],
  ])
  await holds(first, user('T2'), now())
  await holds(first, user('lead who treats'))
  await holds(first, user('disabled'))

  const picture = await sharp({ create: { width: 40, height: 30, channels: 3, background: '#ffffff' } })
    .png()
    .toBuffer()
  const teacherOf = (child: SceneChild) =>
    child.schoolClass === sharing ? user('E1') : user(child.schoolClass === elsewhere ? 'EX' : 'E0 withdrawn')
  const all = [first, second, ...unshared, grown]
  for (const child of all) {
    await fillRecord(child, teacherOf(child), user('AD'), picture)
    await consentsOf(child, child.therapist)
  }
  await database().query('UPDATE users SET disabledAt = ? WHERE id = ?', [now(), user('disabled').id])
  return { people, children: new Map(all.map((child) => [child.key, child])), newlyQualified, picture }
}
