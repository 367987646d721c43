import { mount, RouterLinkStub } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import LoadTable from '@/components/review/LoadTable.vue'
import type { TherapistLoad } from '@shared/review.ts'

const load = (
  therapist: string,
  points: number,
  capacity: number | null,
  more: Partial<TherapistLoad> = {},
): TherapistLoad => ({
  therapistId: `00000000-0000-4000-8000-${therapist.length.toString().padStart(12, '0')}`,
  therapist,
  wte: 1,
  openCases: 9,
  points,
  capacity,
  reviewsOverdue: 0,
  ...more,
})
const table = (loads: TherapistLoad[]) =>
  mount(LoadTable, { props: { loads }, global: { stubs: { RouterLink: RouterLinkStub } } })

describe('LoadTable', () => {
  // A clinic review is not a ranking of colleagues: numbers are small and the children differ.
  it('lists therapists by name whatever their numbers, and the unallocated last', () => {
    const wrapper = table([
      load('Not allocated', 90, null, { therapistId: null, wte: null }),
      load('Zadie', 50, 40),
      load('Adaeze', 3, 40),
      load('Mairi', 20, 24),
    ])
    const names = wrapper.findAll('tbody th').map((cell) => cell.text())
    expect(names).toEqual(['Adaeze', 'Mairi', 'Zadie', 'Not allocated'])
  })

  it('says in words who is over capacity, and only above it', () => {
    const wrapper = table([load('Adaeze', 40.5, 40), load('Tomasz', 40, 40)])
    const points = wrapper.findAll('.meter-words').map((cell) => cell.text().replace(/\s+/g, ' '))
    expect(points).toEqual(['40.5 of 40 over', '40 of 40'])
  })

  it('shows no capacity, rather than a capacity of nought, where none is set', () => {
    const wrapper = table([load('Not allocated', 1.5, null, { therapistId: null, wte: null })])
    expect(wrapper.get('.meter-words').text()).toBe('1.5')
    expect(wrapper.find('line.capacity').exists()).toBe(false)
  })
})
