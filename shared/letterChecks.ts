import { formatDay } from './days.ts'
import type {
  LetterApproval,
  LetterChecks,
  LetterDraft,
  LetterFinding,
  LetterSection,
  LetterSectionId,
} from './letters.ts'
import { maximumHomeItems, nextVisitSentence } from './letterTemplates.ts'
import { letterBlocks } from './letterText.ts'
import { readingLevel, readingTarget } from './readingLevel.ts'
import { sentencesOf } from './sentences.ts'
import { bareScores, checkWording, namesOfOthers } from './wording.ts'

/** What the checker must know beyond the letter's own text. */
export interface LetterContext {
  /** Names that belong in this letter: the child's, the carers', the author's. */
  ownNames: readonly string[]
  /** Names of other children, which do not. */
  otherNames: readonly string[]
}

/** Family letters lead with strengths: two at least (clinic rule). */
export const minimumStrengths = 2

/**
 * Everything that speaks against a letter going out as it stands. `blocked` stops it, `discouraged` needs the author's
 * reason, `advice` only informs. Never changes the text.
 */
export function checkLetter(draft: LetterDraft, context: LetterContext): LetterChecks {
  const places = placesOf(draft)
  const reading = readingLevel(places.map(({ text }) => withoutGaps(text)).join('\n\n'))
  const others = namesNotOwn(context)
  const findings = [
    ...places.flatMap(({ section, text }) => [
      ...gapFindings(section, text),
      ...wordingFindings(section, withoutGaps(text)),
      ...scoreFindings(section, withoutGaps(text)),
      ...nameFindings(section, withoutGaps(text), others),
    ]),
    ...strengthFindings(draft.sections),
    ...homeFindings(draft.sections),
    ...nextDateFindings(draft),
    ...readingFindings(reading.grade, reading.longestSentence),
  ]
  const { ease, grade, words, longestSentence } = reading
  return { findings: withoutRepeats(findings), reading: { ease, grade, words, longestSentence } }
}

/** The findings that still keep a letter from going out: blocked ones, and discouraged ones without a reason. */
export const openFindings = (
  { findings }: Pick<LetterChecks, 'findings'>,
  overrides: LetterApproval['overrides'],
): LetterFinding[] => {
  const answered = new Set(overrides.map(({ phrase }) => phrase.trim().toLowerCase()))
  return findings.filter(
    ({ level, phrase }) =>
      level === 'blocked' || (level === 'discouraged' && !answered.has((phrase ?? '').toLowerCase())),
  )
}

interface Place {
  section: LetterFinding['section']
  text: string
}

const placesOf = ({ salutation, sections }: LetterDraft): Place[] => [
  { section: 'salutation', text: salutation },
  ...sections.map(({ id, heading, text }): Place => ({ section: id, text: `${heading}\n\n${text}` })),
]

// A bracket that was never closed is still a prompt nobody answered.
const gapPattern = /\[[^\]]*\]?|\]/g

const withoutGaps = (text: string) => text.replace(gapPattern, ' ')

const gapFindings = (section: Place['section'], text: string): LetterFinding[] =>
  [...text.matchAll(gapPattern)].map(([phrase]) => ({
    level: 'blocked',
    section,
    phrase,
    message: 'Something is still to be filled in. Write it, or take the brackets and their text out.',
    instead: [],
  }))

const wordingFindings = (section: Place['section'], text: string): LetterFinding[] =>
  checkWording(text).map((hit) => ({
    level: hit.level,
    section,
    phrase: hit.text,
    message: hit.why,
    instead: [...hit.instead],
  }))

const scoreFindings = (section: Place['section'], text: string): LetterFinding[] =>
  bareScores(text).map((hit) => ({
    level: 'blocked',
    section,
    phrase: hit.text,
    message:
      'A score means nothing to a family by itself. Say what the child can do, or what the number means.',
    instead: ['Of 50 letters, 46 were easy to read.'],
  }))

/** Other children's names, less those that this child, a carer or the author shares. */
function namesNotOwn({ ownNames, otherNames }: LetterContext): string[] {
  const own = new Set(ownNames.flatMap((name) => [name.trim(), ...name.trim().split(/\s+/)]))
  return otherNames.filter((name) => !own.has(name.trim()))
}

const nameFindings = (section: Place['section'], text: string, others: readonly string[]): LetterFinding[] =>
  namesOfOthers(text, others).map((hit) => {
    const isFullName = /\s/.test(hit.text)
    return {
      // Many people share a first name; a whole name is another child's.
      level: isFullName ? 'blocked' : 'discouraged',
      section,
      phrase: hit.text,
      message: isFullName
        ? 'This is the name of another child known here. No letter may name another child.'
        : 'Another child known here has this name. Is the right child meant? Leave other children’s names out.',
      instead: ['a friend', 'another child in the class'],
    }
  })

const textOf = (sections: readonly LetterSection[], id: LetterSectionId) =>
  withoutGaps(sections.find((section) => section.id === id)?.text ?? '')

function strengthFindings(sections: readonly LetterSection[]): LetterFinding[] {
  const blocks = letterBlocks(textOf(sections, 'strengths'))
  const items = blocks.flatMap((block) => (block.kind === 'list' ? block.items : []))
  const sentences = blocks.flatMap((block) =>
    block.kind === 'paragraph' ? sentencesOf(block.lines.join(' ')) : [],
  )
  if ((items.length > 0 ? items.length : sentences.length) >= minimumStrengths) return []
  return [
    {
      level: 'discouraged',
      section: 'strengths',
      phrase: 'fewer than two strengths',
      message: 'A family letter leads with what the child enjoys and does well: at least two things.',
      instead: [],
    },
  ]
}

function homeFindings(sections: readonly LetterSection[]): LetterFinding[] {
  const items = letterBlocks(textOf(sections, 'home')).flatMap((block) =>
    block.kind === 'list' ? block.items : [],
  )
  if (items.length <= maximumHomeItems) return []
  return [
    {
      level: 'discouraged',
      section: 'home',
      phrase: `${items.length} things to do at home`,
      message: 'Three things at home are as much as a family can take up at once. Keep the most useful.',
      instead: [],
    },
  ]
}

function nextDateFindings({ nextVisitOn, sections }: LetterDraft): LetterFinding[] {
  if (nextVisitOn === null) {
    return [
      {
        level: 'discouraged',
        section: 'next',
        phrase: 'no next date',
        message: 'No next date is set. Set one, or say why there is none.',
        instead: [],
      },
    ]
  }
  if (textOf(sections, 'next').includes(formatDay(nextVisitOn))) return []
  return [
    {
      level: 'advice',
      section: 'next',
      phrase: null,
      message: `The next date is ${formatDay(nextVisitOn)}, but the letter does not say so in these words.`,
      instead: [nextVisitSentence(nextVisitOn)],
    },
  ]
}

function readingFindings(grade: number | null, longestSentence: string | null): LetterFinding[] {
  if (grade === null || grade <= readingTarget.warnAbove) return []
  return [
    {
      level: 'advice',
      section: 'letter',
      phrase: longestSentence,
      message: `This letter may be hard to read (school grade ${grade.toFixed(1)}; up to ${readingTarget.warnAbove} is the aim). Begin with the longest sentence.`,
      instead: [],
    },
  ]
}

function withoutRepeats(findings: readonly LetterFinding[]): LetterFinding[] {
  const byKey = new Map<string, LetterFinding>()
  for (const finding of findings) {
    const key = [finding.level, finding.section, finding.message, finding.phrase?.toLowerCase()].join('\n')
    if (!byKey.has(key)) byKey.set(key, finding)
  }
  return [...byKey.values()]
}
