import { flesch } from 'flesch'
import { fleschKincaid } from 'flesch-kincaid'
import { syllable } from 'syllable'
import { sentencesOf } from './sentences.ts'

export interface ReadingCounts {
  words: number
  sentences: number
  syllables: number
}

export interface ReadingLevel extends ReadingCounts {
  /** Flesch reading ease, higher is easier; null without words. */
  ease: number | null
  /** School grade (United States); null without words. */
  grade: number | null
  /** The sentence with the most words; null without words. */
  longestSentence: string | null
}

/**
 * School grades for family and school letters. Sixth grade or below: advice of a medical association for patients'
 * letters; the point from which we warn is the clinic's own.
 */
export const readingTarget = { idealUpTo: 6, warnAbove: 8 } as const

export type ReadingVerdict = 'easy' | 'acceptable' | 'hard'

/** How a grade stands against the target; null when there is no grade. */
export function readingVerdict(grade: number | null): ReadingVerdict | null {
  if (grade === null) return null
  if (grade <= readingTarget.idealUpTo) return 'easy'
  return grade <= readingTarget.warnAbove ? 'acceptable' : 'hard'
}

/** Flesch 1948 and Kincaid et al. 1975 from counts; null, never NaN, without words. Show one decimal at most. */
export function readingScores(counts: ReadingCounts): { ease: number | null; grade: number | null } {
  if (counts.words === 0 || counts.sentences === 0 || counts.syllables === 0)
    return { ease: null, grade: null }
  const names = { word: counts.words, sentence: counts.sentences, syllable: counts.syllables }
  return { ease: flesch(names), grade: fleschKincaid(names) }
}

const wordSplitter = new Intl.Segmenter('en-GB', { granularity: 'word' })

const wordsOf = (text: string): string[] =>
  [...wordSplitter.segment(text)].filter((part) => part.isWordLike).map((part) => part.segment)

/**
 * Fixed rules where counters disagree: digits are one word of one syllable, capitals (OT, LQ) are spelled out, and
 * each half of a hyphenated word is a word.
 */
function syllablesIn(word: string): number {
  if (/^[\p{N}.,:]+$/u.test(word)) return 1
  if (/^\p{Lu}{2,5}$/u.test(word)) return word.length
  return Math.max(1, syllable(word.replace(/[’ʼ]/g, "'")))
}

/** How hard a letter is to read. English only; says nothing about layout or meaning, so it never replaces a reader. */
export function readingLevel(text: string): ReadingLevel {
  let syllables = 0
  let words = 0
  let sentences = 0
  let longest: { words: number; text: string } | null = null
  for (const sentence of sentencesOf(text)) {
    const found = wordsOf(sentence.text)
    if (found.length === 0) continue
    sentences += 1
    words += found.length
    syllables += found.reduce((sum, word) => sum + syllablesIn(word), 0)
    if (longest === null || found.length > longest.words)
      longest = { words: found.length, text: sentence.text }
  }
  const counts = { words, sentences, syllables }
  return { ...counts, ...readingScores(counts), longestSentence: longest?.text ?? null }
}
