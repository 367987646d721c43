import type { Locator } from 'playwright-core'
import { expect } from 'vitest'
import { settled, type Person } from '../support/browser.ts'
import { answer, openSection, press, seeHeading } from '../support/fields.ts'

/** Begins a measure on the Hand profile of the child whose record is open. */
export const startMeasure = async ({ page }: Person, kind: string): Promise<void> => {
  await openSection(page, 'Hand profile')
  await press(page, 'Measure')
  await answer(page, 'What to measure', kind)
  await press(page, 'Start')
  await page.waitForURL(/\/measures\/[0-9a-f-]{36}$/)
  await seeHeading(page, kind)
  await settled(page)
}

/** The buttons at the working hand. */
export const edgeOf = ({ page }: Person): Locator =>
  page.getByRole('region', { name: 'What you can do here' })

/** Where a button stands, as a share of the window's width: 0 is the left border. */
export const sideOf = async (person: Person, name: string): Promise<number> => {
  const box = await edgeOf(person).getByRole('button', { name, exact: true }).boundingBox()
  const width = person.page.viewportSize()?.width
  if (!box || !width) throw new Error(`${name} is not in sight`)
  expect(Math.min(box.width, box.height), `size of ${name}`).toBeGreaterThanOrEqual(64)
  return (box.x + box.width / 2) / width
}

/** Milliseconds from a press of this button until the page shows the next count, measured in the page itself. */
export const tapToShown = ({ page }: Person, name: string): Promise<number> =>
  page.evaluate(async (wanted) => {
    const button = [...document.querySelectorAll<HTMLElement>('section[aria-label] button')].find((one) =>
      one.textContent?.trim().startsWith(wanted),
    )
    const bar = document.querySelector('progress')
    if (!button || !bar) throw new Error(`No ${wanted} here`)
    const before = bar.value
    const start = performance.now()
    button.click()
    while (bar.value === before) await new Promise((next) => requestAnimationFrame(next))
    await new Promise((painted) => requestAnimationFrame(painted))
    return performance.now() - start
  }, name)

/** Locks the measure that is open, after reading what the question says. */
export const lockMeasure = async ({ page }: Person): Promise<string> => {
  await page.getByRole('button', { name: 'Lock', exact: true }).locator('visible=true').click()
  const question = page.getByRole('alertdialog', { name: 'Lock this measure?' })
  const words = await question.innerText()
  await press(question, 'Lock it')
  await seeHeading(page, 'As recorded')
  return words
}
