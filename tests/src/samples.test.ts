import { describe, expect, it } from 'vitest'
import { physicalWidths } from '@/components/samples/physicalScale.ts'
import { axisTop, sampleSeries } from '@/components/samples/sampleSeries.ts'
import type { SampleView } from '@shared/samples.ts'

describe('physicalWidths', () => {
  it('draws a 100 mm and a 200 mm wide page one to two, whatever their pixels', () => {
    // 1000 px at 10 px/mm and 800 px at 4 px/mm.
    expect(
      physicalWidths([
        { width: 1000, pixelsPerMm: 10 },
        { width: 800, pixelsPerMm: 4 },
      ]),
    ).toEqual([50, 100])
  })

  it('refuses a common scale when one picture has none', () => {
    expect(
      physicalWidths([
        { width: 1000, pixelsPerMm: 10 },
        { width: 800, pixelsPerMm: null },
      ]),
    ).toBeNull()
  })
})

const sample = (given: Partial<SampleView>): SampleView => ({
  id: 'a',
  childId: 'c',
  takenOn: '2026-01-01',
  ageThen: '7 y 0 m',
  task: 'copy',
  script: 'joined',
  seconds: 60,
  letters: 40,
  legibleLetters: 36,
  reversals: null,
  smudge: null,
  lineAdherence: null,
  note: null,
  lettersPerMinute: 40,
  percentLegible: null,
  contentType: 'image/png',
  bytes: 1,
  width: null,
  height: null,
  pixelsPerMm: null,
  uploadedBy: 'A',
  uploadedAt: '2026-01-01T10:00:00Z',
  alt: '',
  can: { remove: false },
  ...given,
})

describe('sampleSeries', () => {
  it('places points by their day and value, and keeps other tasks apart', () => {
    const series = sampleSeries([
      sample({ id: 'last', takenOn: '2026-01-11', lettersPerMinute: 60 }),
      sample({ id: 'first' }),
      sample({ id: 'middle', takenOn: '2026-01-06', lettersPerMinute: 45 }),
      sample({ id: 'other', task: 'free' }),
    ])
    expect(series.map(({ title }) => title)).toEqual(['Copying a sentence, joined letters'])
    expect(series[0]?.measures.map(({ id }) => id)).toEqual(['speed'])
    expect(series[0]?.measures[0]?.points.map(({ id, x, y }) => [id, x, Math.round(y)])).toEqual([
      ['first', 0, 67],
      ['middle', 50, 75],
      ['last', 100, 100],
    ])
  })

  it('draws nothing from a single measured sample: one point is not a trend', () => {
    expect(sampleSeries([sample({}), sample({ id: 'b', lettersPerMinute: null })])).toEqual([])
  })

  it('ends the axis on a round figure', () => {
    expect([axisTop(58), axisTop(60), axisTop(3)]).toEqual([60, 60, 10])
  })
})
