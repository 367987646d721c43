import {
  handUseAnswerLabels,
  type CutOffSet,
  type CutOffSetId,
  type HandUseAnswer,
  type HandUseDirection,
  type HandUseStanding,
} from './handUse.ts'
import type { Informant } from './questionnaires.ts'

/** How the answers of a form become a score. The methods are code, cited where they stand; forms are data. */
export const scoringMethods = [
  'edinburgh_style',
  'two_marks',
  'one_mark',
  'mean_of_five',
  'demonstrated_actions',
] as const
export type ScoringMethod = (typeof scoringMethods)[number]

export interface FormItem {
  id: string
  /** Asked of an adult about the child. */
  label: string
  /** Said to the child, who shows it; null where it is only asked. */
  childLabel: string | null
  /** A caution or a safe substitute that stands beside the item; null when none is needed. */
  caution: string | null
}

/** One edition of a form, as stored in the database. */
export interface FormDefinition {
  title: string
  /** What it is for, in a sentence. */
  purpose: string
  scoring: ScoringMethod
  items: FormItem[]
  /** Answers offered, in order; "not answered yet" (null) is always possible. */
  options: HandUseAnswer[]
  /** Who may answer it. */
  informants: Informant[]
  /** Method, year and journal; what was read and what is from memory; that the wording is our own. */
  citation: string
  /** Stand beside the score. */
  cautions: string[]
  /** Bounds that belong to this form; null leaves the choice to the clinic's settings. */
  cutOffSet: CutOffSetId | null
}

/** The clinic's everyday form: the one to begin with unless there is a reason for another. */
export const everydayFormKey = 'hand-use-10'

/** A form with its name in the database: `<key>.v<edition>`. */
export interface FormView {
  id: string
  key: string
  edition: number
  definition: FormDefinition
  retiredAt: string | null
}

/** What a form that does not ask for "always" calls its answers: "mostly" would say more than was asked. */
const plainLabels: Record<HandUseAnswer, string> = {
  ...handUseAnswerLabels,
  left: 'Left hand',
  either: 'Either hand',
  right: 'Right hand',
}

/** What an answer is called on a form that offers these options. */
export const answerLabel = (answer: HandUseAnswer, { options }: Pick<FormDefinition, 'options'>): string =>
  options.some((option) => option === 'strong_left' || option === 'strong_right')
    ? handUseAnswerLabels[answer]
    : plainLabels[answer]

/** Answers by item id. Null is "not answered yet"; "either hand" and "does not do this yet" are answers. */
export type FormAnswers = Record<string, HandUseAnswer | null>

export interface FormScore {
  formVersion: string
  method: ScoringMethod
  /** Marks for each hand; null where the method has none (mean of five, demonstrated actions). */
  right: number | null
  left: number | null
  /** Sum of the demonstrated actions, 8 to 24; null for every other method. */
  total: number | null
  /** Items answered with a hand or with either. */
  answered: number
  doesNotDo: number
  unanswered: number
  /** −100 (left) … +100 (right), unrounded; null when not scorable. */
  quotient: number | null
  /** Share (0 to 1) of "always" among the answers that name a side; null when none does or the form does not ask it. */
  strength: number | null
  standing: HandUseStanding
  direction: HandUseDirection | null
  cutOffs: CutOffSet
}
