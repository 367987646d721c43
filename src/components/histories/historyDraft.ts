import { formatDay, isDay, type Day } from '@shared/days.ts'
import type { HistoryDetails, HistoryDraft, HistoryView } from '@shared/histories.ts'
import { answerTo, saysUnsure, withName } from '@shared/historyAnswers.ts'
import { historyQuestions, type HistoryQuestion } from '@shared/historyQuestions.ts'

/** A therapist's page as it is being filled: the day may be empty until it is saved. */
export type HistoryInWork = Omit<HistoryDraft, 'answeredOn'> & { answeredOn: Day | null }

/** How questions call the child: the first word of the name, for a full name in every sentence reads like a form. */
export const firstName = (name: string): string => name.split(' ')[0] ?? name

/** Only what may be written. */
export const draftOf = ({ respondentName, answeredOn, details }: HistoryView): HistoryDraft => ({
  respondentName,
  answeredOn,
  details: { ...details, family: { ...details.family } },
})

const single: Record<string, string> = { months: 'month', years: 'year', children: 'child', weeks: 'week' }

/** What is answered to a question, in words; null while nothing is. */
export function answerWords(details: HistoryDetails, question: HistoryQuestion): string | null {
  if (saysUnsure(details, question)) return 'Not sure'
  const given = answerTo(details, question.id)
  if (given === null) return null
  const { answer } = question
  switch (answer.kind) {
    case 'choice':
      return answer.options.find(({ value }) => value === given)?.label ?? String(given)
    case 'number':
      return `${given} ${given === 1 ? (single[answer.unit] ?? answer.unit) : answer.unit}`
    case 'scale':
      return `${given} out of 10`
    case 'day':
      return isDay(given) ? formatDay(given) : String(given)
    case 'text':
      return String(given)
  }
}

/** Where two people's answers differ. */
export const differingAnswers = (mine: HistoryDetails, theirs: HistoryDetails, name: string) =>
  historyQuestions
    .map((question) => ({
      label: withName(question.label, name),
      mine: answerWords(mine, question) ?? 'Not answered',
      theirs: answerWords(theirs, question) ?? 'Not answered',
    }))
    .filter((part) => part.mine !== part.theirs)
