import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import { createMemoryHistory, createRouter } from 'vue-router'
import WaitingRibbon from '@/components/review/WaitingRibbon.vue'
import { longestFirst, ribbonScale, weeksOf } from '@/components/review/ribbonScale.ts'
import type { WaitingBar } from '@shared/review.ts'

// The clinic's own scenario: the 18-week target is 126 days; the child who has waited 137 days is at 19.6 weeks.
const bar = (name: string, days: number, more: Partial<WaitingBar> = {}): WaitingBar => ({
  childId: `00000000-0000-4000-8000-${String(days).padStart(12, '0')}`,
  name,
  receivedOn: '2026-03-03',
  days,
  targetDays: 126,
  priority: false,
  ...more,
})
const waiting = [bar('Gethin', 18), bar('Dilan', 137), bar('Jakub', 61), bar('Tui', 30, { priority: true })]

const ribbon = async (bars: WaitingBar[], shownAtFirst?: number) => {
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [{ path: '/:rest(.*)*', component: { template: '<i />' } }],
  })
  await router.push('/')
  return mount(WaitingRibbon, {
    props: { waiting: bars, ...(shownAtFirst === undefined ? {} : { shownAtFirst }) },
    global: { plugins: [PrimeVue, router] },
  })
}
const spokenBars = (wrapper: Awaited<ReturnType<typeof ribbon>>) =>
  wrapper.findAll('svg a').map((link) => link.attributes('aria-label'))

describe('scale of the waiting ribbon', () => {
  it('ends every bar at today and makes its length proportional to the days waited', () => {
    const { bars, today } = ribbonScale(waiting, 100, 600)
    const lengths = bars.map(({ start }) => today - start)
    expect(today).toBe(600)
    // 137 days against 61 days: lengths in the same proportion.
    expect(lengths[1]! / lengths[2]!).toBeCloseTo(137 / 61, 6)
  })

  it('puts the start of a bar left of its target exactly when the wait is longer than the target', () => {
    const { bars } = ribbonScale([bar('A', 126), bar('B', 127), bar('C', 125)], 0, 500)
    expect(bars.map(({ over }) => over)).toEqual([false, true, false])
    expect(bars[1]!.start).toBeLessThan(bars[1]!.target)
    expect(bars[0]!.start).toBeCloseTo(bars[0]!.target, 6)
    expect(bars[2]!.start).toBeGreaterThan(bars[2]!.target)
  })

  it('keeps the target inside the drawing when everybody has only just been referred', () => {
    const { bars } = ribbonScale([bar('A', 0), bar('B', 1)], 40, 340)
    expect(bars[0]!.target).toBeGreaterThan(40)
    expect(bars[0]!.start).toBe(340)
  })

  it('writes at most eight tick labels, in whole weeks, however long the wait', () => {
    for (const days of [1, 60, 137, 400, 1500]) {
      const { ticks } = ribbonScale([bar('A', days)], 0, 500)
      expect(ticks.length).toBeGreaterThan(1)
      expect(ticks.length).toBeLessThanOrEqual(8)
      expect(ticks.every(({ weeks }) => Number.isInteger(weeks))).toBe(true)
    }
  })

  it('shows 137 days as 19.6 weeks', () => {
    expect(weeksOf(137)).toBe('19.6')
  })

  it('orders the longest wait first and equal waits by name', () => {
    const names = longestFirst([bar('Zofia', 10), bar('Amara', 10), bar('Kofi', 11)]).map(({ name }) => name)
    expect(names).toEqual(['Kofi', 'Amara', 'Zofia'])
  })
})

describe('WaitingRibbon', () => {
  it('draws one bar for each open referral, longest first, when some wait', async () => {
    const wrapper = await ribbon(waiting)
    expect(spokenBars(wrapper)).toEqual([
      'Dilan 19.6 weeks, over target, since 3 Mar 2026, 1.6 weeks over the target',
      'Jakub 8.7 weeks, since 3 Mar 2026, 9.3 weeks left before the target',
      'Tui priority 4.3 weeks, since 3 Mar 2026, 13.7 weeks left before the target',
      'Gethin 2.6 weeks, since 3 Mar 2026, 15.4 weeks left before the target',
    ])
  })

  it('says in words who waits too long, not in colour alone', async () => {
    const wrapper = await ribbon(waiting)
    expect(wrapper.get('figcaption').text()).toMatch(/^1 of 4 waits longer than the target\./)
    expect(wrapper.get('svg').text()).toContain('19.6 weeks, over target')
  })

  it('says that nobody waits too long when all are within the target', async () => {
    const wrapper = await ribbon([bar('Jakub', 61), bar('Gethin', 18)])
    expect(wrapper.get('figcaption').text()).toContain('Nobody of 2 waits longer than the target.')
    expect(wrapper.findAll('path.over')).toHaveLength(0)
  })

  it('gives the same rows as a table with a link to each record', async () => {
    const wrapper = await ribbon(waiting)
    const rows = wrapper.findAll('tbody tr')
    expect(rows.map((row) => row.get('th').text())).toEqual(['Dilan', 'Jakub', 'Tui', 'Gethin'])
    expect(rows[0]!.findAll('td').map((cell) => cell.text())).toEqual([
      '3 Mar 2026',
      '19.6',
      '1.6 weeks over the target',
      'Routine',
    ])
    expect(rows[0]!.get('a').attributes('href')).toBe(`/children/${waiting[1]!.childId}/glance`)
  })

  it('never hides somebody over the target behind "show all"', async () => {
    const long = Array.from({ length: 6 }, (_, index) => bar(`Over ${index}`, 130 + index))
    const wrapper = await ribbon([...long, bar('Jakub', 61)], 3)
    expect(spokenBars(wrapper)).toHaveLength(6)
    await wrapper.get('button').trigger('click')
    expect(spokenBars(wrapper)).toHaveLength(7)
  })
})
