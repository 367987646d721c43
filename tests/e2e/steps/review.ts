import { expect } from 'vitest'
import { inspect, settled, type Person } from '../support/browser.ts'
import { openPlace, seeHeading, seeText } from '../support/fields.ts'

/** Every figure of the clinic review opens a list of exactly as many entries as it says. */
export const openEveryFigure = async (lead: Person): Promise<void> => {
  const { page } = lead
  await openPlace(page, 'Clinic review')
  await seeHeading(page, 'What needs a look')
  await inspect(lead, 'review')
  await seeText(page.getByRole('region', { name: 'Caseload by therapist' }), 'Adaeze Nwosu-Reid')
  const figures = page.getByRole('region', { name: 'What needs a look' }).getByRole('link')
  const shown = await figures.evaluateAll((links) =>
    links.map((link) => ({
      address: link.getAttribute('href') ?? '',
      count: Number(/^\d+/.exec(link.textContent?.trim() ?? '')?.[0]),
    })),
  )
  expect(shown.length).toBeGreaterThan(6)
  for (const { address, count } of shown) {
    await page.locator(`a[href="${address}"]`).first().click()
    await page.waitForURL(`**${address}`)
    await settled(page)
    if (count === 0) await seeText(page, 'Nothing is on this list')
    else await seeText(page, count === 1 ? '1 entry' : `${count} entries`)
    await inspect(lead, `review-${address.split('/').pop()}`)
    await page.goBack()
    await seeHeading(page, 'What needs a look')
  }
}
