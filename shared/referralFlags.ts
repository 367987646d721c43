import type { Attention } from './attention.ts'
import { ageInMonths, ageInYears, isDay, type Day } from './days.ts'
import type { RedFlagId, RedFlagUrgency } from './redFlagRows.ts'
import type { ReferralConcern } from './referrals.ts'

/*
 * Signs in a referral that must be looked at before a routine place on the waiting list. The software only points at
 * words and answers that stand in the referral; whether they mean anything is for the licensed therapist to decide,
 * and local codes and emergency arrangements come first. It never diagnoses.
 */

/** Rows of the clinic's table that a referral may show, the most pressing first. */
export const referralFlagIds = [
  'new-neurological-signs',
  'preference-before-12-months',
  'preference-12-to-18-months',
  'other-hand-or-lost-skill',
  'change-of-hand',
  'pain',
  'punished-for-hand',
  'swaps-within-task',
] as const satisfies readonly RedFlagId[]
export type ReferralFlagId = (typeof referralFlagIds)[number]

export interface ReferralFlag {
  id: ReferralFlagId
  /** What was noticed and what is usually done, for the person who decides. */
  text: string
  level: Attention
  urgency: RedFlagUrgency
  /** The words of the referral that raised it; null when an answer or the age did. */
  words: string | null
}

interface FlaggedReferral {
  reason: string
  concerns: readonly ReferralConcern[]
  birthDate: Day | null
  receivedOn: Day | null
}

const texts: Record<ReferralFlagId, { text: string; level: Attention; urgency: RedFlagUrgency }> = {
  // New one-sided weakness in a child is an emergency even after a fall: Bhate & Ganesan 2015 (acute hemiparesis).
  'new-neurological-signs': {
    text: 'Possible new weakness, numbness, drooping face, headache or seizure. Do not wait for an appointment: same-day medical advice, or the emergency number if it came suddenly or is getting worse, even after a fall.',
    level: 'overdue',
    urgency: 'same_day',
  },
  // NICE NG127 (2019): hand preference before one year, corrected for early birth, is a reason to refer.
  'preference-before-12-months': {
    text: 'One hand preferred before 12 months (counted from the due date if born early). Usual step: priority, and a referral to the child development service before therapy is planned.',
    level: 'overdue',
    urgency: 'priority',
  },
  // Evidence for the stretch between 12 and 18 months is weak: asking is the usual step.
  'preference-12-to-18-months': {
    text: 'One hand preferred between 12 and 18 months. Usual step: ask about a weaker or stiffer side, a fisted hand and late milestones, then decide.',
    level: 'due',
    urgency: 'ask',
  },
  // NICE NG127 (2019): fisting, one-sided use and loss of a skill.
  'other-hand-or-lost-skill': {
    text: 'One hand hardly used, held in a fist, dropping things, or a skill lost. Usual step: medical review first, no routine block.',
    level: 'overdue',
    urgency: 'medical_review',
  },
  // Common practice, from memory: cause and date are recorded, a doctor looks at it.
  'change-of-hand': {
    text: 'A change of hand, or an injury or plaster of the arm. Usual step: write down date and cause, ask for a medical review, plan the way back.',
    level: 'due',
    urgency: 'medical_review',
  },
  // Common practice, from memory.
  pain: {
    text: 'Pain when writing. Usual step: ask how strong it is from 0 to 10; from 4 on it is looked at soon and the child’s welfare is kept in mind.',
    level: 'due',
    urgency: 'safeguarding',
  },
  // Common practice, from memory; no hand is ever changed on this clinic's advice.
  'punished-for-hand': {
    text: 'Pressure or punishment for using the left hand. Usual step: think about the child’s welfare under the local safeguarding procedure, and advise home and school to leave the hand as it is.',
    level: 'due',
    urgency: 'safeguarding',
  },
  // Common practice, from memory.
  'swaps-within-task': {
    text: 'Hand not settled at six or older. Usual step: full assessment, and ask whether anybody has asked the child to change hands.',
    level: 'soon',
    urgency: 'ask',
  },
}

const patterns: Partial<Record<ReferralFlagId, RegExp>> = {
  'new-neurological-signs':
    /\b(?:(?:new|sudden|suddenly|recent|growing)\s+(?:[\w'’-]+\s+){0,3}?weak(?:ness|er)?|(?:one|left|right)[\s-]sided\s+weakness|weak(?:ness)?\s+(?:in|of|on)\s+(?:(?:the|his|her|their|one)\s+)?(?:left|right|arm|hand|side|leg)|numb(?:ness)?\b|facial? droop\w*|droop\w*\s+(?:face|mouth|eye)|(?:face|mouth)\s+droop\w*|headaches?|seizures?|convulsions?|epilep\w+)/iu,
  'other-hand-or-lost-skill':
    /\b(?:fist(?:ed|s|ing)?|(?:hardly|never|rarely|barely|does\s+not|doesn['’]t|stopped)\s+us(?:es?|ing)\s+(?:(?:the|his|her|their)\s+)?(?:left|right|other)|drop(?:s|ping)\s+things|(?:lost|losing)\s+(?:\w+\s+){0,2}?skills?|used\s+to\s+be\s+able)/iu,
  'change-of-hand':
    /\b(?:(?:chang|switch|swapp)(?:ed|ing)\s+(?:to\s+(?:the|his|her|their)\s+(?:left|right|other)\s+hand|(?:\w+\s+)?hands?)|now\s+(?:writes|draws)\s+with\s+(?:the|his|her|their)?\s*(?:left|right|other)|fractur\w*|broken?\s+(?:\w+\s+)?(?:arm|wrist|hand|elbow|finger)|broke\s+(?:\w+\s+){1,3}(?:arm|wrist|hand|elbow|finger)|plaster(?:ed)?|(?:arm|wrist|hand|elbow)\s+injur\w*|injur\w+\s+(?:\w+\s+){0,2}(?:arm|wrist|hand|elbow))/iu,
  pain: /\b(?:pain(?:s|ful)?|hurts?|hurting|aches?|aching|sore)\b/iu,
  'punished-for-hand':
    /\b(?:punish\w*|smack\w*|slapp\w*|hand\s+(?:is\s+|was\s+)?tied|(?:made|forced|told)\s+to\s+(?:use|write\s+with)\s+(?:the|his|her|their)\s+(?:right|other))/iu,
}

const early =
  /\b(?:since|from|at|by|before|around|when)\b[^.;,]{0,24}?\b(\d{1,2})\s*(?:-|\s)?(?:months?|mths?|mo)\b|\bbefore\s+(?:the|his|her|their)\s+first\s+birthday\b/iu
const aboutPreference = /\b(?:hand(?:ed|edness)?|left|right|prefer\w*)\b/iu
/** Up to two words between a denial and what it denies; "but", "and" and the like begin something that is not denied. */
const between = String.raw`(?:(?!(?:but|and|however|yet|though|although|except|only|then|now|since)\b)[\w'’]+\s+){0,2}$`
const denied = new RegExp(
  String.raw`\b(?:no|not|nobody|no\s+one|never\s+(?:had|has|have|any|gets?|felt|feels?|complain\w*)|without|denies|nor|` +
    String.raw`(?:has|have|had|is|are|was|were|does|do|did)n['’]t)` +
    // "Does not stop hurting", "not only headaches", "not sure whether it is numb", "no idea why it hurts".
    String.raw`\s+(?!(?:stop\w*|only|just|sure|know\w*|idea|doubt)\b)${between}`,
  'iu',
)
const deniedAfter = /^\s*[?:–-]\s*(?:no|none|never|not)\b/iu
const orBefore = new RegExp(String.raw`\b(?:or|nor)\s+${between}`, 'iu')
const anySign = new RegExp(
  Object.values(patterns)
    .map(({ source }) => source)
    .join('|'),
  'giu',
)

/** "No headaches, seizures or numbness" denies all three: the signs named before are taken out of the list. */
function withoutListed(before: string, after: string): string {
  const inList = /^\s*(?:,|or\b|nor\b)/iu.test(after) || orBefore.test(before)
  return inList ? before.replace(anySign, '').replace(/\s*(?:,|\bor\b|\bnor\b)\s*/giu, ' ') : before
}

/** Every match in words, but where the sentence says that it is not so ("no pain", "without any headache"). */
function everyMatch(pattern: RegExp, text: string): string[] {
  const every = new RegExp(pattern.source, `g${pattern.flags}`)
  return [...text.matchAll(every)].flatMap((match) => {
    const before =
      text
        .slice(0, match.index)
        .split(/[.;!?\n]/u)
        .at(-1) ?? ''
    const after = text.slice(match.index + match[0].length)
    if (denied.test(before) || denied.test(withoutListed(before, after)) || deniedAfter.test(after)) return []
    return [match[0].trim()]
  })
}

/** The sign of an age in months at which a preference was seen, where the words name one. */
function preferenceSince(reason: string): { id: ReferralFlagId | null; words: string } | null {
  const match = early.exec(reason)
  if (!match) return null
  const sentence = reason.slice(Math.max(0, match.index - 120), match.index + match[0].length + 60)
  if (!aboutPreference.test(sentence)) return null
  const months = match[1] === undefined ? 11 : Number(match[1])
  const id = months < 12 ? 'preference-before-12-months' : months < 18 ? 'preference-12-to-18-months' : null
  return { id, words: match[0].trim() }
}

/**
 * Signs that stand in words somebody wrote, in the order of `referralFlagIds`, every match by itself. Signs that rest on
 * an age, a date or a ticked concern are for the caller.
 */
export function flagsInWords(text: string): { id: ReferralFlagId; words: string }[] {
  const since = preferenceSince(text)
  return referralFlagIds.flatMap((id) => {
    const pattern = patterns[id]
    if (pattern) return everyMatch(pattern, text).map((words) => ({ id, words }))
    return since?.id === id ? [{ id, words: since.words }] : []
  })
}

/** Warning signs in the order of `referralFlagIds`; each names the words that raised it. */
export function referralFlagsOf({
  reason,
  concerns,
  birthDate,
  receivedOn,
}: FlaggedReferral): ReferralFlag[] {
  const raised = new Map<ReferralFlagId, string | null>()
  for (const { id, words } of flagsInWords(reason)) if (!raised.has(id)) raised.set(id, words)
  if (concerns.includes('pain_fatigue') && !raised.has('pain')) raised.set('pain', null)
  if (concerns.includes('pressure_to_switch') && !raised.has('punished-for-hand'))
    raised.set('punished-for-hand', null)

  // A date still being typed says nothing about age.
  if (isDay(birthDate) && isDay(receivedOn) && birthDate <= receivedOn) {
    const unclear = concerns.includes('hand_preference_unclear')
    if (unclear && ageInYears(birthDate, receivedOn) >= 6) raised.set('swaps-within-task', null)
    const noticed =
      preferenceSince(reason) === null && ageInMonths(birthDate, receivedOn) < 12 && concerns.length > 0
    if (noticed) raised.set('preference-before-12-months', null)
  }
  return referralFlagIds.flatMap((id) => {
    const words = raised.get(id)
    return words === undefined ? [] : [{ id, words, ...texts[id] }]
  })
}
