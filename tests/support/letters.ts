import type { LetterView } from '../../shared/letters.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { Guardian } from '../../server/entities/Guardian.ts'
import type { User } from '../../server/entities/User.ts'
import { signedInAs, type Client } from './app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from './factories.ts'

export interface LetterScene {
  therapist: User
  child: Child
  guardian: Guardian
  guardianUser: User
  as: Client
  base: string
}

/** A therapist's child with one carer who may get e-mail with a link. */
export const letterScene = async (given: Partial<User> = {}): Promise<LetterScene> => {
  const therapist = await buildUser('therapist', given)
  const child = await buildChild({
    therapist,
    nextReviewOn: '2027-02-01',
    preferredName: 'Wrenna',
    strengths: 'Builds tall towers\nTells good jokes',
  })
  const guardianUser = await buildUser('guardian')
  const guardian = await buildGuardian(child, guardianUser)
  await giveConsent(child, 'assessment_treatment', therapist)
  await giveConsent(child, 'email_link', therapist, { guardianId: guardian.id })
  return {
    therapist,
    child,
    guardian,
    guardianUser,
    as: await signedInAs(therapist),
    base: `/api/children/${child.id}/letters`,
  }
}

export const readyText = {
  salutation: 'Dear parent',
  nextVisitOn: '2027-02-01',
  sections: [
    { id: 'opening', heading: 'When we met', text: 'We met twice in the autumn.' },
    { id: 'strengths', heading: 'What Wrenna does well', text: '- Builds tall towers.\n- Tells good jokes.' },
    { id: 'changes', heading: 'What has changed', text: 'It is easier to read what Wrenna writes.' },
    {
      id: 'home',
      heading: 'What helps at home',
      text: '- Turn the page a little to the right. Five minutes a day.',
    },
    { id: 'next', heading: 'What comes next', text: 'We meet again on 1 Feb 2027.' },
  ],
}

/** Through the API: assembled, rewritten, approved. */
export const approvedLetter = async ({ as, base }: LetterScene): Promise<LetterView> => {
  const created = await as.post(base).send({ kind: 'progress' })
  const changed = await as
    .put(`${base}/${created.body.id}`)
    .set('If-Match', `"${created.body.version}"`)
    .send(readyText)
  const approved = await as
    .post(`${base}/${created.body.id}/approve`)
    .set('If-Match', `"${changed.body.version}"`)
    .send({ overrides: [] })
  if (approved.status !== 200) throw new Error(`Not approved: ${JSON.stringify(approved.body)}`)
  return approved.body as LetterView
}

export const queuedLetter = async (scene: LetterScene): Promise<LetterView> => {
  const letter = await approvedLetter(scene)
  const sent = await scene.as
    .post(`${scene.base}/${letter.id}/send`)
    .set('If-Match', `"${letter.version}"`)
    .send({ guardianIds: [scene.guardian.id] })
  if (sent.status !== 200) throw new Error(`Not queued: ${JSON.stringify(sent.body)}`)
  return sent.body as LetterView
}
