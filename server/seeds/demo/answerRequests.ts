import { handUseFormV1 } from '../../../shared/handUse.ts'
import type { DemoRequest } from './assessmentTypes.ts'

const formId = handUseFormV1.version

/**
 * Questions that have not come back. Those that did stand with their answers (questionnaires.ts, moreQuestionnaires.ts,
 * histories*.ts).
 */
export const answerRequests: readonly DemoRequest[] = [
  // For the review to come; Lucía finds it at the top of My child.
  {
    child: 1,
    by: 'adaeze',
    askedDay: -2,
    asks: 'questionnaire',
    formId: 'short-4.v1',
    of: 0,
    byLink: false,
    remindedDays: [],
  },
  // A week old on the demo day: the first reminder is due.
  {
    child: 7,
    by: 'ines',
    askedDay: -7,
    asks: 'questionnaire',
    formId,
    of: 0,
    byLink: false,
    remindedDays: [],
  },
  {
    child: 10,
    by: 'rohan',
    askedDay: -5,
    asks: 'questionnaire',
    formId: 'short-4.v1',
    of: 0,
    byLink: true,
    remindedDays: [],
  },
  // Due back after a fortnight, so 16 days overdue; its time ran out two days ago and school is asked once more.
  {
    child: 25,
    by: 'ines',
    askedDay: -30,
    asks: 'questionnaire',
    formId,
    of: 'kwabena',
    byLink: false,
    remindedDays: [-23, -16],
  },
  {
    child: 25,
    by: 'ines',
    askedDay: -1,
    asks: 'questionnaire',
    formId,
    of: 'kwabena',
    byLink: false,
    remindedDays: [],
  },
]
