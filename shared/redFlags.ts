import type { RedFlagHistory } from './redFlagHistory.ts'

/*
 * Red flags in the answers of a history, where referralFlags.ts reads the words of a referral. A flag asks a clinician to
 * look; it is never a diagnosis. It rests on what was reported, and what is not known raises nothing by itself.
 */

export const redFlagUrgencies = ['same_day', 'priority', 'medical_review', 'safeguarding', 'ask'] as const
export type RedFlagUrgency = (typeof redFlagUrgencies)[number]

export interface RedFlag {
  id: string
  urgency: RedFlagUrgency
  /** What was reported. */
  words: string
  /** What to do now. */
  action: string
  source: string
}

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

const emergency =
  'Tell the family today to seek medical help under your local emergency guidance; do not wait for an appointment here.'
const guideline = 'NICE NG127 (2019), as summarised on a clinicians’ reference page'
const earlyDetection = 'Canadian early-detection prompts; Boychuck et al. 2020, Dev Med Child Neurol 62:89-96'
const consensus = 'Clinical consensus, from memory'

type Rule = (history: RedFlagHistory) => RedFlag | null

const reported = (parts: (string | false)[]): string => parts.filter((part) => part !== false).join(', ')

const suddenChange: Rule = (history) => {
  const signs = reported([
    history.newWeakness === true && 'new weakness',
    history.numbness === true && 'numbness',
    history.faceDroop === true && 'a drooping face',
    history.newHeadache === true && history.handChanged === true && 'headaches',
    history.seizure === true && 'a seizure',
  ])
  if (signs === '') return null
  const change = history.handChanged === true ? 'The child has changed hands, with' : 'There is'
  return {
    id: 'new-neurological-signs',
    urgency: 'same_day',
    words: `${change} ${signs}. New one-sided weakness is urgent even after a fall.`,
    action: emergency,
    source: 'Bhate & Ganesan 2015 (abstract); wording from memory',
  }
}

const tremorRule: Rule = ({ tremor, tremorSudden, otherNeurologicalSigns }) => {
  const flag = tremorFlag(tremor, tremorSudden, otherNeurologicalSigns)
  if (flag === 'none') return null
  if (flag === 'urgent') {
    const words = 'There is a tremor that came suddenly or with other neurological signs.'
    return { id: 'sudden-tremor', urgency: 'same_day', words, action: emergency, source: guideline }
  }
  return {
    id: 'tremor',
    urgency: 'ask',
    words: 'There is a tremor.',
    action:
      'Ask whether it gets in the way of writing, eating or dressing, and which medicines the child takes.',
    source: guideline,
  }
}

const earlyPreference: Rule = ({ firstPreferenceMonths, preferenceConsistent, gestationWeeks }) => {
  if (firstPreferenceMonths === null) return null
  const months = correctedMonths(firstPreferenceMonths, gestationWeeks)
  const flag = earlyHandPreferenceFlag(months, preferenceConsistent)
  if (flag === 'none') return null
  const uncorrected = gestationWeeks === null ? ' (weeks of pregnancy not known, so not corrected)' : ''
  const words = `One hand was preferred from about ${firstPreferenceMonths} months${uncorrected}.`
  if (flag === 'refer') {
    return {
      id: 'preference-before-12-months',
      urgency: 'priority',
      words,
      action: 'Suggest a referral to the child development service before therapy starts.',
      source: `${guideline}; ${earlyDetection}`,
    }
  }
  return {
    id: 'preference-12-to-18-months',
    urgency: 'ask',
    words,
    action: 'Ask about a weaker or stiffer side, fisting and late milestones. The therapist decides.',
    source: 'Clinic rule; patient pages say before 18 months, guidelines before 12',
  }
}

const otherHand: Rule = (history) => {
  const signs = reported([
    history.otherHandHardlyUsed === true && 'the other hand is hardly used',
    history.otherHandFisted === true && 'the other hand is often held in a fist',
    history.dropsThings === true && 'things are dropped',
    lossOfSkillFlag(history.lostSkill) === 'refer' && 'a skill has been lost',
  ])
  if (signs === '') return null
  return {
    id: 'other-hand-or-lost-skill',
    urgency: 'medical_review',
    words: `It is reported that ${signs}.`,
    action: 'Ask for a medical review; do not book a routine block first.',
    source: `${guideline}; ${earlyDetection}`,
  }
}

const changeOfHand: Rule = (history) => {
  if (history.handChanged !== true || suddenChange(history) !== null) return null
  const cause = history.armInjury === true ? ' after pain, an injury or a plaster' : ''
  return {
    id: 'change-of-hand',
    urgency: 'medical_review',
    words: `The child has changed hands${cause}.`,
    action: 'Ask for a medical review and record the date and the cause.',
    source: consensus,
  }
}

const punished: Rule = ({ punishedForHand }) => {
  if (punishedForHand !== true) return null
  return {
    id: 'punished-for-hand',
    urgency: 'safeguarding',
    words: 'The child has been punished for using the left hand.',
    action: 'Follow your local safeguarding procedure; keep the note restricted and out of every letter.',
    source: consensus,
  }
}

const notBrought: Rule = ({ notBroughtInSixMonths }) => {
  if (notBroughtInSixMonths === null || notBroughtInSixMonths < 2) return null
  return {
    id: 'not-brought',
    urgency: 'safeguarding',
    words: `The child was not brought ${notBroughtInSixMonths} times in six months.`,
    action:
      'Talk with the lead about the child’s welfare and follow your local procedure; do not discharge for it.',
    source: 'Safeguarding procedures and a general practitioners’ toolkit; the count is the clinic’s own',
  }
}

const pain: Rule = ({ painAfter }) => {
  if (painAfter === null || painAfter < 4) return null
  return {
    id: 'pain',
    urgency: 'ask',
    words: `Writing hurts (${painAfter} out of 10).`,
    action:
      'A therapist looks before there is more practice; think about the child’s welfare, and ask for a medical review if the pain is new or lasts.',
    source: consensus,
  }
}

const swapping: Rule = ({ ageMonths, swapsWithinTask }) => {
  if (swapsWithinTask !== true || ageMonths === null || ageMonths < 72) return null
  return {
    id: 'swaps-within-task',
    urgency: 'ask',
    words: 'The hand changes during one job at six or older.',
    action: 'Plan a full assessment, and ask kindly whether anyone has asked the child to use another hand.',
    source: consensus,
  }
}

const wideDifficulty: Rule = ({ wideMotorDifficulty }) => {
  if (wideMotorDifficulty !== true) return null
  return {
    id: 'wide-motor-difficulty',
    urgency: 'ask',
    words: 'Movement takes effort in many activities, not only with the hands.',
    action: 'Consider an assessment of coordination. Left-handedness is not the cause.',
    source: 'Darvik, Loras & Pedersen 2018, Front Psychol 9:1948: an association, not a cause',
  }
}

const rules: readonly Rule[] = [
  ...[suddenChange, tremorRule, earlyPreference, otherHand, changeOfHand],
  ...[punished, notBrought, pain, swapping, wideDifficulty],
]

/** Every flag the history raises, most urgent first. */
export const redFlags = (history: RedFlagHistory): RedFlag[] =>
  rules
    .map((rule) => rule(history))
    .filter((flag) => flag !== null)
    .toSorted((a, b) => redFlagUrgencies.indexOf(a.urgency) - redFlagUrgencies.indexOf(b.urgency))
