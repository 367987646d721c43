import { answerRequests } from './answerRequests.ts'
import { conclusions } from './conclusions.ts'
import type { Offset } from './demoTypes.ts'
import { histories } from './histories.ts'
import { measures } from './measures.ts'
import { moreQuestionnaires } from './moreQuestionnaires.ts'
import type { StaffKey } from './people.ts'
import { at, of, type Planned } from './planned.ts'
import { questionnaires } from './questionnaires.ts'

/** The therapist looks at what came back the next morning; the newest answers still wait for the lead. */
const lookedAt = (answeredDay: Offset, by: StaffKey): Planned[] =>
  by === 'ines'
    ? []
    : [at(answeredDay + 1, '09:10', { kind: 'finish_own_tasks', taskKind: 'answers_back', by })]

function historiesOf(child: number): Planned[] {
  return of(histories, child).flatMap((history, index) => {
    const { askedDay, by, carer, answeredDay, time } = history
    if (askedDay === null) return [at(answeredDay, time, { kind: 'history', history, key: null })]
    const key = `history ${index}`
    const request = { by, asks: 'history' as const, formId: null, of: carer, byLink: false }
    return [
      at(askedDay, '11:00', { kind: 'ask', request, key }),
      at(answeredDay, time, { kind: 'history', history, key }),
      ...lookedAt(answeredDay, by),
    ]
  })
}

function questionnairesOf(child: number): Planned[] {
  return of([...questionnaires, ...moreQuestionnaires], child).flatMap((questionnaire, index) => {
    const { asked, by, answeredDay, formId } = questionnaire
    if (asked === null) return [at(answeredDay, '11:20', { kind: 'questionnaire', questionnaire, key: null })]
    const key = `questionnaire ${index}`
    const request = { by, asks: 'questionnaire' as const, formId, of: asked.of, byLink: false }
    return [
      at(asked.day, '11:02', { kind: 'ask', request, key }),
      at(answeredDay, '19:50', { kind: 'questionnaire', questionnaire, key }),
      ...(questionnaire.locked ? lookedAt(answeredDay, by) : []),
    ]
  })
}

/** How a child is assessed: what is asked and answered, measured and concluded. */
export function assessmentOf(child: number): Planned[] {
  return [
    ...historiesOf(child),
    ...questionnairesOf(child),
    ...of(answerRequests, child).flatMap(({ askedDay, remindedDays, child: _child, ...request }, index) => [
      at(askedDay, '11:04', { kind: 'ask', request, key: `request ${index}` }),
      ...remindedDays.map((day) => at(day, '12:30', { kind: 'remind' })),
      // Asking again is what the software had asked for.
      ...(index > 0
        ? [
            at(askedDay, '11:10', {
              kind: 'finish_own_tasks',
              taskKind: 'teacher_unanswered',
              by: request.by,
            }),
          ]
        : []),
    ]),
    ...of(measures, child).map((measure) => at(measure.measuredDay, '11:50', { kind: 'measure', measure })),
    ...of(conclusions, child).flatMap((conclusion, index) => [
      at(conclusion.writtenDay, '15:30', { kind: 'conclusion', conclusion, index }),
      ...(conclusion.countersigned
        ? [
            at(conclusion.countersigned.day, '15:00', {
              kind: 'countersign_conclusion',
              index,
              by: conclusion.countersigned.by,
            }),
          ]
        : []),
    ]),
  ]
}
