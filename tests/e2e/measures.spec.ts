import { expect, it } from 'vitest'
import { edgeOf, lockMeasure, sideOf, startMeasure, tapToShown } from './steps/measure.ts'
import { openFromCaseload } from './steps/colleague.ts'
import { inspect, openTab, settled, type Person } from './support/browser.ts'
import { press, seeText } from './support/fields.ts'
import { signInOf } from './support/people.ts'
import { openStage } from './support/stage.ts'

const { arrive, expectNoFaults } = openStage()

const saved = ({ page }: Person) =>
  page
    .getByRole('status')
    .filter({ hasText: /^Saved/ })
    .waitFor()

it.each([
  { who: 'mairi' as const, child: 'Soraya Haidari', hand: 'left' },
  { who: 'tomasz' as const, child: 'Tane Whetuira', hand: 'right' },
])(
  'records 21 reaches by touch with the working edge on the side of the hand: $hand',
  async ({ who, child, hand }) => {
    const therapist = await arrive('therapist', signInOf(who), 820, 1180, true)
    const { page } = therapist
    await openFromCaseload(therapist, child)
    await startMeasure(therapist, 'Reaching across the midline')
    const side = await sideOf(therapist, 'Left')
    if (hand === 'left') expect(side).toBeLessThan(0.25)
    else expect(side).toBeGreaterThan(0.75)

    const edge = edgeOf(therapist)
    const tap = (name: string) => edge.getByRole('button', { name, exact: true }).tap()
    await tap('Right')
    await tap('Undo')
    for (let reach = 0; reach < 17; reach += 1) await tap(reach % 4 === 3 ? 'Right' : 'Left')
    await tap('Swapped')
    await tap('Lost')
    for (let reach = 0; reach < 3; reach += 1)
      expect(await tapToShown(therapist, 'Left'), 'from tap to shown, ms').toBeLessThanOrEqual(100)
    await seeText(page, 'All 21 reaches are recorded')
    await saved(therapist)
    await inspect(therapist, `reaching-${hand}`)

    // Of 20 counted reaches 16 left, 4 right: 100 (4 − 16) / 20 = −60.0.
    expect(await lockMeasure(therapist)).toContain('1 reach was lost')
    await seeText(page, '16 left, 4 right')
    await seeText(page, /−60\.0/)
    await inspect(therapist, `reaching-${hand}-locked`)
    expectNoFaults()
  },
)

it('records reaches and times by keyboard alone, and loses nothing while the network is away', async () => {
  const therapist = await arrive('therapist', signInOf('tomasz'))
  const { page } = therapist
  await openFromCaseload(therapist, 'Ottilie Brandreth')
  await startMeasure(therapist, 'Reaching across the midline')
  const { keyboard } = page
  for (const key of ['l', 'r', 's', 'x', 'u', 'l']) await keyboard.press(key)
  await saved(therapist)
  await page.context().setOffline(true)
  for (const key of ['l', 'l', 'r']) await keyboard.press(key)
  await seeText(page, '6 of 21')
  await page
    .getByRole('status')
    .filter({ hasText: /^Not saved/ })
    .waitFor()
  await page.context().setOffline(false)
  await saved(therapist)
  await page.reload()
  await seeText(page, '6 of 21')
  await seeText(page, '4 left')

  await startMeasure(therapist, 'Moving pegs')
  await keyboard.press('Space')
  await seeText(edgeOf(therapist), 'Stop')
  await keyboard.press('Space')
  const question = page.getByRole('alertdialog', { name: /^Keep \d+\.\d s\?$/ })
  await question.waitFor()
  await keyboard.press('Enter')
  await question.waitFor({ state: 'hidden' })
  const field = page.getByLabel('Or type the time')
  await expect.poll(() => field.evaluate((one) => one === document.activeElement)).toBe(true)
  for (const seconds of ['12.4', '13.1', '13.4', '12.0']) {
    await field.fill(seconds)
    await keyboard.press('Enter')
    await seeText(page, `${seconds} s kept`)
  }
  await inspect(therapist, 'pegs')
  expectNoFaults()
})

it('tells two people who record one occasion, and shows both records', async () => {
  const first = await arrive('therapist', signInOf('tomasz'))
  await openFromCaseload(first, 'Priya Raghunath')
  await startMeasure(first, 'Reaching across the midline')
  const second = await openTab(first)
  await second.page.goto(first.page.url())
  await seeText(second.page, '0 of 21')
  await settled(second.page)
  await first.page.keyboard.press('l')
  await saved(first)
  await second.page.keyboard.press('r')
  const panel = second.page.getByRole('alert').filter({ hasText: 'while you were recording' })
  await seeText(panel, /: left hand/)
  await seeText(panel, /: right hand/)
  await inspect(second, 'reaching-two-records')
  await press(panel, 'Keep mine')
  await saved(second)
  await second.page.reload()
  await seeText(second.page, 'Last:')
  await seeText(second.page, /right hand first/)
})
