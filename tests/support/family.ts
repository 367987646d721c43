import type { MyChildView, MyConsent } from '../../shared/family.ts'
import { expect } from 'vitest'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Consent } from '../../server/entities/Consent.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { signedInAs, type Client } from './app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, type ChildRequest } from './factories.ts'

// Strings that stand nowhere else: found in an answer, they came from the row they belong to.
export const fathersOwn = { phone: '0161 496 0777', address: '12 Canary Wharf Lane, Fathertown' }
export const mothersOwn = { phone: '0161 496 0555', address: '3 Nightjar Row, Mothertown' }

/** A child of two households: both parents with parental responsibility and an account. */
export const familyScene = async (given: ChildRequest = {}) => {
  const therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  const mother = await buildUser('guardian', { displayName: 'Mira Solberg' })
  const father = await buildUser('guardian', { displayName: 'Falk Otherhome' })
  const schoolClass = await buildClass()
  const child = await buildChild({
    therapist,
    preferredName: 'Juno',
    schoolClassId: schoolClass.id,
    ...given,
  })
  const motherRow = await buildGuardian(child, mother, mothersOwn)
  const fatherRow = await buildGuardian(child, father, { relation: 'father', ...fathersOwn })
  const asMother = await signedInAs(mother)
  const asFather = await signedInAs(father)
  return { therapist, mother, father, child, motherRow, fatherRow, asMother, asFather }
}

export type FamilyScene = Awaited<ReturnType<typeof familyScene>>

export const ownChildPath = (child: Pick<Child, 'id'>, path = '') => `/api/my/children/${child.id}${path}`

export const ownChildSeen = async (as: Client, child: Pick<Child, 'id'>): Promise<MyChildView> => {
  const response = await as.get(ownChildPath(child))
  expect(response.status, response.text).toBe(200)
  return response.body
}

export const consentSeen = async (
  as: Client,
  child: Pick<Child, 'id'>,
  purpose: MyConsent['purpose'],
): Promise<MyConsent> => {
  const found = (await ownChildSeen(as, child)).consents.find((consent) => consent.purpose === purpose)
  if (!found) throw new Error(`No ${purpose} in the answer`)
  return found
}

export const guardianRow = ({ id }: Guardian) => database().manager.findOneByOrFail(Guardian, { id })

export const consentRows = (child: Pick<Child, 'id'>) =>
  database().manager.find(Consent, { where: { childId: child.id }, order: { at: 'ASC' } })
