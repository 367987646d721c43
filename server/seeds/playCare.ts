import { now } from '../clock.ts'
import { Child } from '../entities/Child.ts'
import { Consent } from '../entities/Consent.ts'
import { Guardian } from '../entities/Guardian.ts'
import { Referral } from '../entities/Referral.ts'
import { database } from '../dataSource.ts'
import { Episode } from '../entities/Episode.ts'
import { addDays, type Day } from '../../shared/days.ts'
import type { ReferralDetails } from '../../shared/referrals.ts'
import { allocate, changeCare } from '../services/children.ts'
import { insertConsent } from '../services/consents.ts'
import { withdrawConsent } from '../services/consentWithdrawal.ts'
import { changeState } from '../services/episodes.ts'
import { acceptReferral } from '../services/referrals/accept.ts'
import { enterReferral } from '../services/referrals/enter.ts'
import { transact } from '../services/transact.ts'
import { birthDateFor } from './demo/demoDays.ts'
import type { DemoChild, DemoConsent, DemoReferral, DemoStep } from './demo/demoTypes.ts'
import type { StaffKey } from './demo/people.ts'
import type { ActorKey } from './demo/demoTypes.ts'
import { acting, childOf, idIn, newStory, storyOf, type Scene } from './playScene.ts'
import { actorOf } from './seedPeople.ts'

const referralDetails = (
  scene: Scene,
  child: DemoChild,
  referral: DemoReferral,
  on: Day,
  demoToday: Day,
): ReferralDetails => {
  const { receivedDay: _, priority: _priority, priorityReason: _reason, ...rest } = referral
  return {
    ...rest,
    receivedOn: on,
    givenName: child.givenName,
    familyName: child.familyName,
    preferredName: child.preferredName,
    birthDate: birthDateFor(demoToday, child.age, child.ageDays),
    homeLanguages: child.homeLanguages,
    interpreterLanguage: child.interpreterLanguage,
    scriptDirection: child.scriptDirection,
    classId: scene.classes.get(child.classKey) ?? null,
    lookedAfter: child.lookedAfter,
    carers: child.carers.map(({ account: _account, ...details }) => details),
  }
}

export const playReferral = async (
  scene: Scene,
  number: number,
  { referral, later, on, demoToday }: { referral: DemoReferral; later: boolean; on: Day; demoToday: Day },
): Promise<void> => {
  const actor = actorOf(scene.people, 'pauline')
  const details = referralDetails(scene, childOf(scene, number), referral, on, demoToday)
  const id = await enterReferral(actor, actor.viewer, details, null)
  if (!later) scene.stories.set(number, newStory(id))
}

/** Accepts the referral, and ties each carer who signs in to their account, as the invitation does. */
export const playAcceptance = async (scene: Scene, number: number, step: DemoStep): Promise<void> => {
  const child = childOf(scene, number)
  const story = storyOf(scene, number)
  const actor = actorOf(scene.people, step.by)
  const referral = await database().manager.findOneByOrFail(Referral, { id: story.referralId })
  const lead = actorOf(scene.people, 'ines')
  const decision = {
    priority: child.referral.priority,
    priorityReason: child.referral.priorityReason ?? step.reason,
    therapistId: null,
    existingChildId: null,
    differentChild: false,
    consents: [],
  }
  story.childId = await acceptReferral(
    actor.viewer.roles.includes('therapist') ? lead : actor,
    actor.viewer.roles.includes('therapist') ? lead.viewer : actor.viewer,
    referral.id,
    referral.version,
    decision,
  )
  const guardians = await database().manager.find(Guardian, {
    where: { childId: story.childId },
    order: { createdAt: 'ASC' },
  })
  await transact(lead, async (tx, record) => {
    for (const carer of child.carers) {
      const guardian = guardians.find((candidate) => candidate.name === carer.name)
      if (!guardian) throw new Error(`${carer.name} is missing on the record of child ${number}`)
      story.guardianIds.push(guardian.id)
      if (carer.account === null) continue
      const user = actorOf(scene.people, carer.account).viewer
      await tx.update(Guardian, { id: guardian.id }, { userId: user.id, verifiedAt: now() })
    }
    if (child.consentsForSelf) await tx.update(Child, { id: story.childId }, { consentsForSelf: true })
    record({ action: 'demo.carers', childId: story.childId })
  })
}

export const playAllocation = async (
  scene: Scene,
  number: number,
  therapist: StaffKey,
  by: StaffKey,
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const therapistId = actorOf(scene.people, therapist).viewer.id
  await allocate(actor, access, { therapistId, reason: 'Allocated at the weekly meeting' })
}

export const playStep = async (scene: Scene, number: number, { to, by, reason }: DemoStep): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const episode = await database().manager.findOneByOrFail(Episode, { childId: access.childId })
  if (episode.state === to) return
  await changeState(actor, access, episode.version, { to, reason })
}

export const playCare = async (scene: Scene, number: number, by: StaffKey, demoToday: Day): Promise<void> => {
  const child = childOf(scene, number)
  const { actor, access } = await acting(scene, number, by)
  const { version } = await database().manager.findOneByOrFail(Child, { id: access.childId })
  await changeCare(actor, access, version, {
    writingHand: child.writingHand,
    nextReviewOn: child.nextReviewDay === null ? null : addDays(demoToday, child.nextReviewDay),
    strengths: child.strengths,
  })
}

export const playConsent = async (
  scene: Scene,
  number: number,
  { consent, index, demoToday }: { consent: DemoConsent; index: number; demoToday: Day },
): Promise<void> => {
  const story = storyOf(scene, number)
  const carer = childOf(scene, number).carers[consent.carer]
  const by: ActorKey = consent.recordedBy ?? carer?.account ?? 'pauline'
  const { actor, viewer, access } = await acting(scene, number, by)
  const id = await transact(actor, (tx, record) =>
    insertConsent(tx, record, scene.timeZone, {
      childId: access.childId,
      guardianId: story.guardianIds[consent.carer] ?? null,
      givenByName: carer?.name ?? viewer.displayName,
      purpose: consent.purpose,
      basis: consent.basis,
      method: consent.method,
      expiresOn: consent.expiresDay === null ? null : addDays(demoToday, consent.expiresDay),
      note: consent.note,
      recordedById: viewer.id,
      relation: access.relation,
    }),
  )
  story.consentIds.set(index, id)
}

export const playWithdrawal = async (
  scene: Scene,
  number: number,
  { index, reason, by, on }: { index: number; reason: string; by: ActorKey; on: Day },
): Promise<void> => {
  const { actor, viewer, access } = await acting(scene, number, by)
  await transact(actor, async (tx, record) => {
    const consent = await tx.findOneByOrFail(Consent, { id: idIn(storyOf(scene, number).consentIds, index) })
    const id = await withdrawConsent(tx, consent, {
      byName: consent.givenByName,
      method: access.relation === 'guardian' ? 'signed_in' : 'phone_witnessed',
      reason,
      recordedById: viewer.id,
      today: on,
    })
    record({
      action: 'consent.withdrawn',
      objectType: 'consent',
      objectId: id,
      childId: access.childId,
      relation: access.relation,
    })
  })
}
