import { mount } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import HistoryBeside from '@/components/histories/HistoryBeside.vue'
import { emptyHistory, type HistoryDetails } from '@shared/histories.ts'

const beside = (given: Partial<HistoryDetails>, more: object = {}) =>
  mount(HistoryBeside, {
    props: {
      details: { ...emptyHistory, ...given },
      birthDate: '2018-05-04',
      today: '2026-06-10',
      answeredOn: '2026-06-10',
      correctedUntilMonths: 24,
      writingHand: 'left',
      name: 'Robin',
      closed: false,
      ...more,
    },
  }).text()

describe('what stands beside a history', () => {
  it('says which signs the answers raise and what is usually done, and that it is no diagnosis', () => {
    const text = beside({ newWeakness: 'yes', pain: 5 })
    expect(text.indexOf('Same-day medical help')).toBeLessThan(text.indexOf('Think about welfare'))
    expect(text).toContain('There is new weakness.')
    expect(text).toContain('Writing hurts (5 out of 10).')
    expect(text).toContain('Not a diagnosis')
    expect(beside({})).not.toContain('Signs in these answers')
  })

  it('counts and names what is not answered', () => {
    expect(beside({ enjoys: 'Dens' })).not.toContain('What does Robin enjoy')
    expect(beside({})).toContain('What does Robin enjoy')
    expect(beside({})).toMatch(/Not answered \(\d+\)/)
  })

  it('gives the corrected age of a young child born early', () => {
    const young = { birthDate: '2026-01-05', answeredOn: '2026-04-27' }
    // COR-01: 16 weeks old, born at 34 weeks, is 10 weeks corrected.
    expect(beside({ gestationWeeks: 34 }, young)).toContain('10 weeks corrected (born at 34 weeks)')
    expect(beside({ gestationWeeks: 38 }, young)).not.toContain('corrected')
  })

  it('shows published rates and common practice apart, as context and never as a figure for this child', () => {
    const text = beside({ family: { ...emptyHistory.family, mother: 'left', father: 'right' } })
    expect(text).toContain('they say nothing about what this child will do')
    expect(text).toMatch(/One parent left-handed\s*about 19 %/)
    // No row is this family's: the page is the same whatever the parents' hands.
    const other = { ...emptyHistory.family, mother: 'left', father: 'left' } as const
    const rates = (words: string) => words.slice(words.indexOf('Left-handedness in families'))
    expect(rates(beside({ family: other }))).toBe(rates(text))
    // The decimals are from memory, so they are not printed as published.
    expect(text).not.toMatch(/9\.5|19\.5|26\.1/)
    const [published = '', common = ''] = text.split('Common practice, no source')
    expect(published).toContain('McManus & Bryden 1992')
    expect(common).toMatch(/Father left-handed, mother right-handed\s*17 %/)
    expect(published).not.toContain('17 %')
    expect(text).not.toMatch(/likely|probab|chance/i)
  })
})
