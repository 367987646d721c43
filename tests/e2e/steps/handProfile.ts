import { expect } from 'vitest'
import { inspect, type Person } from '../support/browser.ts'
import { press, seeText } from '../support/fields.ts'
import type { ExpectedRow } from '../support/handFindings.ts'

const lineOf = ({ page }: Person) => page.getByRole('region', { name: 'Lateral line', exact: true })

/** The table beside the line holds exactly these rows, each with value and side. */
export const seeRows = async (therapist: Person, expected: readonly ExpectedRow[]): Promise<void> => {
  const line = lineOf(therapist)
  await line.locator('svg').first().waitFor()
  await press(line, 'The same as a table')
  const rows = line.getByRole('region', { name: 'Lateral line as a table' }).getByRole('row')
  const shown = await rows.evaluateAll((all) =>
    all.slice(1).map((row) => {
      const [measure = '', , value = '', side = ''] = [...row.children].map((cell) =>
        (cell.textContent ?? '').replace(/\s+/g, ' ').trim(),
      )
      return { measure, value, side }
    }),
  )
  const sorted = (all: readonly ExpectedRow[]) =>
    all.toSorted((a, b) => `${a.measure} ${a.value}`.localeCompare(`${b.measure} ${b.value}`))
  expect(sorted(shown)).toEqual(sorted(expected))
  await inspect(therapist, 'hand-profile-table')
  await press(line, 'Hide the table')
}

/** Opens a row of the line and finds what was seen, the formula with the child's figures, and the source. */
export const openRow = async (
  therapist: Person,
  measure: RegExp,
  found: readonly (string | RegExp)[],
): Promise<void> => {
  const line = lineOf(therapist)
  await line.locator('summary').filter({ hasText: measure }).first().click()
  const opened = line.locator('details[open]').filter({ hasText: measure }).first()
  for (const words of found) await seeText(opened, words)
}
