import type { Day } from '@shared/days.ts'
import { answerLabel, type FormDefinition } from '@shared/forms.ts'
import {
  informantLabels,
  type Informant,
  type QuestionnaireDraft,
  type QuestionnaireView,
} from '@shared/questionnaires.ts'

/** A draft as it is being filled: a date or a choice may be empty until it is saved. */
export type QuestionnaireInWork = Omit<QuestionnaireDraft, 'answeredOn' | 'informant' | 'cutOffSet'> & {
  cutOffSet: QuestionnaireDraft['cutOffSet'] | null
  answeredOn: Day | null
  informant: Informant | null
}

/** Only what may be written; score, signature and rights stay behind. */
export const draftOf = (view: QuestionnaireView): QuestionnaireDraft => ({
  informant: view.informant,
  respondentName: view.respondentName,
  answeredOn: view.answeredOn,
  answers: { ...view.answers },
  cutOffSet: view.cutOffSet as QuestionnaireDraft['cutOffSet'],
  comment: view.comment,
})

const line = (draft: QuestionnaireDraft) =>
  `${informantLabels[draft.informant]}, ${draft.respondentName ?? 'no name'}, ${draft.answeredOn}`

/** Where two people's drafts of one questionnaire differ. */
export function differingAnswers(
  definition: FormDefinition,
  mine: QuestionnaireDraft,
  theirs: QuestionnaireDraft,
) {
  const words = ({ answers }: QuestionnaireDraft, id: string) => {
    const answer = answers[id] ?? null
    return answer === null ? 'Not answered' : answerLabel(answer, definition)
  }
  const parts = [
    { label: 'Who answered, and when', mine: line(mine), theirs: line(theirs) },
    ...definition.items.map(({ id, label }) => ({
      label,
      mine: words(mine, id),
      theirs: words(theirs, id),
    })),
    { label: 'Comment', mine: mine.comment ?? '', theirs: theirs.comment ?? '' },
  ]
  return parts.filter((part) => part.mine !== part.theirs)
}
