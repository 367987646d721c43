import type { Locator, Page } from 'playwright-core'
import { settled } from './browser.ts'

type Scope = Page | Locator

const pageOf = (scope: Scope): Page => ('page' in scope ? scope.page() : scope)

/** Chooses an option of a drop-down by the label of its field. */
export const choose = async (
  scope: Scope,
  label: RegExp | string,
  option: RegExp | string,
): Promise<void> => {
  await scope.getByRole('combobox', { name: label }).click()
  const wanted = pageOf(scope).getByRole('option', { name: option })
  await wanted.click()
  await wanted.waitFor({ state: 'detached' })
}

/** Presses the button of exactly this name. */
export const press = (scope: Scope, name: string): Promise<void> =>
  scope.getByRole('button', { name, exact: true }).click()

/** Follows the link of exactly this name. */
export const follow = (scope: Scope, name: string): Promise<void> =>
  scope.getByRole('link', { name, exact: true }).click()

/** Answers a question of radio buttons. */
export const answer = (scope: Scope, question: RegExp | string, words: string): Promise<void> =>
  scope.getByRole('group', { name: question }).getByRole('radio', { name: words, exact: true }).check()

/** Waits for a heading. */
export const seeHeading = (scope: Scope, name: RegExp | string): Promise<void> =>
  scope.getByRole('heading', { name }).first().waitFor()

/** Waits for words anywhere. */
export const seeText = (scope: Scope, words: RegExp | string): Promise<void> =>
  scope.getByText(words).first().waitFor()

/** Goes to a place of the header row. */
export const openPlace = (page: Page, name: string): Promise<void> =>
  follow(page.getByRole('navigation', { name: 'Places' }), name)

/** Goes to a section of the child's record. */
export const openSection = (page: Page, name: string): Promise<void> =>
  follow(page.getByRole('navigation', { name: 'Sections of the record' }), name)

/** Types into the search of a list and waits until the list is narrowed: its rows move as it is. */
export const searchFor = async (page: Page, words: string): Promise<void> => {
  await page.getByRole('searchbox').fill(words)
  await page.waitForURL(({ searchParams }) => searchParams.get('search') === words)
  await settled(page)
}
