import { expect } from 'vitest'
import { inspect, settled, type Person } from '../support/browser.ts'
import { answer, openSection, press, seeHeading, seeText } from '../support/fields.ts'
import type { NewChild } from './referral.ts'

/** Advice the record calls for by its rules; the words are the library's, the choice is the therapist's. */
const chosen = 'Give the left seat of a shared desk'
const alsoOffered = 'Put the page to the left of the middle of the body.'
const reason = 'The desks stand in rows until the holidays.'

/** The therapist picks from what the record calls for. Nothing goes to the teacher by itself. */
export const giveAdvice = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'School')
  await seeHeading(page, 'Advice the record calls for')
  await page.getByRole('checkbox', { name: alsoOffered }).waitFor()
  await inspect(therapist, 'school-offered')
  await press(page, 'Give it to the teacher')
  await seeText(page, 'Choose at least one item')
  await page.getByRole('checkbox', { name: chosen }).check()
  await press(page, 'Give it to the teacher')
  const given = page.getByRole('region', { name: 'With the teacher' })
  await seeText(given, chosen)
  await seeText(given, 'No answer yet')
  await inspect(therapist, 'school-given')
}

/** The teacher sees the pupil and exactly this advice, nothing clinical, and says why it cannot be done. */
export const answerAdvice = async (teacher: Person, child: NewChild): Promise<string> => {
  const { page } = teacher
  await seeHeading(page, 'My classes')
  await inspect(teacher, 'my-classes')
  await page.getByRole('link', { name: /Heron/ }).click()
  await page
    .getByRole('link', { name: new RegExp(child.givenName) })
    .first()
    .waitFor()
  await inspect(teacher, 'class')
  await page
    .getByRole('row', { name: new RegExp(child.familyName) })
    .getByRole('link')
    .click()
  await seeHeading(page, child.givenName)
  const cards = page.getByRole('article')
  expect(await cards.count()).toBe(1)
  await seeText(cards, chosen)
  await seeText(page, 'Writes with the left hand')
  await inspect(teacher, 'pupil')
  const words = await page.locator('main').innerText()
  for (const clinical of ['−73.3', 'quotient', 'Session', 'Grandad', 'FF-', child.carer.name, alsoOffered])
    expect(words).not.toContain(clinical)

  await answer(cards, 'How is it going?', 'Cannot do it')
  await press(cards, 'Send the answer')
  await seeText(cards, /Say why it cannot be done/)
  await inspect(teacher, 'pupil-reason-missing')
  await cards.getByLabel('Why it cannot be done').fill(reason)
  await press(cards, 'Send the answer')
  await cards.getByRole('button', { name: /^Change the answer/ }).waitFor()
  await inspect(teacher, 'pupil-answered')
  return page.url()
}

export const seeAnswer = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'School')
  const given = page.getByRole('region', { name: 'With the teacher' })
  await given.waitFor()
  await seeText(given, 'Cannot do it')
  await seeText(given, reason)
  await inspect(therapist, 'school-answered')
}

/** The carer stops the consent to school advice; from then on the teacher has no such pupil. */
export const stopSharing = async (
  carer: Person,
  teacher: Person,
  child: NewChild,
  pupilAddress: string,
): Promise<void> => {
  await carer.page.goto(`${carer.url}/my-child`)
  await carer.page.waitForURL(/\/my-child\/[0-9a-f-]{36}$/)
  const consent = carer.page.getByRole('region', { name: 'School: seating and classroom advice' })
  await press(consent, 'Stop this')
  await inspect(carer, 'my-child-stopping')
  await press(consent, 'Yes, stop it')
  await seeText(consent, 'Not agreed')
  await inspect(carer, 'my-child-stopped')

  await teacher.page.goto(pupilAddress)
  await seeText(teacher.page, 'This is not here, or not open to you')
  expect(await teacher.page.locator('main').innerText()).not.toContain(child.givenName)
  await inspect(teacher, 'pupil-gone')
  const answer = await teacher.page.request.get(
    `${teacher.url}/api/pupils/${/pupils\/([0-9a-f-]{36})/.exec(pupilAddress)?.[1]}`,
  )
  expect(answer.status()).toBe(404)
  await teacher.page.goto(pupilAddress.replace(/\/pupils\/.*$/, ''))
  await settled(teacher.page)
  await seeHeading(teacher.page, 'Heron')
  expect(await teacher.page.getByText(child.familyName).count()).toBe(0)
}
