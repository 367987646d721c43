import type { Attention } from './attention.ts'

/*
 * The clinic's table of red flags. A flag asks a clinician to look; it is never a diagnosis. Local codes, local emergency
 * arrangements and the licensed therapist's judgement come first.
 */

export const redFlagUrgencies = ['same_day', 'priority', 'medical_review', 'safeguarding', 'ask'] as const
export type RedFlagUrgency = (typeof redFlagUrgencies)[number]
export const redFlagUrgencyLabels: Record<RedFlagUrgency, string> = {
  same_day: 'Same-day medical help',
  priority: 'Priority',
  medical_review: 'Medical review',
  safeguarding: 'Think about welfare',
  ask: 'Ask and look',
}

/** How pressing a flag of this urgency is on lists and tasks. */
export const attentionOf: Record<RedFlagUrgency, Attention> = {
  same_day: 'overdue',
  priority: 'overdue',
  medical_review: 'overdue',
  safeguarding: 'due',
  ask: 'due',
}

export const redFlagIds = [
  'new-neurological-signs',
  'sudden-tremor',
  'walk-changed',
  'new-headaches',
  'preference-before-12-months',
  'preference-12-to-18-months',
  'other-hand-or-lost-skill',
  'change-of-hand',
  'punished-for-hand',
  'pain',
  'not-brought',
  'swaps-within-task',
  'skill-opposite-writing-hand',
  'wide-motor-difficulty',
  'late-milestones',
  'tremor',
] as const
export type RedFlagId = (typeof redFlagIds)[number]

export interface RedFlagRow {
  id: RedFlagId
  /** Name of the row, for a list to choose from. */
  title: string
  urgency: RedFlagUrgency
  /** What is usually done. */
  action: string
  /** No routine block is booked until a named person has written down what was done. */
  holdsBooking: boolean
  source: string
}

const emergency =
  'Tell the family today to seek medical help under your local emergency guidance; do not wait for an appointment here.'
const guideline = 'NICE NG127 (2019), as summarised on a clinicians’ reference page'
const earlyDetection = 'Canadian early-detection prompts; Boychuck et al. 2020, Dev Med Child Neurol 62:89-96'
const consensus = 'Clinical consensus, from memory'

export const redFlagRows: Record<RedFlagId, RedFlagRow> = {
  'new-neurological-signs': {
    id: 'new-neurological-signs',
    title: 'New weakness, numbness, drooping face, a new seizure, or new headaches with another sign',
    urgency: 'same_day',
    action: emergency,
    holdsBooking: true,
    source: 'Bhate & Ganesan 2015 (abstract); wording from memory',
  },
  'sudden-tremor': {
    id: 'sudden-tremor',
    title: 'Tremor that came suddenly or with other new signs',
    urgency: 'same_day',
    action: emergency,
    holdsBooking: true,
    source: guideline,
  },
  'walk-changed': {
    id: 'walk-changed',
    title: 'New change in the way of walking',
    urgency: 'same_day',
    action: emergency,
    holdsBooking: true,
    source: guideline,
  },
  'new-headaches': {
    id: 'new-headaches',
    title: 'New headaches that keep coming back, with no other sign',
    urgency: 'medical_review',
    action:
      'Ask the family to have a doctor look at the headaches soon; with any other new sign it is the same day.',
    holdsBooking: false,
    source: consensus,
  },
  'preference-before-12-months': {
    id: 'preference-before-12-months',
    title: 'One hand preferred before 12 months (counted from the due date if born early)',
    urgency: 'priority',
    action: 'Suggest a referral to the child development service before therapy starts.',
    holdsBooking: true,
    source: `${guideline}; ${earlyDetection}`,
  },
  'preference-12-to-18-months': {
    id: 'preference-12-to-18-months',
    title: 'One hand preferred between 12 and 18 months',
    urgency: 'ask',
    action: 'Ask about a weaker or stiffer side, fisting and late milestones. The therapist decides.',
    holdsBooking: false,
    source: 'Clinic rule; patient pages say before 18 months, guidelines before 12',
  },
  'other-hand-or-lost-skill': {
    id: 'other-hand-or-lost-skill',
    title: 'Other hand hardly used, fisted or weaker, things dropped, or a skill lost',
    urgency: 'medical_review',
    action: 'Ask for a medical review; do not book a routine block first.',
    holdsBooking: true,
    source: `${guideline}; ${earlyDetection}`,
  },
  'change-of-hand': {
    id: 'change-of-hand',
    title: 'Change of hand without new signs (pain, injury, plaster or not known why)',
    urgency: 'medical_review',
    action: 'Ask for a medical review and record the date and the cause.',
    holdsBooking: false,
    source: consensus,
  },
  'punished-for-hand': {
    id: 'punished-for-hand',
    title: 'Punished or shamed for using a hand',
    urgency: 'safeguarding',
    action: 'Follow your local safeguarding procedure; keep the note restricted and out of every letter.',
    holdsBooking: false,
    source: consensus,
  },
  pain: {
    id: 'pain',
    title: 'Pain of 4 or more out of 10 when writing',
    urgency: 'safeguarding',
    action:
      'A therapist looks before there is more practice; think about the child’s welfare, and ask for a medical review if the pain is new or lasts.',
    holdsBooking: false,
    source: consensus,
  },
  'not-brought': {
    id: 'not-brought',
    title: 'Not brought twice or more in six months',
    urgency: 'safeguarding',
    action:
      'Talk with the lead about the child’s welfare and follow your local procedure; do not discharge for it.',
    holdsBooking: false,
    source: 'Safeguarding procedures and a general practitioners’ toolkit; the count is the clinic’s own',
  },
  'swaps-within-task': {
    id: 'swaps-within-task',
    title: 'Hand changes during one job at six or older',
    urgency: 'ask',
    action: 'Plan a full assessment, and ask kindly whether anyone has asked the child to use another hand.',
    holdsBooking: false,
    source: consensus,
  },
  'skill-opposite-writing-hand': {
    id: 'skill-opposite-writing-hand',
    title: 'The hand that does not write is clearly the more skilled one',
    urgency: 'ask',
    action: 'Plan a full assessment, and ask kindly whether anyone has asked the child to use another hand.',
    holdsBooking: false,
    source: consensus,
  },
  'wide-motor-difficulty': {
    id: 'wide-motor-difficulty',
    title: 'Movement takes effort in many activities',
    urgency: 'ask',
    action: 'Consider an assessment of coordination. Left-handedness is not the cause.',
    holdsBooking: false,
    source:
      'Darvik, Loras & Pedersen 2018, Front Psychol 9:1948: 14.7 % left-handed with a coordination disorder, 8.1 % without; an association, not a cause',
  },
  'late-milestones': {
    id: 'late-milestones',
    title: 'Sat after 8 months or walked after 18 months (counted from the due date if born early)',
    urgency: 'ask',
    action: 'Ask whether a doctor has looked at it and how both sides move; the therapist decides.',
    holdsBooking: false,
    source: guideline,
  },
  tremor: {
    id: 'tremor',
    title: 'Tremor that has been there for a while',
    urgency: 'ask',
    action:
      'Ask whether it gets in the way of writing, eating or dressing, and which medicines the child takes.',
    holdsBooking: false,
    source: guideline,
  },
}
