import { randomUUID } from 'node:crypto'
import { hash } from '@node-rs/argon2'
import type { ConsentPurpose } from '../../shared/consents.ts'
import type { EpisodeState } from '../../shared/episodes.ts'
import type { Role } from '../../shared/roles.ts'
import { now } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { Assignment } from '../../server/entities/Assignment.ts'
import { Child } from '../../server/entities/Child.ts'
import { ClassTeacher } from '../../server/entities/ClassTeacher.ts'
import { Consent } from '../../server/entities/Consent.ts'
import { Episode } from '../../server/entities/Episode.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { School } from '../../server/entities/School.ts'
import { SchoolClass } from '../../server/entities/SchoolClass.ts'
import { User } from '../../server/entities/User.ts'

/** Long enough, on no list, and the same for every built user. */
export const testPassword = 'harbour-lantern-otter-42'

// Cheap on purpose: how passwords are hashed in earnest has its own test.
let passwordHash: Promise<string> | null = null
const testHash = () => (passwordHash ??= hash(testPassword, { memoryCost: 8, timeCost: 1, parallelism: 1 }))

let counter = 0
const next = () => (counter += 1)

/** Fields with defaults that a test can leave out. Rows are written as the app account writes them. */
export const buildUser = async (role: Role, given: Partial<User> = {}): Promise<User> => {
  const number = next()
  const user = database().manager.create(User, {
    id: randomUUID(),
    email: `person${number}@harrowmere.example`,
    displayName: `Person ${number}`,
    roles: [role],
    passwordHash: await testHash(),
    workingHand: 'left',
    theme: 'system',
    newlyQualified: false,
    wte: role === 'therapist' ? '1.00' : null,
    createdAt: now(),
    ...given,
  })
  await database().manager.insert(User, user)
  return user
}

export const buildClass = async (
  teacher: User | null = null,
  given: Partial<SchoolClass> = {},
): Promise<SchoolClass> => {
  const number = next()
  const school = { id: randomUUID(), name: `School ${number}`, town: 'Harrowmere', createdAt: now() }
  await database().manager.insert(School, school)
  const schoolClass = database().manager.create(SchoolClass, {
    id: randomUUID(),
    schoolId: school.id,
    name: `Class ${number}`,
    schoolYear: 2026,
    ages: null,
    createdAt: now(),
    ...given,
  })
  await database().manager.insert(SchoolClass, schoolClass)
  if (teacher)
    await database().manager.insert(ClassTeacher, {
      id: randomUUID(),
      schoolClassId: schoolClass.id,
      teacherId: teacher.id,
      startedAt: now(),
      endedAt: null,
    })
  return schoolClass
}

export interface ChildRequest extends Partial<Child> {
  therapist?: User | null
  state?: EpisodeState
  receivedOn?: string
}

/** A child with an open episode, held by the therapist when one is given. No carers and no consents. */
export const buildChild = async ({
  therapist = null,
  state = 'active',
  receivedOn = '2026-06-01',
  ...given
}: ChildRequest = {}): Promise<Child & { episodeId: string }> => {
  const number = next()
  const child = database().manager.create(Child, {
    id: randomUUID(),
    recordNumber: `FF-2026-${String(number).padStart(4, '0')}`,
    givenName: `Given${number}`,
    familyName: `Family${number}`,
    preferredName: null,
    birthDate: '2018-05-04',
    homeLanguages: 'English',
    interpreterLanguage: null,
    scriptDirection: 'ltr',
    lookedAfter: false,
    consentsForSelf: false,
    writingHand: 'left',
    schoolClassId: null,
    nextReviewOn: null,
    createdAt: now(),
    ...given,
  })
  await database().manager.insert(Child, child)
  const episodeId = randomUUID()
  await database().manager.insert(Episode, {
    id: episodeId,
    childId: child.id,
    referralId: null,
    state,
    receivedOn,
    priority: 'routine',
    firstSeenOn: null,
    closedOn: null,
    createdAt: now(),
  })
  if (therapist)
    await database().manager.insert(Assignment, {
      id: randomUUID(),
      childId: child.id,
      therapistId: therapist.id,
      startedAt: now(),
      endedAt: null,
      reason: 'allocated',
    })
  return Object.assign(child, { episodeId })
}

export const buildGuardian = async (
  child: Pick<Child, 'id'>,
  user: User | null = null,
  given: Partial<Guardian> = {},
): Promise<Guardian> => {
  const guardian = database().manager.create(Guardian, {
    id: randomUUID(),
    childId: child.id,
    userId: user?.id ?? null,
    name: user?.displayName ?? `Carer ${next()}`,
    relation: 'mother',
    parentalResponsibility: 'yes',
    courtOrder: false,
    safeToContact: true,
    restricted: false,
    email: user?.email ?? null,
    phone: null,
    address: null,
    verifiedAt: user ? now() : null,
    endedAt: null,
    createdAt: now(),
    ...given,
  })
  await database().manager.insert(Guardian, guardian)
  return guardian
}

export const giveConsent = async (
  child: Pick<Child, 'id'>,
  purpose: ConsentPurpose,
  recordedBy: User,
  given: Partial<Consent> = {},
): Promise<Consent> => {
  const consent = database().manager.create(Consent, {
    id: randomUUID(),
    childId: child.id,
    guardianId: null,
    purpose,
    kind: 'given',
    withdrawsId: null,
    basis: 'parental_responsibility',
    method: 'in_person',
    givenByName: 'A parent',
    at: now(),
    expiresAt: null,
    reason: null,
    recordedById: recordedBy.id,
    recordedAt: now(),
    ...given,
  })
  await database().manager.insert(Consent, consent)
  return consent
}
