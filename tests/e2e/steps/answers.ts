import type { Locator } from 'playwright-core'
import { expect } from 'vitest'
import { inspect, settled, type Person } from '../support/browser.ts'
import { answer, choose, press, seeHeading, seeText } from '../support/fields.ts'
import type { FreshChild } from '../support/newChild.ts'

export const tenActivities = 'Hand use in ten everyday activities'
export const history = 'How things began'

/** What the therapist asked, with its state and what can be done about it. */
const askedList = ({ page }: Person): Locator =>
  page.getByRole('region', { name: 'Asked of family and school' })

const requestOf = (therapist: Person, title: string): Locator =>
  askedList(therapist)
    .getByRole('listitem')
    .filter({ has: therapist.page.getByRole('heading', { name: title }) })
    .first()

/** Opens the hand profile of a child of one's own by its address. */
export const openProfile = async ({ page, url }: Person, { childId }: FreshChild): Promise<void> => {
  await page.goto(`${url}/children/${childId}/hand-profile`)
  await seeHeading(page, 'Warning signs')
  await settled(page)
}

/** On the hand profile: asks a carer for one form, by a link or signed in. */
export const askCarer = async (
  therapist: Person,
  asked: { carer: string; form: string; byLink: boolean },
): Promise<void> => {
  const section = askedList(therapist)
  await press(section, 'Ask for answers')
  await answer(section, 'Which parent or carer?', asked.carer)
  await choose(section, /^What do you ask for/, asked.form)
  const way = asked.byLink ? 'By a link in the e-mail, without signing in' : 'Signed in'
  await answer(section, /^How do they answer/, way)
  // Nobody needs to confirm the address of a carer's own sign-in.
  const confirmed = section.getByLabel('I have confirmed this address with the carer')
  if ((await confirmed.count()) > 0) await confirmed.check()
  await press(section, 'Send the questions')
  await seeRequest(therapist, asked.form, 'Waiting')
}

/** The newest request for a form stands as this. */
export const seeRequest = async (therapist: Person, form: string, state: string): Promise<void> => {
  await requestOf(therapist, form).getByText(state, { exact: true }).waitFor()
}

/** Takes the newest request for a form back. */
export const withdraw = async (therapist: Person, form: string): Promise<void> => {
  await requestOf(therapist, form)
    .getByRole('button', { name: /^Withdraw/ })
    .click()
  await press(therapist.page.getByRole('alertdialog'), 'Withdraw')
  await seeRequest(therapist, form, 'Withdrawn')
}

/** The link of a request on the page of the child. */
export const requestLink = ({ page }: Person, title: string): Locator =>
  page.getByRole('link', { name: new RegExp(title) })

const radio = ({ page }: Person, words: string) => page.getByRole('radio', { name: words, exact: true })

/** Answers the activity on the page by touch and goes on; it must be the one of this place. */
export const tapAnswer = async (person: Person, place: string, words: string): Promise<void> => {
  const { page } = person
  await seeHeading(page, new RegExp(`^${place}: `))
  await page.getByText(words, { exact: true }).tap()
  await expect.poll(() => radio(person, words).isChecked()).toBe(true)
  await page.getByRole('button', { name: 'Next', exact: true }).tap()
}

/** Presses Tab until this stands in focus, as somebody without mouse or touch must. */
export const tabTo = async ({ page }: Person, wanted: Locator): Promise<void> => {
  const reached = () => wanted.evaluate((one) => one === document.activeElement)
  for (let presses = 0; presses < 60; presses += 1) {
    if (await reached()) return
    await page.keyboard.press('Tab')
  }
  throw new Error(`Not reached with the keyboard: ${wanted.toString()}`)
}

/** Goes to a button or link by Tab and presses Enter there. */
export const enterOn = async (person: Person, wanted: Locator): Promise<void> => {
  await tabTo(person, wanted)
  await person.page.keyboard.press('Enter')
}

/**
 * Answers the activity on the page with the keyboard and goes on. The first answer is taken by Space, others by the
 * arrows: radio buttons are one stop of the Tab key.
 */
export const keyAnswer = async (
  person: Person,
  place: string,
  words: string,
  options: readonly string[],
): Promise<void> => {
  const { page } = person
  await seeHeading(page, new RegExp(`^${place}: `))
  await tabTo(person, page.getByRole('radio').first())
  await page.keyboard.press('Space')
  for (let step = 0; step < options.indexOf(words); step += 1) await page.keyboard.press('ArrowDown')
  expect(await radio(person, words).isChecked(), `${place}: ${words}`).toBe(true)
  await enterOn(person, page.getByRole('button', { name: 'Next', exact: true }))
}

/** Types the birth date before the questions of a link are shown. */
export const openLink = async (
  { page }: Person,
  [day, month, year]: readonly [string, string, string],
): Promise<void> => {
  await page.getByLabel('Day', { exact: true }).fill(day)
  await page.getByLabel('Month', { exact: true }).fill(month)
  await page.getByLabel('Year', { exact: true }).fill(year)
  await press(page, 'Open the questions')
}

/** Kind words, and nothing of the child or of the questions. */
export const seeNothingShown = async (person: Person, child: FreshChild, where: string): Promise<void> => {
  const { page } = person
  await seeText(page, /We could not open this/)
  await inspect(person, where)
  const words = await page.locator('body').innerText()
  for (const secret of [...child.name.split(' '), 'Osric', 'Four tasks', 'Before you begin', 'Left, always'])
    expect(words, `what ${where} shows`).not.toContain(secret)
}
