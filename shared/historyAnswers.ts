import type { HistoryDetails } from './histories.ts'
import { historyQuestions, type HistoryField, type HistoryQuestion } from './historyQuestions.ts'

/** A label, hint or title with the child's name in its place. */
export const withName = (words: string, name: string): string => words.replaceAll('{name}', name)

export type HistoryAnswer = string | number | null

/** What is answered to a question; null while nothing is. */
export function answerTo(details: HistoryDetails, id: HistoryField): HistoryAnswer {
  const answers: Record<string, unknown> = { ...details }
  for (const [field, value] of Object.entries(details.family)) answers[`family.${field}`] = value
  const answer = answers[id]
  return typeof answer === 'string' || typeof answer === 'number' ? answer : null
}

/** The details with one answer in its place. The schema says whether it can be. */
export const withAnswer = (
  details: HistoryDetails,
  id: HistoryField | NonNullable<HistoryQuestion['unsure']>,
  value: HistoryAnswer | boolean,
): HistoryDetails =>
  id.startsWith('family.')
    ? { ...details, family: { ...details.family, [id.slice('family.'.length)]: value } }
    : { ...details, [id]: value }

export const saysUnsure = (details: HistoryDetails, { unsure }: HistoryQuestion): boolean =>
  unsure === undefined
    ? false
    : unsure === 'family.siblingsUnsure'
      ? details.family.siblingsUnsure
      : details[unsure]

export const isAsked = (details: HistoryDetails, { asked }: HistoryQuestion): boolean =>
  asked?.(details) ?? true

export const isAnswered = (details: HistoryDetails, question: HistoryQuestion): boolean =>
  saysUnsure(details, question) || answerTo(details, question.id) !== null

/** Questions that are asked and have no answer yet. "Not sure" is an answer; what is good to have is not counted. */
export const missingAnswers = (details: HistoryDetails): HistoryField[] =>
  historyQuestions
    .filter(
      (question) =>
        question.optional !== true && isAsked(details, question) && !isAnswered(details, question),
    )
    .map(({ id }) => id)

/** Without these the history is not sent. */
export const missingRequired = (details: HistoryDetails): HistoryField[] =>
  historyQuestions
    .filter((question) => question.required === true && !isAnswered(details, question))
    .map(({ id }) => id)
