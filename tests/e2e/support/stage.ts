import type { Browser } from 'playwright-core'
import { afterAll, afterEach, beforeAll, expect, inject } from 'vitest'
import { openBrowser, openPerson, signIn, type Person } from './browser.ts'
import type { SignIn } from './people.ts'

/** What the tests of one file share: the clinic of the run, one browser, and whoever stands before it now. */
export const openStage = () => {
  const clinic = inject('clinic')
  const present = new Map<string, Person>()
  let browser: Browser | null = null

  beforeAll(async () => {
    browser = await openBrowser()
  })
  afterEach(async ({ task }) => {
    if (task.result?.state === 'fail') await tell()
    for (const person of present.values()) await person.close()
    present.clear()
  })
  afterAll(() => browser?.close())

  /** Says what everybody had before them, in words: a failed wait alone does not tell why. */
  const tell = async () => {
    for (const [name, { page, faults }] of present) {
      const seen = await page.locator('body').ariaSnapshot({ timeout: 5000 })
      console.error(`${name} at ${page.url()}\n${faults.join('\n')}\n${seen.slice(-6000)}`)
    }
  }

  /** A person with a browser window of their own, not signed in. */
  const enter = async (name: string, width?: number, height?: number, touch?: boolean): Promise<Person> => {
    if (!browser) throw new Error('The browser is not open yet')
    const person = await openPerson(browser, clinic.url, width, height, touch)
    present.set(name, person)
    return person
  }
  /** The same, signed in. */
  const arrive = async (
    name: string,
    how: SignIn,
    width?: number,
    height?: number,
    touch?: boolean,
  ): Promise<Person> => {
    const person = await enter(name, width, height, touch)
    await signIn(person, how)
    return person
  }
  /** Nobody saw an error in the console, a breach of the page's policy, or a request to another host. */
  const expectNoFaults = () => {
    for (const [name, { faults }] of present) expect(faults, `faults seen by ${name}`).toEqual([])
  }
  return { ...clinic, enter, arrive, expectNoFaults }
}
