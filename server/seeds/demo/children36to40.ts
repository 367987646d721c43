import {
  carer,
  carerWithoutAccount,
  child,
  consent,
  fromParent,
  fromSchool,
  path,
  referral,
  usualConsents,
} from './childParts.ts'
import type { DemoChild, DemoReferral } from './demoTypes.ts'

export const children36to40: readonly DemoChild[] = [
  child({
    number: 36,
    givenName: 'Nikau',
    familyName: 'Edgecombe',
    age: { years: 11, months: 9 },
    ageDays: 11,
    classKey: '7a',
    writingHand: 'left',
    strengths: 'Sails a dinghy by himself\nKeeps a diary of the weather\nA calm and steady worker',
    therapist: 'tomasz',
    referral: referral({
      day: -300,
      source: 'school',
      from: fromSchool('brindlemoor'),
      concerns: ['handwriting', 'speed'],
      reason:
        'Nikau writes with his left hand, slowly and with great care, and seldom finishes. He asks for help himself, which we think speaks well of him.',
    }),
    carers: [carer('ruthEdgecombe', 'mother')],
    consents: usualConsents(-274),
    steps: path(
      {
        triaged: -295,
        waiting: -295,
        consented: -274,
        assessing: -262,
        formulated: -246,
        active: -240,
        discharged: -70,
      },
      'tomasz',
      {
        discharged: 'The family has moved away. Summary given to them for the new clinic.',
      },
    ),
  }),
  child({
    number: 37,
    givenName: 'Saoirse',
    familyName: 'Tierney-Vale',
    age: { years: 12, months: 1 },
    ageDays: 25,
    homeLanguages: 'English, Irish',
    classKey: '8c',
    writingHand: 'left',
    strengths:
      'Writes songs and plays them on the tin whistle\nFair-minded, and a class representative\nAn eye for design',
    therapist: 'rohan',
    referral: referral({
      day: -112,
      source: 'school',
      from: fromSchool('brindlemoor'),
      concerns: ['pain_fatigue', 'speed'],
      reason:
        'Saoirse is left-handed and stops writing after ten minutes because her hand and forearm are sore. She has fallen behind in subjects with long written answers. School tests are coming next year.',
    }),
    carers: [carer('orlaTierney', 'mother')],
    consents: [...usualConsents(-86), consent('share_doctor', -86)],
    steps: path(
      { triaged: -107, waiting: -107, consented: -86, assessing: -78, formulated: -66, active: -62 },
      'rohan',
    ),
    nextReviewDay: 24,
  }),
  child({
    number: 38,
    givenName: 'Emre',
    familyName: 'Kocabaş',
    age: { years: 12, months: 6 },
    ageDays: 6,
    homeLanguages: 'English, Turkish',
    classKey: '8c',
    writingHand: 'left',
    strengths:
      'Wants to learn the guitar and has taught himself two songs\nBuilds shelves with his uncle\nSpeaks up for others',
    therapist: 'mairi',
    referral: referral({
      day: -260,
      source: 'parent',
      from: fromParent('selimKocabas'),
      concerns: ['scissors_tools', 'other'],
      reason:
        'Emre writes with his left hand and does other things with either. At school he has started woodwork and at home he wants a guitar. Which way round should he learn, and what should the workshop know?',
    }),
    carers: [carer('selimKocabas', 'father')],
    consents: usualConsents(-232),
    steps: path(
      {
        triaged: -255,
        waiting: -255,
        consented: -232,
        assessing: -220,
        formulated: -204,
        active: -198,
        review: -52,
      },
      'mairi',
    ),
    nextReviewDay: 26,
  }),
  child({
    number: 39,
    givenName: 'Thandeka',
    familyName: 'Moloi-Price',
    age: { years: 13, months: 4 },
    ageDays: 22,
    homeLanguages: 'English, Zulu',
    classKey: '9b',
    writingHand: 'swaps',
    strengths: 'Plays hockey for the school\nLearns languages fast\nKeeps her friends together',
    therapist: 'adaeze',
    referral: referral({
      day: -27,
      source: 'school',
      from: fromSchool('brindlemoor'),
      concerns: ['handwriting', 'other'],
      reason:
        'Thandeka has always been left-handed. For about a week something has been different: she now writes with her right hand and is not herself. She let her tray fall at lunch twice. We are worried and did not know whom to ask.',
      priorityReason:
        'A sudden change of hand at thirteen: ring the family this morning, before anything else.',
    }),
    carers: [carer('leratoMoloi', 'mother')],
    consents: [
      ...(['assessment_treatment', 'share_doctor'] as const).map((purpose) =>
        consent(purpose, -27, {
          method: 'phone_witnessed',
          recordedBy: 'ines',
          note: 'Witnessed by Pauline Osterby',
        }),
      ),
      ...usualConsents(-16).filter(({ purpose }) => purpose !== 'assessment_treatment'),
    ],
    steps: path({ triaged: -27, consented: -16, assessing: -14 }, 'adaeze', {
      triaged: 'Acted on the same day, see the alert. Therapy begins only when the hospital agrees.',
      assessing:
        'The hospital has seen Thandeka, treatment has begun and the doctor asks for an account of her hand use.',
    }),
    nextReviewDay: 7,
  }),
  child({
    number: 40,
    givenName: 'Conrad',
    familyName: 'Aspinall-Reyes',
    age: { years: 14, months: 3 },
    ageDays: 13,
    homeLanguages: 'English, Spanish',
    consentsForSelf: true,
    classKey: '9b',
    writingHand: 'left',
    strengths: 'Writes computer games\nReliable: does what he says he will\nKnows what works for him',
    therapist: 'tomasz',
    referral: referral({
      day: -450,
      source: 'school',
      from: fromSchool('brindlemoor'),
      concerns: ['speed', 'handwriting'],
      reason:
        'Conrad is left-handed and cannot keep up in long written tests. He asked us himself whether a keyboard would be allowed and what he would need to show.',
    }),
    carers: [
      carer('conradAspinallReyes', 'self', { parentalResponsibility: 'no' }),
      carerWithoutAccount('Pilar Reyes', 'mother', { phone: '01632 960 810' }),
    ],
    consents: usualConsents(-424, {
      basis: 'young_person_competent',
      method: 'in_person',
      recordedBy: 'tomasz',
      note: 'Understands what is agreed and consents for himself. He does not wish letters to go to his mother.',
    }),
    steps: path(
      {
        triaged: -444,
        waiting: -444,
        consented: -424,
        assessing: -410,
        formulated: -395,
        active: -390,
        review: -250,
        discharged: -180,
      },
      'tomasz',
      { discharged: 'Goals met. Conrad types in tests and knows when to come back.' },
    ),
  }),
]

/** Conrad asks again, for the examination year: a new episode once it is accepted. */
export const conradAgain: DemoReferral = referral({
  day: -12,
  source: 'school',
  from: fromSchool('brindlemoor'),
  concerns: ['speed'],
  reason:
    'Conrad was with you until last year and did well. He now enters the examination year and the board asks for a new measure of his writing speed before it allows the keyboard. Could you see him again?',
})
