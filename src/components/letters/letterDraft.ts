import { formatDay } from '@shared/days.ts'
import type { LetterChecks, LetterDraft, LetterFinding, LetterView } from '@shared/letters.ts'

/** Only what may be written; facts, checks and rights stay behind. */
export const draftOf = (letter: LetterView): LetterDraft => ({
  salutation: letter.salutation,
  sections: letter.sections.map(({ id, heading, text }) => ({ id, heading, text })),
  nextVisitOn: letter.nextVisitOn,
})

/** Where two people's texts of one letter differ. */
export function differingSections(mine: LetterDraft, theirs: LetterDraft) {
  const day = (draft: LetterDraft) => (draft.nextVisitOn ? formatDay(draft.nextVisitOn) : 'none')
  const parts = [
    { label: 'Greeting', mine: mine.salutation, theirs: theirs.salutation },
    ...mine.sections.map((section) => {
      const other = theirs.sections.find(({ id }) => id === section.id)
      return {
        label: section.heading,
        mine: `${section.heading}\n${section.text}`,
        theirs: other ? `${other.heading}\n${other.text}` : '',
      }
    }),
    { label: 'Next date', mine: day(mine), theirs: day(theirs) },
  ]
  return parts.filter((part) => part.mine !== part.theirs)
}

const determiner = /\b(?:the|a|an|his|her|their|its|my|your|our)\s+$/i

/**
 * Replaces the first place where the phrase stands, whatever its capitals; a text without it stays as it is. Where the
 * words before already say whose or which ('her wrong hand'), the other words come without their article.
 */
export function replacePhrase(text: string, phrase: string, instead: string): string {
  const at = text.toLowerCase().indexOf(phrase.toLowerCase())
  if (at < 0) return text
  const before = text.slice(0, at)
  const other = determiner.test(before) ? instead.replace(/^(?:the|an?)\s+/i, '') : instead
  const first = text.charAt(at)
  const starts = first !== first.toLowerCase()
  const words = starts ? other.charAt(0).toUpperCase() + other.slice(1) : other
  return before + words + text.slice(at + phrase.length)
}

/**
 * May this wording be put in with one touch? Only a few words that say nothing new: an example with a figure, a gap or
 * a whole statement in it would put an invented fact into a letter.
 */
export const canBePutIn = (instead: string): boolean =>
  !/[\d…]/.test(instead) && instead.trim().split(/\s+/).length <= 5

/** Discouraged words, each once: each needs a reason before a letter is approved. */
export function phrasesToExplain({ findings }: LetterChecks): string[] {
  const phrases = findings.flatMap(({ level, phrase }) =>
    level === 'discouraged' && phrase !== null ? [phrase] : [],
  )
  return [...new Map(phrases.map((phrase) => [phrase.toLowerCase(), phrase])).values()]
}

export const blocking = ({ findings }: LetterChecks): LetterFinding[] =>
  findings.filter(({ level }) => level === 'blocked')
