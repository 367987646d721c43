import { sentencesOf, type Sentence } from './sentences.ts'
import { wordingRules, type WordingLevel, type WordingRule } from './wordingRules.ts'

/** Something found in a text, with its position so that it can be marked. */
export interface TextHit {
  start: number
  end: number
  text: string
}

export interface WordingHit extends TextHit {
  ruleId: string
  level: WordingLevel
  why: string
  instead: readonly string[]
}

/** Typographic apostrophes, hyphens and hard spaces as their plain forms, character for character. */
const plain = (text: string): string =>
  text
    .replace(/[‘’ʼ＇]/g, "'")
    .replace(/[‐‑]/g, '-')
    .replace(/[\u00a0\u202f]/g, ' ')

const compiled = wordingRules.map((rule) => ({
  rule,
  patterns: rule.patterns.map((pattern) => new RegExp(pattern.replaceAll('’', "'"), 'giu')),
}))

const pastAct = /\b(?:was|were|had|been|used\s+to)\b/i
const lookingAhead =
  /\b(?:will|should|must|needs?\s+to|can|could|shall|plan(?:s|ned)?\s+to|aims?\s+to|tr(?:y|ies)\s+to|decided|agreed|advis(?:e|es|ed)|recommend(?:s|ed)?|suggest(?:s|ed)?|let\s+us|please)\b/i
const negated =
  /\b(?:do\s+not|don't|does\s+not|doesn't|never|not|no\s+need\s+to|nobody\s+should|without|instead\s+of|rather\s+than)\b[^.;:!?]{0,40}$/i

/** Does the sentence report what was once asked of the child, or say that it is not done? */
function isHistoryOrRefusal(sentence: Sentence, hit: TextHit): boolean {
  const before = plain(sentence.text.slice(0, hit.start - sentence.start))
  const upToHit = plain(sentence.text.slice(0, hit.end - sentence.start))
  if (negated.test(before)) return true
  return pastAct.test(upToHit) && !lookingAhead.test(upToHit)
}

function isAllowed(rule: WordingRule, hit: TextHit, sentences: readonly Sentence[]): boolean {
  if (!rule.allowedAsHistory) return false
  const sentence = sentences.find(({ start, end }) => start <= hit.start && hit.end <= end)
  return sentence !== undefined && isHistoryOrRefusal(sentence, hit)
}

/**
 * Words in a family or school letter that are blocked, or that need a reason to stay. In the order of the text; of two
 * overlapping hits the longer one is kept.
 */
export function checkWording(text: string): WordingHit[] {
  const searched = plain(text)
  const sentences = sentencesOf(text)
  const hits: WordingHit[] = []
  for (const { rule, patterns } of compiled) {
    for (const match of patterns.flatMap((pattern) => [...searched.matchAll(pattern)])) {
      const end = match.index + match[0].length
      const hit = { start: match.index, end, text: text.slice(match.index, end) }
      if (isAllowed(rule, hit, sentences)) continue
      hits.push({ ...hit, ruleId: rule.id, level: rule.level, why: rule.why, instead: rule.instead })
    }
  }
  const longestFirst = hits.toSorted((a, b) => b.end - b.start - (a.end - a.start))
  const kept = longestFirst.filter(
    (hit, index) =>
      !longestFirst.slice(0, index).some((other) => hit.start < other.end && other.start < hit.end),
  )
  return kept.toSorted((a, b) => a.start - b.start)
}

const number = String.raw`[−+-]?\d+(?:[.,]\d+)?`
const scorePatterns = [
  new RegExp(String.raw`\b(?:LQ|[Ll]aterality quotient|[Qq]uotient)\b[^.!?\n\d−+-]{0,30}${number}`, 'gu'),
  new RegExp(
    String.raw`\b(?:T[\s-]scores?|GAS(?:[\s-]T)?(?:\s+scores?)?|[Gg]oal attainment score)\b[^.!?\n\d−+-]{0,30}${number}`,
    'gu',
  ),
  new RegExp(String.raw`\bT\s*(?:=|:|of|is|was|from|→)?\s*\d{2}(?:\.\d+)?\b`, 'gu'),
  new RegExp(String.raw`\b(?:[Ss]kill|[Aa]symmetry|[Rr]eaching) index\b[^.!?\n\d−+-]{0,30}${number}`, 'gu'),
]
const meaning =
  /\b(?:means?|meaning|in other words|that is to say|shows? that|tells? us|so (?:he|she|they|we)|this is how)\b/i

/** Scores (quotient, T, index) given as a bare number: neither their sentence nor the next one says what it means. */
export function bareScores(text: string): TextHit[] {
  const sentences = sentencesOf(text)
  return scorePatterns
    .flatMap((pattern) => [...text.matchAll(pattern)])
    .map((match) => ({ start: match.index, end: match.index + match[0].length, text: match[0] }))
    .filter((hit) => {
      const at = sentences.findIndex(({ start, end }) => start <= hit.start && hit.start < end)
      return !sentences.slice(at, at + 2).some((sentence) => meaning.test(sentence.text))
    })
    .toSorted((a, b) => a.start - b.start)
}

const escaped = (text: string): string => text.replace(/[.*+?^${}()|[\]\\]/g, String.raw`\$&`)

/**
 * Places where another child is named. A single name counts only as written (Will, not will); a full name in any case.
 * Names shorter than two letters are passed over.
 */
export function namesOfOthers(text: string, otherNames: readonly string[]): TextHit[] {
  const hits: TextHit[] = []
  for (const name of new Set(otherNames.map((other) => other.trim().normalize('NFC')))) {
    if ([...name].length < 2) continue
    const forms = [...new Set([name, name.normalize('NFD')])].map((form) =>
      escaped(form)
        .replace(/['’]/g, "['’]")
        .replace(/\s+/g, String.raw`\s+`),
    )
    const flags = /\s/.test(name) ? 'giu' : 'gu'
    const pattern = new RegExp(
      String.raw`(?<![\p{L}\p{M}\p{N}])(?:${forms.join('|')})(?![\p{L}\p{M}\p{N}])`,
      flags,
    )
    for (const match of text.matchAll(pattern)) {
      hits.push({ start: match.index, end: match.index + match[0].length, text: match[0] })
    }
  }
  return hits
    .filter(
      (hit) =>
        !hits.some(
          (other) =>
            other !== hit &&
            other.start <= hit.start &&
            hit.end <= other.end &&
            other.end - other.start > hit.end - hit.start,
        ),
    )
    .toSorted((a, b) => a.start - b.start)
}
