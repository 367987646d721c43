import { handUseFormV1, type HandUseAnswer } from '../../../shared/handUse.ts'
import type { Informant } from '../../../shared/questionnaires.ts'
import type { Asked, DemoQuestionnaire, Offset } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

const codes: Record<string, HandUseAnswer | null> = {
  SL: 'strong_left',
  L: 'left',
  E: 'either',
  R: 'right',
  SR: 'strong_right',
  N: 'does_not_do',
  '?': null,
}

interface Parts {
  informant?: Informant
  comment?: string
  locked?: boolean
  /** When the respondent was asked to answer signed in; left out when staff wrote the answers down. */
  askedDay?: Offset
  /** Whom; the child's first carer unless said otherwise. */
  of?: Asked
}

type Form = (
  child: number,
  answeredDay: Offset,
  by: StaffKey,
  respondentName: string,
  answers: string,
  parts?: Parts,
) => DemoQuestionnaire

/** A form whose answers follow the order of its activities. */
const formOf =
  (formId: string, items: readonly string[], usually: Informant): Form =>
  (
    child,
    answeredDay,
    by,
    respondentName,
    answers,
    { informant = usually, comment, locked = true, askedDay, of = 0 } = {},
  ) => {
    const given = answers.split(' ')
    if (given.length !== items.length)
      throw new Error(`Child ${child}: ${formId} needs ${items.length} answers`)
    return {
      child,
      formId,
      informant,
      respondentName,
      answeredDay,
      by,
      asked: askedDay === undefined ? null : { day: askedDay, of },
      answers: Object.fromEntries(
        items.map((item, index) => {
          const answer = codes[given[index] ?? '']
          if (answer === undefined) throw new Error(`Child ${child}: ${given[index]} is no answer`)
          return [item, answer]
        }),
      ),
      comment: comment ?? null,
      locked,
    }
  }

/** Draws or writes, throws, scissors, toothbrush, spoon, spreads, lid, picks up, eraser, touch screen. */
export const everyday = formOf(
  handUseFormV1.version,
  handUseFormV1.items.map(({ id }) => id),
  'guardian',
)

/** Writes, throws, toothbrush, spoon. */
export const shortForm = formOf('short-4.v1', ['write', 'throw', 'toothbrush', 'spoon'], 'guardian')

/** Writes, draws, throws, scissors, toothbrush, knife, spoon, broom, stick along a box, box lid. */
export const tenTasks = formOf(
  'ten-task.v1',
  ['write', 'draw', 'throw', 'scissors', 'toothbrush', 'knife', 'spoon', 'broom', 'match', 'box_lid'],
  'child_demonstrated',
)

/** Draws a line, rubs out, combs, toothbrush, hammers, spoon, cuts paper, cuts clay: L, E or R. */
export const shownActions = formOf(
  'shown-8.v1',
  ['draw_line', 'erase', 'comb', 'toothbrush', 'hammer', 'spoon', 'cut_paper', 'cut_clay'],
  'child_demonstrated',
)
