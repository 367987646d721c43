import { expect } from 'vitest'
import { inspect, settled, type Person } from '../support/browser.ts'
import { openPlace, openSection, press, searchFor, seeHeading, seeText } from '../support/fields.ts'

/** Opens a child of the therapist's own caseload by a part of the name. */
export const openFromCaseload = async ({ page }: Person, name: string): Promise<void> => {
  await openPlace(page, 'Caseload')
  await searchFor(page, name)
  await page.getByRole('link', { name: new RegExp(name) }).click()
  await page.waitForURL(/\/children\/[0-9a-f-]{36}\/glance$/)
}

/** A new progress letter of the child whose record is open, with every gap the record left filled in. */
export const writeWholeLetter = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'Letters')
  await press(page, 'Progress letter')
  await page.waitForURL(/\/letters\/[0-9a-f-]{36}$/)
  await settled(page)
  const gaps = /\[[^\]]*\]/g
  let filled = 0
  for (const text of await page.getByLabel(/^Text under/).all()) {
    const words = await text.inputValue()
    if (words.search(gaps) < 0) continue
    await text.fill(words.replaceAll(gaps, 'We talk about it when we next meet.'))
    filled += 1
  }
  if (filled > 0) await seeText(page, /^Saved \d\d:\d\d$/)
}

/** Gives a reason for every wording that is kept against advice, and approves. */
export const approveLetter = async ({ page }: Person): Promise<void> => {
  await press(page, 'Approve')
  await seeHeading(page, 'Approve this letter')
  const form = page.locator('form').filter({ hasText: 'Approve this letter' })
  for (const reason of await form.getByRole('textbox').all())
    await reason.fill('The family uses these words.')
  await press(form, 'Approve')
  await seeText(page, 'Approved, not sent')
}

/** The lead finds the waiting letter through the review, says what is good and what to change, and gives it back. */
export const giveBack = async (lead: Person, child: string, words: string): Promise<void> => {
  const { page } = lead
  await openPlace(page, 'Clinic review')
  await page.getByRole('link', { name: /Letters to approve/ }).click()
  await page
    .getByRole('link', { name: new RegExp(child) })
    .first()
    .click()
  await press(page, 'Give back')
  await page.getByLabel('What to change').fill(words)
  await inspect(lead, 'letter-giving-back')
  await press(page, 'Give it back')
  await page.getByRole('button', { name: 'Give it back' }).waitFor({ state: 'detached' })
}

/** Written by somebody newly qualified: there is no way to approve it oneself, only to ask. */
export const askForApproval = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  expect(await page.getByRole('button', { name: 'Approve', exact: true }).count()).toBe(0)
  await press(page, 'Ask for approval')
  await seeText(page, 'Waiting for approval')
  expect(await page.getByRole('button', { name: 'Send', exact: true }).count()).toBe(0)
}
