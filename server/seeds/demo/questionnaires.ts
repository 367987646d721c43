import { handUseFormV1, type HandUseAnswer } from '../../../shared/handUse.ts'
import type { Informant } from '../../../shared/questionnaires.ts'
import type { DemoQuestionnaire, Offset } from './demoTypes.ts'
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
}

/**
 * One form. The ten answers follow the order of the form: draws or writes, throws, scissors, toothbrush, spoon, spreads,
 * lid, picks up, eraser, touch screen.
 */
function form(
  child: number,
  answeredDay: Offset,
  by: StaffKey,
  respondentName: string,
  answers: string,
  { informant = 'guardian', comment, locked = true }: Parts = {},
): DemoQuestionnaire {
  const given = answers.split(' ')
  if (given.length !== handUseFormV1.items.length) throw new Error(`Child ${child}: ten answers are needed`)
  return {
    child,
    informant,
    respondentName,
    answeredDay,
    by,
    answers: Object.fromEntries(
      handUseFormV1.items.map((item, index) => {
        const answer = codes[given[index] ?? '']
        if (answer === undefined) throw new Error(`Child ${child}: ${given[index]} is no answer`)
        return [item.id, answer]
      }),
    ),
    comment: comment ?? null,
    locked,
  }
}

/** In order of answering. A child's last form is the one of the scenario. */
export const questionnaires: readonly DemoQuestionnaire[] = [
  form(1, -124, 'adaeze', 'Lucía Quispe', 'SL SL SL SL SL L E L SL L'),
  form(2, -97, 'adaeze', 'Saskia Verhaeghen', 'SL SL SL SL SL SL R L SL L'),
  form(3, -98, 'rohan', 'Amina Bello', 'SL SL L SL SL L E L SL L'),
  form(4, -125, 'mairi', 'Farid Haidari', 'SL SL L SL SL L E L L E', {
    comment:
      'Answered with the interpreter. At home Soraya eats with her right hand at family meals by custom and with her left at other times; the family asked us to count what she chooses herself.',
  }),
  form(5, -250, 'tomasz', 'Aroha Whetuira', 'SL SL SL SL SL L E L SL E'),
  form(6, -290, 'adaeze', 'Graham Ellacott', 'SL SL SL SL SL SL L SL SL L'),
  form(8, -38, 'tomasz', 'Jessica Coombes', 'SL SL N SL SL SL SL SL SL SL', {
    comment:
      'Answered by phone. Bertie does not cut yet. His mother says the right hand stays closed on the table.',
  }),
  form(9, -27, 'ines', 'Keiko Torigoe', 'E L R L L E ? ? ? ?', {
    comment: 'Saved by the family, not finished.',
    locked: false,
  }),
  form(10, -33, 'rohan', 'Kwame Adjarey', 'E R E L L E R E R E'),
  form(11, -42, 'mairi', 'Maja Lindqvist', 'SL SL L SL SL L L SL SL L'),
  form(12, -42, 'mairi', 'Maja Lindqvist', 'SR SR R SR SR R E R R E'),
  form(13, -80, 'adaeze', 'Fatou Diallo', 'SL SL L SL SL R R L SL L'),
  form(15, -104, 'tomasz', 'Meena Raghunath', 'SR SL L SL E R R L E L', {
    comment:
      'Writes with the right hand since she was asked to at five. Draws at home with the left when nobody is near.',
  }),
  form(16, -118, 'rohan', 'Isla Strathearn', 'SL SL SL SL SL L R L SL L'),
  form(17, -70, 'mairi', 'Wen Tsao', 'SL SL SL SL SL E E SL SL SL'),
  form(18, -66, 'adaeze', 'Folake Bright', 'SL SL L SL SL L E L L L'),
  form(20, -172, 'tomasz', 'Siobhán Delahunt', 'L R R L L R L R R E', { informant: 'teacher' }),
  form(20, -170, 'tomasz', 'Hanna Halbersztadt', 'L E L L L R R R E E', {
    comment: 'School and home answer four activities differently. Each is right about what it sees.',
  }),
  form(21, -90, 'rohan', 'Carmen Montoya', 'SL SL SL SL SL L E E SL SL'),
  form(22, -160, 'mairi', 'Noelani Kapaona', 'SL SL L SL SL L L L SL L'),
  form(23, -96, 'adaeze', 'Nadia Siddiq', 'SL SL L SL SL R R L SL SL'),
  form(24, -105, 'tomasz', 'Judith Amory', 'SL SL L SL L L E L L L'),
  form(26, -84, 'rohan', 'Grace Makori', 'SL SL L SL SL L L L SL SL'),
  form(27, -205, 'adaeze', 'Kirsty Garroway', 'SL SL L SL SL R R L SL L', { comment: 'Before the injury.' }),
  form(27, -40, 'adaeze', 'Kirsty Garroway', 'R L SR SL SL R E R L SR', {
    comment: 'Left arm in plaster: shows what Finlay does just now, not which hand he prefers.',
  }),
  form(28, -345, 'mairi', 'Andrés Salvatierra', 'SL SL L SL SL E E L SL E'),
  form(29, -128, 'tomasz', 'Elena Danailova', 'SL SL SL SL SL L L L SL SL'),
  form(31, -30, 'adaeze', 'Ioana Grigorescu', 'E E E E E E E E E E', {
    comment:
      'Watched in the session, each job always goes to the same hand: writing left, throwing right, scissors right, spoon left.',
  }),
  form(32, -27, 'rohan', 'Bisi Oyelaran', 'SL SL L SL SL E R L L E'),
  form(33, -360, 'tomasz', 'Clare Holloway', 'SL SL SL SL SL SL SL SL SL SL', {
    comment: 'The right hand helps as a weight on the paper. The left leads by need.',
  }),
  form(34, -92, 'mairi', 'Rachid Benkirat', 'SL SL L SL SL L E SL SL L'),
  form(35, -21, 'adaeze', 'Anh Bui', 'SL SL L SL SL R R L SL L'),
  form(36, -262, 'tomasz', 'Ruth Edgecombe', 'SL SL SL SL SL L E SL SL L'),
  form(37, -78, 'rohan', 'Orla Tierney', 'SL SL SL SL SL SL E SL SL L'),
  form(38, -220, 'mairi', 'Selim Kocabaş', 'SL R L SL SL E E R SL L'),
  form(39, -14, 'adaeze', 'Lerato Moloi', 'R SL SR SL L R SR L SL R', {
    comment:
      'Since the illness began. The family says that before it she used the left hand for nearly everything.',
  }),
  form(40, -410, 'tomasz', 'Conrad Aspinall-Reyes', 'SL SL SL SL SL SL L SL SL SL', {
    informant: 'child_demonstrated',
  }),
]
