import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readingLevel, readingScores, readingVerdict } from '../../shared/readingLevel.ts'
import { sentencesOf } from '../../shared/sentences.ts'

// Flesch 1948; Kincaid et al. 1975; constants read on a public research-instrument page
// (206.835 - 1.015 W/S - 84.6 Y/W; 0.39 W/S + 11.8 Y/W - 15.59).
describe('readingScores', () => {
  it.each([
    ['FL-01, FL-01b published 11.3 and (from memory) 37.5', 13, 1, 24, 37.455385, 11.264615],
    ['FL-02 published bounds', 1, 1, 1, 121.22, -3.4],
    ['FL-04 published about 116 (from memory)', 6, 1, 6, 116.145, -1.45],
  ])('%s', (_id, words, sentences, syllables, ease, grade) => {
    const scores = readingScores({ words, sentences, syllables })
    expect(scores.ease).toBeCloseTo(ease, 3)
    expect(scores.grade).toBeCloseTo(grade, 3)
  })

  it('FL-03: 5.7 words a sentence and 1.02 syllables a word, published -1.3', () => {
    expect(readingScores({ words: 5700, sentences: 1000, syllables: 5814 }).grade).toBeCloseTo(-1.331, 3)
  })

  it('FL-06: an empty letter has no level', () => {
    expect(readingScores({ words: 0, sentences: 0, syllables: 0 })).toEqual({ ease: null, grade: null })
    expect(readingLevel('')).toEqual({
      words: 0,
      sentences: 0,
      syllables: 0,
      ease: null,
      grade: null,
      longestSentence: null,
    })
    expect(readingLevel(' \n - \n…').grade).toBeNull()
  })
})

// Counted by hand, but for 'Mr.': title words and names count as the syllable counter has them.
describe('readingLevel', () => {
  it.each([
    ['The cat sat on the mat.', 6, 1, 6],
    ['He draws a lot. She likes scissors!', 7, 2, 8],
    ['Mr. Bell came. It went well.', 6, 2, 6],
    ['Try it, e.g. after tea.', 5, 1, 7],
    ['It took 2.5 minutes.', 4, 1, 5],
    ['The OT will call.', 4, 1, 5],
    ['She is left-handed.', 4, 1, 5],
    ['The child’s page', 3, 1, 3],
  ])('%s', (text, words, sentences, syllables) => {
    expect(readingLevel(text)).toMatchObject({ words, sentences, syllables })
  })

  it('ends a sentence at a heading and at each list item', () => {
    const letter =
      'What helps at home\n\n- Turn the page a little\n- Sit with both feet flat\n\nCall us any time.'
    expect(sentencesOf(letter).map(({ text }) => text)).toEqual([
      'What helps at home',
      '- Turn the page a little',
      '- Sit with both feet flat',
      'Call us any time.',
    ])
  })

  it('carries a hard-wrapped sentence on to the next line', () => {
    expect(readingLevel('We met on Monday and looked\nat how the page lies.').sentences).toBe(1)
  })

  it('quotes the longest sentence', () => {
    const text = 'Short one. This sentence is by far the longest of the three here. Short again.'
    expect(readingLevel(text).longestSentence).toBe('This sentence is by far the longest of the three here.')
  })

  it('gives plain words a lower grade than jargon saying the same', () => {
    const plain = 'Mateo writes more now. He can read what he wrote. The page lies on his left side.'
    const jargon =
      'Mateo demonstrates considerable improvement in graphomotor performance following environmental modification of paper orientation.'
    expect(readingVerdict(readingLevel(plain).grade)).toBe('easy')
    expect(readingVerdict(readingLevel(jargon).grade)).toBe('hard')
  })

  it('never answers NaN, whatever is typed', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', maxLength: 80 }), (text) => {
        const { ease, grade, words } = readingLevel(text)
        expect(ease === null).toBe(words === 0)
        expect([ease, grade].every((value) => value === null || Number.isFinite(value))).toBe(true)
      }),
    )
  })
})

describe('sentencesOf', () => {
  it('gives positions that find the sentence again', () => {
    const text = '  First one.  Second\none here!\n\nThird.'
    for (const { start, end, text: sentence } of sentencesOf(text))
      expect(text.slice(start, end).replace('\n', ' ')).toBe(sentence)
  })
})

// Sixth grade or below for patients' letters: a medical association's advice; above 8 we warn (clinic rule).
describe('readingVerdict', () => {
  it.each([
    [-1, 'easy'],
    [6, 'easy'],
    [6.1, 'acceptable'],
    [8, 'acceptable'],
    [8.1, 'hard'],
    [null, null],
  ])('grade %j is %j', (grade, verdict) => {
    expect(readingVerdict(grade)).toBe(verdict)
  })
})
