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

/** Signs the measure that is open, after reading what the question says. */
export const signMeasure = async ({ page }: Person): Promise<string> => {
  await page.getByRole('button', { name: 'Sign', exact: true }).locator('visible=true').click()
  const question = page.getByRole('alertdialog', { name: 'Sign this measure?' })
  const words = await question.innerText()
  await press(question, 'Sign the measure')
  await seeHeading(page, 'As recorded')
  return words
}

/** What can be done at one moment of reaching. */
export type ReachAct = 'Left' | 'Right' | 'Lost' | 'Swapped' | 'Undo'

interface Recorded {
  place: string
  hand: 'Left' | 'Right' | 'Lost'
  swapped: boolean
}

/** What the acts amount to, kept by the test itself with the places the page asked for. */
export interface ReachTally {
  reaches: readonly Recorded[]
  /** Of a hand, all or at one place. */
  count: (hand: Recorded['hand'], place?: string) => number
  /** 100 (R − L)/(R + L) as the page writes it. */
  index: string
}

const tally = (reaches: readonly Recorded[]): ReachTally => {
  const count = (hand: Recorded['hand'], place?: string) =>
    reaches.filter((reach) => reach.hand === hand && (place === undefined || reach.place === place)).length
  const [left, right] = [count('Left'), count('Right')]
  const index = (100 * (right - left)) / (right + left)
  const sign = index > 0 ? '+' : index < 0 ? '−' : ''
  return { reaches, count, index: `${sign}${Math.abs(index).toFixed(1)}` }
}

/** Records reaches one after the other, reading before each which place is next and after each how many there are. */
export const recordReaches = async (
  { page }: Person,
  acts: readonly ReachAct[],
  perform: (act: ReachAct) => Promise<void>,
): Promise<ReachTally> => {
  const reaches: Recorded[] = []
  for (const act of acts) {
    const last = reaches.at(-1)
    if (act === 'Undo') reaches.pop()
    else if (act === 'Swapped' && last) last.swapped = true
    else if (act === 'Left' || act === 'Right' || act === 'Lost') {
      const next = await page
        .getByRole('status')
        .filter({ hasText: 'Next place' })
        .locator('strong')
        .innerText()
      reaches.push({ place: next, hand: act, swapped: false })
    }
    await perform(act)
    await page.getByText(`${reaches.length} of 21`, { exact: true }).waitFor()
  }
  return tally(reaches)
}

/** The signed page says the same counts, by hand and by place, and the same index. */
export const seeTally = async ({ page }: Person, { reaches, count, index }: ReachTally): Promise<void> => {
  const result = page.getByRole('region', { name: 'Result', exact: true })
  const swapped = reaches.filter((reach) => reach.swapped).length
  const words = (await result.locator('dl').innerText()).replace(/\s+/g, ' ')
  expect(words).toContain(
    `${count('Left')} left, ${count('Right')} right, ${count('Lost')} lost, ${swapped} swapped on the way`,
  )
  expect(words).toContain(`${index} on the line`)
  const rows = await result
    .getByRole('table', { name: 'Reaches by place, from the child’s side' })
    .getByRole('row')
    .allInnerTexts()
  const places = ['Far left', 'Left', 'Near left', 'Midline', 'Near right', 'Right', 'Far right']
  expect(rows.slice(1).map((row) => row.split(/\t/))).toEqual(
    places.map((place) => [
      place,
      ...(['Left', 'Right', 'Lost'] as const).map((hand) => String(count(hand, place))),
    ]),
  )
}

/**
 * From now on the page marks every touch of a button and measures until the frame with the new count is drawn.
 */
export const watchTaps = ({ page }: Person): Promise<void> =>
  page.evaluate(() => {
    const shown = document.querySelector('progress')?.parentElement
    if (!shown) throw new Error('Nothing is recorded here')
    let waiting = false
    addEventListener(
      'pointerdown',
      () => {
        performance.mark('tap')
        waiting = true
      },
      { capture: true },
    )
    new MutationObserver(() => {
      if (!waiting) return
      waiting = false
      // The frame that draws the change begins here; the task after it finds it drawn.
      requestAnimationFrame(() => setTimeout(() => performance.measure('tap to shown', 'tap')))
    }).observe(shown, { subtree: true, childList: true, characterData: true, attributes: true })
  })

/** Milliseconds of every touch measured since, shortest first. */
export const tapTimes = ({ page }: Person): Promise<number[]> =>
  page.evaluate(() =>
    performance
      .getEntriesByName('tap to shown')
      .map(({ duration }) => duration)
      .toSorted((a, b) => a - b),
  )
