import type { DemoQuestionnaire } from './demoTypes.ts'
import { everyday } from './questionnaireParts.ts'

/** The everyday form, in order of answering. A child’s last one is that of the scenario. */
export const questionnaires: readonly DemoQuestionnaire[] = [
  everyday(1, -125, 'adaeze', 'Lucía Quispe', 'SL SL SL SL SL L E L SL L', { askedDay: -127 }),
  everyday(2, -97, 'adaeze', 'Saskia Verhaeghen', 'SL SL SL SL SL SL R L SL L'),
  everyday(3, -98, 'rohan', 'Amina Bello', 'SL SL L SL SL L E L SL L'),
  everyday(4, -125, 'mairi', 'Farid Haidari', 'SL SL L SL SL L E L L E', {
    comment:
      'Answered with the interpreter. At home Soraya eats with her right hand at family meals by custom and with her left at other times; the family asked us to count what she chooses herself.',
  }),
  everyday(5, -250, 'tomasz', 'Aroha Whetuira', 'SL SL SL SL SL L E L SL E'),
  everyday(6, -290, 'adaeze', 'Graham Ellacott', 'SL SL SL SL SL SL L SL SL L'),
  everyday(8, -38, 'tomasz', 'Jessica Coombes', 'SL SL N SL SL SL SL SL SL SL', {
    comment:
      'Answered by phone. Bertie does not cut yet. His mother says the right hand stays closed on the table.',
  }),
  everyday(9, -3, 'ines', 'Keiko Torigoe', 'E L R L L E ? ? ? ?', {
    askedDay: -6,
    locked: false,
  }),
  everyday(10, -33, 'rohan', 'Kwame Adjarey', 'E R E L L E R E R E'),
  everyday(11, -46, 'mairi', 'Maja Lindqvist', 'SL SL L SL SL L L SL SL L', { askedDay: -49 }),
  everyday(12, -46, 'mairi', 'Maja Lindqvist', 'SR SR R SR SR R E R R E', { askedDay: -49 }),
  everyday(13, -80, 'adaeze', 'Fatou Diallo', 'SL SL L SL SL R R L SL L'),
  everyday(15, -104, 'tomasz', 'Meena Raghunath', 'SR SL L SL E R R L E L', {
    comment:
      'Writes with the right hand since she was asked to at five. Draws at home with the left when nobody is near.',
  }),
  everyday(16, -118, 'rohan', 'Isla Strathearn', 'SL SL SL SL SL L R L SL L'),
  everyday(17, -70, 'mairi', 'Wen Tsao', 'SL SL SL SL SL E E SL SL SL'),
  everyday(18, -66, 'adaeze', 'Folake Bright', 'SL SL L SL SL L E L L L'),
  everyday(20, -172, 'tomasz', 'Siobhán Delahunt', 'L R R L L R L R R E', {
    informant: 'teacher',
    askedDay: -179,
    of: 'siobhan',
  }),
  everyday(20, -170, 'tomasz', 'Hanna Halbersztadt', 'L E L L L R R R E E', {
    comment: 'School and home answer four activities differently. Each is right about what it sees.',
  }),
  everyday(21, -90, 'rohan', 'Carmen Montoya', 'SL SL SL SL SL L E E SL SL'),
  everyday(22, -160, 'mairi', 'Noelani Kapaona', 'SL SL L SL SL L L L SL L'),
  everyday(23, -96, 'adaeze', 'Nadia Siddiq', 'SL SL L SL SL R R L SL SL'),
  everyday(24, -105, 'tomasz', 'Judith Amory', 'SL SL L SL L L E L L L'),
  everyday(26, -84, 'rohan', 'Grace Makori', 'SL SL L SL SL L L L SL SL'),
  everyday(27, -205, 'adaeze', 'Kirsty Garroway', 'SL SL L SL SL R R L SL L', {
    comment: 'Before the injury.',
  }),
  everyday(27, -40, 'adaeze', 'Kirsty Garroway', 'R L SR SL SL R E R L SR', {
    comment: 'Left arm in plaster: shows what Finlay does just now, not which hand he prefers.',
  }),
  everyday(28, -345, 'mairi', 'Andrés Salvatierra', 'SL SL L SL SL E E L SL E'),
  everyday(29, -128, 'tomasz', 'Elena Danailova', 'SL SL SL SL SL L L L SL SL'),
  everyday(31, -30, 'adaeze', 'Ioana Grigorescu', 'E E E E E E E E E E', {
    comment:
      'Watched in the session, each job always goes to the same hand: writing left, throwing right, scissors right, spoon left.',
  }),
  everyday(32, -27, 'rohan', 'Bisi Oyelaran', 'SL SL L SL SL E R L L E'),
  everyday(33, -360, 'tomasz', 'Clare Holloway', 'SL SL SL SL SL SL SL SL SL SL', {
    comment: 'The right hand helps as a weight on the paper. The left leads by need.',
  }),
  everyday(34, -92, 'mairi', 'Rachid Benkirat', 'SL SL L SL SL L E SL SL L'),
  everyday(35, -24, 'adaeze', 'Anh Bui', 'SL SL L SL SL R R L SL L', { askedDay: -28 }),
  everyday(36, -262, 'tomasz', 'Ruth Edgecombe', 'SL SL SL SL SL L E SL SL L'),
  everyday(37, -78, 'rohan', 'Orla Tierney', 'SL SL SL SL SL SL E SL SL L'),
  everyday(38, -220, 'mairi', 'Selim Kocabaş', 'SL R L SL SL E E R SL L'),
  everyday(39, -14, 'adaeze', 'Lerato Moloi', 'R SL SR SL L R SR L SL R', {
    comment:
      'Since the illness began. The family says that before it she used the left hand for nearly everything.',
  }),
  everyday(40, -410, 'tomasz', 'Conrad Aspinall-Reyes', 'SL SL SL SL SL SL L SL SL SL', {
    informant: 'child_demonstrated',
  }),
]
