import { readFileSync } from 'node:fs'
import { expect } from 'vitest'
import { inspect, settled, signInHere, type Person } from '../support/browser.ts'
import { openSection, press, seeHeading, seeText } from '../support/fields.ts'
import { mailTo, waitForLink } from '../support/inbox.ts'
import { readPdf } from '../support/pdf.ts'
import { expectNoName } from './invitation.ts'
import type { NewChild } from './referral.ts'

const homeText = `Two small things help most:

- Put the page to the left of the middle, five minutes a day.
- Let Grandad read the card aloud, once a week.`

const textUnder = ({ page }: Person, heading: string) => page.getByLabel(`Text under “${heading}”`)

/** Assembled from the record, completed, a blocked wording refused and replaced, then approved. */
export const writeLetter = async (therapist: Person, child: NewChild): Promise<void> => {
  const { page, url } = therapist
  await openSection(page, 'Letters')
  await seeText(page, 'No letter yet')
  await inspect(therapist, 'letters-empty')
  await press(page, 'Progress letter')
  await page.waitForURL(/\/letters\/[0-9a-f-]{36}$/)

  const strengths = textUnder(therapist, `What ${child.givenName} enjoys and does well`)
  expect(await strengths.inputValue()).toContain('knows every bird')
  expect(await textUnder(therapist, 'What has changed').inputValue()).toContain('25')
  expect(await textUnder(therapist, 'Goals and where they stand').inputValue()).toContain(
    'I want to write the card for Grandad myself.',
  )
  const home = textUnder(therapist, 'What helps at home')
  expect(await home.inputValue()).toMatch(/^\[Write up to three things/)
  await inspect(therapist, 'letter-assembled')

  // What is still to be filled in stands in brackets, and keeps the letter here.
  await press(page, 'Approve')
  await seeHeading(page, 'This letter cannot be approved yet')
  await inspect(therapist, 'letter-with-gaps')
  await home.fill(homeText)
  const school = textUnder(therapist, 'What school is doing')
  if ((await school.inputValue()).includes('[')) await school.fill('')

  const work = textUnder(therapist, 'What we worked on')
  await work.fill(`${await work.inputValue()}\n\n${child.givenName} cut the card with the wrong hand.`)
  const notes = page.getByRole('group', { name: 'Notes on “What we worked on”' })
  await seeText(notes, 'No hand is the wrong one.')
  await seeText(page, /^1 thing must change/)
  await inspect(therapist, 'letter-blocked-words')
  await press(page, 'Approve')
  await seeHeading(page, 'This letter cannot be approved yet')

  await press(notes, 'Use “the left hand”')
  await seeText(page, 'Nothing stands in the way of this letter.')
  expect(await work.inputValue()).toContain('cut the card with the left hand.')
  await page.reload()
  await seeHeading(page, 'Progress letter')
  await expect.poll(() => work.inputValue()).toContain('cut the card with the left hand.')
  await press(page, 'Approve')
  await seeHeading(page, 'Approve this letter')
  await inspect(therapist, 'letter-approval')
  const form = page.locator('form').filter({ hasText: 'Approve this letter' })
  await press(form, 'Approve')
  await seeText(page, 'Approved, not sent')
  await inspect(therapist, 'letter-approved')

  const link = page.getByRole('link', { name: 'PDF' })
  const answer = await page.request.get(`${url}${await link.getAttribute('href')}`)
  expect(answer.headers()['content-type']).toBe('application/pdf')
  expectLetter(readPdf(await answer.body()), child)
}

const expectLetter = (words: string, child: NewChild) => {
  expect(words).toContain(child.givenName)
  expect(words).toContain('cut the card with the left hand.')
  expect(words).toContain('Put the page to the left of the middle, five minutes a day.')
  expect(words).not.toContain('wrong hand')
  expect(words).not.toContain('[')
}

/** Reviewed, sent once, and in the carer's inbox as a link that says nothing about the child. */
export const sendLetter = async (therapist: Person, child: NewChild, inboxUrl: string): Promise<string> => {
  const { page, url } = therapist
  await press(page, 'Send')
  await seeHeading(page, 'Send this letter')
  await inspect(therapist, 'letter-sending')
  await press(page, 'Review and send')
  await seeHeading(page, 'Send this letter?')
  await seeText(page.getByRole('alertdialog'), `${child.carer.name} (Mother)`)
  await inspect(therapist, 'letter-sending-confirmation')
  await press(page, 'Send it')
  await seeHeading(page, 'On its way')
  const { message, link } = await waitForLink(inboxUrl, child.carer.email, /http\S+\/letter\/[0-9a-f-]{36}/)
  expect(link.startsWith(`${url}/letter/`)).toBe(true)
  expectNoName(JSON.stringify(message), child)
  await page.reload()
  await seeText(page, /^Sent$/)
  await inspect(therapist, 'letter-sent')
  const letters = (await mailTo(inboxUrl, child.carer.email)).filter(({ text }) => text.includes('/letter/'))
  expect(letters).toHaveLength(1)
  return link
}

/** The carer comes by the link of the e-mail, signs in on the way, reads, and keeps a copy. */
export const readLetter = async (
  carer: Person,
  link: string,
  child: NewChild,
  password: string,
): Promise<void> => {
  const { page } = carer
  await page.goto(link)
  await page.waitForURL(/\/sign-in\?to=/)
  await signInHere(carer, { email: child.carer.email, password })
  await page.waitForURL(/\/my-child\/[0-9a-f-]{36}\/letters\/[0-9a-f-]{36}$/)
  const letter = page.getByRole('article', { name: 'The letter' })
  await seeText(letter, 'cut the card with the left hand.')
  await inspect(carer, 'received-letter')
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: /^Download/ }).click(),
  ])
  expect(download.suggestedFilename()).not.toContain(child.familyName)
  expectLetter(readPdf(readFileSync(await download.path())), child)
}

/** The therapist learns that it was read. */
export const seeLetterRead = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await page.reload()
  await seeText(page, 'Read by the family')
  await settled(page)
}
