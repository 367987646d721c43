import { randomUUID } from 'node:crypto'
import { now } from '../../../server/clock.ts'
import { database } from '../../../server/dataSource.ts'
import { buildAlert, buildReferral } from '../clinicRows.ts'
import { buildGuardian, giveConsent } from '../factories.ts'
import { dueOn } from '../records.ts'
import { carerDetails, decision, referralDetails } from '../referrals.ts'
import { buildTask } from '../tasks.ts'
import { personOf } from '../accessScene.ts'
import { takeBackConsents, versionOf, type Calls, type On } from './call.ts'

const nameless = () => ({
  givenName: `Neutral${randomUUID().slice(0, 8)}`,
  familyName: 'Placeholder',
  carers: [carerDetails({ email: `carer-${randomUUID().slice(0, 8)}@harrowmere.example` })],
})

const inQueue = (on: On) => buildReferral(personOf(on.scene, 'AD').user, 'new', nameless())

const referralOf = async ({ child }: On): Promise<string> => {
  const [row] = (await database().query('SELECT id FROM referrals WHERE childId = ?', [child.child.id])) as {
    id: string
  }[]
  if (!row) throw new Error('The child has no referral')
  return row.id
}

const contactOnly = ({ child }: On) =>
  buildGuardian(child.child, null, { email: `spare-${randomUUID().slice(0, 8)}@harrowmere.example` })

/** Lists of children, referrals, and the record's identity, family and consents. */
export const childCalls: Calls = {
  'GET /api/today': () => ({}),
  'GET /api/children/find': ({ child }) => ({ query: `q=${child.child.familyName}` }),
  'GET /api/caseload': () => ({ query: 'show=all&size=100' }),
  'GET /api/children': () => ({ query: 'size=100' }),
  'GET /api/review': () => ({}),
  'GET /api/review/:figure': () => ({ ids: ['notes_unsigned_48'] }),
  'POST /api/tasks/:id/finish': async (on) => ({
    ids: [
      (
        await buildTask({
          childId: on.child.child.id,
          assigneeId: on.standing === 'T1' ? on.person.user.id : on.child.therapist.id,
        })
      ).id,
    ],
    body: {},
  }),

  'GET /api/referrals': () => ({ query: 'size=100' }),
  'POST /api/referrals': () => ({ body: referralDetails(nameless()) }),
  'GET /api/referrals/duplicates': ({ child: { child } }) => ({
    query: `givenName=${child.givenName}&familyName=${child.familyName}&birthDate=${child.birthDate}`,
  }),
  'GET /api/referrals/:id': async (on) => ({ ids: [await referralOf(on)] }),
  'PUT /api/referrals/:id': async (on) => {
    const { id, version } = await inQueue(on)
    return { ids: [id], version, body: referralDetails(nameless()) }
  },
  'POST /api/referrals/:id/accept': async (on) => {
    const { id, version } = await inQueue(on)
    return { ids: [id], version, body: decision() }
  },
  'POST /api/referrals/:id/decline': async (on) => {
    const { id, version } = await inQueue(on)
    return {
      ids: [id],
      version,
      body: { outcome: 'advice_only', reason: 'Advice to the school is enough for now' },
    }
  },

  'GET /api/children/:childId': () => ({}),
  'GET /api/children/:childId/glance': () => ({}),
  'GET /api/children/:childId/identity': () => ({}),
  'PUT /api/children/:childId/identity': async ({ child: { child } }) => ({
    version: await versionOf('children', child.id),
    body: {
      givenName: child.givenName,
      familyName: child.familyName,
      preferredName: child.preferredName,
      birthDate: child.birthDate,
      homeLanguages: child.homeLanguages,
      interpreterLanguage: null,
      scriptDirection: 'ltr',
      classId: child.schoolClassId,
      lookedAfter: false,
      consentsForSelf: false,
    },
  }),
  'PATCH /api/children/:childId/care': async ({ child: { child } }) => ({
    version: await versionOf('children', child.id),
    body: { writingHand: 'left', nextReviewOn: dueOn(), strengths: child.strengths },
  }),
  'POST /api/children/:childId/state': async ({ child: { child } }) => {
    await database().query("UPDATE episodes SET state = 'active' WHERE id = ?", [child.episodeId])
    return {
      version: await versionOf('episodes', child.episodeId),
      body: { to: 'review', reason: 'The block has ended' },
    }
  },
  'POST /api/children/:childId/allocation': async ({ child, scene }) => {
    const { id } = child.child
    const held = (await database().query('SELECT id FROM assignments WHERE childId = ? AND endedAt IS NULL', [
      id,
    ])) as { id: string }[]
    return {
      body: { therapistId: scene.newlyQualified.id, reason: 'Room in the diary' },
      after: async () => {
        await database().query('UPDATE assignments SET endedAt = ? WHERE childId = ? AND endedAt IS NULL', [
          now(),
          id,
        ])
        await database().query('UPDATE assignments SET endedAt = NULL WHERE id IN (?)', [
          held.map((assignment) => assignment.id),
        ])
      },
    }
  },
  'POST /api/children/:childId/alerts/:id/action': async ({ child: { child } }) => {
    const alert = await buildAlert(child, 'Pain that lasts after writing')
    return { ids: [alert.id], version: alert.version, body: { action: 'Asked the family doctor to look' } }
  },
  'GET /api/children/:childId/access-history': () => ({}),

  'GET /api/children/:childId/guardians': () => ({}),
  'POST /api/children/:childId/guardians': () => ({
    body: carerDetails({ email: `spare-${randomUUID().slice(0, 8)}@harrowmere.example` }),
  }),
  'PUT /api/children/:childId/guardians/:id': async (on) => {
    const guardian = await contactOnly(on)
    return {
      ids: [guardian.id],
      version: guardian.version,
      body: carerDetails({ email: guardian.email, phone: '01632 960999' }),
    }
  },
  'POST /api/children/:childId/guardians/:id/invite': async (on) => ({
    ids: [(await contactOnly(on)).id],
    body: {},
  }),
  'POST /api/children/:childId/guardians/:id/restrict': async (on) => ({
    ids: [(await contactOnly(on)).id],
    body: { restricted: true, reason: 'The court says so' },
  }),

  'GET /api/children/:childId/consents': () => ({}),
  'POST /api/children/:childId/consents': async (on) => {
    await takeBackConsents(on.child, 'video')
    return {
      body: {
        purpose: 'video',
        guardianId: (await contactOnly(on)).id,
        basis: 'parental_responsibility',
        method: 'paper',
        expiresOn: null,
        note: null,
      },
    }
  },
  'POST /api/children/:childId/consents/:id/withdraw': async ({ child }) => ({
    ids: [(await giveConsent(child.child, 'teaching_use', child.therapist)).id],
    body: { reason: 'The family changed its mind' },
  }),
}
