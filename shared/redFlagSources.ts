import type { WritingHand } from './children.ts'
import type { HistoryDetails, YesNoUnsure } from './histories.ts'
import { unknownHistory } from './redFlagHistory.ts'
import { correctedMonths, redFlags, type RedFlag } from './redFlags.ts'
import type { Hand } from './roles.ts'
import type { HandSkill } from './skillGap.ts'

/* What each source of facts says in the words of redFlagHistory.ts: the history, a writing observation, measures, visits. */

export interface FlaggedChild {
  /** Completed months since birth on the day of the answer; null when not known. */
  ageMonths: number | null
  writingHand: WritingHand | null
}

const saidYes = (answer: YesNoUnsure | null): boolean | null =>
  answer === 'yes' ? true : answer === 'no' ? false : null

const settled = (hand: WritingHand | null): Hand | null => (hand === 'swaps' ? null : hand)

/** An infant who has a steady hand now shows that preference at today's age, whatever is remembered of earlier. */
const firstPreference = (
  { firstNoticedMonths, consistency, gestationWeeks }: HistoryDetails,
  ageMonths: number | null,
): number | null => {
  if (firstNoticedMonths !== null) return firstNoticedMonths
  const steady = consistency === 'always' || consistency === 'mostly'
  if (!steady || ageMonths === null) return null
  return correctedMonths(ageMonths, gestationWeeks) < 18 ? ageMonths : null
}

/** Flags in the answers of a history. "Not sure" and "not answered" raise nothing. */
export function redFlagsOfHistory(details: HistoryDetails, child: FlaggedChild): RedFlag[] {
  const newSigns = [
    ...[details.newWeakness, details.numbness, details.faceDroop, details.seizure],
    ...[details.newHeadache, details.walkChanged],
  ]
  return redFlags({
    ...unknownHistory,
    ageMonths: child.ageMonths,
    writingHand: settled(child.writingHand),
    firstPreferenceMonths: firstPreference(details, child.ageMonths),
    preferenceConsistent: saidYes(details.earlySteady),
    gestationWeeks: details.gestationWeeks,
    handChanged: saidYes(details.handChanged),
    handMayHaveChanged: details.handChanged === null ? null : details.handChanged === 'unsure',
    askedToSwitch: saidYes(details.askedToSwitch),
    newWeakness: saidYes(details.newWeakness),
    numbness: saidYes(details.numbness),
    faceDroop: saidYes(details.faceDroop),
    newHeadache: saidYes(details.newHeadache),
    seizure: saidYes(details.seizure),
    walkChanged: saidYes(details.walkChanged),
    armInjury: saidYes(details.injury),
    otherHandHardlyUsed: saidYes(details.otherHandHardlyUsed),
    otherHandFisted: saidYes(details.otherHandFisted),
    dropsThings: saidYes(details.dropsThings),
    weakerSide: saidYes(details.weakerSide),
    lostSkill: saidYes(details.lostSkill),
    tremor: saidYes(details.tremor),
    tremorSudden: saidYes(details.tremorSudden),
    otherNeurologicalSigns: newSigns.includes('yes') ? true : null,
    satInTime: saidYes(details.satInTime),
    walkedInTime: saidYes(details.walkedInTime),
    swapsWithinTask: details.consistency === null ? null : details.consistency === 'swaps_within_task',
    wideMotorDifficulty: saidYes(details.wideMotorDifficulty),
    painAfter: details.pain,
    punishedForHand: saidYes(details.punishedForHand),
  })
}

/** Flags in what was seen at the desk: pain, and a writing hand other than the one on record. */
export function redFlagsOfObservation(
  seen: { writingHand: WritingHand | null; painBefore: number | null; painAfter: number | null },
  child: FlaggedChild,
): RedFlag[] {
  const pains = [seen.painBefore, seen.painAfter].filter((points) => points !== null)
  const recorded = settled(child.writingHand)
  const shown = settled(seen.writingHand)
  const flags = redFlags({
    ...unknownHistory,
    ageMonths: child.ageMonths,
    painAfter: pains.length === 0 ? null : Math.max(...pains),
    handChanged: recorded === null || shown === null ? null : recorded !== shown,
    swapsWithinTask: seen.writingHand === 'swaps' ? true : null,
  })
  // One look at the desk shows the other hand, not that the child changed: the record may be out of date.
  return flags.map((flag) =>
    flag.id === 'change-of-hand'
      ? { ...flag, words: `The child wrote with the ${shown} hand; the record says the ${recorded}.` }
      : flag,
  )
}

/** The flag of a hand that does not write and clearly does better; for measures of skill. */
export const redFlagsOfSkill = (skills: readonly HandSkill[], writingHand: WritingHand | null): RedFlag[] =>
  redFlags({ ...unknownHistory, skills, writingHand: settled(writingHand) })

/** The flag of repeated visits to which the child was not brought; for the diary. */
export const redFlagsOfVisits = (notBroughtInSixMonths: number): RedFlag[] =>
  redFlags({ ...unknownHistory, notBroughtInSixMonths })

const joined = (signs: readonly string[]) =>
  signs.length < 2 ? signs.join('') : `${signs.slice(0, -1).join(', ')} and ${signs.at(-1)}`

const familySigns: Record<string, string> = {
  'sudden-tremor': 'a tremor that came suddenly or with other new signs',
  'walk-changed': 'a new change in the way of walking',
}

/** What the family reads at once when an answer calls for medical help on the same day; empty when none does. */
export function urgentWordsFor(details: HistoryDetails): string[] {
  const signs = redFlagsOfHistory(details, { ageMonths: null, writingHand: null })
    .filter(({ urgency }) => urgency === 'same_day')
    .flatMap((flag) => flag.signs.map((sign) => familySigns[sign] ?? sign))
  if (signs.length === 0) return []
  return [
    `You have told us about ${joined(signs)}. Please get medical help today; do not wait for an appointment with us. ` +
      'If it came suddenly or is getting worse, call the emergency number now, even if it came after a fall.',
    'This does not mean that we know what it is: it means that a doctor should look at it today. The clinic sees your answer as well, but nobody may be reading it at this moment.',
  ]
}
