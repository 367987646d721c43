import type { AnswerPage } from '@shared/answerRequests.ts'
import { answerLabel, type FormAnswers, type FormDefinition } from '@shared/forms.ts'

/** What an answer is called; "not answered yet" where there is none. */
export const answerWords = (form: FormDefinition, answers: FormAnswers | null, id: string): string => {
  const answer = answers?.[id] ?? null
  return answer === null ? 'Not answered yet' : answerLabel(answer, form)
}

interface Draft {
  answers: FormAnswers
  comment: string | null
}

/** Where the answers on two devices differ. */
export const differingAnswers = (form: FormDefinition, mine: Draft, theirs: AnswerPage) =>
  [
    ...form.items.map(({ id, label }) => ({
      label,
      mine: answerWords(form, mine.answers, id),
      theirs: answerWords(form, theirs.answers, id),
    })),
    { label: 'In your own words', mine: mine.comment ?? '', theirs: theirs.comment ?? '' },
  ].filter((part) => part.mine !== part.theirs)
