import type { FormDefinition, FormItem } from '../../shared/forms.ts'

export interface StartForm {
  key: string
  edition: number
  definition: FormDefinition
}

/*
 * Forms after published methods, in our own wording. What a source calls for that can hurt a child has a safe stand-in
 * or the presence of an adult beside it. What was read of each source and what is from memory is said in its citation.
 */

const item = (id: string, label: string, childLabel: string, caution: string | null = null): FormItem => ({
  id,
  label,
  childLabel,
  caution,
})

const writing = item('write', 'Writes', 'Write your name, or one letter you know.')
const drawing = item('draw', 'Draws', 'Draw me a house.')
const throwing = item('throw', 'Throws a small ball', 'Throw this soft ball to me.')
const scissors = item(
  'scissors',
  'Cuts paper with scissors',
  'Cut this paper in two.',
  'Round-ended scissors, the child seated, an adult beside. Put a left-handed and a right-handed pair equally near.',
)
const toothbrush = item('toothbrush', 'Brushes teeth', 'Show me how you brush your teeth.')
const knife = item(
  'knife',
  'Cuts something soft with a blunt knife, no fork in the other hand',
  'Cut this dough.',
  'A blunt plastic knife and dough only, with an adult watching.',
)
const spoon = item('spoon', 'Eats with a spoon', 'Show me how you eat with this spoon.')
const broom = item(
  'broom',
  'Sweeps with a broom: which hand is on top',
  'Sweep these paper scraps over to me.',
  'A broom of the child’s height, and room around it.',
)
const strike = item(
  'match',
  'Rubs a stick once, quickly, along the side of a box: which hand moves the stick',
  'Give this box one quick rub with the stick.',
  'Stands in for striking a match, which no child is asked to do. Use a lolly stick and an empty box, and say so in the comment.',
)
const boxLid = item('box_lid', 'Opens a box: which hand lifts the lid', 'Open this box. What is inside?')

const tenTasks = [writing, drawing, throwing, scissors, toothbrush, knife, spoon, broom, strike, boxLid]

const fiveAnswers: FormDefinition['options'] = [
  'strong_left',
  'left',
  'either',
  'right',
  'strong_right',
  'does_not_do',
]
const threeAnswers: FormDefinition['options'] = ['left', 'either', 'right', 'does_not_do']
const atHomeOrShown: FormDefinition['informants'] = ['guardian', 'child_demonstrated', 'therapist']

const notADiagnosis = 'Not a diagnosis. Made with adults: no norms for children are claimed.'
const shownRatherThanAsked =
  'Let the child show each activity wherever that can be done; being asked is less sure.'

const twoMarksSource =
  'Oldfield 1971, Neuropsychologia 9:97-113. Read: its first page and abstract; the formula and the second mark as ' +
  'restated on a public page of common data elements; the list of tasks at second hand. From memory: a mark to each ' +
  'hand for either, a blank only without experience, and the deciles of adults. Wording and the safe stand-ins are this clinic’s own.'

const tenTask: FormDefinition = {
  title: 'Ten tasks, two marks',
  purpose:
    'Side and consistency of preference in ten tasks. “Always” means that the other hand would not be used unless it had to be.',
  scoring: 'two_marks',
  items: tenTasks,
  options: fiveAnswers,
  informants: atHomeOrShown,
  citation: twoMarksSource,
  cautions: [
    notADiagnosis,
    shownRatherThanAsked,
    'The quotient tells how consistent the answers are: ten times “mostly” gives the same figure as ten times “always”.',
  ],
  cutOffSet: null,
}

const tenTaskCount: FormDefinition = {
  title: 'Ten tasks, counted',
  purpose: 'The same ten tasks without “always” and “mostly”: only which hand does each.',
  scoring: 'one_mark',
  items: tenTasks,
  options: threeAnswers,
  informants: atHomeOrShown,
  citation:
    'Tasks after Oldfield 1971, Neuropsychologia 9:97-113 (list at second hand), one mark for each task. Counting tells ' +
    'people apart as well as weighting: Bishop and others 1996, British Journal of Psychology 87:269-285 (abstract ' +
    'read). Wording and the safe stand-ins are this clinic’s own.',
  cautions: [notADiagnosis, shownRatherThanAsked],
  cutOffSet: null,
}

const shortFour: FormDefinition = {
  title: 'Four tasks, short form',
  purpose: 'A first look in a minute: four everyday tasks.',
  scoring: 'mean_of_five',
  items: [writing, throwing, toothbrush, spoon],
  options: fiveAnswers,
  informants: atHomeOrShown,
  citation:
    'Veale 2014, Laterality 19(2):164-177. Read: the abstract (four items, simplified answers, 1,514 adults online). ' +
    'From memory: the four tasks, the values −100, −50, 0, 50 and 100, and the bounds of 60 either side. What happens ' +
    'with a task left open is a clinic rule: the mean of those answered, marked incomplete. Wording is our own.',
  cautions: [notADiagnosis, 'Four answers only: one changed answer moves the result by 12.5 or more.'],
  cutOffSet: 'sixty',
}

const sevenTask: FormDefinition = {
  title: 'Seven tasks',
  purpose: 'The ten tasks without drawing, broom and box lid, which told little or were answered unsteadily.',
  scoring: 'two_marks',
  items: [writing, throwing, scissors, toothbrush, knife, spoon, strike],
  options: fiveAnswers,
  informants: atHomeOrShown,
  citation:
    'Dragovic 2004, Laterality 9(4):411-419 (abstract read: 203 adults; drawing, broom and box lid removed); Milenkovic ' +
    'and Dragovic 2013 (first page of the 2012 online version read: 1,224 students, fewer called mixed). The seven ' +
    'tasks follow by removal. Quotient as in Oldfield 1971. Wording and the safe stand-ins are this clinic’s own.',
  cautions: [notADiagnosis, shownRatherThanAsked],
  cutOffSet: null,
}

const shownEight: FormDefinition = {
  title: 'Eight actions shown by the child',
  purpose:
    'The child does each action with the thing in reach of both hands. Better than asking before about seven years.',
  scoring: 'demonstrated_actions',
  items: [
    item('draw_line', 'Draws a line', 'Draw a line from here to here.'),
    item('erase', 'Rubs out a line', 'Rub this line out.'),
    item('comb', 'Combs hair', 'Comb the doll’s hair.', 'Use a doll, or the child’s own comb.'),
    item(
      'toothbrush',
      'Brushes teeth',
      'Show me how you brush your teeth.',
      'A new brush, or a pretend one.',
    ),
    item(
      'hammer',
      'Hammers a peg',
      'Knock this peg in.',
      'A light wooden toy hammer and a soft peg, with an adult beside the child.',
    ),
    item('spoon', 'Eats with a spoon', 'Show me how you eat with this spoon.'),
    item('cut_paper', 'Cuts paper with scissors', 'Cut this paper in two.', scissors.caution),
    item(
      'cut_clay',
      'Cuts clay with a blunt knife',
      'Cut this clay in two.',
      'A blunt plastic knife only, with an adult watching.',
    ),
  ],
  options: threeAnswers,
  informants: ['child_demonstrated'],
  citation:
    'After De Agostini and Dellatolas 1988 as told in a chapter’s abstract (read): right 1, both 2, left 3, total 8 to ' +
    '24, degree the distance from 16; there called left-handed above 48 over three sessions, that is above 16 in one. ' +
    'The place on the line, 100 × (16 − total) ÷ 8, is this clinic’s. Wording is our own.',
  cautions: [
    'Not a diagnosis. One session shows one day: the study added up three.',
    'Put each thing down in the middle, not into a hand.',
    'An action left out leaves the total open: it is not worked out from seven.',
  ],
  cutOffSet: 'sign-only',
}

export const publishedForms: readonly StartForm[] = [
  { key: 'ten-task', edition: 1, definition: tenTask },
  { key: 'ten-task-count', edition: 1, definition: tenTaskCount },
  { key: 'short-4', edition: 1, definition: shortFour },
  { key: 'seven-task', edition: 1, definition: sevenTask },
  { key: 'shown-8', edition: 1, definition: shownEight },
]
