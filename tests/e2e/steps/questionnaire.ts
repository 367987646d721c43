import { expect } from 'vitest'
import { inspect, type Person } from '../support/browser.ts'
import { answer, openSection, press, seeHeading, seeText } from '../support/fields.ts'

/**
 * Oldfield 1971, Neuropsychologia 9:97-113: one mark for the preferred hand, two when the other would not be used
 * unless forced, one in each column when indifferent; LQ = 100 (R − L) / (R + L). Written here apart from the product.
 */
const marks: Record<string, { left: number; right: number }> = {
  'Left, always': { left: 2, right: 0 },
  'Left, mostly': { left: 1, right: 0 },
  'Either hand': { left: 1, right: 1 },
  'Right, mostly': { left: 0, right: 1 },
  'Right, always': { left: 0, right: 2 },
}
const keys = [
  'Left, always',
  'Left, mostly',
  'Either hand',
  'Right, mostly',
  'Right, always',
  'Does not do this yet',
]

const quotientOf = (given: readonly string[]): string => {
  const counted = given.flatMap((words) => marks[words] ?? [])
  const left = counted.reduce((sum, mark) => sum + mark.left, 0)
  const right = counted.reduce((sum, mark) => sum + mark.right, 0)
  return ((100 * (right - left)) / (right + left)).toFixed(1).replace('-', '−')
}

// Five L2, two L1, one of each, one R1, one left out: L = 13, R = 2, so 100 (2 − 13) / 15 = −73.3.
const given = [
  ...['Left, always', 'Left, always', 'Left, mostly', 'Left, always', 'Left, always'],
  ...['Does not do this yet', 'Either hand', 'Left, always', 'Right, mostly', 'Left, mostly'],
]

/**
 * Fills the ten activities by touch and by key, checks the live quotient after every answer against the published
 * formula, signs, and finds the result on the lateral line and in its table.
 */
export const fillQuestionnaire = async (therapist: Person): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'Hand profile')
  await seeText(page, 'Nothing on the line yet')
  await inspect(therapist, 'hand-profile-empty')
  await page
    .getByRole('button', { name: /questionnaire/i })
    .first()
    .click()
  await answer(page, 'Who answers', 'Child showed it')
  await inspect(therapist, 'questionnaire-start')
  await press(page, 'Go to the ten activities')
  await page.waitForURL(/\/questionnaires\//)

  const figure = page.getByRole('region', { name: 'Hand-use quotient' })
  const shown = async () => (await figure.getByRole('status').innerText()).trim()
  const activities = page.getByRole('region', { name: 'Ten activities' }).getByRole('group')
  await expect.poll(() => activities.count(), { timeout: 20_000 }).toBe(10)
  for (const [index, words] of given.entries()) {
    const activity = activities.nth(index)
    if (index % 2 === 0) await activity.getByRole('radio', { name: words, exact: true }).check()
    else {
      await activity.getByRole('radio').first().focus()
      await page.keyboard.press(String(keys.indexOf(words) + 1))
    }
    const answered = given.slice(0, index + 1)
    const named = answered.filter((known) => known in marks).length
    // Below six answers there is no quotient, below eight it is provisional (clinic rule).
    if (named < 6) await seeText(figure, /A quotient appears after 6 answers/)
    else {
      await expect.poll(shown).toContain(quotientOf(answered))
      await seeText(figure, named < 8 ? /Provisional/ : /^Scorable$/)
    }
  }
  expect(quotientOf(given)).toBe('−73.3')
  await seeText(figure, '9 of 10 activities answered; 1 not done yet, left out')
  await inspect(therapist, 'questionnaire-filled')

  await press(page, 'Sign')
  await seeHeading(page, 'Sign this questionnaire?')
  await press(page, 'Sign the questionnaire')
  await page.getByRole('button', { name: 'Correct this' }).waitFor()
  expect(await page.getByRole('radio', { disabled: false }).count()).toBe(0)
  await expect.poll(shown).toContain('−73.3')
  await inspect(therapist, 'questionnaire-signed')

  await openSection(page, 'Hand profile')
  await press(page, 'The same as a table')
  const row = page.getByRole('row', { name: /Hand use in ten everyday activities/ })
  await row.getByRole('cell', { name: '−73.3', exact: true }).waitFor()
  await row.getByRole('cell', { name: 'Left', exact: true }).waitFor()
  const line = page.getByRole('region', { name: 'Lateral line', exact: true })
  await line.locator('svg').first().waitFor()
  await inspect(therapist, 'hand-profile')
}
