import { skillGapAgainst } from './skillGap.ts'
import type { RedFlagHistory } from './redFlagHistory.ts'
import { redFlagRows, redFlagUrgencies, type RedFlagId, type RedFlagRow } from './redFlagRows.ts'

/*
 * Red flags in what was reported or measured, where referralFlags.ts reads the words of a referral. What is not known
 * raises nothing by itself.
 */

export interface RedFlag extends RedFlagRow {
  /** What was reported. */
  words: string
  /** The single signs behind the words, so that a further sign under a flag that stands already is told apart. */
  signs: readonly string[]
}

const raise = (id: RedFlagId, words: string, signs: readonly string[] = [id]): RedFlag => ({
  ...redFlagRows[id],
  words,
  signs,
})

/** Corrected months at a calendar age in months; the calendar age when born at 37 weeks or later, or not known. */
export function correctedMonths(months: number, gestationWeeks: number | null): number {
  if (gestationWeeks === null || gestationWeeks >= 37) return months
  const daysInAMonth = 365.25 / 12
  return months - ((40 - gestationWeeks) * 7) / daysInAMonth
}

/**
 * One-hand preference in infancy: refer below 12 months, watch from 12 to below 18 (sources differ), nothing from 18.
 * Takes the corrected age. A preference expressly reported as not steady raises nothing.
 */
export function earlyHandPreferenceFlag(
  correctedAgeMonths: number | null,
  consistent: boolean | null,
): 'refer' | 'watch' | 'none' {
  if (correctedAgeMonths === null || consistent === false) return 'none'
  if (correctedAgeMonths < 12) return 'refer'
  return correctedAgeMonths < 18 ? 'watch' : 'none'
}

/** Loss of a skill asks for a medical referral at any age. */
export const lossOfSkillFlag = (lostSkill: boolean | null): 'refer' | 'none' =>
  lostSkill === true ? 'refer' : 'none'

/** Tremor: urgent when sudden or with other neurological signs; otherwise therapy looks at what it gets in the way of. */
export function tremorFlag(
  tremor: boolean | null,
  sudden: boolean | null,
  otherSigns: boolean | null,
): 'urgent' | 'therapy_if_it_affects_daily_tasks' | 'none' {
  if (tremor !== true) return 'none'
  return sudden === true || otherSigns === true ? 'urgent' : 'therapy_if_it_affects_daily_tasks'
}

type Rule = (history: RedFlagHistory) => RedFlag | null

const listed = (signs: readonly string[]): string => signs.join(', ')
const reported = (parts: (string | false)[]): string[] => parts.filter((part) => part !== false)

const signsWithoutHeadache = (history: RedFlagHistory): string[] =>
  reported([
    history.newWeakness === true && 'new weakness',
    history.numbness === true && 'numbness',
    history.faceDroop === true && 'a drooping face',
    history.seizure === true && 'a seizure',
  ])

/** What makes new headaches a matter for the same day, beside the signs that are one by themselves. */
const besideHeadache = (history: RedFlagHistory): string[] =>
  reported([
    history.lostSkill === true && 'a lost skill',
    history.weakerSide === true && 'a weaker or stiffer side',
    history.tremor === true && 'a tremor',
    history.walkChanged === true && 'a change in the way of walking',
  ])

const suddenChange: Rule = (history) => {
  const others = signsWithoutHeadache(history)
  const beside = besideHeadache(history)
  const change =
    history.handChanged === true
      ? 'The child has changed hands, with'
      : history.handMayHaveChanged === true
        ? 'The child may have changed hands, with'
        : null
  const headache = history.newHeadache === true && (others.length > 0 || beside.length > 0 || change !== null)
  const signs = headache ? [...others, 'headaches'] : others
  if (signs.length === 0) return null
  const there = others.length > 0 ? 'There is' : 'There are'
  const together =
    headache && beside.length > 0 ? ` Told together with the headaches: ${listed(beside)}.` : ''
  return raise(
    'new-neurological-signs',
    `${change ?? there} ${listed(signs)}.${together} New one-sided weakness is urgent even after a fall.`,
    signs,
  )
}

/** Alone they are no emergency and no matter for therapy either: a doctor looks. */
const headachesAlone: Rule = (history) =>
  history.newHeadache === true && suddenChange(history) === null
    ? raise('new-headaches', 'There are new headaches that keep coming back.')
    : null

const tremorRule: Rule = ({ tremor, tremorSudden, otherNeurologicalSigns }) => {
  const flag = tremorFlag(tremor, tremorSudden, otherNeurologicalSigns)
  if (flag === 'none') return null
  return flag === 'urgent'
    ? raise('sudden-tremor', 'There is a tremor that came suddenly or with other neurological signs.')
    : raise('tremor', 'There is a tremor.')
}

const changedWalk: Rule = ({ walkChanged }) =>
  walkChanged === true ? raise('walk-changed', 'The way the child walks has changed newly.') : null

const earlyPreference: Rule = ({ firstPreferenceMonths, preferenceConsistent, gestationWeeks }) => {
  if (firstPreferenceMonths === null) return null
  const months = correctedMonths(firstPreferenceMonths, gestationWeeks)
  const flag = earlyHandPreferenceFlag(months, preferenceConsistent)
  if (flag === 'none') return null
  const counted =
    gestationWeeks === null
      ? ' (weeks of pregnancy not known, so not corrected)'
      : gestationWeeks < 37
        ? ` (about ${Math.floor(months)} months from the due date)`
        : ''
  const words = `One hand was preferred from about ${firstPreferenceMonths} months${counted}.`
  return raise(flag === 'refer' ? 'preference-before-12-months' : 'preference-12-to-18-months', words)
}

const otherHand: Rule = (history) => {
  const signs = reported([
    history.otherHandHardlyUsed === true && 'the other hand is hardly used',
    history.otherHandFisted === true && 'the other hand is often held in a fist',
    history.dropsThings === true && 'things often drop from the other hand',
    history.weakerSide === true && 'one side is weaker, stiffer or smaller',
    lossOfSkillFlag(history.lostSkill) === 'refer' && 'a skill has been lost',
  ])
  if (signs.length === 0) return null
  return raise('other-hand-or-lost-skill', `It is reported that ${listed(signs)}.`, signs)
}

const changeOfHand: Rule = (history) => {
  if (history.handChanged !== true || suddenChange(history) !== null) return null
  // Which came first is for the dates to tell.
  const besides =
    history.armInjury === true
      ? ' An injury, a plaster or an illness of arm, hand or head is reported too: compare the dates.'
      : ''
  const asked = history.askedToSwitch === true
  const pressure = asked
    ? ' Somebody has asked the child to use the other hand: ask kindly by whom and when, and leave the hand as it is.'
    : ''
  return raise('change-of-hand', `The child has changed hands.${besides}${pressure}`, [
    'change-of-hand',
    ...(asked ? ['asked to switch'] : []),
  ])
}

const punished: Rule = ({ punishedForHand }) =>
  punishedForHand === true
    ? raise('punished-for-hand', 'The child has been told off, punished or shamed for using a hand.')
    : null

/** Times in six months from which "was not brought" is looked at (clinic rule). */
const timesNotBrought = 2

const notBrought: Rule = ({ notBroughtInSixMonths }) =>
  notBroughtInSixMonths !== null && notBroughtInSixMonths >= timesNotBrought
    ? raise('not-brought', `The child was not brought ${notBroughtInSixMonths} times in six months.`)
    : null

/** Points out of 10 from which pain is looked at (clinic rule). */
const painToLookAt = 4

/** Each point from there up is a sign of its own, so that worse pain is something new and less pain is not. */
const painSigns = (points: number): string[] =>
  Array.from({ length: points - painToLookAt + 1 }, (_, step) => `pain of ${painToLookAt + step}`)

const pain: Rule = ({ painAfter }) =>
  painAfter !== null && painAfter >= painToLookAt
    ? raise('pain', `Writing hurts (${painAfter} out of 10).`, painSigns(painAfter))
    : null

/** Six years. */
const settledFromMonths = 72

const swapping: Rule = ({ ageMonths, swapsWithinTask }) =>
  swapsWithinTask === true && ageMonths !== null && ageMonths >= settledFromMonths
    ? raise('swaps-within-task', 'The hand changes during one job at six or older.')
    : null

const oppositeSkill: Rule = ({ writingHand, skills }) => {
  const tasks = skillGapAgainst(writingHand, skills)
  if (tasks.length === 0 || writingHand === null) return null
  const other = writingHand === 'left' ? 'right' : 'left'
  return raise(
    'skill-opposite-writing-hand',
    `The child writes with the ${writingHand} hand, and the ${other} hand did clearly better at: ${listed(tasks)}.`,
    tasks,
  )
}

const wideDifficulty: Rule = ({ wideMotorDifficulty, writingHand }) =>
  wideMotorDifficulty === true && writingHand !== 'right'
    ? raise('wide-motor-difficulty', 'Movement takes effort in many activities, not only with the hands.')
    : null

const lateMilestones: Rule = ({ satInTime, walkedInTime }) => {
  const signs = reported([
    satInTime === false && 'sat without help after 8 months',
    walkedInTime === false && 'walked after 18 months',
  ])
  return signs.length === 0 ? null : raise('late-milestones', `The child ${listed(signs)}.`, signs)
}

const rules: readonly Rule[] = [
  ...[suddenChange, tremorRule, changedWalk, headachesAlone, earlyPreference, otherHand, changeOfHand],
  ...[punished, pain, notBrought, swapping, oppositeSkill, wideDifficulty, lateMilestones],
]

/** Every flag that what is known raises, most urgent first. */
export const redFlags = (history: RedFlagHistory): RedFlag[] =>
  rules
    .map((rule) => rule(history))
    .filter((flag) => flag !== null)
    .toSorted((a, b) => redFlagUrgencies.indexOf(a.urgency) - redFlagUrgencies.indexOf(b.urgency))

/** Signs of `after` that `before` did not have, with the flags they stand under. */
export const newlyRaised = (before: readonly RedFlag[], after: readonly RedFlag[]): RedFlag[] =>
  after.filter(({ id, signs }) => {
    const known = before.find((flag) => flag.id === id)
    return known === undefined || signs.some((sign) => !known.signs.includes(sign))
  })
