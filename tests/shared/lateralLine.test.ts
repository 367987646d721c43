import { describe, expect, it } from 'vitest'
import { sideWords, tracksOf, type LateralLineRow } from '../../shared/lateralLine.ts'

const row = (given: Partial<LateralLineRow>): LateralLineRow => ({
  id: 'a',
  aspect: 'preference',
  track: 'hand-use-10|guardian',
  measure: 'Hand-use questionnaire',
  occasion: '2026-03-03',
  value: -88.2,
  side: 'left',
  interval: null,
  chance: null,
  basis: '10 of 10 activities answered',
  caution: null,
  cutOffs: null,
  informant: 'Parent or carer',
  latest: true,
  source: { kind: 'questionnaire', id: 'a' },
  ...given,
})

describe('tracksOf', () => {
  it('keeps what a parent and what a teacher answered apart, newest occasion first', () => {
    const tracks = tracksOf([
      row({ id: 'old', occasion: '2025-09-01', latest: false }),
      row({ id: 'teacher', track: 'hand-use-10|teacher', informant: 'Teacher' }),
      row({ id: 'new' }),
    ])
    expect(tracks.map((track) => [track.informant, track.rows.map(({ id }) => id)])).toEqual([
      ['Parent or carer', ['new', 'old']],
      ['Teacher', ['teacher']],
    ])
  })
})

describe('sideWords', () => {
  it.each([
    ['preference', 'middle', 'Mixed'],
    ['preference', 'left', 'Left'],
    ['reaching', 'middle', 'Within chance'],
    ['skill', 'left', 'Left hand ahead'],
    ['skill', 'middle', 'No clear difference'],
    ['skill', null, 'No side told'],
    ['eye_far', 'right', 'Right'],
  ] as const)('says of %s to the %s: %s', (aspect, side, words) => {
    expect(sideWords({ value: -3, side, aspect })).toBe(words)
  })

  it('says that there is nothing to tell where nothing was scored', () => {
    expect(sideWords({ value: null, side: null, aspect: 'preference' })).toBe('Not scorable')
  })
})
