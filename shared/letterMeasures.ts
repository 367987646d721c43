import { compareDays, formatDay } from './days.ts'
import type { SampleFacts, SourcedText } from './letterFacts.ts'

export interface SampleChanges {
  intro: string
  lines: SourcedText[]
}

const hasMeasure = (sample: SampleFacts) =>
  sample.legibleLetters !== null || sample.lettersPerMinute !== null || sample.reversals !== null

/**
 * The newest sample with a count in it, and the earliest one of the same task in the same script: a copied sentence
 * says nothing about a free story. A task that was repeated is preferred to one that was done once.
 */
export function comparableSamples(samples: readonly SampleFacts[]): {
  first: SampleFacts | null
  latest: SampleFacts | null
} {
  const counted = samples.filter(hasMeasure).toSorted((a, b) => compareDays(a.takenOn, b.takenOn))
  const earlierTwin = (latest: SampleFacts) =>
    counted.find(
      (sample) =>
        sample.task === latest.task &&
        sample.script === latest.script &&
        compareDays(sample.takenOn, latest.takenOn) < 0,
    )
  const newestFirst = counted.toReversed()
  const repeated = newestFirst.find((sample) => earlierTwin(sample) !== undefined)
  const latest = repeated ?? newestFirst[0] ?? null
  return { latest, first: latest === null ? null : (earlierTwin(latest) ?? null) }
}

const readable = ({ letters, legibleLetters }: SampleFacts) =>
  letters === null || legibleLetters === null || letters === 0 ? null : { letters, legible: legibleLetters }

const turnedRound = (count: number) => {
  if (count === 0) return 'No letters were turned round.'
  return count === 1 ? '1 letter was turned round.' : `${count} letters were turned round.`
}

const smudgeWords = { none: 'clean', light: 'a little smudged', heavy: 'very smudged' } as const

/**
 * What two samples show, in counts a parent can picture ('Of 50 letters, 46 were easy to read. On 3 Mar 2026 it was
 * 38.'). Says what was counted and never whether it is good. Null when no sample holds a count.
 */
export function sampleChanges(childName: string, samples: readonly SampleFacts[]): SampleChanges | null {
  const { first, latest } = comparableSamples(samples)
  if (latest === null) return null
  const lines: string[] = []

  const now = readable(latest)
  const before = first && readable(first)
  if (now) {
    const then =
      before &&
      (before.letters === now.letters ? `${before.legible}` : `${before.legible} of ${before.letters}`)
    lines.push(
      `Of ${now.letters} letters, ${now.legible} were easy to read.${then ? ` On ${formatDay(first.takenOn)} it was ${then}.` : ''}`,
    )
  }
  if (latest.lettersPerMinute !== null) {
    const earlier = first?.lettersPerMinute
    const then =
      first && typeof earlier === 'number'
        ? ` On ${formatDay(first.takenOn)} it was ${Math.round(earlier)}.`
        : ''
    lines.push(`In one minute, ${childName} wrote ${Math.round(latest.lettersPerMinute)} letters.${then}`)
  }
  const reversedBefore = first?.reversals ?? null
  if (
    latest.reversals !== null &&
    (latest.reversals > 0 || (reversedBefore !== null && reversedBefore > 0))
  ) {
    const then =
      first && reversedBefore !== null ? ` On ${formatDay(first.takenOn)} it was ${reversedBefore}.` : ''
    lines.push(`${turnedRound(latest.reversals)}${then}`)
  }
  if (first?.smudge && latest.smudge && first.smudge !== latest.smudge) {
    lines.push(
      `The page was ${smudgeWords[latest.smudge]}. On ${formatDay(first.takenOn)} it was ${smudgeWords[first.smudge]}.`,
    )
  }

  if (lines.length === 0) return null
  const source = first
    ? `Handwriting samples of ${formatDay(first.takenOn)} and ${formatDay(latest.takenOn)}`
    : `Handwriting sample of ${formatDay(latest.takenOn)}`
  return {
    intro: first
      ? `We looked at two pieces of ${childName}’s writing. The task was the same each time. The newer one is from ${formatDay(latest.takenOn)}.`
      : `We looked at a piece of ${childName}’s writing from ${formatDay(latest.takenOn)}.`,
    lines: lines.map((text) => ({ text, source })),
  }
}
