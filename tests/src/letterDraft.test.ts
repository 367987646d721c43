import { describe, expect, it } from 'vitest'
import {
  canBePutIn,
  differingSections,
  phrasesToExplain,
  replacePhrase,
} from '@/components/letters/letterDraft.ts'
import type { LetterChecks, LetterDraft } from '@shared/letters.ts'

describe('replacePhrase', () => {
  it('replaces the first place, whatever its capitals, and keeps a capital at the start', () => {
    expect(replacePhrase('Wrong hand again. The wrong hand.', 'wrong hand', 'the left hand')).toBe(
      'The left hand again. The wrong hand.',
    )
  })

  it('leaves a text without the phrase as it is', () => {
    expect(replacePhrase('She draws birds.', 'wrong hand', 'left hand')).toBe('She draws birds.')
  })

  it.each([
    ['She cut with the wrong hand.', 'wrong hand', 'the left hand', 'She cut with the left hand.'],
    ['Her wrong hand rested.', 'wrong hand', 'the left hand', 'Her left hand rested.'],
    ['Not a southpaw.', 'southpaw', 'a left-handed child', 'Not a left-handed child.'],
    ['They bathe wrong hands.', 'wrong hands', 'the other hand', 'They bathe the other hand.'],
  ])('says whose or which only once: “%s” without “%s”', (text, phrase, instead, expected) => {
    expect(replacePhrase(text, phrase, instead)).toBe(expected)
  })
})

describe('canBePutIn', () => {
  it.each([
    ['the left hand', true],
    ['is left-handed', true],
    ['Of 50 letters, 46 were easy to read.', false],
    ['is finding … takes more effort when…', false],
    ['the ink smears as the hand follows it', false],
  ])('offers “%s” for one touch: %s', (words, allowed) => {
    expect(canBePutIn(words)).toBe(allowed)
  })
})

const checks = (phrases: [level: 'blocked' | 'discouraged', phrase: string | null][]): LetterChecks => ({
  findings: phrases.map(([level, phrase]) => ({ level, phrase, section: 'work', message: '', instead: [] })),
  reading: { ease: null, grade: null, words: 0, longestSentence: null },
})

describe('phrasesToExplain', () => {
  it('asks for one reason for each discouraged wording, however often and however written it stands', () => {
    expect(
      phrasesToExplain(
        checks([
          ['discouraged', 'LQ'],
          ['discouraged', 'lq'],
          ['blocked', 'lazy'],
          ['discouraged', null],
        ]),
      ),
    ).toEqual(['lq'])
  })
})

describe('differingSections', () => {
  const draft = (text: string, nextVisitOn: string | null = null): LetterDraft => ({
    salutation: 'Dear Ana',
    sections: [
      { id: 'opening', heading: 'When we met', text: 'In May.' },
      { id: 'work', heading: 'What we did', text },
    ],
    nextVisitOn,
  })

  it('shows only what differs, with both texts in full', () => {
    expect(differingSections(draft('Cutting.'), draft('Cutting cards.', '2027-01-15'))).toEqual([
      { label: 'What we did', mine: 'What we did\nCutting.', theirs: 'What we did\nCutting cards.' },
      { label: 'Next date', mine: 'none', theirs: '15 Jan 2027' },
    ])
  })
})
