import type { Page } from 'playwright-core'
import { expect, it } from 'vitest'
import { routesFor, screensOf, visitors, type Screen, type Visitor } from './support/addresses.ts'
import { expectAccessible, settled, shoot, type Person } from './support/browser.ts'
import { residentMegabytes } from './support/clinic.ts'
import { signInOf, signInOfParent } from './support/people.ts'
import { openStage } from './support/stage.ts'

const { pid, enter, arrive, expectNoFaults } = openStage()

const who = {
  therapist: () => signInOf('adaeze'),
  clinicLead: () => signInOf('ines'),
  administrator: () => signInOf('pauline'),
  guardian: () => signInOfParent('luciaQuispe'),
  teacher: () => signInOf('kwabena'),
}
const come = (visitor: Visitor): Promise<Person> =>
  visitor === 'nobody' ? enter(visitor) : arrive(visitor, who[visitor]())

const expectNoSidewaysScroll = async (page: Page, where: string) => {
  const { inside, window } = await page.evaluate(() => ({
    inside: document.documentElement.scrollWidth,
    window: document.documentElement.clientWidth,
  }))
  expect(inside, `width of ${where}`).toBeLessThanOrEqual(window)
}

/** One load of the page for all its widths and both themes: the layout follows the window, as it does for people. */
const lookAt = async ({ page, url }: Person, { name, address }: Screen, where: string) => {
  await page.setViewportSize({ width: 1280, height: 900 })
  await page.goto(`${url}${address}`)
  await settled(page)
  if (name !== 'forbidden') expect(new URL(page.url()).pathname, where).not.toBe('/forbidden')
  for (const width of [1280, 820, 360]) {
    await page.setViewportSize({ width, height: width === 360 ? 780 : 900 })
    await settled(page)
    await expectNoSidewaysScroll(page, `${where} at ${width} px`)
    await shoot(page, `${where}-${width}`)
    // Colours do not depend on the width; the two ends show every piece there is.
    await expectAccessible(page, `${where} at ${width} px`, width === 820 ? 'structure' : 'all')
  }
  await page.setViewportSize({ width: 1280, height: 900 })
  await page.emulateMedia({ colorScheme: 'dark' })
  await page.waitForFunction(() => document.documentElement.classList.contains('dark'))
  await settled(page)
  await shoot(page, `${where}-1280-dark`)
  await expectAccessible(page, `${where} in the dark theme`, 'colours')
  await page.emulateMedia({ colorScheme: 'light' })
}

it.each(visitors)(
  'shows every page open to %s at every width, light and dark, accessible and without sideways scroll',
  async (visitor) => {
    const person = await come(visitor)
    const screens = await screensOf(visitor, person)
    const numbers = new Map<string, number>()
    for (const screen of screens) {
      const number = (numbers.get(screen.name) ?? 0) + 1
      numbers.set(screen.name, number)
      await lookAt(person, screen, `${visitor}-${screen.name}${number > 1 ? `-${number}` : ''}`)
    }
    expectNoFaults()
    const missing = routesFor(visitor).filter((name) => !screens.some((screen) => screen.name === name))
    // Sections of a record that the server does not offer to an administrator.
    const closed =
      visitor === 'administrator'
        ? /^(child-|questionnaire|measure|history|conclusion|session-note|letter$)/
        : /^$/
    expect(
      missing.filter((name) => !closed.test(name)),
      'routes without a page here',
    ).toEqual([])
  },
)

it('keeps the server within 250 MB after all these pages', () => {
  if (pid !== null) expect(residentMegabytes(pid)).toBeLessThan(250)
})
