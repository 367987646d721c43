import { answerRequests } from './answerRequests.ts'
import { conclusions } from './conclusions.ts'
import { histories } from './histories.ts'
import { measures } from './measures.ts'
import { moreQuestionnaires } from './moreQuestionnaires.ts'
import { at, of, type Planned } from './planned.ts'
import { questionnaires } from './questionnaires.ts'

function historiesOf(child: number): Planned[] {
  return of(histories, child).flatMap((history, index) => {
    const { askedDay, by, carer, answeredDay, time } = history
    if (askedDay === null) return [at(answeredDay, time, { kind: 'history', history, key: null })]
    const key = `history ${index}`
    const request = { by, asks: 'history' as const, formId: null, of: carer, byLink: false }
    return [
      at(askedDay, '11:00', { kind: 'ask', request, key }),
      at(answeredDay, time, { kind: 'history', history, key }),
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
