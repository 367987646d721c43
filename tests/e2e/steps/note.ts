import { expect } from 'vitest'
import { inspect, type Person } from '../support/browser.ts'
import { choose, openSection, press, seeHeading, seeText } from '../support/fields.ts'

export type NotePart = 'Said' | 'Observed' | 'Assessment' | 'Plan'

export const notePart = ({ page }: Person, part: NotePart) => page.getByLabel(part, { exact: true })

/** A new draft on the record that is open. */
export const startNote = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'Sessions')
  await press(page, 'Write a note')
  await choose(page, /^The child’s assent/, 'Willing')
  await page.getByLabel(/^Who was there/).fill('Mother')
  await inspect(therapist, 'note-start')
  await press(page, 'Start writing')
  await page.waitForURL(/\/sessions\/[0-9a-f-]{36}$/)
  await notePart(therapist, 'Said').waitFor()
}

/** Waits for the next save of the note that the server answers so. */
export const nextSave = ({ page }: Person, status = 200) =>
  page.waitForResponse(
    (answer) =>
      answer.request().method() === 'PUT' &&
      answer.url().includes('/session-notes/') &&
      answer.status() === status,
  )

/** Types, and waits until the note has saved itself. */
export const writeAndKeep = async (therapist: Person, part: NotePart, words: string): Promise<void> => {
  const saved = nextSave(therapist)
  await notePart(therapist, part).fill(words)
  await saved
}

/** Writes a session note; what was typed survives a reload before it is signed, and an addendum follows. */
export const writeNote = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'Sessions')
  await seeText(page, 'No session written up yet')
  await inspect(therapist, 'sessions-empty')
  await startNote(therapist)
  await notePart(therapist, 'Said').fill('“My arm goes for a walk over the page.”')
  const seen = 'Wrote 21 letters in a minute, 19 of them readable.'
  await writeAndKeep(therapist, 'Observed', seen)
  await seeText(page, /^Saved \d\d:\d\d$/)
  await page.reload()
  await seeHeading(page, /^Therapy session/)
  expect(await notePart(therapist, 'Observed').inputValue()).toBe(seen)
  await inspect(therapist, 'note-draft')

  await press(page, 'Sign')
  await seeText(page, '2 things need another look')
  await inspect(therapist, 'note-not-complete')
  await notePart(therapist, 'Assessment').fill(
    'The paper lies in front of the right shoulder, so the hand covers the line.',
  )
  await notePart(therapist, 'Plan').fill('Move the paper to the left and turn it; look again in a week.')
  await page
    .getByLabel('Goals worked on')
    .or(page.getByRole('group', { name: 'Goals worked on' }))
    .getByRole('checkbox')
    .check()
  await press(page, 'Sign')
  await seeHeading(page, 'Sign the note')
  await inspect(therapist, 'note-signing')
  await press(page, 'Sign the note')
  await seeText(page, /One thing needs another look/)
  await page.getByLabel('The note is complete and about this child').check()
  await press(page, 'Sign the note')
  await seeText(page, /^Signed by Adaeze Nwosu-Reid/)
  expect(await page.getByRole('textbox').count()).toBe(0)
  await inspect(therapist, 'note-signed')

  await press(page, 'Addendum')
  await page
    .getByRole('textbox', { name: 'Addendum' })
    .fill('The mother rang: the page stayed clean at home.')
  await inspect(therapist, 'note-addendum')
  await press(page, 'Add it for good')
  await seeHeading(page, 'Addenda')
  await seeText(page, 'The mother rang: the page stayed clean at home.')
  await inspect(therapist, 'note-with-addendum')
}
