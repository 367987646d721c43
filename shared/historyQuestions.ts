import type { FamilyHands, HandConsistency, HistoryDetails, RelativeHand, YesNoUnsure } from './histories.ts'
import { correctedMonths } from './redFlags.ts'

/*
 * The questions of the history as data: one list for the family's phone, one group a page, and for the therapist's page.
 * Our own plain words. `{name}` is the child. A question that may alarm says why it is asked.
 */

export type FamilyField = Exclude<keyof FamilyHands, 'siblingsUnsure'>
type UnsureField =
  'gestationUnsure' | 'firstNoticedUnsure' | 'handChangedOnUnsure' | 'injuryOnUnsure' | 'painUnsure'
/** Where an answer is kept in `HistoryDetails`. */
export type HistoryField = Exclude<keyof HistoryDetails, UnsureField | 'family'> | `family.${FamilyField}`

export type AnswerKind =
  | {
      kind: 'choice'
      options: readonly { value: YesNoUnsure | HandConsistency | RelativeHand; label: string }[]
    }
  | { kind: 'number'; unit: string; min: number; max: number }
  | { kind: 'scale'; from: string; to: string }
  | { kind: 'day' }
  | { kind: 'text'; max: number; rows: number }

export interface HistoryQuestion {
  id: HistoryField
  label: string
  hint?: string
  /** Why it is asked, where the question itself could alarm. */
  why?: string
  answer: AnswerKind
  /** The box "not sure", for answers that are not a choice of words. */
  unsure?: UnsureField | 'family.siblingsUnsure'
  /** Asked only when this holds; left out when it is always asked. */
  asked?: (details: HistoryDetails) => boolean
  /** Good to have; not counted as missing. */
  optional?: true
  /** The history is not sent without it. */
  required?: true
}

export interface HistoryGroup {
  id: string
  title: string
  intro?: string
  questions: readonly HistoryQuestion[]
}

const yesNo: AnswerKind = {
  kind: 'choice',
  options: [
    { value: 'yes', label: 'Yes' },
    { value: 'no', label: 'No' },
    { value: 'unsure', label: 'Not sure' },
  ],
}
const whichHand: AnswerKind = {
  kind: 'choice',
  options: [
    { value: 'left', label: 'Left' },
    { value: 'right', label: 'Right' },
    { value: 'both', label: 'Both' },
    { value: 'unsure', label: 'Not sure' },
  ],
}
const text = (max: number, rows: number): AnswerKind => ({ kind: 'text', max, rows })

const oftenOrdinary = 'There are often quite ordinary reasons for a yes. It tells us what to look at.'
const soThatADoctor =
  'We ask everybody, because these are things a doctor should look at soon if they are new.'

export const historyGroups: readonly HistoryGroup[] = [
  {
    id: 'child',
    title: 'What {name} enjoys',
    questions: [
      {
        id: 'enjoys',
        label: 'What does {name} enjoy and do well?',
        hint: 'Games, people, places, things {name} is proud of. Our plans begin with this.',
        answer: text(1000, 4),
        required: true,
      },
      {
        id: 'childsWords',
        label: 'What does {name} say about using their hands, in their own words?',
        hint: 'Ask {name} if you can: “What is easy for your hands? What would you like to be easier?”',
        answer: text(1000, 4),
      },
    ],
  },
  {
    id: 'hand',
    title: 'Which hand',
    questions: [
      {
        id: 'firstNoticedMonths',
        label: 'How old was {name} when you first noticed that one hand was used more?',
        hint: 'In months: 18 is a year and a half, 36 is three years. Your best guess will do.',
        answer: { kind: 'number', unit: 'months', min: 0, max: 168 },
        unsure: 'firstNoticedUnsure',
      },
      {
        id: 'earlySteady',
        label: 'Was it nearly always the same hand at that time?',
        answer: yesNo,
        asked: ({ firstNoticedMonths, gestationWeeks }) =>
          firstNoticedMonths !== null && correctedMonths(firstNoticedMonths, gestationWeeks) < 18,
      },
      {
        id: 'consistency',
        label: 'How steady is the hand that {name} uses now?',
        answer: {
          kind: 'choice',
          options: [
            { value: 'always', label: 'Always the same hand' },
            { value: 'mostly', label: 'Mostly the same hand' },
            { value: 'swaps_between_tasks', label: 'One hand for some things, the other for others' },
            { value: 'swaps_within_task', label: 'Changes hands in the middle of one thing' },
            { value: 'unsure', label: 'Not sure' },
          ],
        },
      },
    ],
  },
  {
    id: 'changes',
    title: 'Has the hand changed?',
    questions: [
      {
        id: 'handChanged',
        label: 'Has {name} changed from mostly using one hand to mostly using the other?',
        hint: 'Not changing to and fro while growing up, but a change that stayed.',
        answer: yesNo,
      },
      {
        id: 'handChangedOn',
        label: 'When did that happen?',
        hint: 'If you do not know the day, the first of that month is near enough.',
        answer: { kind: 'day' },
        unsure: 'handChangedOnUnsure',
        asked: ({ handChanged }) => handChanged === 'yes',
      },
      {
        id: 'askedToSwitch',
        label: 'Has anybody ever asked {name} to use the other hand?',
        hint: 'At home, at school, in the wider family or anywhere else.',
        answer: yesNo,
      },
      {
        id: 'askedToSwitchBy',
        label: 'Who asked?',
        hint: 'For example “a teacher”. No names are needed.',
        answer: text(200, 1),
        asked: ({ askedToSwitch }) => askedToSwitch === 'yes',
      },
      {
        id: 'askedToSwitchAge',
        label: 'How old was {name} then?',
        answer: { kind: 'number', unit: 'years', min: 0, max: 17 },
        asked: ({ askedToSwitch }) => askedToSwitch === 'yes',
        optional: true,
      },
      {
        id: 'punishedForHand',
        label: 'Has {name} ever been told off, punished or made to feel ashamed for using a hand?',
        why: 'This still happens to some children. Knowing it helps us to be kind and to keep {name} safe.',
        answer: yesNo,
      },
    ],
  },
  {
    id: 'family',
    title: 'Hands in the family',
    intro:
      'This is about the family {name} was born into. “Not sure” is a fine answer, for example after adoption or in a foster family.',
    questions: [
      { id: 'family.mother', label: 'Which hand does the mother write with?', answer: whichHand },
      { id: 'family.father', label: 'Which hand does the father write with?', answer: whichHand },
      {
        id: 'family.siblings',
        label: 'How many brothers and sisters?',
        answer: { kind: 'number', unit: 'children', min: 0, max: 20 },
        unsure: 'family.siblingsUnsure',
      },
      {
        id: 'family.leftHandedSiblings',
        label: 'How many of them write with the left hand?',
        answer: { kind: 'number', unit: 'children', min: 0, max: 20 },
        asked: ({ family }) => family.siblings !== null && family.siblings > 0,
      },
      { id: 'family.twin', label: 'Is {name} a twin?', answer: yesNo },
      {
        id: 'family.others',
        label: 'Other relatives who write with the left hand',
        hint: 'For example “grandfather”. No names are needed.',
        answer: text(300, 1),
        optional: true,
      },
    ],
  },
  {
    id: 'start',
    title: 'The first years',
    questions: [
      {
        id: 'gestationWeeks',
        label: 'How many weeks did the pregnancy last?',
        hint: 'Full weeks. Around 40 is usual; the baby book often has it.',
        why: 'When a baby is born early, we count ages from the day it was expected.',
        answer: { kind: 'number', unit: 'weeks', min: 22, max: 44 },
        unsure: 'gestationUnsure',
      },
      {
        id: 'satInTime',
        label: 'Could {name} sit without help by 8 months?',
        hint: 'If {name} was born early, count from the day the baby was expected.',
        answer: yesNo,
      },
      {
        id: 'walkedInTime',
        label: 'Could {name} walk without help by 18 months?',
        hint: 'If {name} was born early, count from the day the baby was expected.',
        answer: yesNo,
      },
    ],
  },
  {
    id: 'health',
    title: 'Arm, hand and head',
    questions: [
      {
        id: 'injury',
        label: 'Has {name} had an injury, a plaster or an illness of the arm, the hand or the head?',
        answer: yesNo,
      },
      {
        id: 'injuryWhat',
        label: 'What was it?',
        answer: text(500, 2),
        asked: ({ injury }) => injury === 'yes',
      },
      {
        id: 'injuryOn',
        label: 'When was it?',
        hint: 'If you do not know the day, the first of that month is near enough.',
        answer: { kind: 'day' },
        unsure: 'injuryOnUnsure',
        asked: ({ injury }) => injury === 'yes',
      },
      {
        id: 'visionChecked',
        label: 'Has somebody checked {name}’s eyes in the last two years?',
        answer: yesNo,
      },
      {
        id: 'hearingChecked',
        label: 'Has somebody checked {name}’s hearing?',
        answer: yesNo,
      },
    ],
  },
  {
    id: 'new-signs',
    title: 'Anything new?',
    intro: `${soThatADoctor} For most children every answer on this page is no.`,
    questions: [
      { id: 'newWeakness', label: 'Is an arm, a leg or one side newly weak?', answer: yesNo },
      { id: 'numbness', label: 'Is an arm, a leg or one side newly numb or tingling?', answer: yesNo },
      { id: 'faceDroop', label: 'Has one side of the face begun to droop?', answer: yesNo },
      { id: 'newHeadache', label: 'Are there new headaches that keep coming back?', answer: yesNo },
      {
        id: 'seizure',
        label: 'Has there been a seizure (a fit) that is new, or that no doctor has looked at?',
        answer: yesNo,
      },
      {
        id: 'walkChanged',
        label: 'Has the way {name} walks changed in the last weeks?',
        hint: 'Not when it is explained by an injury that has been looked at.',
        answer: yesNo,
      },
      {
        id: 'lostSkill',
        label: 'Is there something {name} could do before and cannot do any more?',
        answer: yesNo,
      },
      {
        id: 'lostSkillWhat',
        label: 'What was it, and since when?',
        answer: text(500, 2),
        asked: ({ lostSkill }) => lostSkill === 'yes',
      },
    ],
  },
  {
    id: 'other-hand',
    title: 'The other hand',
    intro: `These questions are about the hand that {name} uses less. ${oftenOrdinary}`,
    questions: [
      {
        id: 'otherHandHardlyUsed',
        label: 'Is the other hand hardly used, even for holding and steadying?',
        answer: yesNo,
      },
      { id: 'otherHandFisted', label: 'Is the other hand often held in a fist?', answer: yesNo },
      { id: 'dropsThings', label: 'Do things often drop from the other hand?', answer: yesNo },
      {
        id: 'weakerSide',
        label: 'Is one arm or leg weaker, stiffer or smaller than the other?',
        answer: yesNo,
      },
      {
        id: 'tremor',
        label: 'Do {name}’s hands shake?',
        hint: 'When reaching, writing or holding them still.',
        answer: yesNo,
      },
      {
        id: 'tremorSudden',
        label: 'Did the shaking begin suddenly?',
        answer: yesNo,
        asked: ({ tremor }) => tremor === 'yes',
      },
      {
        id: 'wideMotorDifficulty',
        label: 'Do many movements take a lot of effort, not only with the hands?',
        hint: 'Running, riding a bicycle, dressing, ball games.',
        answer: yesNo,
      },
    ],
  },
  {
    id: 'pain',
    title: 'Writing and drawing',
    questions: [
      {
        id: 'pain',
        label: 'How much does it hurt after ten minutes of writing or drawing?',
        hint: '0 is not at all, 10 is the worst there could be. Let {name} choose if you can.',
        answer: { kind: 'scale', from: 'Not at all', to: 'The worst' },
        unsure: 'painUnsure',
      },
      {
        id: 'painWhere',
        label: 'Where does it hurt?',
        answer: text(200, 1),
        asked: ({ pain }) => pain !== null && pain > 0,
      },
      {
        id: 'anythingElse',
        label: 'Is there anything else you would like us to know?',
        answer: text(2000, 4),
        optional: true,
      },
    ],
  },
]

export const historyQuestions: readonly HistoryQuestion[] = historyGroups.flatMap(
  ({ questions }) => questions,
)
