import type { FormAnswers, FormDefinition } from './forms.ts'
import type { HandUseAnswer } from './handUse.ts'

type Answerable = Pick<FormDefinition, 'items' | 'options'>

/** Every item of the form without an answer. */
export const blankAnswers = ({ items }: Pick<FormDefinition, 'items'>): FormAnswers =>
  Object.fromEntries(items.map(({ id }) => [id, null]))

/**
 * What is wrong with answers to a form, by field (`answers.throws`); empty when nothing is. Every item must be there:
 * null is "not answered yet", "either" and "does not do this yet" are answers, and one that is missing is a fault.
 */
export function answerProblems(
  { items, options }: Answerable,
  answers: Readonly<Record<string, unknown>>,
): Record<string, string> {
  const known = new Set(items.map(({ id }) => id))
  const unknown = Object.keys(answers).filter((id) => !known.has(id))
  const wrong = items.filter(({ id }) => {
    const answer = Object.hasOwn(answers, id) ? answers[id] : undefined
    return answer !== null && !options.includes(answer as HandUseAnswer)
  })
  return Object.fromEntries([
    ...unknown.map((id) => [`answers.${id}`, 'This form has no such activity']),
    ...wrong.map(({ id, label }) => [`answers.${id}`, `Choose one of the answers offered for “${label}”`]),
  ])
}

/** Nothing was answered: no hand, not "either", not "does not do this yet". */
export const isBlank = (answers: Readonly<FormAnswers>): boolean =>
  Object.values(answers).every((answer) => answer === null)

/** Ids of items still without an answer, in the order of the form. */
export const openItems = (
  { items }: Pick<FormDefinition, 'items'>,
  answers: Readonly<FormAnswers>,
): string[] => items.map(({ id }) => id).filter((id) => (answers[id] ?? null) === null)
