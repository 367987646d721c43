import { inspect, type Person } from '../support/browser.ts'
import {
  answer,
  choose,
  openPlace,
  openSection,
  press,
  searchFor,
  seeHeading,
  seeText,
} from '../support/fields.ts'
import type { NewChild } from './referral.ts'

/** Opens the box with its key, types a part of the name, and goes to the child with Enter. */
export const findChild = async (therapist: Person, child: NewChild): Promise<void> => {
  const { page } = therapist
  await seeHeading(page, 'Today')
  await inspect(therapist, 'therapist-today')
  await page.keyboard.press('/')
  await page.getByRole('combobox', { name: 'Name or record number' }).fill(child.familyName)
  await page.getByRole('option', { name: child.familyName }).waitFor()
  await inspect(therapist, 'find-a-child')
  await page.keyboard.press('Enter')
  await page.waitForURL(/\/children\/[0-9a-f-]{36}\/glance$/)
  await seeText(page, `${child.givenName} ${child.familyName}`)
  await inspect(therapist, 'child-glance')
}

/** The child stands on the therapist's own list. */
export const seeOnCaseload = async (therapist: Person, child: NewChild): Promise<void> => {
  const { page } = therapist
  await openPlace(page, 'Caseload')
  await seeHeading(page, 'Caseload')
  await inspect(therapist, 'caseload')
  await searchFor(page, child.familyName)
  await page.getByRole('link', { name: `${child.givenName} ${child.familyName}` }).click()
  await page.waitForURL(/\/children\//)
}

/** Strengths, writing hand and next review: letters begin with the strengths. */
export const describeChild = async (therapist: Person, nextReview: string): Promise<void> => {
  const { page } = therapist
  await press(page, 'Strengths, hand and review')
  await answer(page, 'Writes with', 'Left')
  await page.getByLabel(/^What the child enjoys and does well/).fill('tells long stories\nknows every bird')
  await page.getByLabel(/^Next review/).fill(nextReview)
  await inspect(therapist, 'child-care-form')
  await press(page, 'Save')
  await seeText(page, 'knows every bird')
}

const yes = 'Yes'

/** How the child sits and writes on one day; what advice for school rests on. */
export const observeWriting = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'Handwriting')
  await press(page, 'Sitting and writing')
  await seeHeading(page, 'How the child sits and writes')
  await answer(page, 'Writes with', 'Left')
  await answer(page, /^Hand to the line/, 'Above the line')
  await page.getByLabel(/^From the midline/).fill('5')
  await choose(page, /^Desk/, 'Desk for two')
  await answer(page, 'Elbows meet a neighbour’s', yes)
  await answer(page, 'Feet flat on the floor or a footrest', 'No')
  await inspect(therapist, 'writing-observation-form')
  await press(page, 'Keep what was seen')
  await page.getByRole('button', { name: 'Keep what was seen' }).waitFor({ state: 'detached' })
  await inspect(therapist, 'writing-observation-kept')
}

/** A goal on its ladder of five levels. */
export const setGoal = async (therapist: Person, targetOn: string): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'Goals')
  await seeText(page, 'No goal yet')
  await inspect(therapist, 'goals-empty')
  await page.getByRole('button', { name: 'Set a goal' }).first().click()
  await page.getByLabel('Activity').fill('writes a birthday card of five lines that others can read')
  await page.getByLabel('The child’s own words').fill('I want to write the card for Grandad myself.')
  const levels = ['one line', 'two lines', 'five lines', 'seven lines', 'nine lines']
  const labels = [/^−2,/, /^−1,/, /^0, what/, /^\+1,/, /^\+2,/]
  for (const [index, level] of levels.entries())
    await page.getByLabel(labels[index] ?? '').fill(`writes ${level} others can read`)
  await answer(page, 'Starts at', '−2')
  await answer(page, /^How important/, '3, very')
  await answer(page, 'How hard', '2')
  await page.getByLabel('Target date').fill(targetOn)
  await inspect(therapist, 'goal-form')
  await press(page, 'Set this goal')
  await seeText(page, 'I want to write the card for Grandad myself.')
  await inspect(therapist, 'goal-set')
}
