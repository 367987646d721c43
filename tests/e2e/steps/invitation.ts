import { expect } from 'vitest'
import { inspect, type Person } from '../support/browser.ts'
import { follow, openSection, press, seeHeading, seeText } from '../support/fields.ts'
import { waitForLink } from '../support/inbox.ts'
import { purposesGiven, type NewChild } from './referral.ts'

/** Staff on the child's record invite the carer; the e-mail with the link arrives and names no child. */
export const inviteCarer = async (
  staff: Person,
  child: NewChild,
  inboxUrl: string,
): Promise<{ link: string }> => {
  const { page, url } = staff
  await openSection(page, 'Family and consent')
  await seeHeading(page, 'Parents and carers')
  await inspect(staff, 'child-family')
  // Each consent stands alone: those that were given, by whom and how, and no other.
  const consents = page.getByRole('region', { name: 'Consent, one purpose at a time' })
  for (const purpose of purposesGiven) {
    const line = consents.getByRole('listitem').filter({ has: page.getByRole('heading', { name: purpose }) })
    await seeText(line, 'In force')
    await seeText(line, new RegExp(`${child.carer.name}.*on paper, parental responsibility`))
  }
  expect(await consents.getByText('In force', { exact: true }).count()).toBe(purposesGiven.length)
  await press(page, `Invite ${child.carer.name}`)
  await seeHeading(page, `Invite ${child.carer.name}?`)
  await inspect(staff, 'invitation-confirmation')
  await press(page, 'Send the invitation')
  await seeText(page, /Invited/)
  const { message, link } = await waitForLink(inboxUrl, child.carer.email, /http\S+\/invitation#\S+/)
  expect(link.startsWith(`${url}/invitation#`)).toBe(true)
  expectNoName(`${message.subject} ${message.text} ${message.html ?? ''}`, child)
  return { link }
}

/** Neither name of the child stands in an e-mail; the child’s family name is written otherwise than the carer’s. */
export const expectNoName = (words: string, child: NewChild): void => {
  expect(words).not.toContain(child.givenName)
  expect(words).not.toContain(child.familyName)
}

/** The carer opens the link, is told when a password is too weak, chooses a better one and signs in. */
export const acceptInvitation = async (
  carer: Person,
  link: string,
  child: NewChild,
  password: string,
): Promise<void> => {
  const { page } = carer
  await page.goto(link)
  await seeHeading(page, 'Welcome to Fanflower')
  // The token is a key: it leaves the address at once.
  expect(new URL(page.url()).hash).toBe('')
  await inspect(carer, 'invitation')
  await page.getByLabel('New password', { exact: true }).fill('kettle')
  await press(page, 'Save and go to sign in')
  await seeText(page, /One thing needs another look/)
  await inspect(carer, 'invitation-weak-password')
  await page.getByLabel('New password', { exact: true }).fill(password)
  await press(page, 'Save and go to sign in')
  await seeText(page, 'Your password is saved')
  await inspect(carer, 'invitation-done')
  await follow(page, 'Go to sign in')
  await page.getByLabel('E-mail address').fill(child.carer.email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  await inspect(carer, 'sign-in')
  await press(page, 'Sign in')
  // With one child there is nothing to choose.
  await page.waitForURL(/\/my-child\/[0-9a-f-]{36}$/)
  await seeHeading(page, child.givenName)
  await seeText(page, 'No letter yet')
  await inspect(carer, 'my-child')
}
