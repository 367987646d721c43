import type { ChildRelation } from './roles.ts'

/** How somebody stood to the child when they acted, as the access history says it. */
export const childRelationLabels: Record<ChildRelation, string> = {
  guardian: 'Parent or carer',
  assignedTherapist: 'Therapist of the child',
  clinicLead: 'Clinic lead',
  teacher: 'Teacher',
  administrator: 'Administrator',
}

/** A carer without a sign-in: nobody is signed in, but the link and the date of birth were theirs. */
export const carerByLinkWords = 'Parent or carer, by e-mail link'

const nouns: Record<string, string> = {
  child: 'Record',
  children: 'Record',
  episode: 'Episode',
  alert: 'Warning sign',
  consent: 'Consent',
  guardian: 'Carer',
  referral: 'Referral',
  task: 'Task',
  questionnaire: 'Questionnaire',
  measure: 'Measure',
  history: 'History',
  histories: 'History',
  handProfile: 'Hand profile',
  conclusion: 'Conclusion',
  answerRequest: 'Questions to family or school',
  answerLink: 'Questions by e-mail link',
  sessionNote: 'Session note',
  writingObservation: 'Writing observation',
  sample: 'Handwriting sample',
  goal: 'Goal',
  letter: 'Letter',
  schoolAdvice: 'Advice to school',
  pupil: 'Advice to school',
  family: 'Family page',
  accessHistory: 'Access history',
}

/** What was done, where the stored word is not one people use. */
const knownVerbs: Record<string, string> = {
  header_read: 'name and details read',
  glance_read: 'at a glance read',
  locked: 'signed or sent',
  list: 'list read',
  listed: 'list read',
  listOfChild: 'list read',
  file: 'picture read',
  thumbnail: 'small picture read',
  pdf: 'PDF read',
  revisions: 'earlier texts read',
  child: 'read',
  page: 'read',
  choices: 'whom to ask read',
  children: 'list read',
}

/** `revisionsRead` and `state_changed` as words: 'revisions read', 'state changed'. */
const spoken = (word: string) =>
  word
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .replaceAll('_', ' ')
    .toLowerCase()

/** An entry's action as people read it: 'sessionNote.signed' is 'Session note: signed'. */
export function accessActionWords(action: string): string {
  const [noun = '', verb = ''] = action.split('.')
  const known = nouns[noun] ?? nouns[noun.replace(/s$/, '')]
  const first = spoken(noun)
  return `${known ?? first.charAt(0).toUpperCase() + first.slice(1)}: ${knownVerbs[verb] ?? spoken(verb)}`
}

// A create asked for a second time writes nothing, and a file found damaged was only looked at.
const readingVerbs =
  /(?:^|_)(?:read|list|looked|opened|followed|pdf|file|thumbnail|damaged|revisions|child|page|choices|asked_again)/

/** Only whether something was read or written, for those who see no more than that. */
export const accessKindWords = (action: string): string =>
  readingVerbs.test(action.split('.')[1] ?? '') ? 'Read' : 'Written'
