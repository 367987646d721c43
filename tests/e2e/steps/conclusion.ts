import { expect } from 'vitest'
import { inspect, settled, type Person } from '../support/browser.ts'
import { answer, choose, press, seeHeading, seeText } from '../support/fields.ts'
import type { FreshChild } from '../support/newChild.ts'
import { readPdf } from '../support/pdf.ts'

const strengths = 'Builds with great patience and explains every step to a friend.'
const matters = 'I want to draw my own comic.'
const reasoning = 'Draws, throws and eats with the left hand, at home and here.'
const disagreements = 'Reaching came after a morning of right-handed scissors; we look again in spring.'

const write = async ({ page }: Person, label: string, words: string) => {
  await page.getByLabel(label, { exact: true }).fill(words)
}

/**
 * Writes a conclusion against which reaching speaks. It is not signed before the disagreement is answered; then it is,
 * and waits for somebody experienced.
 */
export const concludeAndSign = async (therapist: Person): Promise<string> => {
  const { page } = therapist
  await press(page, 'Conclusion')
  await page.waitForURL(/\/conclusions\/[0-9a-f-]{36}$/)
  await seeHeading(page, 'Strengths first')
  await inspect(therapist, 'conclusion-empty')
  await write(therapist, 'What goes well', strengths)
  await write(therapist, 'What matters to the child', matters)
  await answer(page, /^What you conclude/, 'Left-handed, settled')
  await answer(page, /^How sure you are/, 'Medium: most of what was seen agrees')
  const evidence = page.getByRole('group', { name: /^What it rests on/ }).first()
  for (const words of [
    /^Hand use in ten .*Child showed it/,
    /^Reaching across the midline.*3 left, 17 right/,
  ])
    await evidence.getByRole('checkbox', { name: words }).check()
  await write(therapist, 'How the conclusion was reached', reasoning)
  await choose(page, /^Plan/, 'Advice for home and school')
  const beside = page.getByRole('complementary', { name: 'Before you sign' })
  await seeText(beside, /this points to the other hand: .*Reaching across the midline/)
  await inspect(therapist, 'conclusion-written')

  await press(page, 'Sign')
  await seeText(page, /need another look|needs another look/)
  await seeText(page, 'Write what you make of the disagreements listed here')
  expect(await page.getByRole('heading', { name: 'Sign the conclusion' }).count()).toBe(0)
  await inspect(therapist, 'conclusion-disagreement-open')
  await write(therapist, 'About what does not agree', disagreements)
  await press(page, 'Sign')
  await seeHeading(page, 'Sign the conclusion')
  await inspect(therapist, 'conclusion-signing')
  await page.getByLabel('I have read this conclusion and it is about this child').check()
  await press(page, 'Sign the conclusion')
  await seeText(page, 'Waits for countersignature')
  await inspect(therapist, 'conclusion-waiting')
  return page.url()
}

/** An experienced colleague reads it and signs as well. */
export const countersign = async (lead: Person, address: string): Promise<void> => {
  const { page } = lead
  await page.goto(address)
  await seeText(page, strengths)
  await inspect(lead, 'conclusion-to-countersign')
  await press(page, 'Countersign')
  await page.getByLabel('I have read this conclusion and what it rests on').check()
  await page.locator('form').getByRole('button', { name: 'Countersign', exact: true }).click()
  await seeText(page, /Countersigned by Ines Valderrama/)
  await inspect(lead, 'conclusion-countersigned')
}

/** The printed report says what was written, what it rests on, and both names. */
export const readReport = async (person: Person, child: FreshChild): Promise<string> => {
  const { page, url } = person
  await page.reload()
  await settled(page)
  const link = page.getByRole('link', { name: /^Report/ })
  const printed = await page.request.get(`${url}${await link.getAttribute('href')}`)
  expect(printed.headers()['content-type']).toBe('application/pdf')
  const words = readPdf(await printed.body())
  for (const part of [child.name, strengths, matters, reasoning, disagreements, 'Left-handed, settled'])
    expect(words).toContain(part)
  return words
}
