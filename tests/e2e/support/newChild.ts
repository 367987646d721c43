import { randomInt } from 'node:crypto'
import { expect } from 'vitest'
import { addDays, dayOf, formatDay, type Day } from '../../../shared/days.ts'
import type { GuardianView } from '../../../shared/guardians.ts'
import type { ReferralView } from '../../../shared/referrals.ts'
import type { TherapistChoice } from '../../../shared/users.ts'
import type { Person } from './browser.ts'
import { waitForLink } from './inbox.ts'
import type { SignIn } from './people.ts'

/** A request as the person's own pages send it, in their sign-in; anything but success fails the test. */
export const callApi = async <T>(
  { page, url }: Person,
  method: 'GET' | 'POST' | 'PUT',
  path: string,
  { data, version }: { data?: unknown; version?: number } = {},
): Promise<T> => {
  const answer = await page.request.fetch(`${url}/api${path}`, {
    method,
    headers: {
      'X-Fanflower-User': 'none',
      ...(version === undefined ? {} : { 'If-Match': `"${version}"` }),
    },
    ...(method === 'GET' ? {} : { data: data ?? {} }),
  })
  const text = await answer.text()
  expect(answer.ok(), `${method} ${path}: ${answer.status()} ${text}`).toBe(true)
  return (text === '' ? undefined : JSON.parse(text)) as T
}

/** A child nobody in the demo is: what stands on the record is what the test put there. */
export interface FreshChild {
  childId: string
  givenName: string
  /** As lists show it. */
  name: string
  birthDate: Day
  /** The birth date in the three boxes of a date: day, month, year. */
  born: [day: string, month: string, year: string]
  /** A mother who may sign in once invited, and a father who never does. */
  mother: { name: string; email: string }
  father: { name: string; email: string }
}

const carer = (name: string, relation: 'mother' | 'father', email: string) => ({
  name,
  relation,
  parentalResponsibility: 'yes',
  courtOrder: false,
  safeToContact: true,
  email,
  phone: null,
  address: null,
})

export const today = (): Day => dayOf(new Date(), 'Europe/London')

/** Refers and accepts a child of seven or eight with consent to assessment, and gives them to a therapist. */
export const addChild = async (
  lead: Person,
  { therapist, givenName }: { therapist: string; givenName: string },
): Promise<FreshChild> => {
  const marker = randomInt(100_000, 999_999)
  const familyName = `Merrow-${marker}`
  const birthDate = `${Number(today().slice(0, 4)) - 8}-05-${String(randomInt(10, 28))}`
  const mother = { name: 'Dilys Hartnoll', email: `dilys.${marker}@harrowmere.example` }
  const father = { name: 'Osric Hartnoll', email: `osric.${marker}@harrowmere.example` }
  const referral = await callApi<ReferralView>(lead, 'POST', '/referrals', {
    data: {
      receivedOn: addDays(today(), -40),
      source: 'parent',
      referrerName: mother.name,
      referrerRole: null,
      referrerEmail: null,
      referrerPhone: null,
      reason: 'Finds it hard to keep up when copying from the board and would like to write more.',
      concerns: ['handwriting'],
      givenName,
      familyName,
      preferredName: null,
      birthDate,
      homeLanguages: 'English',
      interpreterLanguage: null,
      scriptDirection: 'ltr',
      classId: null,
      schoolNote: 'Ashbank Primary, Year 3',
      lookedAfter: false,
      carers: [carer(mother.name, 'mother', mother.email), carer(father.name, 'father', father.email)],
    },
  })
  const therapists = await callApi<TherapistChoice[]>(lead, 'GET', '/therapists')
  const { childId } = await callApi<{ childId: string }>(lead, 'POST', `/referrals/${referral.id}/accept`, {
    version: referral.version,
    data: {
      priority: 'routine',
      priorityReason: null,
      therapistId: therapists.find(({ displayName }) => displayName === therapist)?.id,
      existingChildId: null,
      differentChild: false,
      consents: [
        {
          purpose: 'assessment_treatment',
          carer: '0',
          basis: 'parental_responsibility',
          method: 'in_person',
          expiresOn: null,
        },
      ],
    },
  })
  const [day = '', month = '', year = ''] = formatDay(birthDate).split(' ')
  return {
    childId,
    givenName,
    name: `${givenName} ${familyName}`,
    birthDate,
    born: [day, month, year],
    mother,
    father,
  }
}

/** Invites the mother and chooses her password with the link of the e-mail. */
export const inviteMother = async (
  lead: Person,
  { childId, mother }: FreshChild,
  inboxUrl: string,
): Promise<SignIn> => {
  const guardians = await callApi<GuardianView[]>(lead, 'GET', `/children/${childId}/guardians`)
  const id = guardians.find(({ name }) => name === mother.name)?.id
  await callApi(lead, 'POST', `/children/${childId}/guardians/${id}/invite`)
  const { link } = await waitForLink(inboxUrl, mother.email, /http\S+\/invitation#\S+/)
  const password = 'velvet-ladder-harbour-nine'
  await callApi(lead, 'POST', '/invitations/confirm', {
    data: { token: new URL(link).hash.slice(1), newPassword: password },
  })
  return { email: mother.email, password }
}
