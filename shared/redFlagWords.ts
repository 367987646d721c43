import type { HistoryDetails } from './histories.ts'
import type { RedFlagId } from './redFlagRows.ts'
import { redFlagsOfHistory } from './redFlagSources.ts'
import { flagsInWords, type ReferralFlagId } from './referralFlags.ts'

/*
 * Signs in what somebody wrote in words of their own at home or at school, found as in the text of a referral and raised
 * under the rows of the clinic's table. The words are pointed at and quoted; what they mean is for the therapist to decide.
 */

/** A row of the table and the words under it, as written. */
export interface QuotedFlag {
  id: RedFlagId
  quotes: string[]
}

const unfinishedWord = /[\p{L}\p{M}\p{N}'’-]+$/u

/**
 * What of a text may be read for signs while it is being typed. Every pause saves it, so the last word may be half
 * written ("numb" on the way to "number"): it counts once something follows it, or once a later save finds the text as it
 * was, because the person has then gone on to something else. Leaving the page is no sign of its own: it saves what was
 * typed like any pause. Sending reads everything (`before` left out).
 */
export function readableText(now: string | null, before?: string | null): string {
  if (now === null) return ''
  return before === undefined || before === now ? now : now.replace(unfinishedWord, '')
}

interface WrittenText {
  text: string
  /** Signs that the question itself asks for, or that another answer tells better. */
  except?: readonly ReferralFlagId[]
}

const isHeadache = (quote: string) => /^headaches?$/iu.test(quote)

/**
 * Signs in several texts of one answer, each row once. `headachesPress` says whether headaches stand beside another sign
 * that was answered; beside another sign in the words they press too.
 */
function quotedFlags(written: readonly WrittenText[], headachesPress: boolean): QuotedFlag[] {
  const found = written.flatMap(({ text, except = [] }) =>
    flagsInWords(text).filter(({ id }) => !except.includes(id)),
  )
  const others = found.some(
    ({ id, words }) =>
      id === 'other-hand-or-lost-skill' ||
      id === 'change-of-hand' ||
      (id === 'new-neurological-signs' && !isHeadache(words)),
  )
  const quotes = new Map<RedFlagId, string[]>()
  for (const { id, words } of found) {
    const alone = isHeadache(words) && !others && !headachesPress
    const row = alone ? 'new-headaches' : id
    const known = quotes.get(row) ?? []
    if (!known.some((quote) => quote.toLowerCase() === words.toLowerCase()))
      quotes.set(row, [...known, words])
  }
  return [...quotes].map(([id, words]) => ({ id, quotes: words }))
}

/** Signs in the comment of a questionnaire. `before` is what the save before it stored; left out, all of it is read. */
export const flagsInComment = (comment: string | null, before?: string | null): QuotedFlag[] =>
  quotedFlags([{ text: readableText(comment, before) }], false)

/**
 * Signs in the free text of a history. An injury is what its question asks for, so it raises nothing there; how much it
 * hurts and when a hand was first preferred are answered with a figure where they are answered at all.
 */
export function flagsInHistoryWords(details: HistoryDetails, before?: HistoryDetails): QuotedFlag[] {
  const told: ReferralFlagId[] = [
    ...(details.pain === null ? [] : (['pain'] as const)),
    ...(details.firstNoticedMonths === null
      ? []
      : (['preference-before-12-months', 'preference-12-to-18-months'] as const)),
  ]
  const asked: Partial<Record<keyof HistoryDetails, ReferralFlagId>> = {
    injuryWhat: 'change-of-hand',
    painWhere: 'pain',
    lostSkillWhat: 'other-hand-or-lost-skill',
  }
  const written = (['lostSkillWhat', 'injuryWhat', 'painWhere', 'childsWords', 'anythingElse'] as const).map(
    (field) => {
      const own = asked[field]
      const text = readableText(details[field], before?.[field])
      return { text, except: own === undefined ? told : [...told, own] }
    },
  )
  const withHeadaches = redFlagsOfHistory(
    { ...details, newHeadache: 'yes' },
    { ageMonths: null, writingHand: null },
  )
  return quotedFlags(
    written,
    withHeadaches.every(({ id }) => id !== 'new-headaches'),
  )
}
