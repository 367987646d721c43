import { compareDays, type Day } from './days.ts'
import type { HandUseAnswer } from './handUse.ts'
import { agreementOf, type Agreement } from './kappa.ts'
import { informantLabels, informants, type Informant } from './questionnaires.ts'
import type { LockedResponse } from './questionnaireRows.ts'

/** The side an answer names; "does not do this yet" and no answer name none. */
export type AnswerSide = 'left' | 'either' | 'right'

const sides: Record<HandUseAnswer, AnswerSide | null> = {
  strong_left: 'left',
  left: 'left',
  either: 'either',
  right: 'right',
  strong_right: 'right',
  does_not_do: null,
}

export const answerSide = (answer: HandUseAnswer | null): AnswerSide | null =>
  answer === null ? null : sides[answer]

/** Clinic rule, not a published one: so many activities told differently are pointed out. */
export const discrepanciesPointedOut = 3

export interface InformantColumn {
  responseId: string
  informant: Informant
  label: string
  answeredOn: Day
}

export interface InformantItem {
  id: string
  label: string
  /** One for each column; null where not answered or not on the edition that was answered. */
  answers: (HandUseAnswer | null)[]
  /** Two columns at least name different sides. */
  differs: boolean
}

export interface InformantPair extends Agreement {
  one: Informant
  other: Informant
  discrepancies: number
  pointedOut: boolean
  /** Why kappa or its interval is missing, or how far to trust it. */
  note: string
}

/** One form as answered by at least two kinds of informant. */
export interface InformantComparison {
  formKey: string
  title: string
  columns: InformantColumn[]
  items: InformantItem[]
  pairs: InformantPair[]
  /** Says so when the editions answered differ; null otherwise. */
  caution: string | null
}

const newest = (responses: readonly LockedResponse[]) =>
  responses.toSorted((a, b) => compareDays(b.answeredOn, a.answeredOn) || (a.lockedAt < b.lockedAt ? 1 : -1))

/** Kappa without an interval: all told alike, or none, or else one of the two gave one answer throughout (kappa 0). */
function noteOf({ compared, agreed, kappa, kappaInterval }: Agreement): string {
  if (compared === 0) return 'No activity was answered with a side by both, so nothing is compared.'
  if (kappa === null)
    return 'Both gave one and the same answer throughout: kappa asks for at least two kinds of answers.'
  if (kappaInterval === null && agreed === compared)
    return `Agreement on all ${compared} activities; the large-sample interval of kappa says nothing here.`
  if (kappaInterval === null && agreed === 0)
    return 'They agree on none of the activities that both answered; kappa and its interval add nothing.'
  if (kappaInterval === null) return 'One of the two gave the same answer throughout, so kappa tells nothing.'
  return `Kappa from ${compared} activities: its large-sample interval is rough.`
}

function compare(one: LockedResponse, other: LockedResponse, ids: readonly string[]): InformantPair {
  const pairs = ids.flatMap((id) => {
    const [a, b] = [answerSide(one.answers[id] ?? null), answerSide(other.answers[id] ?? null)]
    return a !== null && b !== null ? [[a, b] as const] : []
  })
  const agreement = agreementOf<AnswerSide>(pairs)
  const discrepancies = agreement.compared - agreement.agreed
  return {
    ...agreement,
    one: one.informant,
    other: other.informant,
    discrepancies,
    pointedOut: discrepancies >= discrepanciesPointedOut,
    note: noteOf(agreement),
  }
}

function comparisonOf(responses: readonly LockedResponse[]): InformantComparison | null {
  const columns = informants.flatMap((informant) => {
    const [latest] = newest(responses.filter((response) => response.informant === informant))
    return latest ? [latest] : []
  })
  const [model] = newest(columns)
  if (!model || columns.length < 2) return null
  const { definition } = model.form
  const items = definition.items.map(({ id, label }) => {
    const answers = columns.map((column) => column.answers[id] ?? null)
    const named = new Set(answers.map(answerSide).filter((side) => side !== null))
    return { id, label, answers, differs: named.size > 1 }
  })
  const ids = items.map(({ id }) => id)
  const editions = new Set(columns.map((column) => column.form.edition))
  return {
    formKey: model.form.key,
    title: definition.title,
    columns: columns.map((column) => ({
      responseId: column.id,
      informant: column.informant,
      label: informantLabels[column.informant],
      answeredOn: column.answeredOn,
    })),
    items,
    pairs: columns.flatMap((one, index) => columns.slice(index + 1).map((other) => compare(one, other, ids))),
    caution:
      editions.size > 1
        ? 'Not everyone answered the same edition of the form: the wording of an activity may differ.'
        : null,
  }
}

/**
 * The newest locked response of each kind of informant side by side, form by form. Only sides are compared (left, either,
 * right): "always" and "mostly" agree. An activity not done yet or not answered by one of them is no disagreement.
 */
export function compareInformants(responses: readonly LockedResponse[]): InformantComparison[] {
  const keys = [...new Set(responses.map(({ form }) => form.key))]
  return keys.flatMap((key) => comparisonOf(responses.filter(({ form }) => form.key === key)) ?? [])
}
