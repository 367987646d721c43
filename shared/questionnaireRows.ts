import { compareDays, type Day } from './days.ts'
import { answerLabel, type FormAnswers, type FormScore, type FormView, type ScoringMethod } from './forms.ts'
import { standingWords } from './formScores.ts'
import { formatQuotient } from './laterality.ts'
import type { HandProfileRow, LateralDetails, LateralSide } from './lateralLine.ts'
import { informantLabels, type Informant } from './questionnaires.ts'

/** A locked response to any form, that no later one replaces. */
export interface LockedResponse {
  id: string
  form: FormView
  informant: Informant
  answeredOn: Day
  answers: FormAnswers
  score: FormScore
  /** ISO moment; tells two responses of one day apart. */
  lockedAt: string
}

const twoMarks =
  '100 × (R − L) ÷ (R + L), where R and L are the marks for each hand: two for “always”, one for “mostly”, one to each ' +
  'hand for “either hand”. Activities not answered or not done yet give no marks.'

const formulas: Record<ScoringMethod, string> = {
  edinburgh_style: twoMarks,
  two_marks: twoMarks,
  one_mark:
    '100 × (R − L) ÷ (R + L), where R and L are the marks for each hand: one for the hand used, whether always or ' +
    'mostly, one to each hand for “either hand”. Activities not answered or not done yet give no marks.',
  mean_of_five:
    'Mean over the answered activities of −100 (left, always), −50 (left, mostly), 0 (either hand), +50 (right, ' +
    'mostly) and +100 (right, always).',
  demonstrated_actions:
    'Sum of 1 (right), 2 (both) and 3 (left) over eight actions, from 8 to 24 with 16 in the middle. On the line: ' +
    '100 × (16 − sum) ÷ 8.',
}

function worked(score: FormScore): string | null {
  const value = score.quotient
  if (value === null) return null
  const result = formatQuotient(value)
  if (score.total !== null) return `100 × (16 − ${score.total}) ÷ 8 = ${result}`
  if (score.left === null || score.right === null) return `mean of ${score.answered} answers = ${result}`
  return `100 × (${score.right} − ${score.left}) ÷ (${score.right} + ${score.left}) = ${result}`
}

function sideRule({ cutOffs }: FormScore): string {
  const [up, from] = cutOffs.inclusive ? ['up to', 'from'] : ['below', 'above']
  return (
    `${cutOffs.label}: left ${up} ${formatQuotient(cutOffs.left)}, right ${from} ${formatQuotient(cutOffs.right)}, ` +
    `mixed between. Authors do not agree on cut-offs. ${cutOffs.source}`
  )
}

const details = ({ form: { definition }, answers, score }: LockedResponse): LateralDetails => ({
  formula: formulas[score.method],
  worked: worked(score),
  raw: definition.items.map((item) => {
    const answer = answers[item.id] ?? null
    return { label: item.label, value: answer === null ? 'Not answered' : answerLabel(answer, definition) }
  }),
  sideRule: sideRule(score),
  citation: definition.citation,
  cautions: definition.cautions,
})

const sideOf = ({ direction }: FormScore): LateralSide | null =>
  direction === 'mixed' ? 'middle' : direction

/** What the value rests on. "Does not do this yet" and a blank both give no marks and are told apart. */
function basisOf({ answered, doesNotDo, unanswered }: FormScore): string {
  const open = [
    doesNotDo > 0 ? `, ${doesNotDo} not done yet` : '',
    unanswered > 0 ? `, ${unanswered} left open` : '',
  ].join('')
  return `${answered} of ${answered + doesNotDo + unanswered} activities answered${open}`
}

/** Same form in any edition, same kind of informant. */
const trackOf = ({ form, informant }: LockedResponse) => `${form.key}|${informant}`

/**
 * Rows of the lateral line for questionnaires, newest first. Each form is a row of its own, and so is each kind of
 * informant: what a teacher saw is no later occasion of what a parent said.
 */
export function questionnaireRows(responses: readonly LockedResponse[]): HandProfileRow[] {
  const seen = new Set<string>()
  const newestFirst = responses.toSorted(
    (a, b) => compareDays(b.answeredOn, a.answeredOn) || (a.lockedAt < b.lockedAt ? 1 : -1),
  )
  return newestFirst.map((response) => {
    const { id, form, answeredOn, informant, score } = response
    const track = trackOf(response)
    const latest = !seen.has(track)
    seen.add(track)
    return {
      id,
      aspect: 'preference',
      track,
      measure: form.definition.title,
      occasion: answeredOn,
      value: score.quotient,
      side: sideOf(score),
      interval: null,
      chance: null,
      basis: basisOf(score),
      caution: standingWords(score),
      cutOffs: {
        name: score.cutOffs.label,
        left: score.cutOffs.left,
        right: score.cutOffs.right,
        inclusive: score.cutOffs.inclusive,
      },
      informant: informantLabels[informant],
      latest,
      source: { kind: 'questionnaire', id },
      opens: details(response),
    }
  })
}
