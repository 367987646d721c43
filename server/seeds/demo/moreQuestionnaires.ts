import type { DemoQuestionnaire } from './demoTypes.ts'
import { everyday, shortForm, shownActions, tenTasks } from './questionnaireParts.ts'

/** The same child seen by somebody else, on another day, or with another form. */
export const moreQuestionnaires: readonly DemoQuestionnaire[] = [
  // A second occasion.
  everyday(1, -28, 'adaeze', 'Lucía Quispe', 'SL SL SL SL SL L L L SL E', {
    comment: 'He opens jars with the left now; the screen with whichever hand is free.',
  }),
  everyday(15, -30, 'tomasz', 'Tomasz Zielak', 'L SL L SL L E R L E L', {
    informant: 'therapist',
    comment: 'Watched in the session, with both hands left free.',
  }),
  everyday(22, -60, 'mairi', 'Noelani Kapaona', 'SL SL SL SL SL L L L SL L'),
  everyday(38, -52, 'mairi', 'Selim Kocabaş', 'SL R L SL SL E E R SL L'),

  // Somebody else.
  everyday(10, -30, 'rohan', 'Siobhán Delahunt', 'E R R E L E E R R L', {
    informant: 'teacher',
    askedDay: -36,
    of: 'siobhan',
    comment: 'He changes over when he gets to the middle of the page.',
  }),
  everyday(15, -99, 'tomasz', 'Siobhán Delahunt', 'SR L R L L R R L R E', {
    informant: 'teacher',
    askedDay: -106,
    of: 'siobhan',
    comment: 'Looks at me before she takes up a pencil.',
  }),
  everyday(15, -104, 'tomasz', 'Priya Raghunath', 'R SL L SL SL L R L L L', {
    informant: 'child_demonstrated',
    comment: 'Everything lay in the middle, and nobody said which hand.',
  }),
  everyday(31, -30, 'adaeze', 'Adaeze Nwosu-Reid', 'SL SR SR SR SL SR SL SL SL SR', {
    informant: 'therapist',
    comment: 'Each job goes to one hand, the same one every time it was tried.',
  }),

  // Another form.
  shortForm(3, -98, 'rohan', 'Amina Bello', 'SL SL SL SL'),
  shortForm(26, -84, 'rohan', 'Grace Makori', 'SL SL SL L'),
  shortForm(34, -92, 'mairi', 'Rachid Benkirat', 'SL SL SL SL'),
  tenTasks(31, -30, 'adaeze', 'Alina Grigorescu', 'SL SL SR SR SR SR SL SR SL L'),
  tenTasks(38, -220, 'mairi', 'Emre Kocabaş', 'SL SL R L SL E SL R R E'),
  shownActions(10, -33, 'rohan', 'Kofi Adjarey', 'E R L E R L R E', {
    comment: 'Changed hands within the line and within the cut.',
  }),
  shownActions(11, -42, 'mairi', 'Freya Lindqvist-Shaw', 'L L L L L L L E'),
  shownActions(12, -42, 'mairi', 'Axel Lindqvist-Shaw', 'R R R R R R R E'),
  shownActions(13, -80, 'adaeze', 'Amara Diallo-Finn', 'L L L L L L L R'),
  shownActions(17, -70, 'mairi', 'Mei-Lin Tsao', 'L L L L E L L L'),
]
