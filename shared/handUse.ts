import { lateralityQuotient, type HandCounts } from './laterality.ts'

export const handUseAnswers = [
  'strong_left',
  'left',
  'either',
  'right',
  'strong_right',
  'does_not_do',
] as const
export type HandUseAnswer = (typeof handUseAnswers)[number]
export const handUseAnswerLabels: Record<HandUseAnswer, string> = {
  strong_left: 'Left, always',
  left: 'Left, mostly',
  either: 'Either hand',
  right: 'Right, mostly',
  strong_right: 'Right, always',
  does_not_do: 'Does not do this yet',
}

export interface HandUseItem {
  id: string
  /** Asked of an adult about the child. */
  label: string
  /** Said to the child, who shows it. */
  childLabel: string
}

export interface HandUseForm {
  version: string
  title: string
  items: readonly HandUseItem[]
  source: string
}

/**
 * Ten everyday activities in our own words, safe for ages 4 to 14: nothing sharp, nothing that burns, nothing many
 * children never do. A changed wording is a new version; answers keep the version they were given to.
 */
export const handUseFormV1: HandUseForm = {
  version: 'hand-use-10.v1',
  title: 'Hand use in ten everyday activities',
  items: [
    { id: 'draws_writes', label: 'Draws or writes', childLabel: 'Draw me something you like.' },
    { id: 'throws', label: 'Throws a small ball', childLabel: 'Throw this soft ball to me.' },
    { id: 'scissors', label: 'Cuts paper with child-safe scissors', childLabel: 'Cut along this paper.' },
    { id: 'toothbrush', label: 'Brushes teeth', childLabel: 'Show me how you brush your teeth.' },
    { id: 'spoon', label: 'Eats with a spoon', childLabel: 'Show me how you eat with a spoon.' },
    {
      id: 'spreads',
      label: 'Spreads or cuts soft food with a table knife',
      childLabel: 'Spread this dough for me.',
    },
    {
      id: 'unscrews_lid',
      label: 'Unscrews a lid: which hand turns',
      childLabel: 'Open this jar. What is inside?',
    },
    { id: 'picks_up', label: 'Picks up something small', childLabel: 'Pick up one of these beads.' },
    { id: 'eraser', label: 'Rubs out with an eraser', childLabel: 'Rub out this line.' },
    { id: 'taps_screen', label: 'Taps a touch screen', childLabel: 'Tap the picture on the screen.' },
  ],
  source:
    'Edinburgh-style questionnaire: quotient after Oldfield 1971, Neuropsychologia 9:97-113. Activities and wording ' +
    'are this clinic’s own and made safe for children; no child norms are claimed.',
}

const pointsOf: Record<Exclude<HandUseAnswer, 'does_not_do'>, HandCounts> = {
  strong_left: { left: 2, right: 0 },
  left: { left: 1, right: 0 },
  either: { left: 1, right: 1 },
  right: { left: 0, right: 1 },
  strong_right: { left: 0, right: 2 },
}

/** Points for one answer; null for "does not do this yet", which is left out and never counts as either hand. */
export const answerPoints = (answer: HandUseAnswer): HandCounts | null =>
  answer === 'does_not_do' ? null : pointsOf[answer]

export interface CutOffSet {
  id: string
  label: string
  /** Quotient at which the label "left" starts. */
  left: number
  /** Quotient at which the label "right" starts. */
  right: number
  /** Whether a quotient exactly on a cut-off belongs to the side (true) or to the middle (false). */
  inclusive: boolean
  source: string
}

/** Authors do not agree on cut-offs, so the set used is named and stored with every result. */
export const cutOffSets = [
  {
    id: 'clinic-40',
    label: '40 either side',
    left: -40,
    right: 40,
    inclusive: true,
    source: 'Used in several public analysis scripts and one course page; the clinic’s default.',
  },
  {
    id: 'sign-only',
    label: 'Left below zero, right above',
    left: 0,
    right: 0,
    inclusive: false,
    source: 'Called the easiest split to justify in a university scoring note on handedness questionnaires.',
  },
  {
    id: 'sixty',
    label: '60 either side',
    left: -60,
    right: 60,
    inclusive: false,
    source: 'Veale 2014, Laterality 19:164-177, for a four-item form with adults; bounds from memory.',
  },
] as const satisfies readonly CutOffSet[]
export type CutOffSetId = (typeof cutOffSets)[number]['id']
export const defaultCutOffSet: CutOffSet = cutOffSets[0]

/** The set of that name, or null when no such set is known. */
export const cutOffSetById = (id: string): CutOffSet | null => cutOffSets.find((set) => set.id === id) ?? null

export type HandUseStanding = 'scorable' | 'provisional' | 'not_scorable'
export const handUseStandingLabels: Record<HandUseStanding, string> = {
  scorable: 'Scorable',
  provisional: 'Provisional: fewer than 8 activities answered',
  not_scorable: 'Not scorable: fewer than 6 activities answered',
}
export type HandUseDirection = 'left' | 'mixed' | 'right'
export const handUseDirectionLabels: Record<HandUseDirection, string> = {
  left: 'Left',
  mixed: 'Mixed',
  right: 'Right',
}

/** Clinic rule, not a published one: how many answers a quotient needs. */
export const leastForProvisional = 6
export const leastForScorable = 8

export interface HandUseScore {
  formVersion: string
  right: number
  left: number
  /** Activities answered with a hand or with either. */
  answered: number
  doesNotDo: number
  unanswered: number
  /** Laterality quotient, unrounded; null when not scorable. */
  quotient: number | null
  /** Share (0 to 1) of "always" among the answers that name a side; null when none does. */
  strength: number | null
  standing: HandUseStanding
  direction: HandUseDirection | null
  cutOffs: CutOffSet
}

/** The side a quotient is called under a set of cut-offs. */
export function directionOf(
  quotient: number,
  cutOffs: Pick<CutOffSet, 'left' | 'right' | 'inclusive'>,
): HandUseDirection {
  if (quotient < cutOffs.left || (cutOffs.inclusive && quotient === cutOffs.left)) return 'left'
  if (quotient > cutOffs.right || (cutOffs.inclusive && quotient === cutOffs.right)) return 'right'
  return 'mixed'
}

/** Ids of activities still without an answer, in the order of the form. */
export const unansweredItems = (
  answers: Readonly<Record<string, HandUseAnswer | null>>,
  form: HandUseForm = handUseFormV1,
): string[] => form.items.map((item) => item.id).filter((id) => (answers[id] ?? null) === null)

/** Scores a form. A missing answer is never a score: it only lowers the number answered. */
export function scoreHandUse(
  answers: Readonly<Record<string, HandUseAnswer | null>>,
  cutOffs: CutOffSet = defaultCutOffSet,
  form: HandUseForm = handUseFormV1,
): HandUseScore {
  const given = form.items.map((item) => answers[item.id] ?? null).filter((answer) => answer !== null)
  const points = given.map(answerPoints).filter((point) => point !== null)
  const left = points.reduce((sum, point) => sum + point.left, 0)
  const right = points.reduce((sum, point) => sum + point.right, 0)
  const strong = given.filter((answer) => answer === 'strong_left' || answer === 'strong_right').length
  const sided = strong + given.filter((answer) => answer === 'left' || answer === 'right').length

  const enough = points.length >= leastForProvisional
  const quotient = enough ? lateralityQuotient({ left, right }) : null
  return {
    formVersion: form.version,
    right,
    left,
    answered: points.length,
    doesNotDo: given.length - points.length,
    unanswered: form.items.length - given.length,
    quotient,
    strength: sided === 0 ? null : strong / sided,
    standing:
      quotient === null ? 'not_scorable' : points.length < leastForScorable ? 'provisional' : 'scorable',
    direction: quotient === null ? null : directionOf(quotient, cutOffs),
    cutOffs,
  }
}
