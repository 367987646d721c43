import { expect } from 'vitest'
import { inspect, type Person } from '../support/browser.ts'
import { choose, follow, openPlace, press, searchFor, seeHeading, seeText } from '../support/fields.ts'

/** A child nobody in the demo is, and the carer who will read the letter. */
export interface NewChild {
  givenName: string
  familyName: string
  born: { day: string; month: string; year: string }
  carer: { name: string; email: string }
}

/** What the mother has agreed to on paper; everything else she has not been asked. */
export const purposesGiven = [
  'Assessment and therapy',
  'Keeping photographs or scans of the child’s work',
  'Letters: an e-mail with a link that needs sign-in',
  'School: seating and classroom advice',
]

/** Goes to the register and reads the birth date of a child who is already known. */
const birthDateOf = async ({ page }: Person, name: string): Promise<NewChild['born']> => {
  await openPlace(page, 'Register')
  await searchFor(page, name)
  const row = page.getByRole('row', { name })
  await row.waitFor()
  const [day = '', month = '', year = ''] = (await row.getByRole('time').innerText()).split(' ')
  return { day, month, year }
}

const fillName = async (
  { page }: Person,
  { givenName, familyName, born }: Pick<NewChild, 'givenName' | 'familyName' | 'born'>,
) => {
  await page.getByLabel('Given name').fill(givenName)
  await page.getByLabel('Family name').fill(familyName)
  await page.getByLabel('Day', { exact: true }).fill(born.day)
  await page.getByLabel('Month', { exact: true }).fill(born.month)
  await page.getByLabel('Year', { exact: true }).fill(born.year)
}

/**
 * The administrator types a referral. A name and birth date the clinic knows is offered as such first; the new child's
 * own is not. Left unfinished, the form says what is missing.
 */
export const enterReferral = async (administrator: Person, child: NewChild): Promise<void> => {
  const { page } = administrator
  await inspect(administrator, 'administrator-today')
  const born = await birthDateOf(administrator, 'Mateo Quispe-Arnold')
  await inspect(administrator, 'administrator-register')
  await openPlace(page, 'Referrals')
  await inspect(administrator, 'administrator-referrals')
  await follow(page, 'New referral')
  await seeHeading(page, 'New referral')

  await fillName(administrator, { givenName: 'mateo', familyName: 'Quispe-Arnold', born })
  const offer = page.getByRole('status').filter({ hasText: 'of this name and birth date' })
  await offer.getByRole('link', { name: /Mateo Quispe-Arnold/ }).waitFor()
  await inspect(administrator, 'referral-duplicate-offered')

  await fillName(administrator, child)
  await offer.waitFor({ state: 'detached' })
  await press(page, 'Save the referral')
  await seeText(page, /things need another look/)
  expect(await page.title()).toMatch(/^Error:/)
  await inspect(administrator, 'referral-refused')

  await choose(page, /^Who refers/, 'School')
  await page.getByLabel('Referrer’s name').fill('Kwabena Asirifi')
  await choose(page, /^School class/, /Thistlebank Primary.*Heron/)
  await page
    .getByLabel('Reason in the referrer’s words')
    .fill(
      'Tells wonderful stories. Smudges across the page, knocks elbows with the pupil beside and tires after one page.',
    )
  await page.getByLabel('Handwriting', { exact: true }).check()
  await page.getByLabel('Where and how the child sits').check()
  const carer = page.getByRole('group', { name: 'Carer 1' })
  await carer.getByLabel('Name', { exact: true }).fill(child.carer.name)
  await choose(carer, /^Relation to the child/, 'Mother')
  await choose(carer, /^Parental responsibility/, 'Yes')
  await carer.getByLabel(/^E-mail address/).fill(child.carer.email)
  await inspect(administrator, 'referral-filled')
  await press(page, 'Save the referral')
  await seeHeading(page, `${child.givenName} ${child.familyName}`)
  await seeText(page, 'To be looked at')
  await inspect(administrator, 'referral-saved')
}

/** The lead finds the referral, accepts it with the consents the mother has given, and allocates the child. */
export const acceptReferral = async (lead: Person, child: NewChild, therapist: string): Promise<string> => {
  const { page } = lead
  await inspect(lead, 'lead-today')
  await openPlace(page, 'Referrals')
  await searchFor(page, child.familyName)
  await page.getByRole('link', { name: `${child.givenName} ${child.familyName}` }).click()
  await press(page, 'Accept')
  const form = page.locator('form').filter({ hasText: 'Accept the referral' })
  await page.getByRole('radio', { name: 'Routine', exact: true }).check()
  await choose(form, /^Therapist/, new RegExp(`^${therapist}`))
  for (const purpose of purposesGiven) {
    const label = purpose.startsWith('Letters') ? `${purpose} (${child.carer.name})` : purpose
    const line = form.getByRole('listitem').filter({ has: page.getByLabel(label, { exact: true }) })
    await line.getByRole('checkbox').check()
    // Whoever alone holds parental responsibility stands there already; how it was given is asked once.
    if (await line.getByRole('combobox', { name: 'How', exact: true }).isVisible())
      await choose(line, /^How$/, 'On paper')
  }
  await inspect(lead, 'referral-acceptance')
  await form.getByRole('button', { name: 'Accept', exact: true }).click()
  await page.waitForURL(/\/children\/[0-9a-f-]{36}\/glance$/)
  await seeText(page, `${child.givenName} ${child.familyName}`)
  await inspect(lead, 'lead-child-glance')
  return /children\/([0-9a-f-]{36})/.exec(page.url())?.[1] ?? ''
}
