import { daysBetween, type Day } from '@shared/days.ts'
import { sampleScriptLabels, sampleTaskLabels } from '@shared/handwriting.ts'
import type { SampleView } from '@shared/samples.ts'

export interface SeriesPoint {
  id: string
  takenOn: Day
  value: number
  /** Place along the time axis and up the value axis, in percent from the bottom left. */
  x: number
  y: number
}

export interface SampleSeries {
  id: string
  /** 'Copying a sentence, joined letters'. */
  title: string
  measures: { id: 'speed' | 'legibility'; label: string; unit: string; top: number; points: SeriesPoint[] }[]
}

/** Only samples of one task in one kind of writing may be compared. */
export const comparable = (a: SampleView, b: SampleView): boolean =>
  a.task === b.task && a.script === b.script

/** A round number at or above the largest value, so that the axis ends on a figure people can read. */
export const axisTop = (largest: number): number => Math.max(10, Math.ceil(largest / 10) * 10)

const measures = [
  {
    id: 'speed',
    label: 'Letters a minute',
    unit: 'letters/min',
    of: (sample: SampleView) => sample.lettersPerMinute,
  },
  { id: 'legibility', label: 'Readable', unit: '%', of: (sample: SampleView) => sample.percentLegible },
] as const

/** One series for each task and kind of writing; a measure appears once two samples have it. */
export function sampleSeries(samples: readonly SampleView[]): SampleSeries[] {
  const groups = new Map<string, SampleView[]>()
  for (const sample of samples) {
    const key = `${sample.task}|${sample.script}`
    groups.set(key, [...(groups.get(key) ?? []), sample])
  }
  return [...groups].flatMap(([id, group]) => {
    const ordered = group.toSorted((a, b) => a.takenOn.localeCompare(b.takenOn))
    const first = ordered[0]
    const last = ordered.at(-1)
    if (!first || !last) return []
    const span = Math.max(1, daysBetween(first.takenOn, last.takenOn))
    const drawn = measures.flatMap(({ of, ...measure }) => {
      const known = ordered.flatMap((sample) => {
        const value = of(sample)
        return value === null ? [] : [{ id: sample.id, takenOn: sample.takenOn, value }]
      })
      if (known.length < 2) return []
      const top = measure.id === 'legibility' ? 100 : axisTop(Math.max(...known.map(({ value }) => value)))
      const points = known.map((point) => ({
        ...point,
        x: (100 * daysBetween(first.takenOn, point.takenOn)) / span,
        y: (100 * point.value) / top,
      }))
      return [{ ...measure, top, points }]
    })
    if (drawn.length === 0) return []
    const title = `${sampleTaskLabels[first.task]}, ${sampleScriptLabels[first.script].toLowerCase()}`
    return [{ id, title, measures: drawn }]
  })
}
