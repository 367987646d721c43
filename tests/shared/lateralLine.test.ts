import { describe, expect, it } from 'vitest'
import { tracksOf, type LateralLineRow } from '../../shared/lateralLine.ts'

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
